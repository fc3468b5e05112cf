import { type LiftSlope, weissinger } from '../lifting-line/index.js';
import type { Bulb, FoilSpec } from './types.js';

/** Shares of the span at which a blade's lifting line is solved; between them a polynomial through all. */
const SHARES = [0.25, 0.4375, 0.625, 0.8125, 1] as const;

/** What a blade is with a share of its span in the water. Filled by `bladeAt`. */
export interface BladeState {
  slope: number;
  area: number;
  efficiency: number;
  centre: number;
}

/** One foil with its lifting line, whole and with less of it in the water. */
export interface Blade {
  readonly whole: LiftSlope;
  /** Span [m] and sweep [rad] as it stands in the water, swung aft or not. */
  readonly span: number;
  readonly sweep: number;
  readonly slopes: readonly number[];
  readonly areas: readonly number[];
  readonly efficiencies: readonly number[];
  readonly centres: readonly number[];
}

/** Chord at the share s of the span, straight between the given ones. */
export function chordAt(chords: readonly number[], s: number): number {
  const n = chords.length - 1;
  const t = Math.min(1, Math.max(0, s)) * n;
  const i = Math.min(n - 1, Math.floor(t));
  return chords[i]! + (t - i) * (chords[i + 1]! - chords[i]!);
}

/** Area over span, and the integral of chord squared over span, of a planform. */
export function chordMeans(chords: readonly number[]): { mean: number; square: number } {
  let mean = 0;
  let square = 0;
  const n = chords.length - 1;
  for (let i = 0; i < n; i++) {
    const [a, b] = [chords[i]!, chords[i + 1]!];
    mean += (a + b) / (2 * n);
    square += (a * a + a * b + b * b) / (3 * n);
  }
  return { mean, square };
}

/**
 * Prepares a blade. Swung aft by an angle it is a swept foil of less span and longer chords. With a share of the span
 * in the water, the part towards the tip is there: the root slides into its case, or rises out of the water.
 * @throws RangeError when span or chords are not above zero
 */
export function prepareBlade(f: FoilSpec): Blade {
  if (!(f.span > 0) || f.chords.length < 2 || !f.chords.every((c) => c > 0)) {
    throw new RangeError(`the ${f.kind} needs a span and two or more chords above zero`);
  }
  const swung = f.swung ?? 0;
  const span = f.span * Math.cos(swung);
  const sweep = f.sweep + swung;
  const at = SHARES.map((h) =>
    weissinger({
      span: span * h,
      chordAt: (s) => chordAt(f.chords, 1 - h + h * s) / Math.cos(swung),
      sweep,
      mirrored: !f.surfacePiercing,
    }),
  );
  return {
    whole: at[at.length - 1]!,
    span,
    sweep,
    slopes: at.map((k) => k.slope),
    areas: at.map((k) => k.area),
    efficiencies: at.map((k) => k.efficiency),
    centres: at.map((k) => k.centre),
  };
}

/** Weights of the polynomial through all shares, filled per call. */
const weights = new Float64Array(SHARES.length);

/** The blade with a share (0.25 to 1) of its span in the water. */
export function bladeAt(b: Blade, share: number, out: BladeState): void {
  if (share >= 1) {
    out.slope = b.whole.slope;
    out.area = b.whole.area;
    out.efficiency = b.whole.efficiency;
    out.centre = b.whole.centre;
    return;
  }
  const n = SHARES.length;
  for (let i = 0; i < n; i++) {
    let l = 1;
    for (let j = 0; j < n; j++) if (j !== i) l *= (share - SHARES[j]!) / (SHARES[i]! - SHARES[j]!);
    weights[i] = l;
  }
  out.slope = out.area = out.efficiency = out.centre = 0;
  for (let i = 0; i < n; i++) {
    const w = weights[i]!;
    out.slope += w * b.slopes[i]!;
    out.area += w * b.areas[i]!;
    out.efficiency += w * b.efficiencies[i]!;
    out.centre += w * b.centres[i]!;
  }
}

/** Wetted area [m2] of a bulb, as the ellipsoid of its length and diameter (Knud Thomsen's formula, within 1.1 %). */
export function bulbWetted(b: Bulb): number {
  const p = 1.6075;
  const [a, c] = [(0.5 * b.length) ** p, (0.5 * b.diameter) ** p];
  return 4 * Math.PI * ((a * c + a * c + c * c) / 3) ** (1 / p);
}

/** Volume [m3] of the same ellipsoid. */
export function bulbVolume(b: Bulb): number {
  return (Math.PI / 6) * b.length * b.diameter * b.diameter;
}

/**
 * Drag of a streamlined body over its friction, 1 + 1.5 (d/l)^1.5 + 7 (d/l)^3.
 * Source: Hoerner, Fluid-Dynamic Drag, 1965 (from memory).
 */
export function bulbFormFactor(b: Bulb): number {
  const t = b.diameter / b.length;
  return 1 + 1.5 * t ** 1.5 + 7 * t ** 3;
}
