import { air, OPEN_WATER_ROUGHNESS, water } from '../environment/index.js';
import { bulbVolume, chordMeans, type FoilSpec } from '../foils/index.js';
import type { FairedLines, MainDimensions } from '../hull/index.js';
import type { SailShape } from '../sails/index.js';
import { DEGREE, nearest, STANDARD_GRAVITY, type UnitEngine } from '../units/index.js';
import { nothingBeside, type ReadBeside } from './beside.js';
import { Estimator } from './estimator.js';
import { type ParsedFile, type Path, parseBoatFile } from './parse-file.js';
import { readLines } from './read-lines.js';
import { readMeasuredRigs } from './read-measured-rigs.js';
import { type RigPlaces, readSail, reefsOf } from './read-sails.js';
import { readWaves } from './read-waves.js';
import type { BoatFileValue } from './schema.js';
import type { BoatSpec, CrewSpec, Estimate, WeightItem } from './types.js';
import type { Change } from './variants.js';

/** Density [kg/m3] at which ballast is turned into keel volume: cast iron. */
const CAST_IRON = 7200;
/** Outboard reach [m] of a body's centre beyond the gunwale; common practice for a person of 1.80 m, no source. */
const REACH = { hiking: 0.35, trapeze: 1.0, rail: -0.07 } as const;
/** Drag of a cylinder below its critical Reynolds number (Hoerner, Fluid-Dynamic Drag 1965, from memory). */
const CYLINDER_DRAG = 1.1;
/** Drag area [m2] of one of the crew; judgement. */
const CREW_DRAG = { hiking: 0.4, trapeze: 0.55, rail: 0.3 } as const;
/** Share of that area which each further body of a row on the rail adds, in the lee of its neighbour; judgement. */
const RAIL_SHELTER = 0.4;

/** Largest misfit between the volume of given lines and that of the weights: the hull is floated at its own level. */
const LINES_MISFIT = 0.4;

type Complain = ParsedFile['complain'];

/**
 * Reads a boat file: its text by the definition in `schema.ts`, estimates for what is missing, and checks that the
 * parts fit each other. Pure: no files are opened.
 * @param input the text, or its bytes in UTF-8
 * @param fileName only for messages
 * @param engine reads unusual quantities ("2 * 3.1 m"); see `loadUnitEngine`
 * @param beside reads the files it names
 * @param changes makes a variant of it; see `variants.ts`
 * @returns everything in SI and body axes (origin amidships of the design waterline, x forward, z up)
 * @throws BoatFileError with every problem's line, column, key and hint
 */
export function readBoatSpec(
  input: string | Uint8Array,
  fileName = 'boat file',
  engine?: () => UnitEngine,
  beside: ReadBeside = nothingBeside,
  changes: readonly Change[] = [],
): { spec: BoatSpec; estimates: Estimate[] } {
  const parsed = parseBoatFile(input, fileName, engine, changes);
  // A part that could not be read would only cause false complaints about how the parts fit.
  parsed.problems.throwIfAny();
  const estimator = new Estimator();
  const faired = readLines(parsed.value, parsed.complain, beside);
  parsed.problems.throwIfAny();
  const spec = buildSpec(withLines(parsed.value, faired), estimator, parsed.complain, faired, beside);
  parsed.problems.throwIfAny();
  if (spec === undefined) throw new Error('a boat file was rejected without a reason');
  return { spec, estimates: estimator.estimates };
}

/** The file as if the main dimensions measured from its lines had been written in it. */
function withLines(file: BoatFileValue, faired: FairedLines | undefined): BoatFileValue {
  if (faired === undefined) return file;
  const d = faired.dimensions;
  const stations = faired.lines.stations;
  const loa = stations[stations.length - 1]!.x - stations[0]!.x;
  return {
    ...file,
    hull: {
      ...file.hull,
      waterline_length: d.lwl,
      waterline_beam: d.bwl,
      beam_overall: d.beamMax,
      length_overall: file.hull.length_overall ?? Math.max(loa, d.lwl),
      canoe_draft: d.canoeDraft,
      freeboard: d.freeboard,
      prismatic: d.cp,
      midship: d.cm,
      waterplane: d.cwp,
      buoyancy_aft_of_stem: (0.5 + d.lcbAft) * d.lwl,
    },
  };
}

function buildSpec(
  file: BoatFileValue,
  est: Estimator,
  complain: Complain,
  faired: FairedLines | undefined,
  beside: ReadBeside,
): BoatSpec | undefined {
  const lwl = file.hull.waterline_length;
  /** x of a place given as a distance aft of the fore end of the waterline, and back. */
  const x = (aft: number): number => 0.5 * lwl - aft;

  const waterKind = est.pick(['water', 'kind'], file.water?.kind, () => 'salt' as const);
  const celsius = est.pick(['water', 'temperature'], file.water?.temperature, () => 15);
  const fluid = water(waterKind, celsius);
  const airCelsius = est.pick(['wind', 'air_temperature'], file.wind?.air_temperature, () => 15);

  const ballast = Object.hasOwn(file.weights, 'ballast') ? file.weights.ballast : undefined;
  const count = est.pick(['crew', 'count'], file.crew.count, () => 1);
  const massEach = est.pick(['crew', 'mass_each'], file.crew.mass_each, () => 75);
  const dryMass = Object.values(file.weights).reduce((sum, part) => sum + part.mass, 0);
  const mass = dryMass + count * massEach;

  const { keel: fin, centreboard: board } = file.foils;
  if ((fin === undefined) === (board === undefined)) {
    complain(
      ['foils'],
      fin === undefined ? 'neither keel nor centreboard is given' : 'both keel and centreboard are given',
      'give one of keel and centreboard',
    );
    return undefined;
  }
  const keelPath: Path = ['foils', fin !== undefined ? 'keel' : 'centreboard'];
  const keelFile = (fin ?? board)!;
  if (ballast !== undefined && fin === undefined) {
    complain(
      ['weights', 'ballast'],
      'there is ballast, but no keel to hold it',
      'call it by another name, or give foils.keel',
    );
  }
  for (const [path, f] of [
    [keelPath, keelFile],
    [['foils', 'rudder'], file.foils.rudder],
  ] as const) {
    if ((f.span === undefined) === (f.draft === undefined)) {
      complain(
        path,
        f.span === undefined ? 'neither span nor draft is given' : 'both span and draft are given',
        'give span (root to tip) or draft (waterline to tip)',
      );
      return undefined;
    }
  }

  const keelChords = readChords(keelPath, keelFile, est, complain);
  const rudderChords = readChords(['foils', 'rudder'], file.foils.rudder, est, complain);
  if (keelChords === undefined || rudderChords === undefined) return undefined;
  const keelThickness = est.pick([...keelPath, 'thickness'], keelFile.thickness, () =>
    fin !== undefined ? 0.12 : 0.08,
  );
  let keelVolume = 0;
  if (fin !== undefined) {
    keelVolume = est.pick(['foils', 'keel', 'volume'], fin.volume, () => {
      if (ballast !== undefined) return ballast.mass / CAST_IRON;
      const span = keelFile.span ?? keelFile.draft ?? 0;
      const bulb = fin.bulb === undefined ? 0 : bulbVolume(fin.bulb);
      return 0.68 * keelThickness * span * chordMeans(keelChords).square + bulb;
    });
  }
  const volume = mass / fluid.density - keelVolume;
  if (!(volume > 0.2 * (mass / fluid.density))) {
    complain(
      ['foils', 'keel', 'volume'],
      `the keel alone would float ${Math.round(keelVolume * fluid.density)} of ${Math.round(mass)} kg`,
      'check the volume of the keel and the weights',
    );
    return undefined;
  }
  const hull = readHull(file, est, complain, volume);
  if (hull === undefined) return undefined;
  const { canoeDraft, freeboard, beamMax } = hull;

  const keel = readFoil(keelPath, keelFile, est, complain, x, {
    kind: fin !== undefined ? 'keel' : 'centreboard',
    chords: keelChords,
    thickness: keelThickness,
    rootDepth: () => canoeDraft,
    clMax: 1.2,
    surfacePiercing: false,
    straightTrailingEdge: false,
  });
  const rudderFile = file.foils.rudder;
  const hung = est.pick(['foils', 'rudder', 'hung'], rudderFile.hung, () =>
    rudderFile.aft_of_stem > 0.98 * lwl ? ('transom' as const) : ('under_hull' as const),
  );
  const rudder = readFoil(['foils', 'rudder'], rudderFile, est, complain, x, {
    kind: 'rudder',
    chords: rudderChords,
    thickness: est.pick(['foils', 'rudder', 'thickness'], rudderFile.thickness, () => 0.1),
    rootDepth: () => (hung === 'transom' ? 0 : 0.5 * canoeDraft),
    clMax: hung === 'transom' ? 0.85 : 1.2,
    surfacePiercing: hung === 'transom',
    straightTrailingEdge: true,
  });
  if (keel === undefined || rudder === undefined) return undefined;
  checkFoils(file, keelPath, keelChords[0]!, complain);
  const raised = board === undefined ? 1 : est.pick([...keelPath, 'raises_to'], board.raises_to, () => 0.3);

  const rigAndSails = readRig(file, est, complain, x, freeboard);
  if (rigAndSails === undefined) return undefined;
  const { rig, sails } = rigAndSails;

  const crew = readCrew(file, est, complain, {
    lwl,
    beamMax,
    freeboard,
    count,
    massEach,
    ballast: ballast !== undefined,
  });
  const weights = readWeights(file, est, x, { keel, freeboard, mastX: rig.mastX, mastTop: rig.mastTop });

  const moment = weights.reduce((sum, w) => sum + w.mass * w.x, 0) + crew.spec.mass * x(crew.aft);
  const centreAft = 0.5 - moment / mass / lwl;
  if (!(centreAft > 0.35 && centreAft < 0.7)) {
    const farthest = [...weights].sort((p, q) => Math.abs(q.mass * q.x) - Math.abs(p.mass * p.x))[0]!;
    complain(
      ['weights', farthest.name, 'aft_of_stem'],
      `the centre of mass of boat and crew lies at ${Math.round(100 * centreAft)} % of the waterline length, outside 35 to 70 %`,
      'places are measured aft from the fore end of the waterline',
    );
  }
  const lcbAft =
    est.pick(
      ['hull', 'buoyancy_aft_of_stem'],
      file.hull.buoyancy_aft_of_stem,
      () => lwl * Math.min(0.56, Math.max(0.5, centreAft)),
    ) /
      lwl -
    0.5;
  if (!(lcbAft >= -0.1 && lcbAft <= 0.15)) {
    complain(
      ['hull', 'buoyancy_aft_of_stem'],
      `the centre of buoyancy lies at ${Math.round(100 * (0.5 + lcbAft))} % of the waterline length, outside 40 to 65 %`,
      'it is measured from the fore end of the waterline',
    );
  }

  const planing = est.pick(['hull', 'planes'], file.hull.planes, () => lwl / Math.cbrt(volume) > 5.7);
  const cwp = est.pick(['hull', 'waterplane'], file.hull.waterplane, () => (planing ? 0.7 : 0.68));
  const dimensions: MainDimensions = {
    lwl,
    bwl: file.hull.waterline_beam,
    canoeDraft,
    cp: hull.cp,
    cm: hull.cm,
    cwp,
    lcbAft,
    freeboard,
    beamMax,
  };
  checkCoefficients(dimensions, file, complain);
  checkStability(dimensions, weights, crew.spec, volume, file, complain);

  const heel = est.pick(
    ['limits', 'heel'],
    file.limits?.heel,
    () => (ballast !== undefined ? 30 : 20) * DEGREE,
  );
  const rudderLimit = est.pick(['limits', 'rudder'], file.limits?.rudder, () => 15 * DEGREE);

  return {
    name: file.name,
    note: file.note ?? '',
    water: { ...fluid, name: `${waterKind} water, ${celsius} degC` },
    air: air(airCelsius),
    wind: readWind(file, est, complain),
    gravity: STANDARD_GRAVITY,
    hull: {
      dimensions,
      lines: faired?.lines,
      loa: hull.loa,
      planing,
      residuary: est.pick(
        ['hull', 'wave_resistance'],
        file.hull.wave_resistance,
        () => 'delft-2008' as const,
      ),
      roughness: est.pick(['hull', 'roughness'], file.hull.roughness, () => 0),
      measured: readMeasured(file, complain),
      crewReach: [x(crew.aftmost), x(crew.foremost)],
    },
    weights,
    crew: crew.spec,
    keel,
    keelVolume,
    boardRange: [raised, 1],
    rudder,
    rig,
    sails,
    sailSets: readSailSets(file, sails, est, complain),
    measuredRigs: readMeasuredRigs(file, est, complain, beside, x),
    waves: readWaves(file, complain),
    limits: { heel, rudder: rudderLimit },
  };
}

function readWind(file: BoatFileValue, est: Estimator, complain: Complain): BoatSpec['wind'] {
  const wind = file.wind ?? {};
  const referenceHeight = est.pick(['wind', 'measured_at'], wind.measured_at, () => 10);
  const profile = est.pick(['wind', 'profile'], wind.profile, () => 'log' as const);
  const stray = profile === 'log' ? 'exponent' : 'roughness';
  if (wind[stray] !== undefined) {
    complain(
      ['wind', stray],
      `the ${profile} profile has no ${stray}`,
      `remove it, or choose another profile`,
    );
  }
  if (profile === 'power') {
    return {
      kind: 'power',
      referenceHeight,
      exponent: est.pick(['wind', 'exponent'], wind.exponent, () => 0.1),
    };
  }
  return {
    kind: 'log',
    referenceHeight,
    roughness: est.pick(['wind', 'roughness'], wind.roughness, () => OPEN_WATER_ROUGHNESS),
  };
}

interface HullNumbers {
  readonly loa: number;
  readonly beamMax: number;
  readonly freeboard: number;
  readonly canoeDraft: number;
  readonly cp: number;
  readonly cm: number;
}

function readHull(
  file: BoatFileValue,
  est: Estimator,
  complain: Complain,
  volume: number,
): HullNumbers | undefined {
  const h = file.hull;
  const lwl = h.waterline_length;
  const bwl = h.waterline_beam;
  const loa = est.pick(['hull', 'length_overall'], h.length_overall, () => 1.1 * lwl);
  const beamMax = est.pick(['hull', 'beam_overall'], h.beam_overall, () => 1.3 * bwl);
  const freeboard = est.pick(['hull', 'freeboard'], h.freeboard, () => 0.1 * lwl);
  if (h.lines !== undefined) {
    const lines = h.prismatic! * h.midship! * lwl * bwl * h.canoe_draft!;
    if (!(Math.abs(volume / lines - 1) < LINES_MISFIT)) {
      complain(
        ['hull', 'lines'],
        `up to their waterline the lines displace ${say(lines)} m3, but weights and crew need ${say(volume)} m3`,
        'check unit and waterline_height of the lines, and the masses',
      );
      return undefined;
    }
  }
  if (loa < lwl) {
    complain(
      ['hull', 'length_overall'],
      `the hull (${say(loa)} m) is shorter than its waterline (${say(lwl)} m)`,
      'are length_overall and waterline_length swapped?',
    );
  }
  if (beamMax < bwl) {
    complain(
      ['hull', 'beam_overall'],
      `the hull (${say(beamMax)} m) is narrower than its waterline (${say(bwl)} m)`,
      'are beam_overall and waterline_beam swapped?',
    );
  }
  const ratio = lwl / bwl;
  if (!(ratio > 1.5 && ratio < 12)) {
    complain(
      ['hull', 'waterline_beam'],
      `the waterline is ${say(ratio)} times as long as wide, outside 1.5 to 12`,
      'check waterline_length and waterline_beam',
    );
  }
  const slender = lwl / Math.cbrt(volume);
  if (!(slender > 2.5 && slender < 14)) {
    complain(
      ['weights'],
      `a waterline of ${say(lwl)} m does not go with ${say(volume)} m3 displaced: length over cube root of volume is ${say(slender)}, outside 2.5 to 14`,
      'check the masses and the waterline length',
    );
    return undefined;
  }
  const cp = est.pick(['hull', 'prismatic'], h.prismatic, () => 0.56);
  const given = h.canoe_draft;
  if (given === undefined) {
    const cm = est.pick(['hull', 'midship'], h.midship, () => 0.72);
    const canoeDraft = volume / (cp * cm * lwl * bwl);
    est.record(['hull', 'canoe_draft'], canoeDraft);
    if (!(canoeDraft < bwl)) {
      complain(
        ['hull', 'waterline_beam'],
        `to carry the weights the hull would have to be ${say(canoeDraft)} m deep, deeper than wide`,
        'check the masses and the waterline beam',
      );
    }
    return { loa, beamMax, freeboard, canoeDraft, cp, cm };
  }
  // With the draft given, the midship coefficient follows from the displacement; given too, the three must agree.
  const needed = volume / (cp * lwl * bwl * given);
  if (h.lines !== undefined) return { loa, beamMax, freeboard, canoeDraft: given, cp, cm: h.midship! };
  const cm = h.midship ?? needed;
  const fits = h.midship === undefined ? needed > 0.55 && needed < 0.92 : Math.abs(needed / cm - 1) < 0.15;
  if (!fits) {
    const right = volume / (cp * (h.midship ?? 0.72) * lwl * bwl);
    complain(
      ['hull', 'canoe_draft'],
      `with a draft of ${say(given)} m the hull displaces ${say(cp * (h.midship ?? 0.72) * lwl * bwl * given)} m3, but weights and crew need ${say(volume)} m3`,
      `about ${say(right)} m would fit; leave canoe_draft out to have it worked out`,
    );
    return undefined;
  }
  if (h.midship === undefined) {
    est.record(
      ['hull', 'midship'],
      cm,
      'from the displacement and the canoe draft: volume / (Cp Lwl Bwl Tc), exact for the prismatic used',
    );
  }
  return { loa, beamMax, freeboard, canoeDraft: given, cp, cm };
}

function readMeasured(file: BoatFileValue, complain: Complain): BoatSpec['hull']['measured'] {
  const points = file.hull.measured_resistance;
  if (points === undefined) return undefined;
  for (let i = 1; i < points.length; i++) {
    if (points[i]!.speed > points[i - 1]!.speed) continue;
    complain(
      ['hull', 'measured_resistance', `[${i + 1}]`],
      'the speed is not above the one before',
      'write the points with rising speeds',
    );
  }
  return { speed: points.map((p) => p.speed), force: points.map((p) => p.force) };
}

interface FoilDefaults {
  readonly kind: FoilSpec['kind'];
  readonly chords: readonly number[];
  readonly thickness: number;
  readonly rootDepth: () => number;
  readonly clMax: number;
  readonly surfacePiercing: boolean;
  readonly straightTrailingEdge: boolean;
}

type FoilFile =
  | BoatFileValue['foils']['rudder']
  | NonNullable<BoatFileValue['foils']['keel']>
  | NonNullable<BoatFileValue['foils']['centreboard']>;

/** Chords from root to tip: as listed, or the root's and the tip's. */
function readChords(
  path: Path,
  f: FoilFile,
  est: Estimator,
  complain: Complain,
): readonly number[] | undefined {
  if (f.chords !== undefined) {
    for (const key of ['root_chord', 'tip_chord'] as const) {
      if (f[key] === undefined) continue;
      complain([...path, key], 'the chords are listed as well', 'give the list, or root and tip');
      return undefined;
    }
    return f.chords;
  }
  const root = f.root_chord;
  const tip = est.pick([...path, 'tip_chord'], f.tip_chord, () => 0.6 * root);
  if (tip > 3 * root) {
    complain(
      [...path, 'tip_chord'],
      `the tip (${say(tip)} m) is more than three times the root (${say(root)} m)`,
      'are root_chord and tip_chord swapped?',
    );
  }
  return [root, tip];
}

function twinOf(t: BoatFileValue['foils']['rudder']['twin']): FoilSpec['twin'] {
  if (t === undefined) return undefined;
  return { offset: 0.5 * t.apart, cant: t.cant ?? 0, lowered: t.lowered ?? 'both' };
}

function readFoil(
  path: Path,
  f: FoilFile,
  est: Estimator,
  complain: Complain,
  x: (aft: number) => number,
  d: FoilDefaults,
): FoilSpec | undefined {
  const depth = est.pick([...path, 'root_depth'], f.root_depth, d.rootDepth);
  const span = f.span ?? f.draft! - depth;
  if (!(span >= 0.05)) {
    complain(
      [...path, 'draft'],
      `the tip (${say(f.draft!)} m down) is no deeper than the root (${say(depth)} m down)`,
      'draft counts from the waterline; the hull itself may be deeper than this',
    );
    return undefined;
  }
  const root = d.chords[0]!;
  const tip = d.chords[d.chords.length - 1]!;
  const sweep = est.pick([...path, 'sweep'], f.sweep, () =>
    d.straightTrailingEdge ? Math.atan((0.75 * (root - tip)) / span) : 0,
  );
  return {
    kind: d.kind,
    span,
    chords: d.chords,
    sweep,
    swung: 'kicked_up' in f ? f.kicked_up : undefined,
    twin: 'twin' in f ? twinOf(f.twin) : undefined,
    bulb: 'bulb' in f ? f.bulb : undefined,
    thickness: d.thickness,
    x: x(f.aft_of_stem + 0.25 * root),
    z: depth === 0 ? 0 : -depth,
    surfacePiercing: d.surfacePiercing,
    clMax: est.pick([...path, 'lift_limit'], f.lift_limit, () => d.clMax),
  };
}

function checkFoils(file: BoatFileValue, keelPath: Path, chord: number, complain: Complain): void {
  const lwl = file.hull.waterline_length;
  const keel = (file.foils.keel ?? file.foils.centreboard)!;
  const rudder = file.foils.rudder;
  if (keel.aft_of_stem < 0.1 * lwl || keel.aft_of_stem + chord > 0.95 * lwl) {
    complain(
      [...keelPath, 'aft_of_stem'],
      `the ${keelPath[1]} reaches from ${say(keel.aft_of_stem)} m to ${say(keel.aft_of_stem + chord)} m aft of the stem, outside 10 to 95 % of the waterline (${say(lwl)} m)`,
      'it is the leading edge, measured from the fore end of the waterline',
    );
  }
  if (rudder.aft_of_stem < keel.aft_of_stem + chord) {
    complain(
      ['foils', 'rudder', 'aft_of_stem'],
      `the rudder (${say(rudder.aft_of_stem)} m aft of the stem) is not behind the ${keelPath[1]} (which ends at ${say(keel.aft_of_stem + chord)} m)`,
      'are the two swapped?',
    );
  } else if (rudder.aft_of_stem > 1.2 * lwl) {
    complain(
      ['foils', 'rudder', 'aft_of_stem'],
      `the rudder is ${say(rudder.aft_of_stem)} m aft of the stem, beyond 1.2 times the waterline (${say(lwl)} m)`,
      'it is measured from the fore end of the waterline',
    );
  }
}

function readRig(
  file: BoatFileValue,
  est: Estimator,
  complain: Complain,
  x: (aft: number) => number,
  freeboard: number,
): { rig: BoatSpec['rig']; sails: SailShape[] } | undefined {
  const r = file.rig;
  const lwl = file.hull.waterline_length;
  const mastTop = r.mast_height;
  if (r.mast_aft_of_stem > 0.75 * lwl) {
    complain(
      ['rig', 'mast_aft_of_stem'],
      `the mast stands ${say(r.mast_aft_of_stem)} m aft of the stem, behind three quarters of the waterline (${say(lwl)} m)`,
      'it is measured from the fore end of the waterline',
    );
  }
  if (mastTop < freeboard + 0.5) {
    complain(
      ['rig', 'mast_height'],
      `the mast ends ${say(mastTop)} m above the water, hardly above the hull (${say(freeboard)} m)`,
      'mast_height is the top of the mast above the waterline',
    );
    return undefined;
  }
  const kinds = Object.values(file.sails).map((s) => s.kind);
  const stayed = est.pick(['rig', 'stayed'], r.stayed, () => kinds.includes('jib'));
  const mainTack = Object.values(file.sails).find((s) => s.kind === 'mainsail')?.tack_height;
  const boomHeight = est.pick(
    ['rig', 'boom_height'],
    r.boom_height,
    () => mainTack ?? freeboard + 0.08 * mastTop,
  );
  if (boomHeight > 0.6 * mastTop) {
    complain(
      ['rig', 'boom_height'],
      `the boom (${say(boomHeight)} m) is above six tenths of the mast (${say(mastTop)} m)`,
      'boom_height is measured from the waterline',
    );
    return undefined;
  }
  const forestay = kinds.includes('jib')
    ? est.pick(['rig', 'forestay_height'], r.forestay_height, () => 0.8 * mastTop)
    : (r.forestay_height ?? mastTop);
  if (forestay > mastTop) {
    complain(
      ['rig', 'forestay_height'],
      `the forestay meets the mast at ${say(forestay)} m, above its top (${say(mastTop)} m)`,
      'both are heights above the waterline',
    );
  }
  const mizzen = r.mizzen_mast;
  if (mizzen !== undefined && mizzen.aft_of_stem <= r.mast_aft_of_stem) {
    complain(
      ['rig', 'mizzen_mast', 'aft_of_stem'],
      `the second mast (${say(mizzen.aft_of_stem)} m) does not stand behind the first (${say(r.mast_aft_of_stem)} m)`,
      'both are measured from the fore end of the waterline',
    );
  }
  // Pole and sprit are estimated once, where a sail needs them.
  let pole = r.pole_length;
  let sprit = r.sprit_length;
  const place: RigPlaces = {
    x,
    lwl,
    mastAft: r.mast_aft_of_stem,
    mastTop,
    boomHeight,
    forestay,
    freeboard,
    mizzen: mizzen && { aft: mizzen.aft_of_stem, top: mizzen.height },
    poleEnd: () => {
      pole ??= est.pick(['rig', 'pole_length'], undefined, () => Math.max(0.3, r.mast_aft_of_stem));
      return r.mast_aft_of_stem - pole;
    },
    spritEnd: () => {
      sprit ??= est.pick(['rig', 'sprit_length'], undefined, () => 0.12 * lwl);
      return -sprit;
    },
  };
  const sails: SailShape[] = [];
  let foot = 0;
  for (const [name, sail] of Object.entries(file.sails)) {
    const shape = readSail(name, sail, place, est, complain);
    if (shape === undefined) continue;
    sails.push(shape, ...reefsOf(shape, sail, ['sails', name], complain));
    if (shape.kind === 'mainsail') foot = Math.max(foot, shape.chord[0]!);
  }
  const rig = {
    mastX: x(r.mast_aft_of_stem),
    mastTop,
    mastDiameter: est.pick(['rig', 'mast_diameter'], r.mast_diameter, () => 0.011 * mastTop),
    riggingArea: est.pick(['rig', 'rigging_area'], r.rigging_area, () =>
      stayed ? (4 * mastTop * mastTop) / 2000 : 0,
    ),
    boomHeight,
    boomLength: est.pick(['rig', 'boom_length'], r.boom_length, () =>
      foot > 0 ? 1.03 * foot : 0.3 * mastTop,
    ),
    boomLimit: est.pick(['rig', 'boom_limit'], r.boom_limit, () => (stayed ? 78 : 85) * DEGREE),
    mastDrag: est.pick(['rig', 'mast_drag'], r.mast_drag, () => CYLINDER_DRAG),
    mizzen: mizzen && {
      x: x(mizzen.aft_of_stem),
      top: mizzen.height,
      diameter: est.pick(['rig', 'mizzen_mast', 'diameter'], mizzen.diameter, () => 0.011 * mizzen.height),
    },
  };
  return { rig, sails };
}

function readSailSets(
  file: BoatFileValue,
  sails: readonly SailShape[],
  est: Estimator,
  complain: Complain,
): BoatSpec['sailSets'] {
  const names = Object.keys(file.sails);
  const sets = file.sail_sets;
  let given: { name: string; sails: readonly string[] }[];
  if (sets === undefined) {
    est.record(['sail_sets'], names.join(' + '));
    given = [{ name: names.join(' + '), sails: names }];
    checkSet(['sails'], names, file, complain);
  } else {
    given = Object.entries(sets).map(([name, members]) => {
      checkSet(['sail_sets', name], members, file, complain);
      return { name, sails: members };
    });
  }
  // Every reef of the sails of a set is a set of its own; off-wind sails come down before a reef goes in (judgement).
  return given.flatMap((set) => {
    const kinds = set.sails.map((s) => file.sails[s]?.kind);
    const most = kinds.some((k) => k === 'spinnaker' || k === 'gennaker' || k === 'reacher')
      ? 0
      : Math.max(0, ...set.sails.map((s) => file.sails[s]?.reefs?.length ?? 0));
    const reefed = Array.from({ length: most }, (_, i) => ({
      name: `${set.name}, reef ${i + 1}`,
      sails: set.sails.map((s) => {
        const own = `${s}, reef ${Math.min(i + 1, file.sails[s]?.reefs?.length ?? 0)}`;
        return sails.some((shape) => shape.name === own) ? own : s;
      }),
    }));
    return [set, ...reefed];
  });
}

function checkSet(path: Path, sails: readonly string[], file: BoatFileValue, complain: Complain): void {
  const names = Object.keys(file.sails);
  for (const [i, sail] of sails.entries()) {
    if (Object.hasOwn(file.sails, sail)) continue;
    const likely = nearest(sail, names);
    complain(
      [...path, `[${i + 1}]`],
      `there is no sail called "${sail.slice(0, 40)}"`,
      likely !== undefined ? `did you mean "${likely}"?` : `the sails are ${names.join(', ')}`,
    );
  }
  for (const group of [['mainsail'], ['mizzen'], ['jib'], ['spinnaker', 'gennaker', 'reacher']] as const) {
    const same = sails.filter(
      (s) => Object.hasOwn(file.sails, s) && group.some((kind) => kind === file.sails[s]!.kind),
    );
    if (same.length > 1) {
      complain(
        path,
        `${same.join(' and ')} are both of the kind ${group.join(', ')}; a set holds one of a kind`,
        'list under sail_sets which sails go up together',
      );
    }
  }
}

function readCrew(
  file: BoatFileValue,
  est: Estimator,
  complain: Complain,
  b: { lwl: number; beamMax: number; freeboard: number; count: number; massEach: number; ballast: boolean },
): { spec: CrewSpec; aft: number; foremost: number; aftmost: number } {
  const c = file.crew;
  const { lwl, count } = b;
  const style = est.pick(['crew', 'style'], c.style, () =>
    b.ballast ? ('rail' as const) : ('hiking' as const),
  );
  let wires = 0;
  if (style === 'trapeze') {
    wires = est.pick(['crew', 'on_trapeze'], c.on_trapeze, () => 1);
  } else if (c.on_trapeze !== undefined) {
    complain(
      ['crew', 'on_trapeze'],
      `some of the crew are on a trapeze, but the style is ${style}`,
      'set the style to trapeze, or remove on_trapeze',
    );
  }
  if (wires > count) {
    complain(
      ['crew', 'on_trapeze'],
      `${wires} of a crew of ${count} cannot be on a trapeze`,
      'check count and on_trapeze',
    );
  }
  const others = style === 'rail' ? 'rail' : 'hiking';
  const reach = est.pick(
    ['crew', 'reach'],
    c.reach,
    () => (wires * REACH.trapeze + (count - wires) * REACH[others]) / count,
  );
  const armOut = 0.5 * b.beamMax + reach;
  if (!(armOut > 0)) {
    complain(
      ['crew', 'reach'],
      `a reach of ${say(reach)} m puts the crew to leeward of the centreline`,
      'reach counts from the gunwale outwards',
    );
  }
  const armLee = -est.pick(['crew', 'arm_leeward'], c.arm_leeward, () => 0.35 * b.beamMax);
  const aft = est.pick(['crew', 'aft_of_stem'], c.aft_of_stem, () => (style === 'rail' ? 0.62 : 0.56) * lwl);
  const foremost = est.pick(['crew', 'foremost'], c.foremost, () => Math.max(0, aft - 0.12 * lwl));
  const aftmost = est.pick(['crew', 'aftmost'], c.aftmost, () =>
    Math.max(aft, Math.min(0.95 * lwl, aft + 0.2 * lwl)),
  );
  if (!(foremost <= aft && aft <= aftmost)) {
    complain(
      ['crew', c.foremost !== undefined && foremost > aft ? 'foremost' : 'aftmost'],
      `the crew's usual place (${say(aft)} m aft of the stem) is not between the foremost (${say(foremost)} m) and the aftmost (${say(aftmost)} m)`,
      'all three are measured from the fore end of the waterline',
    );
  }
  const spec: CrewSpec = {
    count,
    mass: count * b.massEach,
    x: 0.5 * lwl - aft,
    z: est.pick(['crew', 'height'], c.height, () => b.freeboard + 0.25),
    armOut,
    armLee,
    style,
    dragArea: est.pick(
      ['crew', 'drag_area'],
      c.drag_area,
      () =>
        wires * CREW_DRAG.trapeze +
        CREW_DRAG[others] *
          (others === 'rail' && count > wires ? 1 + RAIL_SHELTER * (count - wires - 1) : count - wires),
    ),
  };
  return { spec, aft, foremost, aftmost };
}

function readWeights(
  file: BoatFileValue,
  est: Estimator,
  x: (aft: number) => number,
  b: { keel: FoilSpec; freeboard: number; mastX: number; mastTop: number },
): WeightItem[] {
  const lwl = file.hull.waterline_length;
  const { keel } = b;
  const keelMiddle = keel.x - 0.25 * keel.chords[0]! - 0.5 * keel.span * Math.tan(keel.sweep);
  return Object.entries(file.weights).map(([name, part]) => {
    const path: Path = ['weights', name];
    const aft = est.pick([...path, 'aft_of_stem'], part.aft_of_stem, () =>
      name === 'ballast' ? 0.5 * lwl - keelMiddle : name === 'rig' ? 0.5 * lwl - b.mastX : 0.54 * lwl,
    );
    const z = est.pick([...path, 'height'], part.height, () =>
      name === 'ballast' ? keel.z - 0.6 * keel.span : name === 'rig' ? 0.45 * b.mastTop : 0.4 * b.freeboard,
    );
    return { name, mass: part.mass, x: x(aft), z };
  });
}

/** A waterline cannot be much finer or fuller than the area curve it belongs to. */
function checkCoefficients(d: MainDimensions, file: BoatFileValue, complain: Complain): void {
  const vertical = (d.cp * d.cm) / d.cwp;
  if (!(vertical > 0.35 && vertical < 0.85)) {
    complain(
      ['hull', file.hull.waterplane !== undefined ? 'waterplane' : 'prismatic'],
      `prismatic ${say(d.cp)}, midship ${say(d.cm)} and waterplane ${say(d.cwp)} do not make a hull: Cp Cm / Cwp is ${say(vertical)}, outside 0.35 to 0.85`,
      'leave one of them out to have it estimated',
    );
  }
}

/**
 * A boat that falls over at rest with the crew inboard cannot be sailed. First estimates only: Morrish's formula for
 * the centre of buoyancy, and a waterplane inertia of 0.11 Cwp^2 L B^3, a quarter above that of usual hulls
 * (judgement), so that no boat that floats is rejected. The hull's own righting arm is worked out later.
 */
function checkStability(
  d: MainDimensions,
  weights: readonly WeightItem[],
  crew: CrewSpec,
  volume: number,
  file: BoatFileValue,
  complain: Complain,
): void {
  const moment = weights.reduce((sum, w) => sum + w.mass * w.z, 0) + crew.mass * crew.z;
  const mass = weights.reduce((sum, w) => sum + w.mass, 0) + crew.mass;
  const kb = -(0.5 * d.canoeDraft + volume / (d.cwp * d.lwl * d.bwl)) / 3;
  const bm = (0.11 * d.cwp * d.cwp * d.lwl * d.bwl ** 3) / volume;
  const gm = kb + bm - moment / mass;
  if (gm < -0.15 * d.bwl) {
    const tallest = [...weights].sort((a, b) => b.mass * b.z - a.mass * a.z)[0]!;
    const highCrew = crew.mass * crew.z > tallest.mass * tallest.z && file.crew.height !== undefined;
    complain(
      highCrew ? ['crew', 'height'] : ['weights', tallest.name, 'height'],
      `the boat falls over at rest: its centre of mass is ${say(moment / mass)} m above the waterline, the metacentre about ${say(kb + bm)} m`,
      'check the heights of the weights (above the waterline; negative below) and the waterline beam',
    );
  }
}

/** A number for a message: three digits. */
function say(value: number): string {
  return `${Number(value.toPrecision(3))}`;
}
