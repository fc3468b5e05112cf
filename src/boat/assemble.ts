import { logWindProfile, powerWindProfile, type WindProfile } from '../environment/index.js';
import { prepareFoilSystem } from '../foils/index.js';
import { generateRoundBilge, type HullOptions, prepareHull } from '../hull/index.js';
import {
  prepareSailSet,
  prepareTableSet,
  type SailSet,
  type SailShape,
  type WindageBody,
} from '../sails/index.js';
import { foilsWithFactors, hullWithFactors, type ModelFactors, withFactors } from './factors.js';
import type { Boat, BoatSpec, Estimate } from './types.js';

/**
 * Drag coefficients of bluff bodies in the air. Wires: cylinder below its critical Reynolds number, 1.1 (Hoerner,
 * Fluid-Dynamic Drag 1965, from memory); hull side 1.0, end 0.6 and boom 1.0: judgement.
 */
const DRAG = { cylinder: 1.1, hullSide: 1.0, hullEnd: 0.6, boom: 1.0 } as const;
/** Share of a mast's drag that the sail behind it takes away along its luff; judgement, bounded by the tunnel polar of a una rig. */
const MAST_SHIELD = 0.2;
/** The boom lies near the apparent wind, under the foot of its sail: this share of its length counts; judgement. */
const BOOM_SHARE = 0.2;

/** Wind profile of a boat. */
export function windProfileOf(spec: BoatSpec): WindProfile {
  return spec.wind.kind === 'log'
    ? logWindProfile(spec.wind.referenceHeight, spec.wind.roughness)
    : powerWindProfile(spec.wind.referenceHeight, spec.wind.exponent);
}

/** A mast in the wind: along the luff of a sail it is partly sheltered. */
function mastBody(
  name: string,
  m: { x: number; top: number; foot: number; diameter: number; drag: number },
  sail: SailShape | undefined,
): WindageBody {
  const low = Math.max(m.foot, sail?.z[0] ?? m.top);
  const high = Math.min(m.top, sail?.z[sail.z.length - 1] ?? m.top);
  const covered = Math.max(0, high - low);
  const full = m.drag * m.diameter * (m.top - m.foot);
  const less = MAST_SHIELD * m.drag * m.diameter * covered;
  const area = full - less;
  const middle = area > 0 ? (full * 0.5 * (m.top + m.foot) - less * 0.5 * (low + high)) / area : m.foot;
  return { name, frontal: area, side: area, x: m.x, z: middle };
}

/**
 * The bodies of a boat that catch the wind without driving it: topsides, masts, boom, wires and crew.
 * @param sails the sails that are up; left out: bare poles
 */
export function windageOf(spec: BoatSpec, sails: readonly SailShape[] = []): WindageBody[] {
  const { dimensions, loa } = spec.hull;
  const { rig, crew } = spec;
  const { freeboard, beamMax } = dimensions;
  const foot = Math.min(freeboard, rig.mastTop);
  const wires = DRAG.cylinder * rig.riggingArea;
  const main = sails.find((s) => s.kind === 'mainsail');
  const bodies: WindageBody[] = [
    {
      name: 'hull',
      frontal: DRAG.hullEnd * freeboard * beamMax,
      side: DRAG.hullSide * freeboard * loa,
      x: 0,
      z: 0.5 * freeboard,
    },
    mastBody(
      'mast',
      { x: rig.mastX, top: rig.mastTop, foot, diameter: rig.mastDiameter, drag: rig.mastDrag },
      main,
    ),
    { name: 'crew', frontal: crew.dragArea, side: crew.dragArea, x: crew.x, z: crew.z },
  ];
  if (main !== undefined) {
    const boom = BOOM_SHARE * DRAG.boom * rig.mastDiameter * rig.boomLength;
    bodies.push({
      name: 'boom',
      frontal: boom,
      side: boom,
      x: rig.mastX - 0.5 * rig.boomLength,
      z: rig.boomHeight,
    });
  }
  if (rig.mizzen !== undefined) {
    const { x, top, diameter } = rig.mizzen;
    const sail = sails.find((s) => s.kind === 'mizzen');
    bodies.push(mastBody('mizzen mast', { x, top, foot, diameter, drag: rig.mastDrag }, sail));
  }
  if (wires > 0) {
    bodies.push({
      name: 'rigging',
      frontal: wires,
      side: wires,
      x: rig.mastX,
      z: 0.5 * (rig.mastTop + foot),
    });
  }
  return bodies;
}

/** Mass [kg] of boat and crew, and its centre with the crew inboard at their usual place. */
export function massOf(spec: BoatSpec): { mass: number; x: number; z: number } {
  let mass = spec.crew.mass;
  let mx = spec.crew.mass * spec.crew.x;
  let mz = spec.crew.mass * spec.crew.z;
  for (const part of spec.weights) {
    mass += part.mass;
    mx += part.mass * part.x;
    mz += part.mass * part.z;
  }
  return { mass, x: mx / mass, z: mz / mass };
}

/**
 * Puts a boat together for computing: hull form and resistance, foils, sail sets, wind.
 * @throws RangeError when hull, foils or sails cannot be made from the specification
 */
export function assembleBoat(input: { spec: BoatSpec; estimates?: readonly Estimate[] }): Boat {
  const { spec, estimates = [] } = input;
  const { mass, x, z } = massOf(spec);
  const wind = windProfileOf(spec);
  const lines = spec.hull.lines ?? generateRoundBilge(spec.hull.dimensions);
  const reach = (crewX: number): number => x + (spec.crew.mass / mass) * (crewX - spec.crew.x);
  const options: HullOptions = {
    water: spec.water,
    gravity: spec.gravity,
    residuary: spec.hull.residuary,
    roughness: spec.hull.roughness,
    planing: spec.hull.planing,
    centreReach: [reach(spec.hull.crewReach[0]), reach(spec.hull.crewReach[1])],
    measured: spec.hull.measured,
    ...(spec.keelVolume > 0 ? { keel: keelOf(spec) } : {}),
  };
  const hull = prepareHull(lines, { mass, x, z }, options);
  const foils = prepareFoilSystem({
    keel: spec.keel,
    rudder: spec.rudder,
    canoeDraft: hull.form.canoeDraft,
    sidewaysVolume: hull.form.sidewaysVolume,
    water: spec.water,
  });
  return {
    spec,
    lines,
    hull,
    foils,
    sailSets: sailSetsOf(spec, wind),
    wind,
    mass,
    centre: { x, z },
    estimates,
    warnings: hull.warnings,
  };
}

/** The sail sets of a boat, prepared. */
function sailSetsOf(spec: BoatSpec, wind: WindProfile, windage = 1): SailSet[] {
  const scaled = (bodies: WindageBody[]): WindageBody[] =>
    bodies.map((b) => ({ ...b, frontal: b.frontal * windage, side: b.side * windage }));
  const byName = new Map(spec.sails.map((s) => [s.name, s]));
  const sailSets = spec.sailSets.map((set) => {
    const sails = set.sails.map((name) => {
      const sail = byName.get(name);
      if (sail === undefined) {
        throw new RangeError(`sail set ${set.name}: there is no sail called "${name}"`);
      }
      return sail;
    });
    return prepareSailSet({
      name: set.name,
      sails,
      windage: scaled(windageOf(spec, sails)),
      boomLimit: spec.rig.boomLimit,
      wind,
      airDensity: spec.air.density,
      mastTop: spec.rig.mastTop,
    });
  });
  const tables = spec.measuredRigs.map((table) =>
    prepareTableSet({
      table,
      windage: table.windageIncluded ? [] : scaled(windageOf(spec)),
      wind,
      airDensity: spec.air.density,
    }),
  );
  return [...sailSets, ...tables];
}

/**
 * The boat with the uncertain constants of the model multiplied. Hull and foils are not prepared again: it takes a
 * small part of the time that `assembleBoat` takes.
 */
export function boatWithFactors(boat: Boat, factors: ModelFactors): Boat {
  const spec = withFactors(boat.spec, factors);
  const wind = windProfileOf(spec);
  return {
    ...boat,
    spec,
    hull: hullWithFactors(boat.hull, spec, factors),
    foils: foilsWithFactors(boat.foils, factors),
    sailSets: sailSetsOf(spec, wind, factors.windage),
    wind,
  };
}

/** Volume of the fin and the depth of its centre: that of the ballast, or of the planform without ballast. */
function keelOf(spec: BoatSpec): NonNullable<HullOptions['keel']> {
  const { keel } = spec;
  const n = keel.chords.length - 1;
  // Centre of the planform's area below the root.
  let area = 0;
  let moment = 0;
  for (let i = 0; i < n; i++) {
    const [a, b] = [keel.chords[i]!, keel.chords[i + 1]!];
    area += 0.5 * (a + b);
    moment += 0.5 * (a + b) * i + (a + 2 * b) / 6;
  }
  const middle = -keel.z + (keel.span * moment) / (area * n);
  const ballast = spec.weights.find((w) => w.name === 'ballast');
  const depth = ballast !== undefined && ballast.z < keel.z ? -ballast.z : middle;
  // Volume sits a little abaft the quarter chord, at about 40 % of the chord.
  const chord = area / n;
  const x = keel.x - 0.5 * keel.span * Math.tan(keel.sweep) - 0.15 * chord;
  return { volume: spec.keelVolume, centreDepth: depth, draft: keel.span - keel.z, x };
}
