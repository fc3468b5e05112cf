import type {
  CompleteTable,
  Completion,
  DifferenceSummary,
  SpeedTable,
  TableDifference,
} from '../polar/index.js';
import { degrees } from '../units/index.js';
import { CAUTIONS } from './cautions.js';
import { csvText } from './csv.js';
import { lineChartSvg } from './line-chart.js';
import { fixed, significant } from './numbers.js';
import { staticPage } from './page-shell.js';
import { oneLine, shortened, wrapped } from './plain-text.js';
import type { ReadingNote } from './read-table.js';
import { type SpeedUnit, speedIn, unitSuffix } from './table-format.js';
import { TEXT_WIDTH, textTable } from './text-table.js';

const signed = (v: number, decimals: number): string => {
  const text = fixed(v, decimals);
  return v > 0 && Number(text) !== 0 ? `+${text}` : text;
};
const deg = (rad: number): string => significant(degrees(rad), 4);

/** How a complete table is filled where nothing was computed, a sentence each. */
export function fillingRules(complete: CompleteTable, completion: Completion, unit: SpeedUnit): string[] {
  const { filled, closest, table: t } = complete;
  const wind = (v: number): string => `${significant(speedIn(unit, v), 4)} ${unit}`;
  const computed = closest.map((c) => c.tws);
  const [lowest, highest] = [computed[0]!, computed[computed.length - 1]!];
  const top = t.rows[t.rows.length - 1]!.tws;
  const known = closest.filter((c) => c.twa !== undefined).map((c) => c.twa!);
  const [nearest, farthest] = [Math.min(...known), Math.max(...known)].map(deg);
  const range = nearest === farthest ? `${nearest} deg` : `${nearest} to ${farthest} deg by wind speed`;
  const noGo =
    completion.noGo === 'zero'
      ? 'the speed is zero'
      : 'the speed falls in a straight line to zero at 0 deg, with no more made good to windward than at best VMG';
  const byWhy = new Map<string, string[]>();
  for (const f of filled) {
    const key = `${f.why}: ${f.filledWith}`;
    byWhy.set(key, [...(byWhy.get(key) ?? []), `${wind(f.tws)} ${deg(f.twa)} deg`]);
  }
  return [
    `Wind at ${t.windHeight === undefined ? 'an unknown height' : `${significant(t.windHeight, 3)} m`}; wind angles from the course through the water.`,
    `Below ${wind(lowest)}: a row at rest in no wind; what reads the table goes in a straight line between the two.`,
    top > highest
      ? `Above ${wind(highest)}, the highest computed wind, up to ${wind(top)}: ${completion.above === 'hold' ? 'the speeds of that wind are held' : 'the speeds fall in a straight line to zero'}.`
      : `Above ${wind(highest)}, the highest computed wind, there is no row.`,
    ...(known.length > 0
      ? [`No-go zone, closer to the wind than the closest balanced angle of the table (${range}): ${noGo}.`]
      : []),
    ...[...byWhy].map(
      ([key, places]) =>
        `${places.length} ${places.length === 1 ? 'cell' : 'cells'} beyond it without a balanced state (${key}): ${places.slice(0, 6).join(', ')}${places.length > 6 ? ', ...' : ''}.`,
    ),
  ];
}

/** What is taken off the speeds; empty: nothing. */
export function deratingText(completion: Completion, unit: SpeedUnit): string {
  const { share, byWind } = completion.derating;
  const p = (s: number): string => `${Number((100 * s).toFixed(1))} %`;
  const everywhere = share === 1 ? [] : [`Speeds are ${p(share)} of the predicted ones in every wind`];
  const points = byWind
    .map((w) => `${significant(speedIn(unit, w.tws), 4)} ${unit} ${p(w.share)}`)
    .join(', ');
  const byPoints =
    byWind.length === 0
      ? []
      : [
          `${share === 1 ? 'Speeds are a share of the predicted ones' : 'times a share'} by wind speed: ${points}; straight lines between`,
        ];
  const parts = [...everywhere, ...byPoints];
  return parts.length === 0 ? '' : `${parts.join(', ')}.`;
}

/** What a table was read as. */
export function readingText(name: string, t: SpeedTable, notes: readonly ReadingNote[]): string {
  const angles = t.rows.map((r) => r.points.length);
  const [least, most] = [Math.min(...angles), Math.max(...angles)];
  const count = least === most ? `${most}` : `${least} to ${most}`;
  return [
    `${shortened(oneLine(name), 60)}: ${t.rows.length} wind speeds, ${count} angles each`,
    '',
    textTable(
      [
        { head: 'read as', unit: '', left: true },
        { head: 'value', unit: '', left: true },
        { head: 'grounds', unit: '', left: true },
      ],
      notes.map((n) => [n.what, shortened(oneLine(n.value), 40), n.grounds]),
    ),
  ].join('\n');
}

/** Differences by wind speed: table less prediction, in percent of the prediction. */
export function differencesText(summaries: readonly DifferenceSummary[], unit: SpeedUnit): string {
  const pc = (v: number | undefined): string => (v === undefined ? '-' : signed(100 * v, 1));
  const rows = summaries.map((s) => {
    const w = s.largest;
    return [
      fixed(speedIn(unit, s.tws), 1),
      String(s.count),
      pc(s.mean),
      s.rms === undefined ? '-' : fixed(100 * s.rms, 1),
      pc(w?.share),
      w === undefined ? '' : fixed(degrees(w.twa), 1),
      w === undefined ? '' : fixed(speedIn(unit, w.tableSpeed), 2),
      w?.predicted.status !== 'balanced' ? '' : fixed(speedIn(unit, w.predicted.speed), 2),
      s.unbalanced === 0 ? '' : String(s.unbalanced),
    ];
  });
  return [
    textTable(
      [
        { head: 'TWS', unit },
        { head: 'points', unit: '' },
        { head: 'mean', unit: '%' },
        { head: 'rms', unit: '%' },
        { head: 'largest', unit: '%' },
        { head: 'at TWA', unit: 'deg' },
        { head: 'table', unit },
        { head: 'predicted', unit },
        { head: 'no state', unit: '' },
      ],
      rows,
    ),
    '',
    wrapped(
      'Table less prediction, in percent of the predicted speed. "no state": points where the table has a speed and no predicted state balances; points without speed in the table are left out of the figures.',
      TEXT_WIDTH,
    ),
  ].join('\n');
}

/** Every difference as comma-separated values (RFC 4180, CRLF). */
export function differencesCsv(differences: readonly TableDifference[], unit: SpeedUnit): string {
  const u = unitSuffix(unit);
  const heads = [
    `tws_${u}`,
    'twa_deg',
    `table_speed_${u}`,
    `predicted_speed_${u}`,
    `difference_${u}`,
    'difference_percent',
    'sails',
    'status',
    'reason',
  ];
  const v = (x: number | undefined): string => (x === undefined ? '' : fixed(speedIn(unit, x), 3));
  const lines = differences.map((d) => {
    const p = d.predicted;
    return [
      v(d.tws),
      fixed(degrees(d.twa), 2),
      v(d.tableSpeed),
      v(p.status === 'balanced' ? p.speed : undefined),
      v(d.difference),
      d.share === undefined ? '' : fixed(100 * d.share, 1),
      p.status === 'balanced' ? csvText(p.sailSet) : '',
      p.status === 'balanced' ? p.status : p.why,
      p.status === 'balanced' ? '' : csvText(p.reason),
    ];
  });
  return `${[heads, ...lines].map((c) => c.join(',')).join('\r\n')}\r\n`;
}

/** Charts of a table, one for each wind, with the prediction beside it where there is one. */
export function tablePage(
  title: string,
  t: SpeedTable,
  unit: SpeedUnit,
  differences: readonly TableDifference[] = [],
): string {
  const charts = t.rows
    .filter((r) => r.tws > 0 && r.points.length > 1)
    .map((r, i) => {
      const here = differences.filter((d) => d.tws === r.tws);
      const wind = `${fixed(speedIn(unit, r.tws), 1)} ${unit} of wind`;
      const predicted = {
        name: 'prediction',
        x: here.map((d) => degrees(d.twa)),
        y: here.map((d) =>
          d.predicted.status === 'balanced' ? speedIn(unit, d.predicted.speed) : Number.NaN,
        ),
        colour: 4,
        dash: '7 4',
      };
      return lineChartSvg(
        {
          title: wind,
          description: `Boat speed over true wind angle in ${wind}: the table${here.length > 0 ? ' and the prediction, dashed' : ''}.`,
          xLabel: 'true wind angle, deg',
          yLabel: `boat speed, ${unit}`,
          lines: [
            {
              name: 'table',
              x: r.points.map((p) => degrees(p.twa)),
              y: r.points.map((p) => speedIn(unit, p.speed)),
              colour: 1,
            },
            ...(here.some((d) => d.predicted.status === 'balanced') ? [predicted] : []),
          ],
        },
        `wind-${i + 1}`,
      );
    });
  const angles = [...new Set(t.rows.flatMap((r) => r.points.map((p) => p.twa)))].sort((a, b) => a - b);
  const heads = t.rows.map((r) => `<th scope="col">${fixed(speedIn(unit, r.tws), 1)}</th>`).join('');
  const body = angles
    .map((a) => {
      const cells = t.rows.map((r) => {
        const p = r.points.find((q) => q.twa === a);
        return `<td>${p === undefined ? '' : fixed(speedIn(unit, p.speed), 2)}</td>`;
      });
      return `<tr><th scope="row">${fixed(degrees(a), 1)}</th>${cells.join('')}</tr>`;
    })
    .join('');
  const figures = `<div class="scroll" tabindex="0" role="region" aria-label="The table"><table><caption>Boat speed in ${unit} by true wind angle (deg, down) and wind speed (${unit}, across)</caption><thead><tr><th scope="col">TWA</th>${heads}</tr></thead><tbody>${body}</tbody></table></div>`;
  return staticPage({
    title: shortened(oneLine(title), 80),
    lead:
      differences.length > 0 ? 'A table of boat speeds beside the prediction.' : 'A table of boat speeds.',
    sections: [
      { id: 'charts', heading: 'Charts', html: `<div class="charts">${charts.join('\n')}</div>` },
      { id: 'table', heading: 'Table', html: figures },
    ],
  });
}

/** The short text that travels inside a file: how it was made, and the cautions. */
export const tableDescription = (rules: readonly string[]): string => [...rules, ...CAUTIONS].join(' ');
