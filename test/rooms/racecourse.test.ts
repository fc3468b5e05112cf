import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  COURSE_NAMES,
  courseOf,
  courseTime,
  expectedTime,
  legTime,
  NAUTICAL_MILE,
  namedCourse,
  observedWind,
  type SailedPoint,
  steadyWind,
  weibullScale,
  weibullWind,
  windTable,
} from '../../src/racecourse/index.js';

const DEG = Math.PI / 180;
const angles = Array.from({ length: 31 }, (_, i) => (30 + 5 * i) * DEG);
/** A boat whose speed is the same at every angle it can sail. */
const steady = (speed: number, from = 30): SailedPoint[] =>
  angles.filter((a) => a >= from * DEG - 1e-9).map((twa) => ({ twa, speed }));
const seconds = (points: readonly SailedPoint[], twa: number): number => {
  const t = legTime(points, twa);
  if (!t.ok) throw new Error(t.reason);
  return t.secondsPerMile;
};

const randomPolar = fc
  .array(fc.double({ min: 0.5, max: 6, noNaN: true }), { minLength: 31, maxLength: 31 })
  .map((v) => angles.map((twa, i) => ({ twa, speed: v[i]! })));
const direction = fc.double({ min: 0, max: Math.PI, noNaN: true });

describe('courses', () => {
  it('have shares that add up to 1 and directions that close where the course is a closed one', () => {
    for (const name of COURSE_NAMES) {
      const c = namedCourse(name);
      expect(c.legs.reduce((s, l) => s + l.share, 0)).toBeCloseTo(1, 14);
    }
    for (const name of ['windward-leeward', 'triangle', 'right-triangle', 'trapezoid'] as const) {
      const along = namedCourse(name).legs.reduce((s, l) => s + l.share * Math.cos(l.twa), 0);
      expect(along, name).toBeCloseTo(0, 12);
    }
  });

  it('refuse legs without length or outside the half circle', () => {
    expect(() => courseOf('x', [])).toThrow(/needs a leg/);
    expect(() => courseOf('x', [{ twa: -0.1, length: 1 }])).toThrow(/outside 0 to pi/);
    expect(() => courseOf('x', [{ twa: 1, length: 0 }])).toThrow(/not above 0/);
  });
});

describe('the time of a leg', () => {
  it('is the closed form for a boat of one speed that points no higher than 30 deg', () => {
    const v = 3;
    const mile = NAUTICAL_MILE / v;
    // Dead to windward it tacks through 60 deg and makes good v cos 30; off the wind it goes straight.
    expect(seconds(steady(v), 0)).toBeCloseTo(mile / Math.cos(30 * DEG), 9);
    expect(seconds(steady(v), 90 * DEG)).toBeCloseTo(mile, 9);
    expect(seconds(steady(v), 180 * DEG)).toBeCloseTo(mile, 9);
    // Between close-hauled on either tack the hull's edge is straight across the wind: v cos 30 / cos(angle).
    expect(seconds(steady(v), 20 * DEG)).toBeCloseTo((mile * Math.cos(20 * DEG)) / Math.cos(30 * DEG), 9);
    const course = courseTime(steady(v), namedCourse('windward-leeward'));
    expect(course.ok && course.secondsPerMile).toBeCloseTo((mile / Math.cos(30 * DEG) + mile) / 2, 9);
  });

  it('says how the leg is sailed', () => {
    const manner = (points: readonly SailedPoint[], deg: number) => {
      const t = legTime(points, deg * DEG);
      return t.ok ? t.manner : t.reason;
    };
    const slowRun = steady(3).map((p) => (p.twa > 150 * DEG ? { ...p, speed: 1 } : p));
    expect(manner(steady(3), 0)).toBe('tacking');
    expect(manner(steady(3), 90)).toBe('direct');
    expect(manner(steady(3), 180)).toBe('direct');
    expect(manner(slowRun, 180)).toBe('gybing');
    const hole = steady(3).filter((p) => Math.abs(p.twa - 90 * DEG) > 0.2);
    expect(manner(hole, 90)).toBe('two angles');
    expect(manner([{ twa: 90 * DEG, speed: 3 }], 0)).toMatch(/no mix of balanced states/);
  });

  it('never gains by a detour: two legs take no less time than their sum', () => {
    fc.assert(
      fc.property(
        randomPolar,
        direction,
        direction,
        fc.double({ min: 0.1, max: 3, noNaN: true }),
        (points, a, b, q) => {
          const x = Math.cos(a) + q * Math.cos(b);
          const y = Math.sin(a) + q * Math.sin(b);
          const r = Math.hypot(x, y);
          if (r < 1e-3) return;
          const whole = r * seconds(points, Math.atan2(y, x));
          expect(whole).toBeLessThanOrEqual((seconds(points, a) + q * seconds(points, b)) * (1 + 1e-9));
        },
      ),
      { numRuns: 60, seed: 1 },
    );
  });

  it('is no longer than going straight, and falls as any state gets faster', () => {
    fc.assert(
      fc.property(randomPolar, fc.nat(30), (points, k) => {
        const leg = points[k]!;
        const before = seconds(points, leg.twa);
        expect(before).toBeLessThanOrEqual((NAUTICAL_MILE / leg.speed) * (1 + 1e-12));
        const faster = points.map((p, i) => (i === k ? { ...p, speed: 1.1 * p.speed } : p));
        for (const twa of [0, 1, 2, Math.PI])
          expect(seconds(faster, twa)).toBeLessThanOrEqual(seconds(points, twa) * (1 + 1e-12));
      }),
      { numRuns: 40, seed: 2 },
    );
  });

  it('scales with the inverse of speed', () => {
    const points = angles.map((twa) => ({ twa, speed: 2 + Math.sin(twa) }));
    const twice = points.map((p) => ({ ...p, speed: 2 * p.speed }));
    for (const twa of [0, 0.7, 1.6, Math.PI])
      expect(2 * seconds(twice, twa)).toBeCloseTo(seconds(points, twa), 9);
  });

  it('counts manoeuvres only where they are sailed, and goes straight where that is cheaper', () => {
    const cost = { tacksPerMile: 10, gybesPerMile: 4, tack: 5, gybe: 3 };
    const of = (points: readonly SailedPoint[], deg: number) => {
      const t = legTime(points, deg * DEG, cost);
      if (!t.ok) throw new Error(t.reason);
      return t;
    };
    expect(of(steady(3), 0).secondsPerMile).toBeCloseTo(seconds(steady(3), 0) + 50, 9);
    expect(of(steady(3), 90).secondsPerMile).toBeCloseTo(seconds(steady(3), 90 * DEG), 9);
    // Gybing saves less than four gybes cost: dead before the wind then.
    const nearly = steady(3).map((p) => (p.twa > 177 * DEG ? { ...p, speed: 2.98 } : p));
    expect(legTime(nearly, Math.PI)).toMatchObject({ manner: 'gybing' });
    expect(of(nearly, 180).manner).toBe('direct');
  });
});

describe('winds', () => {
  it('are tables whose shares add up to 1, equal speeds added up', () => {
    const t = windTable('', [
      { tws: 6, share: 2 },
      { tws: 4, share: 1 },
      { tws: 6, share: 1 },
    ]);
    expect(t.tws).toEqual([4, 6]);
    expect(t.share).toEqual([0.25, 0.75]);
    expect(() => windTable('', [{ tws: -1, share: 1 }])).toThrow(/outside 0 to 60/);
    expect(() => windTable('', [{ tws: 4, share: 0 }])).toThrow(/add up to nothing/);
  });

  it('keep the mean of the observations they are made of', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: 0.1, max: 20, noNaN: true }), { minLength: 1, maxLength: 80 }),
        (obs) => {
          const t = observedWind('', obs, 1);
          const mean = t.tws.reduce((s, v, i) => s + v * t.share[i]!, 0);
          expect(mean).toBeCloseTo(obs.reduce((a, b) => a + b, 0) / obs.length, 9);
        },
      ),
      { numRuns: 50, seed: 3 },
    );
  });

  it('of Weibull have the mean they are asked for, and Rayleigh its closed form', () => {
    expect(weibullScale(7, 2)).toBeCloseTo(7 / (Math.sqrt(Math.PI) / 2), 9);
    expect(weibullScale(7, 1)).toBeCloseTo(7, 9);
    const scale = weibullScale(6, 1.9);
    const t = weibullWind('', { scale, shape: 1.9, least: 0, most: 50, bands: 2000 });
    expect(t.tws.reduce((s, v, i) => s + v * t.share[i]!, 0)).toBeCloseTo(6, 2);
    const some = weibullWind('', { scale, shape: 1.9, least: 3, most: 10, bands: 5 });
    expect(Math.min(...some.tws)).toBeGreaterThan(3);
    expect(Math.max(...some.tws)).toBeLessThan(10);
  });

  it('weigh the times of a course, and leave none out silently', () => {
    const course = namedCourse('downwind');
    const wind = windTable('', [
      { tws: 4, share: 1 },
      { tws: 8, share: 3 },
    ]);
    const both = expectedTime([courseTime(steady(2), course), courseTime(steady(4), course)], wind);
    expect(both.secondsPerMile).toBeCloseTo(NAUTICAL_MILE * (0.25 / 2 + 0.75 / 4), 9);
    expect(both.covered).toBeCloseTo(1, 12);
    const one = expectedTime([courseTime(steady(2), course), courseTime([], course)], wind);
    expect(one.covered).toBeCloseTo(0.25, 12);
    expect(one.winds[1]).toMatchObject({ ok: false, reason: expect.stringMatching(/^run: no mix/) });
    const single = expectedTime([courseTime(steady(2), course)], steadyWind(5, ''));
    expect(single.secondsPerMile).toBeCloseTo(NAUTICAL_MILE / 2, 9);
  });
});
