import { sectionLimits } from './section-limits.js';
import type { SailShape, SectionLimits } from './types.js';

const STEPS = 24;

/** A mainsail from its main dimensions [m]; x forward, z above the waterline. */
export interface MainsailDimensions {
  readonly name: string;
  readonly luff: number;
  readonly foot: number;
  /** Width of the head(board). */
  readonly headWidth: number;
  /** Share by which the chord at half height exceeds the straight line from foot to head. */
  readonly roach: number;
  readonly tackX: number;
  readonly tackZ: number;
  readonly section?: SectionLimits | undefined;
}

/** Chords of a mainsail: the straight leech plus a roach of parabolic share, largest at half height. */
export function mainsailShape(d: MainsailDimensions): SailShape {
  const z: number[] = [];
  const chord: number[] = [];
  const xLead: number[] = [];
  for (let i = 0; i <= STEPS; i++) {
    const s = i / STEPS;
    const straight = d.foot + (d.headWidth - d.foot) * s;
    const half = 0.5 * (d.foot + d.headWidth);
    z.push(d.tackZ + s * d.luff);
    chord.push(straight + 4 * s * (1 - s) * d.roach * half);
    xLead.push(d.tackX);
  }
  return { name: d.name, kind: 'mainsail', z, chord, xLead, section: d.section ?? sectionLimits.mainsail };
}

/** A jib from tack, head and foot [m]: a triangle whose luff lies on the forestay. */
export interface JibDimensions {
  readonly name: string;
  /** Length along the forestay. */
  readonly luff: number;
  readonly foot: number;
  readonly tackX: number;
  readonly tackZ: number;
  /** A point of the forestay above the tack that gives its slope: where it meets the mast. */
  readonly headX: number;
  readonly headZ: number;
  readonly section?: SectionLimits | undefined;
}

/** Chords of a jib: foot at the tack, 3 % of it at the head, a straight leech. */
export function jibShape(d: JibDimensions): SailShape {
  const stay = Math.hypot(d.headX - d.tackX, d.headZ - d.tackZ);
  if (!(stay > 0)) throw new RangeError('the forestay has no length');
  const z: number[] = [];
  const chord: number[] = [];
  const xLead: number[] = [];
  for (let i = 0; i <= STEPS; i++) {
    const s = i / STEPS;
    const along = (s * d.luff) / stay;
    z.push(d.tackZ + along * (d.headZ - d.tackZ));
    chord.push(d.foot * (1 - 0.97 * s));
    xLead.push(d.tackX + along * (d.headX - d.tackX));
  }
  return { name: d.name, kind: 'jib', z, chord, xLead, section: d.section ?? sectionLimits.jib };
}

/** Value of a shape's profile at a height, linear between its points. */
export function profileAt(zs: readonly number[], values: readonly number[], z: number): number {
  let i = 0;
  while (i < zs.length - 2 && z > zs[i + 1]!) i++;
  const w = Math.min(1, Math.max(0, (z - zs[i]!) / (zs[i + 1]! - zs[i]!)));
  return values[i]! + w * (values[i + 1]! - values[i]!);
}

/** Area [m2] and centre (x, z) of a sail, by trapezoids. */
export function sailArea(s: SailShape): { area: number; x: number; z: number } {
  let area = 0;
  let mx = 0;
  let mz = 0;
  for (let i = 0; i + 1 < s.z.length; i++) {
    const h = s.z[i + 1]! - s.z[i]!;
    const c0 = s.chord[i]!;
    const c1 = s.chord[i + 1]!;
    const a = 0.5 * h * (c0 + c1);
    const z = s.z[i]! + (h * (c0 + 2 * c1)) / (3 * (c0 + c1));
    const lead = 0.5 * (s.xLead[i]! + s.xLead[i + 1]!);
    area += a;
    mz += a * z;
    mx += a * (lead - 0.25 * (c0 + c1));
  }
  return { area, x: mx / area, z: mz / area };
}
