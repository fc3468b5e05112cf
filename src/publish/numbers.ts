/** Numbers as text. Nothing here depends on the reader's locale. */

/** What stands for a number that is not one (infinite or undefined). */
export const NO_NUMBER = 'n/a';

/** A number with a fixed count of decimals; never "-0.00". */
export function fixed(value: number, decimals: number): string {
  if (!Number.isFinite(value)) return NO_NUMBER;
  const text = value.toFixed(decimals);
  return /^-0(\.0*)?$/.test(text) ? text.slice(1) : text;
}

/** A number with about `digits` significant digits, written without an exponent where that is readable. */
export function significant(value: number, digits = 4): string {
  if (!Number.isFinite(value)) return NO_NUMBER;
  if (value === 0) return '0';
  const magnitude = Math.abs(value);
  if (magnitude < 1e-4 || magnitude >= 1e7) return value.toExponential(digits - 1);
  const whole = Math.floor(Math.log10(magnitude)) + 1;
  const text = fixed(value, Math.min(8, Math.max(0, digits - whole)));
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text;
}

/** A number rounded to `digits` significant digits, for files meant for programs; null where it is not finite. */
export function rounded(value: number, digits = 9): number | null {
  if (!Number.isFinite(value)) return null;
  const r = Number(value.toPrecision(digits));
  return r === 0 ? 0 : r;
}

/** Decimals of the kinds of figures in tables. */
export interface Decimals {
  readonly speed: number;
  readonly angle: number;
  readonly share: number;
}

/** Decimals of all figures from those of speeds: angles carry one less, shares (0 to 1) two. */
export function decimalsFor(speed = 2): Decimals {
  return { speed, angle: Math.max(0, speed - 1), share: 2 };
}
