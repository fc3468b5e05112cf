import type { Boat } from '../boat/index.js';
import type { Sensitivity } from '../racecourse/index.js';
import { degrees, toKnots } from '../units/index.js';
import { htmlTable } from './comparison.js';
import { escapeHtml } from './escape.js';
import { fixed, rounded } from './numbers.js';
import { staticPage } from './page-shell.js';
import { oneLine, shortened, wrapped } from './plain-text.js';
import { TEXT_WIDTH, textTable, warningText } from './text-table.js';
import { tornadoSvg } from './tornado.js';

/** What a sensitivity's outputs are written from. Times in s per nautical mile, [wind][leg]. */
export interface SensitivityReport {
  readonly name: string;
  /** Change of each quantity, as a share. */
  readonly step: number;
  readonly tws: readonly number[];
  readonly legs: readonly { readonly name: string; readonly twa: number }[];
  readonly base: readonly (readonly number[])[];
  readonly rows: readonly Sensitivity[];
  readonly warnings: Boat['warnings'];
}

const signed = (v: number): string => {
  const text = fixed(v, 1);
  return Number.isFinite(v) && Number(text) > 0 ? `+${text}` : text;
};
const percentOf = (step: number): string => `${Number((100 * step).toPrecision(6))} %`;
const kn = (v: number): string => fixed(toKnots(v), 1).replace(/\.0$/, '');

const HOW =
  'Each quantity is changed alone and the boat solved again; what it would bring along (weight, structure, cost) is not ' +
  'in the figure. Below zero is quicker. n/a: no balanced state.';

/** Largest effect of a quantity anywhere, for the order of the rows. */
function size(s: Sensitivity): number {
  return Math.max(
    0,
    ...[s.less, s.more]
      .flatMap((t) => t?.flat() ?? [])
      .filter(Number.isFinite)
      .map(Math.abs),
  );
}

const ordered = (r: SensitivityReport): Sensitivity[] => [...r.rows].sort((a, b) => size(b) - size(a));

const at = (t: Sensitivity['less'], i: number, j: number): number => t?.[i]?.[j] ?? Number.NaN;

/** The table for a terminal: per quantity what less and more of it does in each wind and on each leg. */
export function sensitivityText(r: SensitivityReport): string {
  const rows: (readonly string[] | 'rule')[] = [
    ['as she is', '', ...r.tws.flatMap((_, i) => r.legs.map((_, j) => fixed(r.base[i]![j]!, 1)))],
    'rule',
  ];
  for (const s of ordered(r)) {
    const line = (t: Sensitivity['less']): string[] =>
      r.tws.flatMap((_, i) => r.legs.map((_, j) => signed(at(t, i, j))));
    rows.push(
      [s.name, `-${percentOf(r.step)}`, ...line(s.less)],
      ['', `+${percentOf(r.step)}`, ...line(s.more)],
    );
  }
  return [
    `${shortened(oneLine(r.name), 60)}: seconds per nautical mile for a change of ${percentOf(r.step)}`,
    '',
    textTable(
      [
        { head: 'quantity', unit: '', left: true },
        { head: '', unit: '' },
        ...r.tws.flatMap((v) => r.legs.map((l) => ({ head: l.name, unit: `${kn(v)} kn` }))),
      ],
      rows,
    ),
    '',
    wrapped(HOW, TEXT_WIDTH),
    ...(r.warnings.length > 0
      ? [
          '',
          'Outside the range of a method',
          ...r.warnings.map((w) => wrapped(`- ${warningText(w)}`, TEXT_WIDTH, '  ')),
        ]
      : []),
  ].join('\n');
}

/** As JSON: s per nautical mile, kn, deg; null where there is no time. */
export function sensitivityJson(r: SensitivityReport): string {
  const clean = (rows: readonly (readonly number[])[] | undefined): (number | null)[][] | null =>
    rows?.map((row) => row.map((v) => rounded(v))) ?? null;
  return `${JSON.stringify(
    {
      boat: r.name,
      step: r.step,
      tws_kn: r.tws.map((v) => rounded(toKnots(v))),
      legs: r.legs.map((l) => ({ name: l.name, twa_deg: rounded(degrees(l.twa)) })),
      time_s: clean(r.base),
      quantities: ordered(r).map((s) => ({
        name: s.name,
        words: s.words,
        less_s: clean(s.less),
        more_s: clean(s.more),
      })),
      warnings: r.warnings.map(warningText),
    },
    null,
    2,
  )}\n`;
}

/** As a page with a tornado plot for each wind and leg, and the table. No scripts. */
export function sensitivityPage(r: SensitivityReport): string {
  const rows = ordered(r);
  const charts = r.tws
    .flatMap((v, i) =>
      r.legs.map((l, j) =>
        tornadoSvg(
          `${l.name}, ${kn(v)} kn`,
          rows.map((s) => ({ name: s.name, less: at(s.less, i, j), more: at(s.more, i, j) })),
          percentOf(r.step),
          `tornado-${i}-${j}`,
        ),
      ),
    )
    .join('\n');
  const heads = [
    'quantity',
    'change',
    ...r.tws.flatMap((v) => r.legs.map((l) => `${escapeHtml(l.name)}<small>${kn(v)} kn</small>`)),
    'what is changed',
  ];
  const cells = rows.flatMap((s) =>
    (['less', 'more'] as const).map((which) => [
      which === 'less' ? escapeHtml(s.name) : '',
      `${which === 'less' ? '-' : '+'}${percentOf(r.step)}`,
      ...r.tws.flatMap((_, i) => r.legs.map((_, j) => signed(at(s[which], i, j)))),
      `<td class="text wide">${which === 'less' ? escapeHtml(s.words) : ''}</td>`,
    ]),
  );
  return staticPage({
    title: `${oneLine(r.name)}: what to change`,
    lead: `Seconds per nautical mile gained (below zero) or lost by ${percentOf(r.step)} less and ${percentOf(r.step)} more of each quantity.`,
    sections: [
      {
        id: 'tornado',
        heading: 'Tornado plots',
        html: `<p class="soft">${escapeHtml(HOW)}</p><div class="charts">${charts}</div>`,
      },
      { id: 'table', heading: 'Table', html: htmlTable('Seconds per nautical mile', heads, cells, [0]) },
      ...(r.warnings.length > 0
        ? [
            {
              id: 'ranges',
              heading: 'Outside the range of a method',
              html: `<ul>${r.warnings.map((w) => `<li>${escapeHtml(warningText(w))}</li>`).join('')}</ul>`,
            },
          ]
        : []),
    ],
  });
}
