import { jibShape, mainsailShape, type SailShape, sailArea, sectionLimits } from '../sails/index.js';
import type { Estimator } from './estimator.js';
import type { ParsedFile, Path } from './parse-file.js';
import type { BoatFileValue } from './schema.js';

type SailFile = BoatFileValue['sails'][string];

/** Where the sails are set. Lengths m; `x` turns a distance aft of the stem into body axes. */
export interface RigPlaces {
  readonly x: (aft: number) => number;
  readonly lwl: number;
  readonly mastAft: number;
  readonly mastTop: number;
  readonly boomHeight: number;
  /** Height at which the forestay meets the mast. */
  readonly forestay: number;
  readonly freeboard: number;
}

type Complain = ParsedFile['complain'];

const say = (value: number): string => `${Number(value.toPrecision(3))}`;

/** One sail's shape from what the file says of it. */
export function readSail(
  name: string,
  sail: SailFile,
  place: RigPlaces,
  est: Estimator,
  complain: Complain,
): SailShape | undefined {
  const path: Path = ['sails', name];
  const limits = sectionLimits[sail.kind];
  const section = sail.lift_limit === undefined ? undefined : { ...limits, clMax: sail.lift_limit };
  return sail.kind === 'mainsail'
    ? readMainsail(name, path, sail, place, est, complain, section)
    : readJib(name, path, sail, place, est, complain, section);
}

function readMainsail(
  name: string,
  path: Path,
  sail: SailFile,
  place: RigPlaces,
  est: Estimator,
  complain: Complain,
  section: SailShape['section'] | undefined,
): SailShape | undefined {
  const tackAft = est.pick([...path, 'tack_aft_of_stem'], sail.tack_aft_of_stem, () => place.mastAft);
  const tackZ = est.pick([...path, 'tack_height'], sail.tack_height, () => place.boomHeight);
  const luff = est.pick([...path, 'luff'], sail.luff, () => 0.99 * place.mastTop - tackZ);
  if (tackZ + luff > 1.005 * place.mastTop) {
    complain(
      [...path, sail.luff !== undefined ? 'luff' : 'tack_height'],
      `the head is ${say(tackZ + luff)} m above the water, above the top of the mast (${say(place.mastTop)} m)`,
      'check luff, tack_height and rig.mast_height',
    );
    return undefined;
  }
  if (!(luff > 0.3)) {
    complain(
      [...path, 'tack_height'],
      `only ${say(luff)} m of mast is left above the tack`,
      'check tack_height and rig.mast_height',
    );
    return undefined;
  }
  const shape = (foot: number, roach: number): SailShape =>
    mainsailShape({
      name,
      luff,
      foot,
      headWidth: sail.head_width ?? 0.05 * foot,
      roach,
      tackX: place.x(tackAft),
      tackZ,
      section,
    });
  const area = (foot: number, roach: number): number => sailArea(shape(foot, roach)).area;

  let foot = sail.foot;
  let roach = sail.roach;
  if (sail.area !== undefined && foot !== undefined && roach === undefined) {
    // The area is linear in the roach.
    const flat = area(foot, 0);
    roach = (sail.area - flat) / (area(foot, 1) - flat);
    if (!(roach >= -0.2 && roach <= 0.6)) {
      complain(
        [...path, 'area'],
        `${say(sail.area)} m2 does not go with a luff of ${say(luff)} m and a foot of ${say(foot)} m, which make ${say(area(foot, -0.2))} to ${say(area(foot, 0.6))} m2`,
        'leave area or foot out, or check the units',
      );
      return undefined;
    }
    est.record([...path, 'roach'], roach);
  }
  roach = est.pick([...path, 'roach'], roach, () => 0.15);
  if (foot === undefined) {
    if (sail.area === undefined) foot = 0.38 * luff;
    else {
      // The area is linear in the foot.
      const one = area(1, roach);
      foot = 1 + (sail.area - one) / (area(2, roach) - one);
    }
    est.record([...path, 'foot'], foot);
  }
  if (sail.head_width === undefined) est.record([...path, 'head_width'], 0.05 * foot);
  if (!(foot > 0.05 * luff && foot < 1.5 * luff)) {
    complain(
      [...path, sail.foot !== undefined ? 'foot' : sail.area !== undefined ? 'area' : 'luff'],
      `a foot of ${say(foot)} m does not go with a luff of ${say(luff)} m`,
      'the foot is usually 0.3 to 0.5 of the luff',
    );
    return undefined;
  }
  if (sail.head_width !== undefined && sail.head_width > 1.2 * foot) {
    complain(
      [...path, 'head_width'],
      `the head (${say(sail.head_width)} m) is wider than the foot (${say(foot)} m)`,
      'is it in centimetres?',
    );
    return undefined;
  }
  const made = shape(foot, roach);
  checkArea(path, sail, sailArea(made).area, 0.03, complain);
  if (made.chord.some((c) => !(c >= 0))) {
    complain(
      [...path, 'roach'],
      `a roach of ${say(roach)} leaves the leech in front of the luff`,
      'check roach and head_width',
    );
    return undefined;
  }
  return made;
}

function readJib(
  name: string,
  path: Path,
  sail: SailFile,
  place: RigPlaces,
  est: Estimator,
  complain: Complain,
  section: SailShape['section'] | undefined,
): SailShape | undefined {
  for (const key of ['roach', 'head_width'] as const) {
    if (sail[key] !== undefined) {
      complain([...path, key], `a jib has no ${key} here`, 'this key is for mainsails; remove it');
    }
  }
  const tackAft = est.pick([...path, 'tack_aft_of_stem'], sail.tack_aft_of_stem, () => 0.02 * place.lwl);
  const tackZ = est.pick(
    [...path, 'tack_height'],
    sail.tack_height,
    () => place.freeboard + 0.02 * place.mastTop,
  );
  if (tackAft >= place.mastAft) {
    complain(
      [...path, 'tack_aft_of_stem'],
      `the tack (${say(tackAft)} m aft of the stem) is not in front of the mast (${say(place.mastAft)} m)`,
      'check tack_aft_of_stem and rig.mast_aft_of_stem',
    );
    return undefined;
  }
  if (tackZ >= 0.8 * place.forestay) {
    complain(
      [...path, 'tack_height'],
      `the tack (${say(tackZ)} m) is near or above the top of the forestay (${say(place.forestay)} m)`,
      'both are heights above the waterline',
    );
    return undefined;
  }
  const stay = Math.hypot(place.mastAft - tackAft, place.forestay - tackZ);
  const luff = est.pick([...path, 'luff'], sail.luff, () => 0.94 * stay);
  if (luff > 1.005 * stay) {
    complain(
      [...path, 'luff'],
      `the luff (${say(luff)} m) is longer than the way from the tack to the forestay's end at the mast (${say(stay)} m)`,
      'check luff, rig.forestay_height and tack_height',
    );
    return undefined;
  }
  const shape = (foot: number): SailShape =>
    jibShape({
      name,
      luff,
      foot,
      tackX: place.x(tackAft),
      tackZ,
      headX: place.x(place.mastAft),
      headZ: place.forestay,
      section,
    });
  let foot = sail.foot;
  if (foot === undefined) {
    foot = sail.area === undefined ? 0.4 * luff : sail.area / sailArea(shape(1)).area;
    est.record([...path, 'foot'], foot);
  }
  if (!(foot > 0.05 * luff && foot < 1.5 * luff)) {
    complain(
      [...path, sail.foot !== undefined ? 'foot' : 'area'],
      `a foot of ${say(foot)} m does not go with a luff of ${say(luff)} m`,
      'the foot is usually 0.3 to 0.6 of the luff',
    );
    return undefined;
  }
  const made = shape(foot);
  checkArea(path, sail, sailArea(made).area, 0.1, complain);
  return made;
}

function checkArea(path: Path, sail: SailFile, made: number, tolerance: number, complain: Complain): void {
  if (sail.area === undefined || Math.abs(made / sail.area - 1) <= tolerance) return;
  complain(
    [...path, 'area'],
    `${say(sail.area)} m2 does not go with the other dimensions, which make ${say(made)} m2`,
    'leave area out, or leave foot or roach out to have it worked out from the area',
  );
}
