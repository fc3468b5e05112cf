import { describe, expect, it } from 'vitest';
import { allChecks } from './all.js';
import { runCheck } from './run.js';

describe('comparisons with the outside', () => {
  for (const check of allChecks) {
    it(`${check.quantity} (${check.source})`, () => {
      const r = runCheck(check);
      expect(r.cases).toBeGreaterThan(0);
      expect(Number.isFinite(r.worst)).toBe(true);
      if (!check.printOnly)
        expect(r.worst, `worst case: ${r.worstCase}`).toBeLessThanOrEqual(check.tolerance);
    });
  }
});
