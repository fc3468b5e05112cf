import {
  type Completion,
  completeTable,
  defaultWindSpeeds,
  type Polar,
  predictPolar,
} from '../polar/index.js';
import {
  cautionText,
  delimitedTable,
  deratingText,
  fileStem,
  fillingRules,
  printedAngle,
  printedWind,
  signalKPolar,
  speedFrom,
  speedIn,
  TABLE_PRESETS,
  type TableFormat,
  TEXT_WIDTH,
  tableDescription,
  wrapped,
  writeFiles,
} from '../publish/index.js';
import { degrees, radians } from '../units/index.js';
import { loadBoat, reportName } from './boat-input.js';
import { UsageError } from './errors.js';
import { readDecimals, readList, readOne, readPercent, WIND_ANGLES, windSpeedsIn } from './grid.js';
import { print, printRaw } from './output.js';
import { formatWith, type TableWords } from './table-options.js';

export interface ExportArguments extends TableWords {
  readonly boat: string;
  readonly shape: string;
  readonly tws: string | undefined;
  readonly twa: string | undefined;
  readonly optimum: boolean;
  readonly cap: string | undefined;
  readonly top: string | undefined;
  readonly above: 'hold' | 'fade';
  readonly noGo: 'zero' | 'fade';
  readonly percent: string | undefined;
  readonly percentByWind: string | undefined;
  readonly header: string | undefined;
  readonly lineEnds: 'crlf' | 'lf' | undefined;
  readonly decimals: string | undefined;
  readonly out: string;
  readonly print: boolean;
}

/** Closer to the wind no state is looked for: no boat with sails makes way there (judgement). */
const CLOSEST = 20;

/** Angles [deg] of the table where none are asked for. */
const ANGLES = Array.from({ length: 37 }, (_, i) => 5 * i);

/** "10:100,20:90" in percent by wind speed. @throws UsageError */
function readByWind(text: string, unit: TableFormat['windUnit']): Completion['derating']['byWind'] {
  const option = '--percent-by-wind';
  const points = text.split(',').map((part) => {
    const [wind, percent, ...more] = part.split(':');
    if (percent === undefined || more.length > 0)
      throw new UsageError(`${option}: write wind:percent pairs such as 10:100,20:90, not "${part}"`);
    const tws = speedFrom(unit, readOne(wind!, windSpeedsIn(unit, option)));
    return { tws, share: readPercent(percent, option) };
  });
  const sorted = points.sort((a, b) => a.tws - b.tws);
  if (sorted.some((p, i) => i > 0 && p.tws === sorted[i - 1]!.tws))
    throw new UsageError(`${option}: a wind speed stands twice in "${text}"`);
  return sorted;
}

/** Header text of the corner, or of a list's columns. @throws UsageError */
function readHeader(text: string | undefined, f: TableFormat): TableFormat['header'] {
  if (text === undefined) return undefined;
  const bad = [...text].some((c) => c === '"' || c === f.delimiter || c < ' ');
  if (bad && f.layout !== 'list')
    throw new UsageError('--header: the text must not hold quotes, the delimiter or control characters');
  if (/^[=+\-@#]/.test(text)) throw new UsageError(`--header: "${text}" begins like a formula or a note`);
  if (f.layout !== 'list') return text === 'none' ? '' : text;
  const names = text.split(',').map((t) => t.trim());
  if (
    names.length !== 3 ||
    names.some((n) => n === '' || n.includes('"') || n.includes(f.delimiter) || /^[=+\-@#]/.test(n))
  )
    throw new UsageError(
      `--header: a list wants three names parted by commas, such as wind,angle,speed, not "${text}"`,
    );
  return names as [string, string, string];
}

/** The polar at exactly the wind speeds and angles that the table prints; with the angles of best VMG if wanted. */
function computed(path: string, f: TableFormat, a: ExportArguments, tws: number[], twa: number[]) {
  const boat = loadBoat(path);
  const unique = (list: number[]): number[] => [...new Set(list)].sort((x, y) => x - y);
  const winds = unique(tws.map((v) => printedWind(f, v)));
  // A hair below 20 deg may be 20 deg in radians.
  const angles = unique([...twa.map((v) => printedAngle(f, v)), Math.PI]).filter(
    (v) => degrees(v) > CLOSEST - 1e-6,
  );
  let polar: Polar = predictPolar(boat, { tws: winds, twa: angles });
  if (a.optimum) {
    const best = [...polar.bestUp, ...polar.bestDown].flatMap((r) =>
      r.status === 'balanced' ? [r.twa] : [],
    );
    const more = unique([...angles, ...best.map((v) => printedAngle(f, v))]);
    polar = predictPolar(boat, { tws: winds, twa: more });
  }
  return { boat, polar };
}

/** Puts the angles closer to the wind than any computed one back in: nothing balances there. */
function withClosest(polar: Polar, angles: readonly number[]): Polar {
  const more = angles.filter((v) => degrees(v) <= CLOSEST - 1e-6);
  return {
    ...polar,
    twa: [...more, ...polar.twa],
    sets: polar.sets.map((s) => ({
      name: s.name,
      speed: s.speed.map((row) => [...more.map(() => Number.NaN), ...row]),
    })),
    results: polar.results.map((row, i) => [
      ...more.map((twa) => ({
        status: 'unbalanced' as const,
        tws: polar.tws[i]!,
        twa,
        why: 'no drive' as const,
        reason: `closer to the wind than ${CLOSEST} deg no state is looked for`,
        evaluations: 0,
      })),
      ...row,
    ]),
  };
}

/** Options that mean nothing together. @throws UsageError */
function checkTogether(a: ExportArguments): void {
  const text = {
    delimiter: a.delimiter,
    'decimal-mark': a.decimalMark,
    'speed-unit': a.speedUnit,
    'angle-unit': a.angleUnit,
    header: a.header,
    'line-ends': a.lineEnds,
    decimals: a.decimals,
  };
  const given = Object.entries(text).find(([, v]) => v !== undefined)?.[0];
  if (a.shape === 'signal-k' && given !== undefined)
    throw new UsageError(`--${given} is for delimited text; Signal K is m/s and rad by its specification`);
  if (a.above === 'fade' && a.top === undefined)
    throw new UsageError('--above fade wants --top, the wind speed at which the boat stops');
}

/** Predicts the complete rectangle a router needs and writes it. */
export function exportCommand(a: ExportArguments): void {
  checkTogether(a);
  const signalK = a.shape === 'signal-k';
  const preset = TABLE_PRESETS[signalK ? 'angles-down' : a.shape]!;
  const base = formatWith(preset, a);
  const decimals = readDecimals(a.decimals) ?? base.decimals;
  const lineEnd = a.lineEnds === undefined ? base.lineEnd : a.lineEnds === 'lf' ? '\n' : '\r\n';
  const f: TableFormat = { ...base, decimals, lineEnd, header: readHeader(a.header, base) };
  const unit = f.windUnit;
  const wind = (text: string, option: string): number =>
    printedWind(f, speedFrom(unit, readOne(text, windSpeedsIn(unit, option))));
  const asked =
    a.tws === undefined
      ? defaultWindSpeeds
      : readList(a.tws, windSpeedsIn(unit)).map((v) => speedFrom(unit, v));
  const cap = a.cap === undefined ? Number.POSITIVE_INFINITY : wind(a.cap, '--cap');
  const tws = [...asked.filter((v) => v < cap - 1e-9), ...(asked.some((v) => v >= cap - 1e-9) ? [cap] : [])];
  const top = a.top === undefined ? undefined : wind(a.top, '--top');
  if (top !== undefined && top < Math.max(...tws) - 1e-9)
    throw new UsageError(
      `--top: ${a.top} is below the highest computed wind, ${Number(speedIn(unit, Math.max(...tws)).toFixed(2))} ${unit}; --cap keeps the wind down`,
    );
  const twa = (a.twa === undefined ? ANGLES : readList(a.twa, WIND_ANGLES)).map(radians);
  const completion: Completion = {
    noGo: a.noGo,
    above: a.above,
    top,
    derating: {
      share: a.percent === undefined ? 1 : readPercent(a.percent, '--percent'),
      byWind: a.percentByWind === undefined ? [] : readByWind(a.percentByWind, unit),
    },
  };
  const { boat, polar } = computed(a.boat, f, a, tws, twa);
  const closer = [...new Set(twa.map((v) => printedAngle(f, v)))].sort((x, y) => x - y);
  const complete = completeTable(withClosest(polar, closer), completion);
  const derated = deratingText(completion, unit);
  const rules = [...fillingRules(complete, completion, unit), ...(derated === '' ? [] : [derated])];
  const content = signalK
    ? signalKPolar(complete.table, tableDescription(rules))
    : delimitedTable(complete.table, f);
  if (a.print) {
    printRaw(content);
    return;
  }
  const stem = fileStem(reportName(a.boat, boat));
  const name = signalK
    ? `${stem}-signal-k.json`
    : `${stem}-routing.${f.delimiter === ',' || f.delimiter === ';' ? 'csv' : 'txt'}`;
  const [path] = writeFiles(a.out, [{ name, content }]);
  const { rows } = complete.table;
  print(
    [
      `${rows.length} wind speeds by ${rows[0]!.points.length} angles, no cell empty: ${path}`,
      '',
      ...rules.map((r) => wrapped(`- ${r}`, TEXT_WIDTH, '  ')),
      '',
      cautionText(),
    ].join('\n'),
  );
}
