import { describe, expect, it } from 'vitest';
import { createSmallQp } from '../../src/numerics/index.js';
import { seeded } from '../support/random.js';

describe('quadratic programmes of a few variables', () => {
  const random = seeded(77);
  const between = (a: number, b: number): number => a + (b - a) * random();

  it('meet their optimality conditions, or have no feasible point, on 5000 random problems', () => {
    const qp = createSmallQp(4, 20);
    let infeasible = 0;
    for (let k = 0; k < 5000; k++) {
      const n = 1 + Math.floor(4 * random());
      const m = Math.floor(19 * random());
      const root = Array.from({ length: n * n }, () => between(-1, 1));
      for (let i = 0; i < n; i++)
        for (let j = 0; j < n; j++) {
          let s = i === j ? 10 ** between(-4, 0) : 0;
          for (let l = 0; l < n; l++) s += root[i * n + l]! * root[j * n + l]!;
          qp.b[i * n + j] = s;
        }
      for (let i = 0; i < n; i++) qp.g[i] = between(-2, 2);
      for (let c = 0; c < m; c++) {
        for (let i = 0; i < n; i++) qp.normals[c * n + i] = between(-1, 1);
        qp.limits[c] = between(-0.2, 1);
      }
      const ok = qp.solve(n, m);
      if (!ok) {
        infeasible++;
        // No point of a fine random search meets all constraints with room to spare.
        let least = Number.POSITIVE_INFINITY;
        for (let t = 0; t < 300; t++) {
          const x = Array.from({ length: n }, () => between(-6, 6) * random());
          let v = Number.NEGATIVE_INFINITY;
          for (let c = 0; c < m; c++) {
            let s = -qp.limits[c]!;
            for (let i = 0; i < n; i++) s += qp.normals[c * n + i]! * x[i]!;
            v = Math.max(v, s);
          }
          least = Math.min(least, v);
        }
        expect(least).toBeGreaterThan(-1e-9);
        continue;
      }
      const scale = 1 + Math.max(...Array.from(qp.p.subarray(0, n), Math.abs));
      for (let c = 0; c < m; c++) {
        let s = -qp.limits[c]!;
        for (let i = 0; i < n; i++) s += qp.normals[c * n + i]! * qp.p[i]!;
        expect(s).toBeLessThan(1e-9 * scale);
        expect(qp.multipliers[c]).toBeGreaterThanOrEqual(0);
        expect(qp.multipliers[c]! * Math.abs(s)).toBeLessThan(1e-6 * scale * (1 + qp.multipliers[c]!));
      }
      for (let i = 0; i < n; i++) {
        let s = -qp.g[i]!;
        let size = Math.abs(qp.g[i]!);
        for (let j = 0; j < n; j++) s += qp.b[i * n + j]! * qp.p[j]!;
        for (let c = 0; c < m; c++) {
          s += qp.multipliers[c]! * qp.normals[c * n + i]!;
          size += qp.multipliers[c]!;
        }
        expect(Math.abs(s)).toBeLessThan(1e-8 * (size + scale));
      }
    }
    expect(infeasible).toBeGreaterThan(100);
    expect(infeasible).toBeLessThan(3500);
  });

  it('stand still between two constraints that leave no room', () => {
    const qp = createSmallQp(2, 4);
    qp.b.set([1, 0, 0, 1]);
    qp.g.set([3, 1]);
    qp.normals.set([1, 0, -1, 0]);
    qp.limits.set([0.5, -0.5]);
    expect(qp.solve(2, 2)).toBe(true);
    expect(qp.p[0]).toBeCloseTo(0.5, 12);
    expect(qp.p[1]).toBeCloseTo(1, 12);
  });
});
