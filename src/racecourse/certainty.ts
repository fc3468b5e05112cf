import { choleskyFactor, choleskySolve } from '../numerics/index.js';
import type { WindTable } from './wind.js';

/** How sure it is that one variant is quicker than another. Times in s per nautical mile. */
export interface PairCertainty {
  /** Probability that the first is quicker: ties count half. */
  readonly quicker: number;
  /** Mean and standard deviation of first minus second, and the values that 10 % and 90 % of the draws lie below. */
  readonly mean: number;
  readonly deviation: number;
  readonly low: number;
  readonly high: number;
  /** Draws counted, and those left out because one of the two cannot sail the course in any wind. */
  readonly draws: number;
  readonly leftOut: number;
  /** Draws in which some wind was left out because one of the two cannot sail it. */
  readonly partly: number;
  /** Share of the variance of the difference that each uncertain constant accounts for, linearly. */
  readonly shares: readonly number[];
  /** What is left: constants acting together, and curvature. */
  readonly rest: number;
}

/** Mean of the winds' times by their shares, over the winds that `use` holds. */
function mean(times: readonly number[], wind: WindTable, use: (i: number) => boolean): number {
  let sum = 0;
  let weight = 0;
  for (let i = 0; i < times.length; i++) {
    if (!use(i)) continue;
    sum += wind.share[i]! * times[i]!;
    weight += wind.share[i]!;
  }
  return weight > 0 ? sum / weight : Number.NaN;
}

/** Value below which a share p of sorted values lies, straight between them. */
export function quantile(sorted: readonly number[], p: number): number {
  const at = p * (sorted.length - 1);
  const i = Math.floor(at);
  const next = sorted[Math.min(i + 1, sorted.length - 1)]!;
  return sorted[i]! + (at - i) * (next - sorted[i]!);
}

function meanOf(values: readonly number[]): number {
  return values.reduce((s, v) => s + v, 0) / values.length;
}

export function deviationOf(values: readonly number[]): number {
  const m = meanOf(values);
  return values.length < 2
    ? 0
    : Math.sqrt(values.reduce((s, v) => s + (v - m) ** 2, 0) / (values.length - 1));
}

/**
 * Two variants under the same draws.
 * @param a @param b seconds per nautical mile [draw][wind], NaN where a wind cannot be sailed
 * @param z the draws' standard normal numbers [draw][constant]
 */
export function pairCertainty(
  a: readonly (readonly number[])[],
  b: readonly (readonly number[])[],
  wind: WindTable,
  z: readonly Float64Array[],
): PairCertainty {
  const differences: number[] = [];
  const used: Float64Array[] = [];
  let partly = 0;
  for (let k = 0; k < a.length; k++) {
    const both = (i: number): boolean => Number.isFinite(a[k]![i]!) && Number.isFinite(b[k]![i]!);
    const d = mean(a[k]!, wind, both) - mean(b[k]!, wind, both);
    if (Number.isNaN(d)) continue;
    if (!wind.share.every((_, i) => both(i))) partly++;
    differences.push(d);
    used.push(z[k]!);
  }
  const n = differences.length;
  const leftOut = a.length - n;
  if (n === 0)
    return {
      quicker: Number.NaN,
      mean: Number.NaN,
      deviation: Number.NaN,
      low: Number.NaN,
      high: Number.NaN,
      draws: 0,
      leftOut,
      partly,
      shares: [],
      rest: Number.NaN,
    };
  const wins = differences.reduce((s, d) => s + (d < 0 ? 1 : d === 0 ? 0.5 : 0), 0);
  const sorted = [...differences].sort((x, y) => x - y);
  const shares = linearShares(differences, used);
  return {
    quicker: wins / n,
    mean: meanOf(differences),
    deviation: deviationOf(differences),
    low: quantile(sorted, 0.1),
    high: quantile(sorted, 0.9),
    draws: n,
    leftOut,
    partly,
    shares,
    rest: shares.length === 0 ? 0 : Math.max(0, 1 - shares.reduce((s, v) => s + v, 0)),
  };
}

/**
 * Shares of the variance of y that a straight line in each independent column of z accounts for: squared standardised
 * coefficients of the least-squares plane. Empty where y does not vary or there are too few draws.
 */
export function linearShares(y: readonly number[], z: readonly Float64Array[]): number[] {
  const n = y.length;
  const m = z[0]?.length ?? 0;
  const variance = deviationOf(y) ** 2;
  if (n < 2 * (m + 1) || !(variance > 0)) return [];
  const order = m + 1;
  const normal = new Float64Array(order * order);
  const right = new Float64Array(order);
  const row = new Float64Array(order);
  for (let k = 0; k < n; k++) {
    row[0] = 1;
    row.set(z[k]!, 1);
    for (let i = 0; i < order; i++) {
      right[i]! += row[i]! * y[k]!;
      for (let j = 0; j <= i; j++) normal[i * order + j]! += row[i]! * row[j]!;
    }
  }
  if (!choleskyFactor(order, order, normal)) return [];
  choleskySolve(order, order, normal, right);
  return Array.from({ length: m }, (_, j) => {
    const spread = deviationOf(z.map((r) => r[j]!));
    return (right[j + 1]! * spread) ** 2 / variance;
  });
}

/** Mean and spread of one variant's own expected time over the draws, as far as it can be sailed. */
export function ownSpread(
  times: readonly (readonly number[])[],
  wind: WindTable,
): { mean: number; deviation: number } {
  const values = times
    .map((t) => mean(t, wind, (i) => Number.isFinite(t[i]!)))
    .filter((v) => Number.isFinite(v));
  return values.length === 0
    ? { mean: Number.NaN, deviation: Number.NaN }
    : { mean: meanOf(values), deviation: deviationOf(values) };
}
