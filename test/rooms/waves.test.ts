import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { BoatFileError, readBoat } from '../../src/boat/index.js';
import { fetchLimitedSea } from '../../src/environment/index.js';
import { forceBalance, solveState } from '../../src/equilibrium/index.js';

const G = 9.80665;
const text = readFileSync('boats/keelboat.yaml', 'utf8');
const withWaves = (waves: string) => readBoat(`${text}\n${waves}\n`, 'keelboat.yaml');
const SEA = `waves:
  height: 0.5 m
  added_resistance:
    - { twa: 40 deg, coefficient: 0.08 }
    - { twa: 120 deg, coefficient: 0.02 }`;

describe('a sea', () => {
  it('raised over a fetch follows the published growth and stops when fully developed', () => {
    // g Hs / U^2 = 0.0016 sqrt(g F / U^2): 10 m/s over 10 km.
    const s = fetchLimitedSea(10, 10000, G);
    expect((G * s.height) / 100).toBeCloseTo(0.0016 * Math.sqrt((G * 10000) / 100), 12);
    expect((G * s.period) / 10).toBeCloseTo(0.286 * Math.cbrt((G * 10000) / 100), 12);
    const full = fetchLimitedSea(10, 1e8, G);
    expect((G * full.height) / 100).toBeCloseTo(0.243, 12);
    expect((G * full.period) / 10).toBeCloseTo(8.134, 12);
    expect(fetchLimitedSea(0, 1000, G)).toEqual({ height: 0, period: 0 });
  });

  it('costs nothing unless the file says so, and then what the file says', () => {
    const calm = readBoat(text, 'keelboat.yaml');
    const rough = withWaves(SEA);
    const wind = { tws: 6, twa: 0.75 };
    const a = solveState(calm, wind);
    const b = solveState(rough, wind);
    if (a.status !== 'balanced' || b.status !== 'balanced') throw new Error('no state');
    expect(b.speed).toBeLessThan(a.speed);
    const row = forceBalance(rough, b).rows.find((r) => r.name.startsWith('waves'))!;
    const { lwl, bwl } = rough.hull.form;
    const scale = (rough.spec.water.density * G * bwl ** 2 * 0.25) / lwl;
    const c = -row.forward / scale;
    expect(c).toBeGreaterThan(0.02);
    expect(c).toBeLessThan(0.08);
    expect(forceBalance(calm, a).rows.some((r) => r.name.startsWith('waves'))).toBe(false);
  });

  it('of a period takes the figures between those of its neighbours', () => {
    const rows = (period: string) => `waves:
  height: 0.5 m
  period: ${period}
  added_resistance:
    - { period: 2 s, twa: 40 deg, coefficient: 0.02 }
    - { period: 2 s, twa: 120 deg, coefficient: 0.01 }
    - { period: 4 s, twa: 40 deg, coefficient: 0.08 }
    - { period: 4 s, twa: 120 deg, coefficient: 0.03 }`;
    const speed = (period: string): number => {
      const s = solveState(withWaves(rows(period)), { tws: 6, twa: 0.75 });
      return s.status === 'balanced' ? s.speed : Number.NaN;
    };
    const [short, middle, long, longer] = ['2 s', '3 s', '4 s', '9 s'].map(speed);
    expect(middle).toBeLessThan(short!);
    expect(middle).toBeGreaterThan(long!);
    expect(longer).toBe(long);
    expect(() => withWaves(rows('3 s').replace('{ period: 4 s, twa: 40', '{ twa: 40'))).toThrow(
      /only some rows/,
    );
    expect(() => withWaves(rows('3 s').replace('  period: 3 s\n', ''))).toThrow(
      /by period, but the sea has none/,
    );
    expect(() => withWaves(rows('3 s').replaceAll('4 s', '1 s'))).toThrow(/periods must not fall/);
  });

  it('needs one of height and fetch, and rising angles', () => {
    expect(() => withWaves(SEA.replace('height: 0.5 m', 'height: 0.5 m\n  fetch: 2 km'))).toThrow(
      BoatFileError,
    );
    expect(() => withWaves(SEA.replace('120 deg', '30 deg'))).toThrow(/angles must rise/);
  });

  it('is written about in the check of its own range', () => {
    expect(() => withWaves(SEA.replace('0.5 m', '50 m'))).toThrow(/outside/);
  });
});

describe('roughness', () => {
  it('slows the boat, the more so the rougher', () => {
    const speeds = ['0 mm', '0.1 mm', '0.5 mm'].map((r) => {
      const b = readBoat(text.replace('  planes: no', `  planes: no\n  roughness: ${r}`), 'keelboat.yaml');
      const s = solveState(b, { tws: 4, twa: 1.6 });
      return s.status === 'balanced' ? s.speed : Number.NaN;
    });
    expect(speeds[1]).toBeLessThan(speeds[0]!);
    expect(speeds[2]).toBeLessThan(speeds[1]!);
  });
});
