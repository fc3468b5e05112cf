import { assembleBoat, type Boat, type BoatSpec } from '../../src/boat/index.js';
import { DEMO_BOATS, demoBoat } from './demo.js';

/**
 * A boat near a demo boat, or a silly one, from a seeded generator. `sensible` varies dimensions by up to a quarter,
 * `silly` by up to a factor of three. Boats that cannot float or be built throw a RangeError.
 */
export function randomBoat(random: () => number, kind: 'sensible' | 'silly'): Boat {
  const base = demoBoat(DEMO_BOATS[Math.floor(random() * DEMO_BOATS.length)]!).spec;
  const most = kind === 'sensible' ? 1.25 : 3;
  const factor = (): number => Math.exp((2 * random() - 1) * Math.log(most));
  const within = (v: number, low: number, high: number): number => Math.min(high, Math.max(low, v));
  const { hull, crew, keel, rudder, rig } = base;
  const d = hull.dimensions;
  const [rigUp, wide, load] = [factor(), factor(), factor()];
  const beam = factor();
  const spec: BoatSpec = {
    ...base,
    name: `${kind} boat`,
    hull: {
      ...hull,
      planing: random() < 0.6,
      residuary: random() < 0.3 ? 'delft-1998' : 'delft-2008',
      dimensions: {
        ...d,
        bwl: d.bwl * beam,
        beamMax: d.beamMax * beam,
        cp: within(d.cp * (1 + 0.04 * (random() - 0.5)), 0.5, 0.64),
        cm: within(d.cm * (1 + 0.1 * (random() - 0.5)), 0.6, 0.85),
        freeboard: d.freeboard * factor(),
      },
    },
    weights: base.weights.map((w) => ({ ...w, mass: w.mass * load })),
    crew: {
      ...crew,
      mass: crew.mass * factor(),
      armOut: crew.armOut * factor(),
      armLee: crew.armLee,
      dragArea: crew.dragArea * factor(),
    },
    keel: {
      ...keel,
      span: keel.span * factor(),
      chords: stretched(keel.chords, factor()),
      x: keel.x * factor(),
    },
    rudder: { ...rudder, span: rudder.span * factor(), chords: stretched(rudder.chords, factor()) },
    rig: { ...rig, mastTop: rig.mastTop * rigUp },
    sails: base.sails.map((s) => {
      const foot = s.z[0]!;
      return { ...s, z: s.z.map((z) => foot + (z - foot) * rigUp), chord: s.chord.map((c) => c * wide) };
    }),
  };
  return assembleBoat({ spec, estimates: [] });
}

/** Chords with the root's times a factor. */
function stretched(chords: readonly number[], factor: number): number[] {
  return chords.map((c, i) => (i === 0 ? c * factor : c));
}
