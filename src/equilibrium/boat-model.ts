import type { Boat } from '../boat/index.js';
import { fetchLimitedSea } from '../environment/index.js';
import { FOIL } from '../foils/index.js';
import { HULL } from '../hull/index.js';
import { pchip } from '../numerics/index.js';
import { AERO, type SailSet } from '../sails/index.js';
import { type ForceModel, RES, X } from './types.js';

/** What the boat's force model keeps from its last evaluation, for tables and reports. */
export interface BoatForces {
  /** Places AERO, N and N m. */
  readonly air: Float64Array;
  /** Places FOIL. */
  readonly foils: Float64Array;
  /** Places HULL. */
  readonly hull: Float64Array;
  /** Righting moments [N m] of the hull's form with the crew inboard, and of the crew's arm. */
  formMoment: number;
  crewMoment: number;
  /** Added resistance in waves [N]; 0 on flat water. */
  waves: number;
  /** Sums before scaling: N along and across the course, N m. */
  readonly sums: Float64Array;
}

export interface BoatModel extends ForceModel {
  readonly boat: Boat;
  readonly sailSet: SailSet;
  readonly forces: BoatForces;
  /** Price on heeling moment [1/m] that belongs to a depower value. */
  price(depower: number): number;
}

/** Controls held where they are put instead of being chosen. */
export interface HeldControls {
  /** Heel [rad], to leeward positive. */
  readonly heel?: number | undefined;
  /** Crew's arm as a share of fully out, -1 to 1. */
  readonly crewShare?: number | undefined;
  /** Share of the board lowered. */
  readonly boardDown?: number | undefined;
  /** The solver's own depower value; reports speak of `ease`. */
  readonly depower?: number | undefined;
}

/** Lowest heel [rad] offered to the solver: a little to windward. Judgement. */
const HEEL_TO_WINDWARD = (-5 * Math.PI) / 180;
/**
 * Heel [rad] that crews allow off the wind, reached between these true wind angles: the hull regressions reward heel
 * there more than any helmsman would (judgement).
 */
const HEEL_OFF_WIND = {
  limit: (10 * Math.PI) / 180,
  start: (100 * Math.PI) / 180,
  end: (140 * Math.PI) / 180,
};
/** Largest depower value: the price is then 199 over the sails' height, which leaves next to nothing. */
const DEPOWER_MAX = 0.995;

/** What heel, leeway and trim could add to upright drive or take from upright resistance, with room to spare (judgement). */
const BOUND_MARGIN = { drive: 1.06, resistance: 0.9 } as const;

/**
 * Forces and moments of a boat under one sail set. Body and course axes as in methods: heading is turned to
 * windward of the course by the leeway; water drag acts along the course, foil lift across it.
 */
export function createBoatModel(boat: Boat, sailSet: SailSet, held: HeldControls = {}): BoatModel {
  const { spec, hull, foils, mass } = boat;
  const g = spec.gravity;
  const weight = mass * g;
  const length = hull.form.lwl;
  const crewWeight = spec.crew.mass * g;
  const priceHeight = Math.max(0.1, sailSet.centre[1]);
  const keelDepth = -foils.spec.keel.z + 0.45 * foils.spec.keel.span;
  const rudderDepth = -foils.spec.rudder.z + 0.45 * foils.spec.rudder.span;
  const air = new Float64Array(AERO.count);
  const water = new Float64Array(FOIL.count);
  const hullParts = new Float64Array(HULL.count);
  const sums = new Float64Array(RES.count);
  const forces: BoatForces = {
    air,
    foils: water,
    hull: hullParts,
    formMoment: 0,
    crewMoment: 0,
    waves: 0,
    sums,
  };
  const flow = { tws: 0, twa: 0, speed: 0, leeway: 0 };

  const lower = new Float64Array(X.count);
  const upper = new Float64Array(X.count);
  const limit = (j: number, a: number, b: number): void => {
    lower[j] = a;
    upper[j] = b;
  };
  limit(X.speed, 0, 20 * Math.sqrt(g * length));
  limit(X.leeway, -1, 1);
  limit(X.heel, HEEL_TO_WINDWARD, Math.min(spec.limits.heel, hull.heelMax));
  limit(X.rudder, -spec.limits.rudder, spec.limits.rudder);
  limit(X.depower, 0, DEPOWER_MAX);
  limit(X.arm, spec.crew.armLee, spec.crew.armOut);

  limit(X.hoist, spec.boardRange[0], spec.boardRange[1]);
  const hoists = spec.boardRange[0] < spec.boardRange[1] && held.boardDown === undefined;

  if (held.heel !== undefined) limit(X.heel, held.heel, held.heel);
  if (held.boardDown !== undefined) limit(X.hoist, held.boardDown, held.boardDown);
  if (held.depower !== undefined) limit(X.depower, held.depower, held.depower);
  if (held.crewShare !== undefined) {
    const arm = held.crewShare * (held.crewShare >= 0 ? spec.crew.armOut : -spec.crew.armLee);
    limit(X.arm, arm, arm);
  }

  const heelLimit = upper[X.heel]!;
  const prepare = (_tws: number, twa: number): void => {
    if (held.heel !== undefined) return;
    const t = Math.min(
      1,
      Math.max(0, (twa - HEEL_OFF_WIND.start) / (HEEL_OFF_WIND.end - HEEL_OFF_WIND.start)),
    );
    const most = Math.min(heelLimit, HEEL_OFF_WIND.limit);
    upper[X.heel] = heelLimit + (most - heelLimit) * t * t * (3 - 2 * t);
  };

  const price = (depower: number): number => depower / (1 - depower) / priceHeight;

  // Added resistance does not depend on the state: it is worked out when wind or angle change.
  const { waves } = spec;
  const waveTables = (waves?.tables ?? []).map((t) => ({
    period: t.period ?? 0,
    at: t.twa.length < 2 ? () => t.coefficient[0]! : pchip(t.twa, t.coefficient).value,
  }));
  /** Between the tables of neighbouring periods in a straight line, held beyond the first and the last. */
  const waveCoefficient = (twa: number, period: number): number => {
    let i = 0;
    while (i < waveTables.length - 2 && period > waveTables[i + 1]!.period) i++;
    const a = waveTables[i]!;
    const b = waveTables[i + 1];
    if (b === undefined) return a.at(twa);
    const t = Math.min(1, Math.max(0, (period - a.period) / (b.period - a.period)));
    return a.at(twa) + t * (b.at(twa) - a.at(twa));
  };
  let waveTws = Number.NaN;
  let waveTwa = Number.NaN;
  const setWaves = (tws: number, twa: number): void => {
    if (waves === undefined || (tws === waveTws && twa === waveTwa)) return;
    waveTws = tws;
    waveTwa = twa;
    const u10 = tws * boat.wind.factor(10);
    const grown = fetchLimitedSea(u10, waves.fetch ?? 0, g);
    const height = waves.height ?? grown.height;
    const coefficient = waveCoefficient(twa, waves.period ?? grown.period);
    forces.waves = (coefficient * spec.water.density * g * hull.form.bwl ** 2 * height * height) / length;
  };

  const evaluateAir = (tws: number, twa: number, x: Float64Array): void => {
    setWaves(tws, twa);
    flow.tws = tws;
    flow.twa = twa;
    flow.speed = x[X.speed]!;
    flow.leeway = x[X.leeway]!;
    sailSet.evaluateInto(flow, x[X.heel]!, price(x[X.depower]!), air);
  };

  /** To first order about the last full evaluation. */
  const nearAir = (tws: number, twa: number, x: Float64Array): void => {
    flow.tws = tws;
    flow.twa = twa;
    flow.speed = x[X.speed]!;
    flow.leeway = x[X.leeway]!;
    sailSet.nearInto(flow, x[X.heel]!, price(x[X.depower]!), air);
  };

  const evaluateWater = (x: Float64Array): void => {
    foils.evaluateInto(x[X.speed]!, x[X.leeway]!, x[X.rudder]!, x[X.heel]!, x[X.hoist]!, water);
    hull.resistanceInto(x[X.speed]!, x[X.heel]!, hullParts);
  };

  const add = (x: Float64Array, out: Float64Array): void => {
    const heel = x[X.heel]!;
    const leeway = x[X.leeway]!;
    const sinHeel = Math.sin(heel);
    const cosHeel = Math.cos(heel);
    const sinLee = Math.sin(leeway);
    const cosLee = Math.cos(leeway);
    const drive = air[AERO.drive]!;
    const side = air[AERO.side]! * cosHeel;
    let hullDrag = 0;
    for (let i = 0; i < HULL.count; i++) hullDrag += hullParts[i]!;
    const keelDrag = water[FOIL.keelInduced]! + water[FOIL.keelProfile]!;
    const rudderDrag = water[FOIL.rudderInduced]! + water[FOIL.rudderProfile]!;
    forces.formMoment = weight * hull.rightingArm(heel);
    forces.crewMoment = crewWeight * x[X.arm]! * cosHeel;
    sums[RES.surge] = drive * cosLee + side * sinLee - hullDrag - keelDrag - rudderDrag - forces.waves;
    sums[RES.sway] = side * cosLee - drive * sinLee - water[FOIL.lift]! * cosHeel;
    sums[RES.roll] = air[AERO.heelMoment]! + water[FOIL.heelMoment]! - forces.formMoment - forces.crewMoment;
    sums[RES.yaw] =
      air[AERO.driveZ]! * sinHeel -
      air[AERO.sideX]! * cosHeel +
      water[FOIL.yawMoment]! +
      (keelDrag * keelDepth + rudderDrag * rudderDepth) * sinHeel;
    out[RES.surge] = sums[RES.surge]! / weight;
    out[RES.sway] = sums[RES.sway]! / weight;
    out[RES.roll] = sums[RES.roll]! / (weight * length);
    out[RES.yaw] = sums[RES.yaw]! / (weight * length);
  };

  const residualInto = (tws: number, twa: number, x: Float64Array, out: Float64Array): void => {
    evaluateAir(tws, twa, x);
    evaluateWater(x);
    add(x, out);
  };

  const sideConditionsInto = (out: Float64Array): void => {
    out[0] = water[FOIL.keelStall]! - 1;
    out[1] = water[FOIL.rudderStall]! - 1;
  };

  const xw = new Float64Array(X.count);
  const c0 = new Float64Array(RES.count);
  const c1 = new Float64Array(RES.count);
  const g0 = new Float64Array(2);
  const g1 = new Float64Array(2);
  const air0 = new Float64Array(AERO.count);
  const water0 = new Float64Array(FOIL.count);
  const hull0 = new Float64Array(HULL.count);

  /** Differences by parts: the air does not depend on rudder, arm and board, the water not on depower and arm. */
  const jacobianInto = (
    tws: number,
    twa: number,
    x: Float64Array,
    jacobian: Float64Array,
    side: Float64Array,
  ): number => {
    air0.set(air);
    water0.set(water);
    hull0.set(hullParts);
    add(x, c0);
    sideConditionsInto(g0);
    xw.set(x);
    for (let j = 0; j < X.count; j++) {
      const size = j === X.speed ? Math.max(Math.abs(x[j]!), 0.02 * model.speedScale) : 1;
      let h = 1e-6 * size;
      if (j === X.depower && x[j]! + h > DEPOWER_MAX) h = -h;
      if (j === X.hoist && x[j]! + h > upper[j]!) h = -h;
      xw[j] = x[j]! + h;
      const inAir = j !== X.rudder && j !== X.arm && j !== X.hoist;
      const inWater = j !== X.depower && j !== X.arm && (j !== X.hoist || hoists);
      if (inAir) nearAir(tws, twa, xw);
      if (inWater) evaluateWater(xw);
      add(xw, c1);
      for (let i = 0; i < RES.count; i++) jacobian[i * X.count + j] = (c1[i]! - c0[i]!) / h;
      if (inWater) {
        sideConditionsInto(g1);
        for (let i = 0; i < 2; i++) side[i * X.count + j] = (g1[i]! - g0[i]!) / h;
      } else {
        side[j] = 0;
        side[X.count + j] = 0;
      }
      xw[j] = x[j]!;
      if (inAir) air.set(air0);
      if (inWater) {
        water.set(water0);
        hullParts.set(hull0);
      }
    }
    return 4;
  };

  const bare = new Float64Array(AERO.count);
  const bareHull = new Float64Array(HULL.count);
  const bareFoils = new Float64Array(FOIL.count);
  const boundsAt = (tws: number, twa: number, speed: number): { drive: number; resistance: number } => {
    // Upright at full power drive is largest. Leeway turns the hull, not the sails, but the boom's limit goes with it.
    flow.tws = tws;
    flow.twa = twa;
    flow.speed = speed;
    flow.leeway = 0;
    sailSet.evaluateInto(flow, 0, 0, bare);
    const hullDrag = hull.resistanceInto(speed, 0, bareHull);
    foils.evaluateInto(speed, 0, 0, 0, spec.boardRange[0], bareFoils);
    const foilDrag = bareFoils[FOIL.keelProfile]! + bareFoils[FOIL.rudderProfile]!;
    setWaves(tws, twa);
    return {
      drive: (BOUND_MARGIN.drive * Math.max(0, bare[AERO.drive]!) + Math.min(0, bare[AERO.drive]!)) / weight,
      resistance: (BOUND_MARGIN.resistance * (hullDrag + foilDrag) + forces.waves) / weight,
    };
  };

  const model: BoatModel = {
    boat,
    sailSet,
    forces,
    bounds: { lower, upper },
    speedScale: Math.sqrt(g * length),
    prepare,
    residualInto,
    sideConditions: 2,
    sideConditionsInto,
    sideConditionNames: ['keel lift', 'rudder lift'],
    jacobianInto,
    boundsAt,
    price,
  };
  return model;
}
