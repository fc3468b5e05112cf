import type { Boat } from '../boat/index.js';
import type { RangeWarning } from '../hull/index.js';
import type { Polar } from './types.js';

const DEGREE = Math.PI / 180;

/**
 * What the states of a polar ask of the methods beyond their ranges, each with the farthest value, once. Beside
 * `boat.warnings`, which hold whatever the state.
 */
export function polarWarnings(boat: Boat, polar: Polar): RangeWarning[] {
  const { spec, hull } = boat;
  const scale = Math.sqrt(spec.gravity * hull.form.lwl);
  let froude = 0;
  let heeled = 0;
  let heel = 0;
  for (const r of [...polar.results.flat(), ...polar.bestUp, ...polar.bestDown]) {
    if (r.status !== 'balanced') continue;
    const fn = r.speed / scale;
    froude = Math.max(froude, fn);
    if (Math.abs(r.heel) > 1 * DEGREE) heeled = Math.max(heeled, fn);
    heel = Math.max(heel, Math.abs(r.heel) / DEGREE);
  }
  const out: RangeWarning[] = [];
  if (spec.hull.measured === undefined && !spec.hull.planing && froude > 0.6) {
    out.push({
      method: 'Delft residuary resistance',
      parameter: 'Froude number',
      value: froude,
      range: [0.1, 0.6],
      treatment: 'continued beyond 0.60 with the slope before it (judgement): such speeds are a guess',
    });
  }
  if (spec.hull.measured !== undefined) {
    const top = spec.hull.measured.speed[spec.hull.measured.speed.length - 1]!;
    if (froude * scale > top) {
      out.push({
        method: 'measured resistance',
        parameter: 'speed [m/s]',
        value: froude * scale,
        range: [spec.hull.measured.speed[0]!, top],
        treatment: 'continued in proportion to speed squared',
      });
    }
  }
  if (spec.hull.measured === undefined && heeled > 0.55) {
    out.push({
      method: 'Delft increase of residuary resistance with heel, 1998',
      parameter: 'Froude number, heeled',
      value: heeled,
      range: [0.25, 0.55],
      treatment: spec.hull.planing ? 'held above 0.55, fading as planing takes over' : 'held above 0.55',
    });
  }
  if (heel > 30) {
    out.push({
      method: 'Delft increase of resistance with heel; side force with heel',
      parameter: 'heel [deg]',
      value: heel,
      range: [0, 30],
      treatment: 'continued by the law of the heel angle',
    });
  }
  return out;
}
