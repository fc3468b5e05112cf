import { describe, expect, it } from 'vitest';
import { predictPolar } from '../../src/polar/index.js';
import {
  percentCsv,
  percentTable,
  type TargetCard,
  targetCard,
  targetsCardPage,
  targetsCsv,
  targetsJson,
  targetsText,
} from '../../src/publish/index.js';
import { degrees, fromKnots, radians, toKnots } from '../../src/units/index.js';
import { demoBoat } from '../support/demo.js';

const reachAngles = [60, 90].map(radians);
const polar = predictPolar(demoBoat('trapeze-dinghy'), {
  tws: [6, 12].map(fromKnots),
  twa: [30, 40, 50, 60, 90, 120, 140, 160, 180].map(radians),
});
const choice = { reachAngles, shares: [], label: '' };
const full = targetCard(polar, choice);
const sea = { what: 'sea', share: 0.96 };
const crew = { what: 'crew', share: 0.95 };
const eased = targetCard(polar, { ...choice, shares: [sea, crew] });
const style = { unit: 'kn', decimals: 2 } as const;

const HOSTILE = `=cmd()|"x"</td><script>alert(1)</script>'&\u202e\u001b[31m`;

function hostileCard(): TargetCard {
  const spoil = <T extends object>(c: T): T =>
    'state' in c ? { ...c, state: { ...(c.state as object), sailSet: HOSTILE } } : c;
  return {
    ...full,
    boatName: `${HOSTILE}${'x'.repeat(10_000)}`,
    label: HOSTILE,
    winds: full.winds.map((w) => ({ ...w, up: spoil(w.up), down: spoil(w.down), reach: w.reach.map(spoil) })),
  };
}

describe('the target card', () => {
  it('at full speed is the polar itself: best VMG and the reaches asked for', () => {
    full.winds.forEach((w, i) => {
      for (const [cell, r] of [
        [w.up, polar.bestUp[i]!],
        [w.down, polar.bestDown[i]!],
        [w.reach[0]!, polar.results[i]![3]!],
        [w.reach[1]!, polar.results[i]![4]!],
      ] as const) {
        if (!cell.ok || r.status !== 'balanced') throw new Error('the demo boat sails here');
        expect(cell).toMatchObject({ speed: r.speed, vmg: r.vmg, aws: r.aws, awa: r.awa, state: r });
      }
    });
  });

  it('derated keeps the angle; speed and VMG fall by the product of the shares', () => {
    expect(eased.share).toBeCloseTo(0.912, 12);
    full.winds.forEach((w, i) => {
      const [a, b] = [w.up, eased.winds[i]!.up];
      if (!a.ok || !b.ok) throw new Error('the demo boat sails here');
      expect(b.state.twa).toBe(a.state.twa);
      expect(b.speed).toBeCloseTo(0.912 * a.speed, 12);
      expect(b.vmg).toBeCloseTo(b.speed * Math.cos(b.state.twa), 9);
    });
  });

  it('derated has the apparent wind of the lower speed: the wind triangle closes', () => {
    for (const w of eased.winds)
      for (const c of [w.up, w.down, ...w.reach]) {
        if (!c.ok) throw new Error('the demo boat sails here');
        // Less the boat's own motion, the apparent wind is the true wind again.
        const { leeway, tws, twa } = c.state;
        const ahead = c.aws * Math.cos(c.awa) - c.speed * Math.cos(leeway);
        const windward = c.aws * Math.sin(c.awa) + c.speed * Math.sin(leeway);
        expect(Math.hypot(ahead, windward)).toBeCloseTo(tws, 9);
        // Dead astern the angle may come out on either side.
        expect(Math.cos(Math.atan2(windward, ahead) + leeway - twa)).toBeCloseTo(1, 12);
      }
    // Slower upwind: less wind from ahead, so it comes from further aft.
    const [a, b] = [full.winds[1]!.up, eased.winds[1]!.up];
    if (a.ok && b.ok) {
      expect(b.aws).toBeLessThan(a.aws);
      expect(b.awa).toBeGreaterThan(a.awa);
    }
  });

  it('wants reaching angles of the grid', () => {
    expect(() => targetCard(polar, { ...choice, reachAngles: [1.234] })).toThrow(/1\.234 rad is not on/);
  });

  it('shows a reason, never a figure, where no state balances', () => {
    const [wind] = full.winds;
    const why = { ok: false, twa: 0, why: 'overpowered', reason: 'for the test' } as const;
    const card = { ...full, winds: [{ ...wind!, up: why }] };
    expect(targetsText(card, style, { percents: true })).toMatch(
      /6\.0 +up +overpowered\n[\s\S]*6\.0 kn up: overpowered\. for the test/,
    );
    expect(targetsCsv(card, style)).toMatch(/^up,6\.00,,,{11},100\.0,,10\.00,overpowered,for the test,$/m);
    expect(targetsCardPage(card, 'kn', 'A6')).toContain('<td class="none" colspan="5">overpowered</td>');
    expect(percentTable(card, 'up').tws).toEqual([]);
    expect(JSON.parse(targetsJson(card, style)).winds[0].best_vmg_up).toEqual({
      status: 'unbalanced',
      why: 'overpowered',
      reason: 'for the test',
    });
  });

  it('says what was taken off, and at which height the wind is', () => {
    const text = targetsText({ ...eased, label: 'first season' }, style, { percents: false });
    expect(text).toMatch(
      /targets, wind at 10 m, kn\nSpeeds: 91\.2 % of the predicted speed: sea 96 %, crew 95 %\.\nfirst season\n/,
    );
    const page = targetsCardPage(eased, 'kn', 'A5');
    expect(page).toContain('Wind at 10 m. Speeds in kn. 91.2 % of prediction (sea 96 %, crew 95 %).');
    expect(targetsCsv(eased, style)).toContain(',91.2,');
    expect(JSON.parse(targetsJson(eased, style))).toMatchObject({
      percent_of_prediction: 91.2,
      taken_off: [
        { what: 'sea', percent_left: 96 },
        { what: 'crew', percent_left: 95 },
      ],
    });
  });

  it('has the same figures in table, CSV and JSON, in kn and in m/s', () => {
    for (const unit of ['kn', 'm/s'] as const) {
      const u = unit === 'kn' ? 'kn' : 'm_s';
      const [head, first] = targetsCsv(full, { unit, decimals: 2 })
        .split('\r\n')
        .map((l) => l.split(','));
      const at = (name: string): string => first![head!.indexOf(name)]!;
      const up = full.winds[0]!.up;
      if (!up.ok) throw new Error('the demo boat sails here');
      const speed = unit === 'kn' ? toKnots(up.speed) : up.speed;
      expect(at(`target_speed_${u}`)).toBe(speed.toFixed(2));
      expect(at('twa_deg')).toBe(degrees(up.state.twa).toFixed(1));
      const text = targetsText(full, { unit, decimals: 2 }, { percents: false });
      expect(text).toMatch(new RegExp(`up +${at('twa_deg')} +${at(`target_speed_${u}`)} `));
      const json = JSON.parse(targetsJson(full, { unit, decimals: 2 }));
      expect(json.winds[0].best_vmg_up[`target_speed_${u}`]).toBeCloseTo(speed, 8);
    }
  });

  it('keeps hostile names harmless and short', () => {
    const card = hostileCard();
    const page = targetsCardPage(card, 'kn', 'A6');
    expect(page).not.toContain('<script');
    for (const c of ['\u202e', '\u001b']) expect(page).not.toContain(c);
    expect(page.length).toBeLessThan(40_000);
    const csv = targetsCsv(card, style);
    expect(csv).not.toMatch(/(^|,)"?=cmd/m);
    expect(csv).toContain(`"'=cmd()|""x""`);
    const text = targetsText(card, style, { percents: true });
    for (const c of ['\u202e', '\u001b']) expect(text).not.toContain(c);
    expect(Math.max(...text.split('\n').map((l) => [...l].length))).toBeLessThanOrEqual(100);
    expect(JSON.parse(targetsJson(card, style)).label).toBe(HOSTILE);
  });
});

describe('percent of target', () => {
  it('holds the target at 100, and the percent of every other speed in it', () => {
    for (const course of ['up', 'down'] as const) {
      const t = percentTable(full, course);
      expect(t.tws).toEqual(polar.tws);
      full.winds.forEach((w, i) => {
        const cell = w[course];
        if (!cell.ok) throw new Error('the demo boat sails here');
        for (const r of t.rows) expect((100 * r.speeds[i]!) / cell.speed).toBeCloseTo(r.percent, 9);
        expect(t.rows.find((r) => r.percent === 100)!.speeds[i]).toBe(cell.speed);
      });
    }
  });

  it('is of the derated target', () => {
    const speed = (c: TargetCard): number =>
      percentTable(c, 'up').rows.find((r) => r.percent === 100)!.speeds[0]!;
    expect(speed(eased)).toBeCloseTo(0.912 * speed(full), 12);
  });

  it('of one boat speed is 100 at the target itself', () => {
    const up = full.winds[1]!.up;
    if (!up.ok) throw new Error('the demo boat sails here');
    const text = targetsText(full, style, { percents: false, boatSpeed: up.speed });
    const row = text
      .split('in percent of target\n')[1]!
      .split('\n')
      .find((l) => l.startsWith('12.0'))!;
    expect(row.trim().split(/ +/)[1]).toBe('100');
  });

  it('goes out as one row a percent and wind', () => {
    const lines = percentCsv(full, style).trimEnd().split('\r\n');
    expect(lines[0]).toBe('course,tws_kn,percent_of_target,boat_speed_kn');
    expect(lines).toHaveLength(1 + 2 * 2 * percentTable(full, 'up').rows.length);
    expect(lines[1]).toMatch(/^up,6\.00,110,\d\.\d\d$/);
  });
});
