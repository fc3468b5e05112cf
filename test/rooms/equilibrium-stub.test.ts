import { describe, expect, it } from 'vitest';
import { createSolver } from '../../src/equilibrium/index.js';
import { dragOnly, fixedDragAngles } from '../support/stub-models.js';

const DEG = Math.PI / 180;

describe('the real solver on stub boats', () => {
  it('gives V/V_T = sin(twa - b)/sin(b) for fixed drag angles', () => {
    for (const [b, share] of [
      [20, 0.5],
      [30, 0.4],
      [40, 0.7],
    ] as const) {
      const solver = createSolver(fixedDragAngles(b * share * DEG, b * (1 - share) * DEG));
      let start: Float64Array | undefined;
      for (const twa of [b + 10, 60, 90, 120, 150]) {
        const r = solver.solve(6, twa * DEG, start ? [start] : []);
        expect(r.ok, `b ${b} twa ${twa}: ${r.ok ? '' : r.reason}`).toBe(true);
        if (!r.ok) return;
        start = r.x;
        expect(r.speed / 6).toBeCloseTo(Math.sin((twa - b) * DEG) / Math.sin(b * DEG), 7);
        expect(r.speedSlope / 6).toBeCloseTo(Math.cos((twa - b) * DEG) / Math.sin(b * DEG), 4);
      }
    }
  });

  it('reports no drive inside the drag angles', () => {
    const solver = createSolver(fixedDragAngles(15 * DEG, 15 * DEG));
    const r = solver.solve(6, 25 * DEG, []);
    expect(r.ok).toBe(false);
    if (!r.ok) expect(r.why).toBe('no drive');
  });

  it('gives the closed form on a drag-only dead run', () => {
    const k = Math.sqrt((1.225 * 1.2 * 7) / (1025 * 0.004 * 1.6));
    expect(k).toBeCloseTo(1.252437, 6);
    const solver = createSolver(dragOnly(1.225, 1.2 * 7, 1025, 0.004 * 1.6));
    const r = solver.solve(5, Math.PI, []);
    expect(r.ok).toBe(true);
    if (r.ok) expect(r.speed / 5).toBeCloseTo(k / (1 + k), 7);
  });
});
