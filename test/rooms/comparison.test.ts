import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { boatWithFactors, FACTOR_NAMES, NO_FACTORS, readBoat, variantGrid } from '../../src/boat/index.js';
import {
  type Comparison,
  comparison,
  crossoversOf,
  type Entrant,
  factorDraws,
  linearShares,
  namedCourse,
  pairCertainty,
  quantile,
  SPREADS,
  timesUnderFactors,
  variantTimes,
  windTable,
} from '../../src/racecourse/index.js';

const KNOT = 1852 / 3600;
const TEXT = readFileSync('boats/single-hander.yaml', 'utf8');
const course = namedCourse('windward-leeward');
const wind = windTable('', [
  { tws: 6 * KNOT, share: 1 },
  { tws: 14 * KNOT, share: 1 },
]);
const draw = factorDraws(7);
const draws = Array.from({ length: 32 }, (_, i) => draw(i));
const z = draws.map((d) => d.z);

const entrant = (name: string, vary?: string): Entrant & { readonly boat: ReturnType<typeof readBoat> } => {
  const changes = vary === undefined ? [] : variantGrid([vary], TEXT).at(0).changes;
  const boat = readBoat(TEXT, 'boat.yaml', undefined, undefined, changes);
  const known = variantTimes(boat, course, wind);
  const drawn = timesUnderFactors(
    boat,
    course,
    wind.tws,
    known,
    draws.map((d) => d.factors),
  );
  return { name, known, drawn, boat };
};
const base = entrant('base');
const heavy = entrant('heavy crew', 'crew.mass_each = times 1.1');
const bigger = entrant('more sail', 'sails.main.area = times 1.08');
const run = (list: readonly Entrant[]): Comparison => comparison(list, course, wind, { z, seed: 7 });

describe('a comparison', () => {
  it('of a boat with itself is exactly 0 everywhere, with a probability of exactly 50 %', () => {
    const twin = { ...entrant('twin', 'crew.mass_each = times 1') };
    const c = run([base, twin]);
    const other = c.ranking.find((s) => s.entrant === 1)!;
    expect(other.difference).toBe(0);
    expect(other.againstBase).toMatchObject({ quicker: 0.5, mean: 0, deviation: 0, low: 0, high: 0 });
    for (const v of c.differences[1]!.flat()) expect(Number.isNaN(v) || v === 0).toBe(true);
    expect(c.differences[1]!.flat().filter((v) => v === 0).length).toBeGreaterThan(20);
    expect(c.crossovers).toEqual([]);
    expect(c.quicker).toEqual([
      [0.5, 0.5],
      [0.5, 0.5],
    ]);
  });

  it('does not depend on the order in which the variants are named', () => {
    const one = run([base, heavy, bigger]);
    const two = run([base, bigger, heavy]);
    const bare = (c: Comparison) => c.ranking.map(({ entrant: _, ...s }) => s);
    expect(bare(two)).toEqual(bare(one));
    expect(one.quicker[1]![2]).toBe(two.quicker[2]![1]);
    expect(one.quicker[1]![2]! + one.quicker[2]![1]!).toBeCloseTo(1, 12);
    // Nor does a pair's difference on the base, but for its sign.
    const back = run([heavy, base]);
    const there = one.ranking.find((s) => s.name === 'heavy crew')!;
    const here = back.ranking.find((s) => s.name === 'base')!;
    expect(here.difference).toBe(-there.difference);
    expect(here.againstBase!.quicker).toBeCloseTo(1 - there.againstBase!.quicker, 12);
  });

  it('finds a difference far surer than the times themselves', () => {
    const c = run([base, bigger]);
    const s = c.ranking.find((r) => r.entrant === 1)!;
    expect(c.baseDeviation).toBeGreaterThan(5);
    expect(s.againstBase!.deviation).toBeLessThan(0.5 * c.baseDeviation);
    expect(s.againstBase!.low).toBeLessThan(s.againstBase!.high);
  });

  it('gives more crew its due: slower in light air, and turning the order as the wind rises', () => {
    const c = run([base, heavy]);
    expect(c.times[1]![0]! - c.times[0]![0]!).toBeGreaterThan(0);
    expect(c.times[1]![1]! - c.times[0]![1]!).toBeLessThan(0);
    expect(c.crossovers).toHaveLength(1);
    expect(c.crossovers[0]).toMatchObject({ quickerBelow: 0, quickerAbove: 1 });
    expect(c.crossovers[0]!.tws).toBeGreaterThan(wind.tws[0]!);
    expect(c.crossovers[0]!.tws).toBeLessThan(wind.tws[1]!);
    const worst = c.ranking.find((s) => s.entrant === 1)!.worst!;
    expect(worst.tws).toBe(wind.tws[0]);
    expect(worst.loss).toBeCloseTo(c.times[1]![0]! - c.times[0]![0]!, 12);
  });

  it('keeps a wind that somebody cannot sail out of the ranking, and says so', () => {
    const lame: Entrant = {
      ...bigger,
      name: 'lame',
      known: { ...bigger.known, times: [bigger.known.times[0]!, { ok: false, reason: 'overpowered' }] },
      drawn: bigger.drawn.map((t) => [t[0]!, Number.NaN]),
    };
    const c = run([base, lame]);
    expect(c.covered).toBeCloseTo(0.5, 12);
    const s = c.ranking.find((r) => r.entrant === 1)!;
    expect(s.unsailed).toEqual([{ tws: wind.tws[1], reason: 'overpowered' }]);
    expect(c.ranking.find((r) => r.entrant === 0)!.secondsPerMile).toBeCloseTo(c.times[0]![0]!, 9);
    expect(s.againstBase!.partly).toBe(draws.length);
  });
});

describe('the draws', () => {
  it('leave the times as they are where all constants are as they are', () => {
    for (const e of [base, heavy]) {
      const [plain] = timesUnderFactors(e.boat, course, wind.tws, e.known, [NO_FACTORS]);
      e.known.times.forEach((t, i) => {
        expect(plain![i]).toBeCloseTo(t.ok ? t.secondsPerMile : Number.NaN, 6);
      });
    }
  });

  it('give each the same answer alone as among others, bit for bit', () => {
    const alone = timesUnderFactors(base.boat, course, wind.tws, base.known, [draws[20]!.factors]);
    expect(alone[0]).toEqual(base.drawn[20]);
  });

  it('solved near the angles of the unchanged boat err by less than a tenth of the spread they measure', () => {
    const off = [1, 2, 3, 4].flatMap((i) => {
      const full = variantTimes(boatWithFactors(base.boat, draws[i]!.factors), course, wind);
      return full.times.map((t, k) => base.drawn[i]![k]! / (t.ok ? t.secondsPerMile : Number.NaN) - 1);
    });
    const spread = wind.tws.map((_, k) => {
      const all = base.drawn.map((d) => d[k]!);
      const mean = all.reduce((x, y) => x + y, 0) / all.length;
      return Math.sqrt(all.reduce((x, y) => x + (y / mean - 1) ** 2, 0) / all.length);
    });
    const rms = Math.sqrt(off.reduce((x, y) => x + y * y, 0) / off.length);
    expect(rms).toBeLessThan(0.1 * Math.min(...spread));
  });

  it('have a spread with a source for every factor, and a median of 1', () => {
    expect(SPREADS.map((s) => s.factor).sort()).toEqual([...FACTOR_NAMES].sort());
    for (const s of SPREADS) {
      expect(s.sigma).toBeGreaterThan(0);
      expect(s.source.length).toBeGreaterThan(8);
    }
    const many = Array.from({ length: 512 }, (_, i) => draw(i).factors);
    for (const f of FACTOR_NAMES) {
      const sorted = many.map((m) => m[f]).sort((a, b) => a - b);
      expect(quantile(sorted, 0.5), f).toBeCloseTo(1, 2);
    }
  });
});

describe('what is made of the draws', () => {
  it('counts ties half and leaves out what neither can sail', () => {
    const one = windTable('', [{ tws: 5, share: 1 }]);
    const p = pairCertainty([[1], [2], [3], [Number.NaN]], [[2], [2], [1], [5]], one, z.slice(0, 4));
    expect(p).toMatchObject({ quicker: 0.5, draws: 3, leftOut: 1 });
    expect(p.mean).toBeCloseTo(1 / 3, 12);
    expect(pairCertainty([[Number.NaN]], [[1]], one, z.slice(0, 1))).toMatchObject({ draws: 0, leftOut: 1 });
  });

  it('shares the variance of a plane out among its columns exactly', () => {
    const columns = Array.from({ length: 256 }, (_, i) => draw(i).z);
    const y = columns.map((c) => 3 * c[0]! - 4 * c[2]! + 7);
    const shares = linearShares(y, columns);
    expect(shares[0]).toBeCloseTo(9 / 25, 1);
    expect(shares[2]).toBeCloseTo(16 / 25, 1);
    expect(shares.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 1);
    expect(shares[1]).toBeLessThan(1e-20);
    expect(linearShares(y.slice(0, 5), columns.slice(0, 5))).toEqual([]);
    expect(
      linearShares(
        columns.map(() => 1),
        columns,
      ),
    ).toEqual([]);
  });

  it('finds where two rows cross, over gaps and ties', () => {
    expect(crossoversOf([4, 6, 8], [10, 10, 10], [12, 11, 9])).toEqual([{ tws: 7, firstBelow: true }]);
    expect(crossoversOf([4, 6, 8], [10, 10, 10], [12, Number.NaN, 8])).toEqual([
      { tws: 6, firstBelow: true },
    ]);
    expect(crossoversOf([4, 6, 8], [10, 10, 10], [12, 10, 12])).toEqual([]);
  });
});
