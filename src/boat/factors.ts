import { FOIL, type FoilSystem } from '../foils/index.js';
import { HULL, type Hull, planingShare } from '../hull/index.js';
import type { BoatSpec } from './types.js';

/**
 * Multipliers on the uncertain constants of the model, all 1 for the model as it is. Plain data.
 * With every factor at 1 all results are the same to the last bit.
 */
export interface ModelFactors {
  /** Residuary resistance of the hull, upright and heeled, and of the keel. */
  readonly residuary: number;
  /** Frictional resistance of the hull. */
  readonly friction: number;
  /** What planing adds to, or takes off, the resistance of a displacement hull. */
  readonly planing: number;
  /** Largest lift coefficient of every sail section. */
  readonly sailLift: number;
  /** Force of a sail in separated flow, square to its chord. */
  readonly sailNormal: number;
  /** Drag of every sail section: its least drag and its growth with lift. */
  readonly sailDrag: number;
  /** Drag areas of topsides, spars, wires and crew. */
  readonly windage: number;
  /** Righting moment of the hull with the crew inboard. */
  readonly righting: number;
  /** Outboard reach of the crew. */
  readonly crewReach: number;
  /** Induced drag of keel and rudder: the inverse of their efficiency. */
  readonly foilInduced: number;
  /** Profile drag of keel and rudder. */
  readonly foilProfile: number;
  /** Growth of the wind with height: the exponent of the power law, or of the one that touches the log law. */
  readonly windShear: number;
}

export type FactorName = keyof ModelFactors;

export const NO_FACTORS: ModelFactors = {
  residuary: 1,
  friction: 1,
  planing: 1,
  sailLift: 1,
  sailNormal: 1,
  sailDrag: 1,
  windage: 1,
  righting: 1,
  crewReach: 1,
  foilInduced: 1,
  foilProfile: 1,
  windShear: 1,
};

export const FACTOR_NAMES = Object.keys(NO_FACTORS) as readonly FactorName[];

/** A specification with those factors worked in that belong to sails, crew and wind; hull and foils keep theirs. */
export function withFactors(spec: BoatSpec, f: ModelFactors): BoatSpec {
  const { wind } = spec;
  return {
    ...spec,
    crew: {
      ...spec.crew,
      armOut: spec.crew.armOut * f.crewReach,
      armLee: spec.crew.armLee * f.crewReach,
    },
    sails: spec.sails.map((s) => ({
      ...s,
      section: {
        ...s.section,
        clMax: s.section.clMax * f.sailLift,
        cd0: s.section.cd0 * f.sailDrag,
        k: s.section.k * f.sailDrag,
        cd90: s.section.cd90 * f.sailNormal,
      },
    })),
    measuredRigs: spec.measuredRigs.map((t) =>
      f.sailLift === 1 && f.sailDrag === 1
        ? t
        : { ...t, lift: t.lift.map((v) => v * f.sailLift), drag: t.drag.map((v) => v * f.sailDrag) },
    ),
    wind:
      wind.kind === 'power'
        ? { ...wind, exponent: wind.exponent * f.windShear }
        : { ...wind, roughness: roughnessFor(wind.referenceHeight, wind.roughness, f.windShear) },
  };
}

/** Roughness length whose log law has `factor` times the shear 1 / ln(z/z0) at the reference height. */
function roughnessFor(height: number, roughness: number, factor: number): number {
  return factor === 1 ? roughness : height * Math.exp(-Math.log(height / roughness) / factor);
}

/** A hull with its parts of resistance and its righting arm multiplied. Friction and waves count as far as it floats. */
export function hullWithFactors(hull: Hull, spec: BoatSpec, f: ModelFactors): Hull {
  const scale = Math.sqrt(spec.gravity * Math.cbrt(hull.form.volume));
  const planes = spec.hull.planing && spec.hull.measured === undefined;
  return {
    ...hull,
    rightingArm: (heel) => hull.rightingArm(heel) * f.righting,
    resistanceInto: (speed, heel, out) => {
      hull.resistanceInto(speed, heel, out);
      const afloat = out[HULL.friction]! + out[HULL.residuary]!;
      const planing = planes ? planingShare(speed / scale) : 0;
      out[HULL.friction]! *= f.friction;
      out[HULL.residuary]! *= f.residuary;
      out[HULL.heel]! *= f.residuary;
      out[HULL.keelResiduary]! *= f.residuary;
      out[HULL.keelHeel]! *= f.residuary;
      // The whole is (1 - w) (floating) + w (planing); the last place holds what the whole has beyond floating.
      const more = out[HULL.friction]! + out[HULL.residuary]! - afloat;
      out[HULL.planing]! += (f.planing - 1) * (out[HULL.planing]! + planing * afloat) - planing * more;
      let sum = 0;
      for (let i = 0; i < HULL.count; i++) sum += out[i]!;
      return sum;
    },
  };
}

/** Foils with their drag multiplied. */
export function foilsWithFactors(foils: FoilSystem, f: ModelFactors): FoilSystem {
  return {
    ...foils,
    evaluateInto: (speed, leeway, rudder, heel, hoist, out) => {
      foils.evaluateInto(speed, leeway, rudder, heel, hoist, out);
      out[FOIL.keelInduced]! *= f.foilInduced;
      out[FOIL.rudderInduced]! *= f.foilInduced;
      out[FOIL.keelProfile]! *= f.foilProfile;
      out[FOIL.rudderProfile]! *= f.foilProfile;
      return (
        out[FOIL.keelInduced]! + out[FOIL.keelProfile]! + out[FOIL.rudderInduced]! + out[FOIL.rudderProfile]!
      );
    },
  };
}
