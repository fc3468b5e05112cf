import type { SailCoefficients, SailLoading } from '../sails/index.js';
import { degrees } from '../units/index.js';
import { csvText } from './csv.js';
import { escapeHtml } from './escape.js';
import { type ChartLine, lineChartSvg } from './line-chart.js';
import { fixed, significant } from './numbers.js';
import { staticPage } from './page-shell.js';
import { oneLine, wrapped } from './plain-text.js';
import type { LoadingReport, SailReport } from './sail-report.js';
import { TEXT_WIDTH, textTable } from './text-table.js';

const HEADS = [
  'AWA deg',
  'lift',
  'drag',
  'drag with windage',
  'drive',
  'side',
  'centre m up',
  'centre m aft',
] as const;

function cells(report: SailReport, r: SailCoefficients): string[] {
  const aft = 0.5 * report.lwl - r.x;
  return [
    fixed(degrees(r.awa), 0),
    fixed(r.lift, 3),
    fixed(r.drag, 3),
    fixed(r.dragWithWindage, 3),
    fixed(r.drive, 3),
    fixed(r.side, 3),
    fixed(r.height, 2),
    // Where the side force changes sign its centre means nothing.
    Math.abs(r.side) < 0.1 ? '' : fixed(aft, 2),
  ];
}

/** Value of a loading's column at a share of its height, between nodes. */
function along(l: SailLoading, values: Float64Array, share: number): number {
  const last = l.z.length - 1;
  const z = l.z[0]! + share * (l.z[last]! - l.z[0]!);
  let i = 0;
  while (i < last - 1 && z > l.z[i + 1]!) i++;
  const t = (z - l.z[i]!) / (l.z[i + 1]! - l.z[i]!);
  return values[i]! + t * (values[i + 1]! - values[i]!);
}

interface TrimRow {
  readonly text: readonly string[];
}

/** What a loading means to a trimmer: where it acts, how hard the sections work, what twist it takes. */
function trimRows(report: SailReport['sets'][number]): TrimRow[] {
  return report.loadings.flatMap((l) =>
    l.sails.map((s) => {
      let atLimit = 0;
      for (let i = 0; i < s.cl.length; i++)
        if (s.cl[i]! > 0.999 * s.clLimit[i]! && s.clLimit[i]! > 0) atLimit++;
      const windTwist = along(s, s.inflow, 0.9) - along(s, s.inflow, 0.1);
      const twist = along(s, s.trim, 0.9) - along(s, s.trim, 0.1);
      return {
        text: [
          fixed(l.awaDeg, 0),
          `${fixed(100 * l.kept, 0)} %`,
          oneLine(s.sail),
          fixed(s.centreHeight, 2),
          fixed(along(s, s.cl, 0.15), 2),
          fixed(along(s, s.cl, 0.5), 2),
          fixed(along(s, s.cl, 0.85), 2),
          `${fixed((100 * atLimit) / s.cl.length, 0)} %`,
          fixed(degrees(windTwist), 1),
          fixed(degrees(twist), 1),
        ],
      };
    }),
  );
}

const TRIM_HEADS = [
  ['AWA', 'deg'],
  ['moment', 'kept'],
  ['sail', ''],
  ['centre', 'm up'],
  ['lift low', '15 %'],
  ['lift mid', '50 %'],
  ['lift high', '85 %'],
  ['at limit', 'of height'],
  ['wind twist', 'deg'],
  ['sail twist', 'deg'],
] as const;

const WORDS =
  'Coefficients are on the set’s area and the wind at its centre, at full power, upright. Twist is from a tenth to nine tenths of the height: of the apparent wind, and of the sail that carries the loading.';

/** Tables for the terminal. */
export function sailText(report: SailReport): string {
  const parts: string[] = [`${oneLine(report.boat)}: sail sets`, ''];
  for (const set of report.sets) {
    parts.push(
      `${oneLine(set.name)}, ${significant(set.area, 3)} m2`,
      '',
      textTable(
        [
          { head: 'AWA', unit: 'deg' },
          { head: 'lift', unit: '' },
          { head: 'drag', unit: '' },
          { head: 'with bodies', unit: '' },
          { head: 'drive', unit: '' },
          { head: 'side', unit: '' },
          { head: 'centre', unit: 'm up' },
          { head: 'centre', unit: 'm aft' },
        ],
        set.rows.map((r) => cells(report, r)),
      ),
      '',
    );
    const rows = trimRows(set);
    if (rows.length > 0)
      parts.push(
        textTable(
          TRIM_HEADS.map(([head, unit], i) => ({ head, unit, left: i === 2 })),
          rows.map((r) => r.text),
        ),
        '',
      );
  }
  parts.push(wrapped(WORDS, TEXT_WIDTH));
  return parts.join('\n');
}

/** Coefficients of every set as CSV. */
export function sailCsv(report: SailReport): string {
  const lines = [
    'sails,awa_deg,lift,drag,drag_with_windage,drive,side,centre_height_m,centre_aft_of_stem_m',
    ...report.sets.flatMap((s) => s.rows.map((r) => [csvText(s.name), ...cells(report, r)].join(','))),
  ];
  return `${lines.join('\r\n')}\r\n`;
}

function htmlTable(caption: string, heads: readonly string[], rows: readonly (readonly string[])[]): string {
  const head = heads.map((h) => `<th scope="col">${escapeHtml(h)}</th>`).join('');
  const body = rows
    .map(
      (r) =>
        `<tr>${r.map((c, i) => (i === 0 ? `<th scope="row">${escapeHtml(c)}</th>` : `<td>${escapeHtml(c)}</td>`)).join('')}</tr>`,
    )
    .join('');
  return `<div class="scroll" tabindex="0" role="region" aria-label="${escapeHtml(caption)}"><table><caption>${escapeHtml(caption)}</caption><thead><tr>${head}</tr></thead><tbody>${body}</tbody></table></div>`;
}

const DASHES = ['', '8 4', '2 4', '10 4 2 4', '4 4', '12 3', '1 3', '6 2 1 2', '3 6'];

/** Charts of every set: coefficients over angle, lift against drag, and loadings over height. */
export function sailChartsHtml(report: SailReport): { coefficients: string; loadings: string } {
  const line = (k: number, name: string, x: readonly number[], y: readonly number[]): ChartLine => ({
    name,
    x,
    y,
    colour: k % 9,
    ...(DASHES[k % 9] ? { dash: DASHES[k % 9]! } : {}),
  });
  const over = (
    title: string,
    pick: (r: SailCoefficients) => number,
    yLabel: string,
    id: string,
    from?: number,
  ): string =>
    lineChartSvg(
      {
        title,
        description: `${title} over apparent wind angle, one line for each sail set. The table below holds the same figures.`,
        xLabel: 'apparent wind angle, deg',
        yLabel,
        lines: report.sets.map((s, k) =>
          line(
            k,
            oneLine(s.name),
            s.rows.map((r) => degrees(r.awa)),
            s.rows.map(pick),
          ),
        ),
        ...(from === undefined ? {} : { yFrom: from }),
      },
      id,
    );
  const charts = [
    over('Lift coefficient', (r) => r.lift, 'lift', 'sail-lift'),
    over('Drag coefficient, with windage', (r) => r.dragWithWindage, 'drag', 'sail-drag'),
    over('Drive coefficient', (r) => r.drive, 'drive', 'sail-drive'),
    over('Side-force coefficient', (r) => r.side, 'side force', 'sail-side'),
    over('Height of the centre of effort', (r) => r.height, 'm above the water', 'sail-centre', 0),
  ];
  const tables = report.sets
    .map(
      (s) =>
        `<details><summary>${escapeHtml(oneLine(s.name))} as a table</summary>${htmlTable(
          `${oneLine(s.name)}: coefficients on ${significant(s.area, 3)} m2`,
          HEADS,
          s.rows.map((r) => cells(report, r)),
        )}</details>`,
    )
    .join('');
  const loadings = report.sets
    .filter((s) => s.loadings.some((l) => l.sails.length > 0))
    .map((s, k) => {
      // Close-hauled, or reaching for sails that do not stand closer.
      const stands = (l: LoadingReport): boolean => l.sails.every((x) => x.circulation.some((g) => g > 0));
      const at = (s.loadings.find(stands) ?? s.loadings[0]!).awaDeg;
      const upwind = s.loadings.filter((l) => Math.abs(l.awaDeg - at) < 1e-9);
      const names = [...new Set(upwind.flatMap((l) => l.sails.map((x) => x.sail)))];
      const plots = names.map((name, n) => {
        const of = upwind.map((l) => ({ l, s: l.sails.find((x) => x.sail === name)! }));
        return (
          lineChartSvg(
            {
              title: `${oneLine(name)}: circulation over height`,
              description: `Circulation of ${oneLine(name)} over height at full power and eased.`,
              xLabel: 'circulation, m\u00b2/s',
              yLabel: 'height above the water, m',
              yFrom: 0,
              lines: of.map(({ l, s: x }, i) => ({
                ...line(i * 3 + 1, `${fixed(100 * l.kept, 0)} % of the moment`, [...x.circulation], [...x.z]),
              })),
            },
            `load-${k}-${n}`,
          ) +
          lineChartSvg(
            {
              title: `${oneLine(name)}: section lift over height`,
              description: `Section lift coefficient of ${oneLine(name)} over height with its limit.`,
              xLabel: 'section lift coefficient',
              yLabel: 'height above the water, m',
              yFrom: 0,
              lines: [
                ...of.map(({ l, s: x }, i) => ({
                  ...line(i * 3 + 1, `${fixed(100 * l.kept, 0)} % of the moment`, [...x.cl], [...x.z]),
                })),
                {
                  name: 'limit',
                  x: [...of[0]!.s.clLimit],
                  y: [...of[0]!.s.z],
                  colour: 5,
                  width: 1,
                  dash: '1 3',
                },
              ],
            },
            `lift-${k}-${n}`,
          )
        );
      });
      const rows = trimRows(s).map((r) => r.text);
      return `<h3>${escapeHtml(oneLine(s.name))}, apparent wind ${fixed(upwind[0]!.awaDeg, 0)} deg</h3><div class="charts">${plots.join('')}</div><details><summary>${escapeHtml(oneLine(s.name))}: what it means to a trimmer</summary>${htmlTable(
        `${oneLine(s.name)}: loading and twist`,
        TRIM_HEADS.map(([h, u]) => (u === '' ? h : `${h}, ${u}`)),
        rows,
      )}</details>`;
    })
    .join('\n');
  return { coefficients: `<div class="charts">${charts.join('\n')}</div>\n${tables}`, loadings };
}

/** A page of its own. */
export function sailPage(report: SailReport): string {
  const charts = sailChartsHtml(report);
  return staticPage({
    title: `${oneLine(report.boat)}: the sails`,
    lead: WORDS,
    sections: [
      { id: 'coefficients', heading: 'Coefficients', html: charts.coefficients },
      { id: 'loadings', heading: 'Loading along the height', html: charts.loadings },
    ],
  });
}
