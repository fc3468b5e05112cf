import { describe, expect, it } from 'vitest';
import { normalQuantile, SOBOL_DIMENSIONS, sobolPoints } from '../../src/numerics/index.js';

const first = (n: number, seed: number, dimensions = SOBOL_DIMENSIONS): Float64Array[] => {
  const point = sobolPoints(dimensions, seed);
  return Array.from({ length: n }, (_, i) => point(i));
};

describe('the low-discrepancy sequence', () => {
  it('puts one of 2^k points into each of 2^k equal slices, in every dimension and from any seed', () => {
    for (const seed of [0, 1, 77])
      for (let k = 0; k <= 10; k++) {
        const points = first(2 ** k, seed);
        for (let j = 0; j < SOBOL_DIMENSIONS; j++)
          expect(new Set(points.map((p) => Math.floor(p[j]! * 2 ** k))).size).toBe(2 ** k);
      }
  });

  it('fills every pair of dimensions evenly', () => {
    const points = first(4096, 5);
    for (let a = 0; a < SOBOL_DIMENSIONS; a++)
      for (let b = 0; b < a; b++) {
        const cells = new Int32Array(64);
        for (const p of points) cells[8 * Math.floor(8 * p[a]!) + Math.floor(8 * p[b]!)]!++;
        expect(Math.max(...cells) - Math.min(...cells), `${a} and ${b}`).toBe(0);
      }
  });

  it('is a matter of number and seed alone', () => {
    const point = sobolPoints(4, 9);
    const late = point(700);
    expect([...sobolPoints(4, 9)(700)]).toEqual([...late]);
    expect([...sobolPoints(4, 10)(700)]).not.toEqual([...late]);
    expect(() => sobolPoints(99, 1)).toThrow(/dimensions/);
  });

  it('integrates a product far better than as many random points would', () => {
    const n = 1024;
    const mean = first(n, 3, 6).reduce((s, p) => s + p.reduce((a, v) => a * (1 + (v - 0.5)), 1), 0) / n;
    // Random points: standard deviation of about sqrt((13/12)^6 - 1) / sqrt(n) = 0.025.
    expect(Math.abs(mean - 1)).toBeLessThan(0.003);
  });
});

describe('the normal quantile', () => {
  it('agrees with printed values', () => {
    // Standard normal tables; the last from memory.
    expect(normalQuantile(0.5)).toBeCloseTo(0, 12);
    expect(normalQuantile(0.975)).toBeCloseTo(1.959963984540054, 8);
    expect(normalQuantile(0.001)).toBeCloseTo(-3.090232306167813, 8);
    expect(normalQuantile(0.8413447460685429)).toBeCloseTo(1, 8);
  });
});
