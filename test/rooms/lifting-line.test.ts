import { describe, expect, it } from 'vitest';
import { wakeEnergyMatrix, wakeLine } from '../../src/lifting-line/index.js';
import { choleskyFactor, coordinateDescent, createBoxQp, solveBoxQp } from '../../src/numerics/index.js';
import { seeded } from '../support/random.js';

describe('wake energy', () => {
  const lines = [wakeLine(1.3, 9.5, 16), wakeLine(0.9, 8.1, 16)];
  const a = wakeEnergyMatrix(lines, { image: true });

  it('is symmetric', () => {
    for (let i = 0; i < 32; i++) for (let j = 0; j < 32; j++) expect(a[i * 32 + j]).toBe(a[j * 32 + i]);
  });

  it('is positive: every random loading costs energy', () => {
    const random = seeded(1);
    for (let k = 0; k < 500; k++) {
      const g = Float64Array.from({ length: 32 }, () => random() - 0.5);
      let e = 0;
      for (let i = 0; i < 32; i++) for (let j = 0; j < 32; j++) e += g[i]! * a[i * 32 + j]! * g[j]!;
      expect(e).toBeGreaterThan(0);
    }
  });

  it('grows with the square of the scale of circulation and not with the scale of length', () => {
    const big = wakeEnergyMatrix([wakeLine(2.6, 19, 16), wakeLine(1.8, 16.2, 16)], { image: true });
    for (let k = 0; k < a.length; k++) expect(big[k]).toBeCloseTo(a[k]!, 10);
  });
});

describe('box-bounded quadratic programme', () => {
  function randomProblem(random: () => number, n: number) {
    const qp = createBoxQp(n);
    const m = Float64Array.from({ length: n * n }, () => random() - 0.5);
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        let s = i === j ? 0.05 : 0;
        for (let k = 0; k < n; k++) s += m[i * n + k]! * m[j * n + k]!;
        qp.h[i * n + j] = s;
      }
      qp.g[i] = random() - 0.3;
      qp.upper[i] = random();
    }
    return qp;
  }

  it('agrees with coordinate descent to 1e-9 on 1000 random problems', () => {
    const random = seeded(7);
    for (let k = 0; k < 1000; k++) {
      const n = 2 + Math.floor(random() * 14);
      const qp = randomProblem(random, n);
      solveBoxQp(qp);
      const other = createBoxQp(n);
      other.h.set(qp.h);
      other.g.set(qp.g);
      other.upper.set(qp.upper);
      coordinateDescent(other, 200000, 1e-15);
      for (let i = 0; i < n; i++) expect(Math.abs(qp.x[i]! - other.x[i]!)).toBeLessThan(1e-9);
    }
  });

  it('gives the same answer from any warm start', () => {
    const random = seeded(11);
    for (let k = 0; k < 200; k++) {
      const qp = randomProblem(random, 12);
      solveBoxQp(qp);
      const first = qp.x.slice();
      for (let i = 0; i < 12; i++) qp.place[i] = Math.floor(random() * 3) - 1;
      solveBoxQp(qp);
      for (let i = 0; i < 12; i++) expect(qp.x[i]).toBeCloseTo(first[i]!, 11);
    }
  });

  it('refuses a matrix that is not positive definite', () => {
    expect(choleskyFactor(2, 2, Float64Array.from([1, 0, 2, 1]))).toBe(false);
  });
});
