import type { Flotation, Immersed, PreparedLines } from './hydrostatics.js';
import type { HullForm } from './types.js';

/** Largest section, waterline length and beam, draft and coefficients of the hull as it floats upright. */
export function formOf(
  p: PreparedLines,
  f: Flotation,
  im: Immersed,
  wetted: number,
  z: number,
  carried: number,
): HullForm {
  const { x } = p;
  const slope = Math.tan(f.trim);
  const n = x.length;
  let draft = 0;
  let bwl = 0;
  let first = x[0]!;
  let last = x[n - 1]!;
  let sidewaysVolume = 0;
  let transomBreadth = 0;
  const keel = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const water = f.height + x[i]! * slope;
    const s = p.lines.stations[i]!;
    let lowest = Number.POSITIVE_INFINITY;
    for (let k = 0; k < s.z.length; k++) lowest = Math.min(lowest, s.z[k]!);
    keel[i] = lowest - water;
    if (keel[i]! < 0) {
      draft = Math.max(draft, -keel[i]!);
      sidewaysVolume += p.weight[i]! * 0.5 * Math.PI * keel[i]! * keel[i]!;
      // Breadth at the water: linear between the points that straddle it.
      for (let k = 0; k + 1 < s.z.length; k++) {
        const a = s.z[k]! - water;
        const b = s.z[k + 1]! - water;
        if (a <= 0 !== b <= 0) {
          const t = a / (a - b);
          const breadth = 2 * (s.y[k]! + t * (s.y[k + 1]! - s.y[k]!));
          bwl = Math.max(bwl, breadth);
          if (i === 0) transomBreadth = Math.max(transomBreadth, breadth);
        }
      }
    }
  }
  // Ends of the waterline where the keel line comes out of the water.
  for (let i = 0; i + 1 < n; i++) {
    const [a, b] = [keel[i]!, keel[i + 1]!];
    if (a > 0 && b <= 0) first = Math.max(first, x[i]! + (a / (a - b)) * (x[i + 1]! - x[i]!));
    if (a <= 0 && b > 0) last = Math.min(last, x[i]! + (a / (a - b)) * (x[i + 1]! - x[i]!));
  }
  const lwl = last - first;
  const most = Math.max(...im.sections);
  return {
    lwl,
    bwl,
    canoeDraft: draft,
    volume: im.volume,
    waterplane: im.waterplane,
    wetted,
    cp: im.volume / (most * lwl),
    cm: most / (bwl * draft),
    cwp: im.waterplane / (lwl * bwl),
    lcbFromForward: last - im.x,
    lcfFromForward: last - im.flotationX,
    kb: im.z + draft - f.height,
    bm: im.transverse / im.volume,
    gm: carried * (im.z + im.transverse / im.volume - z),
    trim: f.trim,
    transom: im.sections[0]!,
    transomBreadth,
    sidewaysVolume,
  };
}
