import type { OutsideCheck } from './check.js';

export interface CheckResult {
  readonly check: OutsideCheck;
  readonly cases: number;
  readonly mean: number;
  readonly worst: number;
  readonly worstCase: string;
  readonly passed: boolean;
  readonly names: readonly string[];
}

/** Runs a comparison; a comparison without cases, or with a case that is not a number, fails. */
export function runCheck(check: OutsideCheck): CheckResult {
  const cases = check.run();
  let sum = 0;
  let worst = 0;
  let worstCase = '';
  let bad = cases.length === 0;
  for (const c of cases) {
    if (!Number.isFinite(c.error)) bad = true;
    sum += c.error;
    if (c.error >= worst) {
      worst = c.error;
      worstCase = c.name;
    }
  }
  return {
    check,
    cases: cases.length,
    mean: sum / cases.length,
    worst,
    worstCase,
    names: cases.map((c) => c.name),
    passed: !bad && worst <= check.tolerance,
  };
}
