import { FOIL } from '../foils/index.js';
import { AERO, type SailSet, sailArea } from '../sails/index.js';
import { DEGREE } from '../units/index.js';
import type { Boat } from './types.js';

/** One derived quantity of a boat. */
export interface DescriptionRow {
  readonly section: string;
  readonly quantity: string;
  readonly value: number | string;
  readonly unit: string;
}

/** Heels [deg] at which righting arms are listed. */
const HEELS = [5, 10, 15, 20, 25, 30];

/** Everything worked out from the boat file, for a table. Lengths m, places aft of the fore end of the waterline. */
export function describeBoat(boat: Boat): DescriptionRow[] {
  const { spec, hull, foils } = boat;
  const { form } = hull;
  const d = spec.hull.dimensions;
  const rows: DescriptionRow[] = [];
  let section = '';
  const row = (quantity: string, value: number | string, unit = ''): void => {
    rows.push({ section, quantity, value, unit });
  };
  const aft = (x: number): number => 0.5 * d.lwl - x;

  section = 'hull';
  row('displacement with crew', boat.mass, 'kg');
  row('displaced volume of the hull', form.volume, 'm3');
  row('waterline length', form.lwl, 'm');
  row('waterline beam', form.bwl, 'm');
  row('canoe draft', form.canoeDraft, 'm');
  row('freeboard', d.freeboard, 'm');
  row('greatest beam', d.beamMax, 'm');
  row('wetted area, upright', form.wetted, 'm2');
  row('waterplane area', form.waterplane, 'm2');
  row('prismatic coefficient', form.cp);
  row('midship coefficient', form.cm);
  row('waterplane coefficient', form.cwp);
  row('centre of buoyancy', (100 * form.lcbFromForward) / form.lwl, '% of Lwl aft');
  row('centre of flotation', (100 * form.lcfFromForward) / form.lwl, '% of Lwl aft');
  row('length over cube root of volume', form.lwl / Math.cbrt(form.volume));
  row('beam over canoe draft', form.bwl / form.canoeDraft);
  row('trim, crew at their usual place', form.trim / DEGREE, 'deg');
  row('can plane', spec.hull.planing ? 'yes' : 'no');
  row('wave resistance', spec.hull.measured === undefined ? spec.hull.residuary : 'measured');

  section = 'stability';
  row('centre of mass, aft of the stem', aft(boat.centre.x), 'm');
  row('centre of mass, above the waterline', boat.centre.z, 'm');
  row('metacentric height GM', form.gm, 'm');
  for (const heel of HEELS) {
    if (heel * DEGREE > hull.heelMax) continue;
    row(`righting arm GZ at ${heel} deg`, hull.rightingArm(heel * DEGREE), 'm');
  }
  row('crew arm fully out', spec.crew.armOut, 'm');
  for (const heel of HEELS) {
    const angle = heel * DEGREE;
    if (angle > Math.min(hull.heelMax, spec.limits.heel)) continue;
    const moment =
      spec.gravity *
      (boat.mass * hull.rightingArm(angle) + spec.crew.mass * spec.crew.armOut * Math.cos(angle));
    row(`righting moment, crew out, at ${heel} deg`, moment, 'N m');
  }

  section = 'sails';
  for (const sail of spec.sails) {
    const { area, x, z } = sailArea(sail);
    row(`${sail.name}: ${sail.cloth === undefined ? 'area' : 'projected area'}`, area, 'm2');
    if (sail.cloth !== undefined) row(`${sail.name}: area of the cloth`, sail.cloth, 'm2');
    row(`${sail.name}: centre above the waterline`, z, 'm');
    row(`${sail.name}: centre aft of the stem`, aft(x), 'm');
  }
  for (const set of boat.sailSets) {
    row(`set ${set.name}: area`, set.area, 'm2');
    row(`set ${set.name}: centre above the waterline`, set.centre[1], 'm');
    row(
      `set ${set.name}: lead of its force over the lateral centre`,
      (100 * leadOf(boat, set)) / d.lwl,
      '% of Lwl',
    );
    row(`set ${set.name}: area over volume^(2/3)`, set.area / Math.cbrt(form.volume) ** 2);
  }

  section = 'foils';
  const keelName = spec.keel.kind === 'keel' ? 'keel' : 'centreboard';
  row('draft', spec.keel.span - spec.keel.z, 'm');
  row(`${keelName}: area`, foils.keelArea, 'm2');
  row(`${keelName}: effective aspect ratio`, foils.keelAspect);
  row(`${keelName}: lift slope`, foils.keelSlope, '1/rad');
  row('rudder: area', foils.rudderArea, 'm2');
  row('rudder: effective aspect ratio', foils.rudderAspect);
  row('rudder: lift slope', foils.rudderSlope, '1/rad');
  row('rudder', spec.rudder.surfacePiercing ? 'cuts the surface' : 'under the hull');
  row('centre of lateral resistance, aft of the stem', aft(lateralCentre(boat)), 'm');
  return rows;
}

/** The close-hauled flow at which centres are compared: speeds over sqrt(g Lwl), angles in deg (judgement). */
const UPWIND = { speed: 0.33, tws: 0.66, twa: 43, leeway: 4 } as const;

/**
 * x [m] of the side force in the water close-hauled and upright, with the rudder amidships: keel with the hull's
 * share, rudder, and the hull's own turning moment, from the foil system.
 */
export function lateralCentre(boat: Boat): number {
  const out = new Float64Array(FOIL.count);
  const speed = UPWIND.speed * Math.sqrt(boat.spec.gravity * boat.hull.form.lwl);
  boat.foils.evaluateInto(speed, UPWIND.leeway * DEGREE, 0, 0, boat.spec.boardRange[1], out);
  return out[FOIL.yawMoment]! / out[FOIL.lift]!;
}

/** x [m] of the side force of a sail set close-hauled, upright and at full power, without windage. */
export function effortCentre(boat: Boat, set: SailSet): number {
  const out = new Float64Array(AERO.count);
  const scale = Math.sqrt(boat.spec.gravity * boat.hull.form.lwl);
  const flow = {
    speed: UPWIND.speed * scale,
    tws: UPWIND.tws * scale,
    twa: UPWIND.twa * DEGREE,
    leeway: UPWIND.leeway * DEGREE,
  };
  set.evaluateInto(flow, 0, 0, out);
  return (out[AERO.sideX]! - out[AERO.windageSideX]!) / (out[AERO.side]! - out[AERO.windageSide]!);
}

/** Distance [m] by which the force of a sail set lies before the lateral centre; heel turns the bow the other way. */
export function leadOf(boat: Boat, set: SailSet): number {
  return effortCentre(boat, set) - lateralCentre(boat);
}
