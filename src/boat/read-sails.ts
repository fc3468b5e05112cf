import {
  jibShape,
  mainsailShape,
  offWindShape,
  reefedShape,
  type SailKind,
  type SailShape,
  sailArea,
  sectionLimits,
  type Widths,
} from '../sails/index.js';
import { DEGREE } from '../units/index.js';
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
  readonly mizzen?: { readonly aft: number; readonly top: number } | undefined;
  /** Distance [m] aft of the stem of the ends of pole and sprit (negative: before it). */
  readonly poleEnd: () => number;
  readonly spritEnd: () => number;
}

/** Which keys belong to some kinds only. */
const MAINSAILS: readonly SailKind[] = ['mainsail', 'mizzen'];
const OFF_WIND: readonly SailKind[] = ['spinnaker', 'gennaker', 'reacher'];
const ONLY: Readonly<Partial<Record<keyof SailFile, readonly SailKind[]>>> = {
  quarter_width: MAINSAILS,
  half_width: [...MAINSAILS, ...OFF_WIND],
  three_quarter_width: MAINSAILS,
  upper_width: MAINSAILS,
  head_width: MAINSAILS,
  roach: MAINSAILS,
  gaff_length: MAINSAILS,
  gaff_angle: MAINSAILS,
  reefs: MAINSAILS,
  luff_perpendicular: ['jib'],
  goose_wing: ['jib'],
  head_height: OFF_WIND,
  projected: OFF_WIND,
};
/** Share of the cloth that the wind sees; judgement, as in the definition. */
const PROJECTED = { spinnaker: 0.8, gennaker: 0.85, reacher: 0.97 } as const;

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
  for (const [key, kinds] of Object.entries(ONLY)) {
    if (sail[key as keyof SailFile] === undefined || kinds.includes(sail.kind)) continue;
    complain(
      [...path, key],
      `a ${sail.kind} has no ${key} here`,
      `this key is for ${kinds.join(', ')}; remove it`,
    );
  }
  const limits = sectionLimits[sail.kind];
  const own = sail.section;
  const section =
    sail.lift_limit === undefined && own === undefined
      ? undefined
      : {
          clMax: sail.lift_limit ?? limits.clMax,
          cd0: own?.least_drag ?? limits.cd0,
          k: own?.drag_rise ?? limits.k,
          cl0: own?.least_drag_lift ?? limits.cl0,
          cd90: own?.square_drag ?? limits.cd90,
        };
  switch (sail.kind) {
    case 'mainsail':
    case 'mizzen':
      return readMainsail(name, path, sail, place, est, complain, section);
    case 'jib':
      return readJib(name, path, sail, place, est, complain, section);
    default:
      return readOffWind(name, path, { ...sail, kind: sail.kind }, place, est, complain, section);
  }
}

/** Reefed versions of a sail, the first reef first. */
export function reefsOf(shape: SailShape, sail: SailFile, path: Path, complain: Complain): SailShape[] {
  const shares = sail.reefs ?? [];
  for (let i = 1; i < shares.length; i++) {
    if (shares[i]! < shares[i - 1]!) continue;
    complain(
      [...path, 'reefs', `[${i + 1}]`],
      'this reef takes in no more than the one before',
      'write them in falling order',
    );
    return [];
  }
  return shares.map((share, i) => ({
    ...reefedShape(shape, share, i + 1),
    name: `${shape.name}, reef ${i + 1}`,
  }));
}

/** Widths measured at shares of the height, with foot and head; undefined when none is given. */
function widthsOf(sail: SailFile, foot: number, head: number): Widths | undefined {
  const between = (
    [
      [0.25, sail.quarter_width],
      [0.5, sail.half_width],
      [0.75, sail.three_quarter_width],
      [0.875, sail.upper_width],
    ] as const
  ).filter((p): p is [0.25 | 0.5 | 0.75 | 0.875, number] => p[1] !== undefined);
  if (between.length === 0) return undefined;
  return { at: [0, ...between.map((p) => p[0]), 1], width: [foot, ...between.map((p) => p[1]), head] };
}

function readOffWind(
  name: string,
  path: Path,
  sail: SailFile & { kind: 'spinnaker' | 'gennaker' | 'reacher' },
  place: RigPlaces,
  est: Estimator,
  complain: Complain,
  section: SailShape['section'] | undefined,
): SailShape | undefined {
  const { kind } = sail;
  const tackAft = est.pick([...path, 'tack_aft_of_stem'], sail.tack_aft_of_stem, () =>
    kind === 'spinnaker' ? place.poleEnd() : place.spritEnd(),
  );
  const tackZ = est.pick(
    [...path, 'tack_height'],
    sail.tack_height,
    () => place.freeboard + (kind === 'spinnaker' ? 0.12 : 0.02) * place.mastTop,
  );
  const headZ = est.pick([...path, 'head_height'], sail.head_height, () =>
    kind === 'gennaker'
      ? 0.97 * place.mastTop
      : Math.min(place.mastTop, place.forestay + 0.005 * place.mastTop),
  );
  if (!(headZ > tackZ + 0.5) || headZ > 1.005 * place.mastTop) {
    complain(
      [...path, sail.head_height !== undefined ? 'head_height' : 'tack_height'],
      `the head is ${say(headZ)} m above the water, the tack ${say(tackZ)} m, the top of the mast ${say(place.mastTop)} m`,
      'the head lies between tack and masthead',
    );
    return undefined;
  }
  const straight = Math.hypot(place.mastAft - tackAft, headZ - tackZ);
  const luff = est.pick([...path, 'luff'], sail.luff, () => straight);
  if (luff < 0.6 * straight || luff > 1.4 * straight) {
    complain(
      [...path, 'luff'],
      `a luff of ${say(luff)} m does not go with the ${say(straight)} m from tack to head`,
      'check luff, tack_height and head_height',
    );
    return undefined;
  }
  // Simpson over foot, half height and a pointed head.
  const areaOf = (foot: number, half: number): number => (luff * (foot + 4 * half)) / 6;
  const foot = est.pick([...path, 'foot'], sail.foot, () => {
    if (sail.area === undefined) return 0.55 * luff;
    return sail.half_width === undefined
      ? (6 * sail.area) / (5 * luff)
      : Math.max(0.2 * luff, (6 * sail.area) / luff - 4 * sail.half_width);
  });
  const half = est.pick([...path, 'half_width'], sail.half_width, () =>
    sail.area === undefined ? foot : ((6 * sail.area) / luff - foot) / 4,
  );
  const area = sail.area ?? areaOf(foot, half);
  if (!(half > 0.05 * luff && half < 1.6 * luff && foot < 1.6 * luff)) {
    complain(
      [...path, sail.area !== undefined ? 'area' : 'foot'],
      `${say(area)} m2 on a luff of ${say(luff)} m would make it ${say(half)} m wide at half height and ${say(foot)} m at the foot`,
      'check area, luff and foot',
    );
    return undefined;
  }
  checkArea(path, sail, areaOf(foot, half), 0.25, complain);
  return offWindShape({
    name,
    kind,
    area,
    foot,
    halfWidth: half,
    projected: est.pick([...path, 'projected'], sail.projected, () => PROJECTED[kind]),
    tackX: place.x(tackAft),
    tackZ,
    headX: place.x(place.mastAft),
    headZ,
    section,
  });
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
  if (sail.kind === 'mizzen' && place.mizzen === undefined) {
    complain([...path, 'kind'], 'a mizzen needs a second mast', 'give rig.mizzen_mast');
    return undefined;
  }
  const mast =
    sail.kind === 'mizzen' && place.mizzen !== undefined
      ? place.mizzen
      : { aft: place.mastAft, top: place.mastTop };
  const tackAft = est.pick([...path, 'tack_aft_of_stem'], sail.tack_aft_of_stem, () => mast.aft);
  const tackZ = est.pick([...path, 'tack_height'], sail.tack_height, () => place.boomHeight);
  const gaff =
    sail.gaff_length === undefined
      ? undefined
      : {
          length: sail.gaff_length,
          angle: est.pick([...path, 'gaff_angle'], sail.gaff_angle, () => 60 * DEGREE),
        };
  if (gaff === undefined && sail.gaff_angle !== undefined) {
    complain([...path, 'gaff_angle'], 'there is no gaff', 'give gaff_length as well');
  }
  const luff = est.pick([...path, 'luff'], sail.luff, () =>
    gaff === undefined ? 0.99 * mast.top - tackZ : 0.9 * mast.top - tackZ,
  );
  if (tackZ + luff > 1.005 * mast.top) {
    complain(
      [...path, sail.luff !== undefined ? 'luff' : 'tack_height'],
      `the head is ${say(tackZ + luff)} m above the water, above the top of the mast (${say(mast.top)} m)`,
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
      kind: sail.kind === 'mizzen' ? 'mizzen' : 'mainsail',
      gaff,
      widths: gaff === undefined ? widthsOf(sail, foot, sail.head_width ?? 0.05 * foot) : undefined,
      tackX: place.x(tackAft),
      tackZ,
      section,
    });
  const area = (foot: number, roach: number): number => sailArea(shape(foot, roach)).area;

  let foot = sail.foot;
  let roach = sail.roach;
  const measured = widthsOf(sail, 1, 0) !== undefined;
  if (measured && (roach !== undefined || gaff !== undefined)) {
    complain(
      [...path, roach !== undefined ? 'roach' : 'gaff_length'],
      'the widths say how the leech runs',
      'leave it out, or leave the widths out',
    );
    return undefined;
  }
  if (measured) {
    // The widths settle the leech; the area can only confirm them.
    roach = 0;
    foot ??= 1.02 * (sail.quarter_width ?? sail.half_width ?? 0.38 * luff) + 0.02 * luff;
    if (sail.foot === undefined) est.record([...path, 'foot'], foot);
  }
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
  roach = est.pick([...path, 'roach'], roach, () => (gaff === undefined ? 0.15 : 0));
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
      gooseWinged: sail.goose_wing,
      section,
    });
  let foot = sail.foot;
  if (sail.luff_perpendicular !== undefined) {
    if (foot !== undefined || sail.area !== undefined) {
      complain(
        [...path, 'luff_perpendicular'],
        'foot or area are given as well',
        'give one of foot, area and luff_perpendicular',
      );
      return undefined;
    }
    // A triangle: area = luff times luff perpendicular over two.
    foot = (0.5 * luff * sail.luff_perpendicular) / sailArea(shape(1)).area;
    est.record([...path, 'foot'], foot);
  }
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
