import type { Boat } from '../boat/index.js';
import { FOIL } from '../foils/index.js';
import { HULL } from '../hull/index.js';
import { AERO } from '../sails/index.js';
import { createSetSolvers, stateVector } from './boat-solver.js';
import { type ForceBalance, type ForceRow, type LinesOfAction, RES, type SailingState, X } from './types.js';

const DEGREE = Math.PI / 180;

/**
 * Every force and moment at a balanced state, in a table that adds up to nothing: along and across the course
 * [N], heeling about the fore-and-aft axis and yawing about the upright axis through the origin [N m].
 */
export function forceBalance(boat: Boat, state: SailingState): ForceBalance {
  const set = createSetSolvers(boat).find((s) => s.sailSet.name === state.sailSet);
  if (set === undefined) throw new RangeError(`the boat has no sail set named "${state.sailSet}"`);
  const { model } = set;
  const x = stateVector(state);
  const out = new Float64Array(RES.count);
  model.residualInto(state.tws, state.twa, x, out);
  const { air, foils, hull, formMoment, crewMoment, sums } = model.forces;
  const heel = x[X.heel]!;
  const leeway = x[X.leeway]!;
  const [sinH, cosH] = [Math.sin(heel), Math.cos(heel)];
  const [sinL, cosL] = [Math.sin(leeway), Math.cos(leeway)];
  const rows: ForceRow[] = [];

  const airRow = (
    name: string,
    drive: number,
    side: number,
    moment: number,
    sideX: number,
    driveZ: number,
  ): void => {
    const s = side * cosH;
    rows.push({
      group: 'air',
      name,
      forward: drive * cosL + s * sinL,
      leeward: s * cosL - drive * sinL,
      roll: moment,
      yaw: driveZ * sinH - sideX * cosH,
    });
  };
  airRow(
    'sails',
    air[AERO.drive]! - air[AERO.windageDrive]!,
    air[AERO.side]! - air[AERO.windageSide]!,
    air[AERO.heelMoment]! - air[AERO.windageMoment]!,
    air[AERO.sideX]! - air[AERO.windageSideX]!,
    air[AERO.driveZ]! - air[AERO.windageDriveZ]!,
  );
  airRow(
    'windage of hull, spars, rigging and crew',
    air[AERO.windageDrive]!,
    air[AERO.windageSide]!,
    air[AERO.windageMoment]!,
    air[AERO.windageSideX]!,
    air[AERO.windageDriveZ]!,
  );

  const drag = (name: string, force: number, yaw = 0): void => {
    if (force !== 0) rows.push({ group: 'water', name, forward: -force, leeward: 0, roll: 0, yaw });
  };
  drag('hull friction', hull[HULL.friction]!);
  drag('hull residuary (waves)', hull[HULL.residuary]!);
  drag('heel, residuary', hull[HULL.heel]!);
  drag('keel residuary', hull[HULL.keelResiduary]!);
  drag('keel residuary, heeled', hull[HULL.keelHeel]!);
  drag('planing', hull[HULL.planing]!);
  drag('immersed transom', hull[HULL.transom]!);
  drag('waves, added resistance', model.forces.waves);
  const keelArm = (-boat.foils.spec.keel.z + 0.45 * boat.foils.spec.keel.span) * sinH;
  const rudderArm = (-boat.foils.spec.rudder.z + 0.45 * boat.foils.spec.rudder.span) * sinH;
  drag('keel or board, induced', foils[FOIL.keelInduced]!, foils[FOIL.keelInduced]! * keelArm);
  drag('keel or board, profile', foils[FOIL.keelProfile]!, foils[FOIL.keelProfile]! * keelArm);
  drag('rudder, induced', foils[FOIL.rudderInduced]!, foils[FOIL.rudderInduced]! * rudderArm);
  drag('rudder, profile', foils[FOIL.rudderProfile]!, foils[FOIL.rudderProfile]! * rudderArm);
  rows.push({
    group: 'water',
    name: 'keel or board with hull, lift',
    forward: 0,
    leeward: -foils[FOIL.keelLift]! * cosH,
    roll: foils[FOIL.heelMoment]! - foils[FOIL.rudderHeelMoment]!,
    yaw: foils[FOIL.yawMoment]! - foils[FOIL.rudderYawMoment]!,
  });
  rows.push({
    group: 'water',
    name: 'rudder, lift',
    forward: 0,
    leeward: -foils[FOIL.rudderLift]! * cosH,
    roll: foils[FOIL.rudderHeelMoment]!,
    yaw: foils[FOIL.rudderYawMoment]!,
  });
  rows.push({
    group: 'weight',
    name: 'hull form, crew inboard',
    forward: 0,
    leeward: 0,
    roll: -formMoment,
    yaw: 0,
  });
  rows.push({ group: 'weight', name: 'crew to windward', forward: 0, leeward: 0, roll: -crewMoment, yaw: 0 });

  const flow = { tws: state.tws, twa: state.twa, speed: state.speed, leeway: state.leeway };
  const facts: { name: string; value: number; unit: string }[] = [];
  const fact = (name: string, value: number, unit: string): void => {
    facts.push({ name, value, unit });
  };
  fact('righting arm GZ, crew inboard', boat.hull.rightingArm(heel), 'm');
  fact('crew arm', x[X.arm]!, 'm');
  fact('wetted area of the hull', boat.hull.wetted(heel), 'm2');
  fact('Froude number', state.speed / Math.sqrt(boat.spec.gravity * boat.hull.form.lwl), '');
  fact('keel lift used', 100 * foils[FOIL.keelStall]!, '% of its limit');
  fact('rudder lift used', 100 * foils[FOIL.rudderStall]!, '% of its limit');
  for (const l of set.sailSet.loading(flow, heel, model.price(x[X.depower]!))) {
    fact(`${l.sail}: centre of effort above the water`, l.centreHeight, 'm');
    let atLimit = 0;
    for (let i = 0; i < l.cl.length; i++) if (l.cl[i]! > 0.999 * l.clLimit[i]!) atLimit++;
    fact(`${l.sail}: sections at their lift limit`, (100 * atLimit) / l.cl.length, '% of nodes');
    const last = l.inflow.length - 1;
    fact(`${l.sail}: twist of the wind, foot to head`, (l.inflow[last]! - l.inflow[0]!) / DEGREE, 'deg');
  }
  fact('drag angle in air', airDragAngle(state, rows) / DEGREE, 'deg');
  fact('drag angle in water', waterDragAngle(rows) / DEGREE, 'deg');
  const sum = { forward: 0, leeward: 0, roll: 0, yaw: 0 };
  for (const r of rows) {
    sum.forward += r.forward;
    sum.leeward += r.leeward;
    sum.roll += r.roll;
    sum.yaw += r.yaw;
  }
  // The table is the model's own sum, row by row: a part left out of it would show here.
  const weight = boat.mass * boat.spec.gravity;
  const gap = Math.max(
    Math.abs(sum.forward - sums[RES.surge]!),
    Math.abs(sum.leeward - sums[RES.sway]!),
    Math.abs(sum.roll - sums[RES.roll]!) / boat.hull.form.lwl,
    Math.abs(sum.yaw - sums[RES.yaw]!) / boat.hull.form.lwl,
  );
  if (gap > 1e-9 * weight)
    throw new Error(`the force table misses ${gap.toExponential(2)} N of the model's sum`);
  return { state, rows, sum, facts, lines: linesOfAction(boat, state, rows, air, foils) };
}

/** Resultants of air and water, each with a point of its line of action. */
function linesOfAction(
  boat: Boat,
  state: SailingState,
  rows: readonly ForceRow[],
  air: Float64Array,
  foils: Float64Array,
): LinesOfAction {
  const up = total(rows, 'air');
  const down = total(rows, 'water');
  const { spec } = boat;
  const [sin, cos] = [Math.sin(state.heel), Math.cos(state.heel)];
  const side = Math.abs(air[AERO.side]!) > 1e-9 ? air[AERO.side]! : 1e-9;
  const lift = Math.abs(foils[FOIL.lift]!) > 1e-9 ? foils[FOIL.lift]! : 1e-9;
  const z = air[AERO.heelMoment]! / side;
  const depth = foils[FOIL.heelMoment]! / lift;
  const rudder = rows.find((r) => r.name === 'rudder, lift');
  const yaw = rows.filter((r) => r.group !== 'weight').reduce((s, r) => s + r.yaw, 0) - (rudder?.yaw ?? 0);
  return {
    air: { ...up, z, x: air[AERO.sideX]! / side, planOffset: z * sin },
    water: {
      ...down,
      depth,
      x: foils[FOIL.yawMoment]! / (lift * cos),
      planOffset: -depth * sin,
    },
    lead: Math.hypot(up.forward, up.leeward) > 0 ? yaw / Math.hypot(up.forward, up.leeward) : 0,
    crewWeight: spec.crew.mass * spec.gravity,
    crewHeight: spec.crew.z,
    boatWeight: (boat.mass - spec.crew.mass) * spec.gravity,
    massHeight: boat.centre.z,
    length: spec.hull.loa,
    beam: spec.hull.dimensions.beamMax,
    freeboard: spec.hull.dimensions.freeboard,
    canoeDraft: spec.hull.dimensions.canoeDraft,
    draft: spec.keel.span * state.boardDown - spec.keel.z,
    mastTop: spec.rig.mastTop,
  };
}

function total(rows: readonly ForceRow[], group: ForceRow['group']): { forward: number; leeward: number } {
  let forward = 0;
  let leeward = 0;
  for (const r of rows) {
    if (r.group !== group) continue;
    forward += r.forward;
    leeward += r.leeward;
  }
  return { forward, leeward };
}

/** Angle [rad] of the air force from square to the apparent wind, in the horizontal plane. */
function airDragAngle(state: SailingState, rows: readonly ForceRow[]): number {
  const f = total(rows, 'air');
  const course = state.awa + state.leeway; // apparent wind from the course
  const drag = -f.forward * Math.cos(course) + f.leeward * Math.sin(course);
  const lift = f.forward * Math.sin(course) + f.leeward * Math.cos(course);
  return Math.atan2(drag, lift);
}

/** Angle [rad] of the water force from square to the course. */
function waterDragAngle(rows: readonly ForceRow[]): number {
  const f = total(rows, 'water');
  return Math.atan2(-f.forward, -f.leeward);
}
