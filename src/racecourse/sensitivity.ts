import {
  assembleBoat,
  type BoatSpec,
  boatWithFactors,
  type ModelFactors,
  NO_FACTORS,
} from '../boat/index.js';
import { predictPolar } from '../polar/index.js';
import { legTime, sailedPoints } from './times.js';

const DEGREE = Math.PI / 180;

/** A boat with one thing changed: its figures, or a factor on the model. */
export interface Altered {
  readonly spec: BoatSpec;
  readonly factors: ModelFactors;
}

/** Something a designer can change, as a factor f on it. */
export interface DesignQuantity {
  readonly name: string;
  /** What exactly is changed, and what stays. */
  readonly words: string;
  /** The boat with f times as much of it; undefined where she has none. */
  alter(spec: BoatSpec, f: number): Altered | undefined;
}

const of = (spec: BoatSpec): Altered => ({ spec, factors: NO_FACTORS });
const byFactor =
  (name: keyof ModelFactors) =>
  (spec: BoatSpec, f: number): Altered => ({ spec, factors: { ...NO_FACTORS, [name]: f } });

function scaledWeights(spec: BoatSpec, f: number, which: (name: string) => boolean): Altered | undefined {
  if (!spec.weights.some((w) => which(w.name))) return undefined;
  return of({
    ...spec,
    weights: spec.weights.map((w) => (which(w.name) ? { ...w, mass: w.mass * f } : w)),
  });
}

export const DESIGN_QUANTITIES: readonly DesignQuantity[] = [
  {
    name: 'crew weight',
    words: 'mass of the whole crew',
    alter: (s, f) => of({ ...s, crew: { ...s.crew, mass: s.crew.mass * f } }),
  },
  {
    name: 'crew reach',
    words: 'how far out the crew get',
    alter: byFactor('crewReach'),
  },
  {
    name: 'sail area',
    words: 'chords of every sail, heights as they are',
    alter: (s, f) =>
      of({
        ...s,
        sails: s.sails.map((sail) => ({ ...sail, chord: sail.chord.map((c) => c * f) })),
        measuredRigs: s.measuredRigs.map((t) => ({ ...t, area: t.area * f })),
      }),
  },
  {
    name: 'rig height',
    words:
      'mast and sails taller above the boom and narrower, at the same sail area; the rig weight moves up',
    alter: (s, f) => {
      if (s.sails.length === 0) return undefined;
      const foot = s.rig.boomHeight;
      const up = (z: number): number => foot + (z - foot) * f;
      return of({
        ...s,
        rig: { ...s.rig, mastTop: up(s.rig.mastTop) },
        sails: s.sails.map((sail) => ({
          ...sail,
          z: sail.z.map(up),
          chord: sail.chord.map((c) => c / f),
        })),
        weights: s.weights.map((w) => (w.name === 'rig' ? { ...w, z: up(w.z) } : w)),
      });
    },
  },
  {
    name: 'boat weight',
    words: 'every weight but ballast and crew, heights as they are',
    alter: (s, f) => scaledWeights(s, f, (n) => n !== 'ballast'),
  },
  {
    name: 'ballast',
    words: 'mass of the ballast and volume of the fin',
    alter: (s, f) => {
      const a = scaledWeights(s, f, (n) => n === 'ballast');
      return a && { ...a, spec: { ...a.spec, keelVolume: s.keelVolume * f } };
    },
  },
  {
    name: 'beam',
    words: 'all beams of the hull, at the same weight; the crew sit as far inside the gunwale',
    alter: (s, f) => {
      const d = s.hull.dimensions;
      const lines = s.hull.lines;
      return of({
        ...s,
        hull: {
          ...s.hull,
          dimensions: { ...d, bwl: d.bwl * f, beamMax: d.beamMax * f },
          ...(lines && {
            lines: { ...lines, stations: lines.stations.map((t) => ({ ...t, y: t.y.map((v) => v * f) })) },
          }),
        },
        crew: { ...s.crew, armOut: s.crew.armOut + 0.5 * (f - 1) * d.beamMax },
      });
    },
  },
  {
    name: 'wetted area',
    words: 'friction of the hull',
    alter: byFactor('friction'),
  },
  {
    name: 'righting moment',
    words: 'of the hull, crew inboard',
    alter: byFactor('righting'),
  },
  {
    name: 'keel or board span',
    words: 'chords and weights as they are',
    alter: (s, f) => of({ ...s, keel: { ...s.keel, span: s.keel.span * f } }),
  },
  {
    name: 'keel or board chord',
    words: 'span and weights as they are',
    alter: (s, f) => of({ ...s, keel: { ...s.keel, chords: s.keel.chords.map((c) => c * f) } }),
  },
  {
    name: 'rudder chord',
    words: 'span as it is',
    alter: (s, f) => of({ ...s, rudder: { ...s.rudder, chords: s.rudder.chords.map((c) => c * f) } }),
  },
  {
    name: 'windage',
    words: 'drag areas of hull, spars, wires and crew',
    alter: byFactor('windage'),
  },
];

/** Directions [rad] that a sensitivity is told for, and what they are called. */
export const SENSITIVITY_LEGS: readonly { readonly name: string; readonly twa: number }[] = [
  { name: 'upwind', twa: 0 },
  { name: 'reaching', twa: 90 * DEGREE },
  { name: 'downwind', twa: 180 * DEGREE },
];

const ANGLES = [32, 37, 42, 48, 60, 75, 90, 105, 120, 135, 150, 165, 180].map((a) => a * DEGREE);

/** Seconds per nautical mile of an altered boat [wind][leg]; NaN where it cannot be sailed. */
export function legTimes(a: Altered, tws: readonly number[]): number[][] {
  const boat = assembleBoat({ spec: a.spec });
  const plain = Object.values(a.factors).every((f) => f === 1);
  const polar = predictPolar(plain ? boat : boatWithFactors(boat, a.factors), { tws, twa: ANGLES });
  return tws.map((_, i) => {
    const points = sailedPoints(polar, i);
    return SENSITIVITY_LEGS.map(({ twa }) => {
      const t = legTime(points, twa);
      return t.ok ? t.secondsPerMile : Number.NaN;
    });
  });
}

/** What a little less and a little more of one quantity does: seconds per nautical mile gained (below 0) or lost. */
export interface Sensitivity {
  readonly name: string;
  readonly words: string;
  /** [wind][leg]; NaN where one of the two cannot be sailed. Undefined where the boat cannot be made so. */
  readonly less: readonly (readonly number[])[] | undefined;
  readonly more: readonly (readonly number[])[] | undefined;
}

/** Boats to be timed for a sensitivity, the unchanged one first, and how their times are put together. */
export function sensitivityPlan(
  spec: BoatSpec,
  step: number,
): {
  readonly boats: readonly Altered[];
  readonly gather: (times: readonly (number[][] | undefined)[]) => Sensitivity[];
} {
  const rows = DESIGN_QUANTITIES.map((q) => ({
    q,
    less: q.alter(spec, 1 - step),
    more: q.alter(spec, 1 + step),
  }));
  const there = rows.flatMap((r) => (r.less && r.more ? [{ q: r.q, less: r.less, more: r.more }] : []));
  const minus = (a: number[][] | undefined, b: number[][]): number[][] | undefined =>
    a?.map((row, i) => row.map((v, j) => v - b[i]![j]!));
  return {
    boats: [of(spec), ...there.flatMap((r) => [r.less, r.more])],
    gather: (times) => {
      const base = times[0];
      if (base === undefined) throw new RangeError('the boat itself was not timed');
      return there.map((r, k) => ({
        name: r.q.name,
        words: r.q.words,
        less: minus(times[1 + 2 * k], base),
        more: minus(times[2 + 2 * k], base),
      }));
    },
  };
}
