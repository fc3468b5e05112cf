import { pchip } from '../numerics/index.js';
import { sectionLimits } from './section-limits.js';
import type { SailShape, SectionLimits } from './types.js';

const STEPS = 24;

/** Widths of a sail from leech to luff at shares of its height, rising, the foot (0) and the head (1) among them. */
export interface Widths {
  readonly at: readonly number[];
  readonly width: readonly number[];
}

/** A spar that spreads the head of a four-cornered sail: length [m], and angle [rad] above the horizontal. */
export interface Gaff {
  readonly length: number;
  readonly angle: number;
}

/** A mainsail or mizzen from its main dimensions [m]; x forward, z above the waterline. */
export interface MainsailDimensions {
  readonly name: string;
  readonly kind?: 'mainsail' | 'mizzen' | undefined;
  readonly luff: number;
  readonly foot: number;
  /** Width of the head(board). */
  readonly headWidth: number;
  /** Share by which the chord at half height exceeds the straight line from foot to head. */
  readonly roach: number;
  /** Measured widths; they stand instead of foot, head width and roach. */
  readonly widths?: Widths | undefined;
  /** Four-cornered: the luff ends at the throat, and the gaff carries the head on from there. */
  readonly gaff?: Gaff | undefined;
  readonly tackX: number;
  readonly tackZ: number;
  readonly section?: SectionLimits | undefined;
}

/**
 * Chords of a mainsail: the straight leech plus a roach of parabolic share, largest at half height; or a smooth curve
 * through measured widths (pin-head, fat-head, square-head alike); or, under a gaff, a straight leech from clew to peak.
 */
export function mainsailShape(d: MainsailDimensions): SailShape {
  const kind = d.kind ?? 'mainsail';
  const section = d.section ?? sectionLimits[kind];
  const z: number[] = [];
  const chord: number[] = [];
  const xLead: number[] = [];
  if (d.gaff !== undefined) {
    const peakX = d.tackX - d.gaff.length * Math.cos(d.gaff.angle);
    const peakZ = d.tackZ + d.luff + d.gaff.length * Math.sin(d.gaff.angle);
    const clewX = d.tackX - d.foot;
    const height = peakZ - d.tackZ;
    const throat = d.luff / height;
    // A point stands at the throat, where the leading edge turns.
    const heights = [
      ...Array.from({ length: STEPS / 2 }, (_, i) => (throat * i) / (STEPS / 2)),
      ...Array.from({ length: STEPS / 2 + 1 }, (_, i) => throat + ((1 - throat) * i) / (STEPS / 2)),
    ];
    for (const s of heights) {
      const lead = s <= throat ? d.tackX : d.tackX + ((peakX - d.tackX) * (s - throat)) / (1 - throat);
      const straight = lead - (clewX + (peakX - clewX) * s);
      z.push(d.tackZ + s * height);
      xLead.push(lead);
      // At the peak leech and gaff meet: nothing is left, to rounding.
      const c = straight + 4 * s * (1 - s) * d.roach * 0.5 * d.foot;
      chord.push(Math.abs(c) < 1e-9 ? 0 : c);
    }
    return { name: d.name, kind, z, chord, xLead, section };
  }
  const measured = d.widths && pchip(d.widths.at, d.widths.width);
  for (let i = 0; i <= STEPS; i++) {
    const s = i / STEPS;
    const straight = d.foot + (d.headWidth - d.foot) * s;
    const half = 0.5 * (d.foot + d.headWidth);
    z.push(d.tackZ + s * d.luff);
    chord.push(measured ? measured.value(s) : straight + 4 * s * (1 - s) * d.roach * half);
    xLead.push(d.tackX);
  }
  return { name: d.name, kind, z, chord, xLead, section };
}

/** A sail with its lower part tied down: the share of the height that stays up, its foot at the old tack. */
export function reefedShape(s: SailShape, share: number, reef: number): SailShape {
  const foot = s.z[0]!;
  const height = s.z[s.z.length - 1]! - foot;
  const heights = Array.from(
    { length: STEPS + 1 },
    (_, i) => foot + height * (1 - share + (share * i) / STEPS),
  );
  const lowered = height * (1 - share);
  // What was above the reef keeps its leading edge's slope and starts at the tack.
  const shift = profileAt(s.z, s.xLead, foot) - profileAt(s.z, s.xLead, foot + lowered);
  return {
    ...s,
    reef,
    z: heights.map((z) => z - lowered),
    chord: heights.map((z) => profileAt(s.z, s.chord, z)),
    xLead: heights.map((z) => profileAt(s.z, s.xLead, z) + shift),
  };
}

/** A sail for off the wind [m], set between a tack and a halyard; areas of cloth. */
export interface OffWindDimensions {
  readonly name: string;
  readonly kind: 'spinnaker' | 'gennaker' | 'reacher';
  readonly area: number;
  readonly foot: number;
  /** Width at half height. */
  readonly halfWidth: number;
  /** Share of the cloth's widths that the wind sees. */
  readonly projected: number;
  readonly tackX: number;
  readonly tackZ: number;
  readonly headX: number;
  readonly headZ: number;
  readonly section?: SectionLimits | undefined;
}

/**
 * Projected chords of an off-wind sail: a smooth curve through foot, width at half height and a narrow head, to the
 * scale of its area; the leading edge runs straight from tack to head.
 */
export function offWindShape(d: OffWindDimensions): SailShape {
  const rise = d.headZ - d.tackZ;
  if (!(rise > 0)) throw new RangeError(`the head of ${d.name} is not above its tack`);
  const curve = pchip([0, 0.5, 1], [d.foot, d.halfWidth, 0.04 * d.halfWidth]);
  const along = Array.from({ length: STEPS + 1 }, (_, i) => i / STEPS);
  const shape: SailShape = {
    name: d.name,
    kind: d.kind,
    z: along.map((s) => d.tackZ + s * rise),
    chord: along.map((s) => curve.value(s)),
    xLead: along.map((s) => d.tackX + s * (d.headX - d.tackX)),
    section: d.section ?? sectionLimits[d.kind],
  };
  const scale = (d.projected * d.area) / sailArea(shape).area;
  return { ...shape, cloth: d.area, chord: shape.chord.map((c) => c * scale) };
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
  readonly gooseWinged?: boolean | undefined;
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
  const section = d.section ?? sectionLimits.jib;
  return { name: d.name, kind: 'jib', z, chord, xLead, section, gooseWinged: d.gooseWinged };
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
