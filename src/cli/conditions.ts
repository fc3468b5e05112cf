import { readFileSync } from 'node:fs';
import {
  COURSE_NAMES,
  type Course,
  type CourseName,
  courseOf,
  type Manoeuvres,
  namedCourse,
  observedWind,
  steadyWind,
  type WindTable,
  weibullScale,
  weibullWind,
  windTable,
} from '../racecourse/index.js';
import { fromKnots, nearest, radians } from '../units/index.js';
import { UsageError } from './errors.js';
import { readList, WIND_SPEEDS } from './grid.js';

/** Wind of a comparison when none is asked for, kn, equally often (judgement). */
export const USUAL_WINDS = '6,10,14,18';
export const USUAL_COURSE = 'windward-leeward';
/** Winds [kn] between which a Weibull wind is taken to be sailed, and its bands (judgement). */
const SAILED = { least: 4, most: 25, bands: 8 } as const;
/** Width [kn] of the bands that observations are sorted into. */
const BAND = 2;
/** Observations below this [kn] are calms: there is no sailing. */
const CALM = 1;
const MOST_OBSERVATIONS = 1_000_000;

/** Reads pairs such as "0=50, 120=25". */
function pairs(option: string, text: string, least: number, most: number, unit: string): [number, number][] {
  return text.split(',').map((part) => {
    const match = /^\s*(\d+\.?\d*|\.\d+)\s*=\s*(\d+\.?\d*|\.\d+)\s*%?\s*$/.exec(part);
    if (match === null)
      throw new UsageError(
        `${option}: "${part.trim()}" is no pair; write pairs such as ${unit === 'deg' ? '0=50,120=25,120=25' : '6=20,10=50,14=30'}`,
      );
    const [value, share] = [Number(match[1]), Number(match[2])];
    if (!(value >= least && value <= most))
      throw new UsageError(`${option}: ${value} ${unit} is outside ${least} to ${most} ${unit}`);
    if (!(share > 0)) throw new UsageError(`${option}: the share of ${value} ${unit} must be above 0`);
    return [value, share];
  });
}

function count(option: string, text: string | undefined, most: number): number {
  if (text === undefined) return 0;
  const n = Number(text);
  if (!/^\s*(\d+\.?\d*|\.\d+)\s*$/.test(text) || n > most)
    throw new UsageError(`${option}: "${text}" is not a number from 0 to ${most}`);
  return n;
}

export interface CourseArguments {
  readonly course: string | undefined;
  readonly tacks: string | undefined;
  readonly tackCost: string | undefined;
  readonly gybes: string | undefined;
  readonly gybeCost: string | undefined;
}

/** Reads a course: one of the built-in names, or legs as pairs of angle [deg] and share. @throws UsageError */
export function readCourse(a: CourseArguments): Course {
  const manoeuvres: Manoeuvres = {
    tacksPerMile: count('--tacks', a.tacks, 1000),
    gybesPerMile: count('--gybes', a.gybes, 1000),
    tack: count('--tack-cost', a.tackCost, 600),
    gybe: count('--gybe-cost', a.gybeCost, 600),
  };
  const text = (a.course ?? USUAL_COURSE).trim();
  if ((COURSE_NAMES as readonly string[]).includes(text)) return namedCourse(text as CourseName, manoeuvres);
  if (!text.includes('=')) {
    const near = nearest(text, COURSE_NAMES);
    throw new UsageError(
      `--course: there is no course "${text}"; ${near === undefined ? `there are ${COURSE_NAMES.join(', ')}, or legs such as 0=50,120=25,120=25` : `did you mean ${near}?`}`,
    );
  }
  const legs = pairs('--course', text, 0, 180, 'deg').map(([deg, length]) => ({ twa: radians(deg), length }));
  return courseOf('own course', legs, manoeuvres);
}

/** Reads winds: speeds in kn (equally often), pairs of speed and share, "weibull mean shape", or a file. @throws UsageError */
export function readWind(given: string | undefined): WindTable {
  const text = (given ?? USUAL_WINDS).trim();
  const option = '--wind';
  if (/^weibull\b/i.test(text)) {
    const match = /^weibull\s+(\d+\.?\d*)(?:\s*kn)?\s+(\d+\.?\d*)$/i.exec(text);
    const [mean, shape] = match === null ? [Number.NaN, Number.NaN] : [Number(match[1]), Number(match[2])];
    if (!(mean >= 2 && mean <= 50 && shape >= 0.8 && shape <= 10))
      throw new UsageError(
        `${option}: write "weibull 11 2": the mean speed, 2 to 50 kn, and the shape, 0.8 to 10`,
      );
    return weibullWind(
      `Weibull, mean ${mean} kn, shape ${shape}, sailed from ${SAILED.least} to ${SAILED.most} kn`,
      {
        scale: weibullScale(fromKnots(mean), shape),
        shape,
        least: fromKnots(SAILED.least),
        most: fromKnots(SAILED.most),
        bands: SAILED.bands,
      },
    );
  }
  if (text.includes('=')) {
    const rows = pairs(option, text, WIND_SPEEDS.least, WIND_SPEEDS.most, 'kn');
    return windTable(
      rows.map(([v, s]) => `${v} kn (${s})`).join(', '),
      rows.map(([v, share]) => ({ tws: fromKnots(v), share })),
    );
  }
  if (/^[\d.,:\s]+(kn|m\/s|km\/h)?$/i.test(text)) {
    const speeds = readList(text, { ...WIND_SPEEDS, option });
    const words = `${speeds.map((v) => Number(v.toFixed(2))).join(', ')} kn${speeds.length > 1 ? ', equally often' : ''}`;
    return speeds.length === 1
      ? steadyWind(fromKnots(speeds[0]!), words)
      : windTable(
          words,
          speeds.map((v) => ({ tws: fromKnots(v), share: 1 })),
        );
  }
  return observations(text);
}

/** Columns of a file of observations that are understood, with their factors to kn. */
const COLUMNS: Readonly<Record<string, number>> = {
  tws_kn: 1,
  wind_kn: 1,
  tws_m_s: 3600 / 1852,
  wind_m_s: 3600 / 1852,
};

/** A file of observed wind speeds: one a line in kn, or a CSV table with one of the columns above. */
function observations(path: string): WindTable {
  let text: string;
  try {
    text = readFileSync(path, 'utf8');
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    throw new UsageError(
      code === 'ENOENT'
        ? `--wind: "${path}" is neither a list of speeds nor a file; write 6,10,14 or 6=20,10=50 or "weibull 11 2"`
        : `--wind: ${path} cannot be read (${code ?? 'unknown cause'})`,
    );
  }
  const rows = text.split(/\r?\n/);
  const head = rows[0]!.split(',').map((h) => h.trim().toLowerCase());
  const at = head.findIndex((h) => Object.hasOwn(COLUMNS, h));
  const titled = at >= 0 || /[a-z]/i.test(rows[0]!);
  if (titled && at < 0)
    throw new UsageError(
      `${path}:1 no column of wind speeds; it must be called ${Object.keys(COLUMNS).join(' or ')}`,
    );
  const factor = at >= 0 ? COLUMNS[head[at]!]! : 1;
  const speeds: number[] = [];
  let calms = 0;
  for (let i = titled ? 1 : 0; i < rows.length; i++) {
    if (rows[i]!.trim() === '') continue;
    const cell = (rows[i]!.split(',')[Math.max(0, at)] ?? '').trim();
    const v = /^(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(cell) ? Number(cell) * factor : Number.NaN;
    if (!(v >= 0 && v <= WIND_SPEEDS.most))
      throw new UsageError(
        `${path}:${i + 1} "${cell.slice(0, 40)}" is no wind speed from 0 to ${WIND_SPEEDS.most} kn`,
      );
    if (v < CALM) calms++;
    else speeds.push(fromKnots(v));
    if (speeds.length > MOST_OBSERVATIONS)
      throw new UsageError(`${path}: more than ${MOST_OBSERVATIONS} observations`);
  }
  if (speeds.length === 0) throw new UsageError(`${path}: no observation of ${CALM} kn or more`);
  const calm = calms === 0 ? '' : `; ${calms} calms below ${CALM} kn left out`;
  return observedWind(`${speeds.length} observations in bands of ${BAND} kn${calm}`, speeds, fromKnots(BAND));
}
