import type { Boat, Difference } from '../boat/index.js';
import type { Polar } from '../polar/index.js';
import { type Comparison, POINTS_OF_SAIL, type Standing } from '../racecourse/index.js';
import { degrees, toKnots } from '../units/index.js';
import { escapeHtml } from './escape.js';
import { lineChartSvg } from './line-chart.js';
import { fixed, rounded, significant } from './numbers.js';
import { staticPage } from './page-shell.js';
import { oneLine, shortened, wrapped } from './plain-text.js';
import { halfPolarsSvg } from './polar-halves.js';
import { TEXT_WIDTH, textTable, warningText } from './text-table.js';

/** Everything a comparison's outputs are written from. Plain data. */
export interface ComparisonReport {
  readonly comparison: Comparison;
  /** In the order of the entrants, the base first. */
  readonly boats: readonly {
    readonly name: string;
    readonly differences: readonly Difference[];
    readonly warnings: Boat['warnings'];
  }[];
  readonly polars: readonly Polar[];
}

/** What a comparison's certainty does and does not cover. */
const WHAT_IT_COVERS =
  'The draws vary the constants of the model that all variants share, the same draws for every variant. What differs ' +
  'from one sail or hull to the next beyond the figures in the file, waves, gusts and the crew are not in them.';

const kn = (tws: number, decimals = 1): string => fixed(toKnots(tws), decimals);
const signed = (v: number, decimals = 1): string => {
  const text = fixed(v, decimals);
  return Number.isFinite(v) && Number(text) > 0 ? `+${text}` : text;
};
const percent = (p: number): string => (Number.isFinite(p) ? `${fixed(100 * p, 0)} %` : '');
/** A probability: never certain, for the draws are a sample and do not cover everything. */
const chance = (p: number): string => (p > 0.99 ? 'over 99 %' : p < 0.01 ? 'under 1 %' : percent(p));
const pointName = (twa: number): string => {
  const deg = Math.round(degrees(twa));
  return deg === 0 ? 'beat' : deg === 180 ? 'run' : `${deg}`;
};
const nameOf = (text: string, most = 28): string => shortened(oneLine(text), most);

/** What lies outside a method's range: all of the base's, and of the variants what the base does not have. */
function rangesLeft(r: ComparisonReport): string[] {
  const own = new Set(r.boats[0]!.warnings.map((w) => `${w.method} ${w.parameter}`));
  return r.boats.flatMap((b, k) =>
    b.warnings
      .filter((w) => k === 0 || !own.has(`${w.method} ${w.parameter}`))
      .map((w) => `${k === 0 ? 'base' : oneLine(b.name)}: ${warningText(w)}`),
  );
}

/** The course in words: legs with their shares, and what manoeuvres cost. */
function courseWords(c: Comparison): string {
  const legs = c.course.legs.map((l) => `${l.name} ${fixed(100 * l.share, 0)} %`).join(', ');
  const m = c.course.manoeuvres;
  const cost = [
    ...(m.tack * m.tacksPerMile > 0 ? [`${m.tacksPerMile} tacks of ${m.tack} s a mile`] : []),
    ...(m.gybe * m.gybesPerMile > 0 ? [`${m.gybesPerMile} gybes of ${m.gybe} s a mile`] : []),
  ].join(', ');
  return `${c.course.name}: ${legs}${cost === '' ? '' : `; ${cost}`}`;
}

/** What is true of a comparison in a sentence each: reach of the wind table, crossovers, certainty. */
function findings(c: Comparison): string[] {
  const out: string[] = [];
  if (c.covered < 1 - 1e-9)
    out.push(
      c.covered > 0
        ? `Only ${percent(c.covered)} of the wind is sailed by all; times and ranking are over that part.`
        : 'No wind of the table is sailed by all: there is no ranking.',
    );
  for (const s of c.ranking)
    for (const u of s.unsailed)
      out.push(`${oneLine(s.name)} cannot sail the course in ${kn(u.tws)} kn: ${u.reason}`);
  if (c.crossovers.length === 0 && c.wind.tws.length > 1)
    out.push('The order is the same in every wind of the table.');
  for (const x of c.crossovers)
    out.push(
      `At about ${kn(x.tws)} kn the order turns: below it ${oneLine(c.names[x.quickerBelow]!)} is quicker, above it ${oneLine(c.names[x.quickerAbove]!)}.`,
    );
  return out;
}

/** What matters most in a difference: the constants with the largest shares of its variance. */
function mattersMost(c: Comparison, s: Standing, most = 3): string {
  const shares = s.againstBase?.shares ?? [];
  return shares
    .map((share, i) => ({ share, words: c.spreads[i]!.words }))
    .sort((a, b) => b.share - a.share)
    .slice(0, most)
    .filter((x) => x.share > 0.02)
    .map((x) => `${x.words} ${percent(x.share)}`)
    .join(', ');
}

function certaintySentence(c: Comparison): string {
  const deviations = c.ranking.map((s) => s.againstBase?.deviation).filter((d) => d !== undefined);
  const own = c.baseDeviation;
  const widest = Math.max(0, ...deviations.filter((d) => Number.isFinite(d)));
  return (
    `${c.draws} paired draws, seed ${c.seed}. The base's own time is uncertain by ${fixed(own, 1)} s a mile (one standard deviation), ` +
    `the differences by ${deviations.length > 1 ? 'at most ' : ''}${fixed(widest, 1)}: what is common to the variants cancels.`
  );
}

/** The comparison as text for a terminal. */
export function comparisonText(r: ComparisonReport): string {
  const c = r.comparison;
  const parts: string[] = [
    `${nameOf(c.names[0]!, 60)} and ${c.names.length - 1} ${c.names.length === 2 ? 'variant' : 'variants'}`,
    wrapped(courseWords(c), TEXT_WIDTH, '  '),
    wrapped(`wind: ${c.wind.words}`, TEXT_WIDTH, '  '),
    '',
  ];
  const changes = r.boats
    .slice(1)
    .flatMap((b) =>
      (b.differences.length > 0 ? b.differences : [{ key: 'no difference', before: '', after: '' }]).map(
        (d, i) => [
          i === 0 ? nameOf(b.name) : '',
          shortened(d.key, 34),
          shortened(oneLine(d.before) || '-', 16),
          shortened(oneLine(d.after) || '-', 16),
        ],
      ),
    );
  parts.push(
    textTable(
      [
        { head: 'variant', unit: '', left: true },
        { head: 'changed', unit: '', left: true },
        { head: 'from', unit: '', left: true },
        { head: 'to', unit: '', left: true },
      ],
      changes,
    ),
    '',
    'Ranking by expected time',
    '',
  );
  const drawn = c.draws > 0;
  parts.push(
    textTable(
      [
        { head: '', unit: '' },
        { head: 'boat', unit: '', left: true },
        { head: 'time', unit: 's/nmi' },
        { head: 'to base', unit: 's/nmi' },
        ...(drawn
          ? [
              { head: 'spread', unit: 's/nmi' },
              { head: '10 to 90 %', unit: 's/nmi' },
              { head: 'beats base', unit: '' },
            ]
          : []),
        { head: 'loses most', unit: 's/nmi' },
        { head: 'at', unit: 'kn' },
      ],
      c.ranking.map((s, i) => [
        `${i + 1}`,
        nameOf(s.name),
        fixed(s.secondsPerMile, 1),
        s.entrant === 0 ? 'base' : signed(s.difference),
        ...(drawn
          ? s.againstBase === undefined
            ? ['', '', '']
            : [
                fixed(s.againstBase.deviation, 1),
                `${signed(s.againstBase.low)} .. ${signed(s.againstBase.high)}`,
                chance(s.againstBase.quicker),
              ]
          : []),
        s.worst === undefined ? '' : fixed(s.worst.loss, 1),
        s.worst === undefined || s.worst.loss === 0 ? '' : kn(s.worst.tws),
      ]),
    ),
    '',
    ...findings(c).map((f) => wrapped(`- ${f}`, TEXT_WIDTH, '  ')),
  );
  if (drawn) {
    parts.push('', wrapped(certaintySentence(c), TEXT_WIDTH), wrapped(WHAT_IT_COVERS, TEXT_WIDTH));
    for (const s of c.ranking) {
      const most = mattersMost(c, s);
      if (most !== '')
        parts.push(wrapped(`- ${oneLine(s.name)}: what matters most is ${most}`, TEXT_WIDTH, '  '));
      const left = s.againstBase?.leftOut ?? 0;
      if (left > 0)
        parts.push(
          wrapped(`- ${oneLine(s.name)}: ${left} draws left out, no wind sailed by both`, TEXT_WIDTH, '  '),
        );
      const partly = s.againstBase?.partly ?? 0;
      if (partly > 0)
        parts.push(
          wrapped(
            `- ${oneLine(s.name)}: in ${partly} draws some wind is not sailed by both, and left out`,
            TEXT_WIDTH,
            '  ',
          ),
        );
    }
  }
  const shown = POINTS_OF_SAIL.map((twa, j) => ({ twa, j })).filter(({ twa }) =>
    ['beat', '60', '80', '100', '120', '140', 'run'].includes(pointName(twa)),
  );
  parts.push('', 'Difference to the base, s/nmi; negative is quicker', '');
  const rows: (readonly string[] | 'rule')[] = [];
  for (let k = 1; k < c.names.length; k++) {
    if (k > 1) rows.push('rule');
    c.wind.tws.forEach((v, i) => {
      rows.push([
        i === 0 ? nameOf(c.names[k]!) : '',
        kn(v),
        signed(c.times[k]![i]! - c.times[0]![i]!),
        ...shown.map(({ j }) => signed(c.differences[k]![i]![j]!)),
      ]);
    });
  }
  parts.push(
    textTable(
      [
        { head: 'boat', unit: '', left: true },
        { head: 'TWS', unit: 'kn' },
        { head: 'course', unit: '' },
        ...shown.map(({ twa }) => ({ head: pointName(twa), unit: '' })),
      ],
      rows,
    ),
  );
  const beyond = rangesLeft(r);
  if (beyond.length > 0)
    parts.push(
      '',
      'Outside the range of a method',
      ...beyond.map((w) => wrapped(`- ${w}`, TEXT_WIDTH, '  ')),
    );
  return parts.join('\n');
}

const clean = (v: number): number | null => rounded(v, 9);

/** The comparison as JSON: times in s per nautical mile, speeds in kn, angles in deg; null where there is no time. */
export function comparisonJson(r: ComparisonReport): string {
  const c = r.comparison;
  const out = {
    course: {
      name: c.course.name,
      legs: c.course.legs.map((l) => ({
        name: l.name,
        twa_deg: clean(degrees(l.twa)),
        share: clean(l.share),
      })),
      tacks_per_nmi: c.course.manoeuvres.tacksPerMile,
      tack_s: c.course.manoeuvres.tack,
      gybes_per_nmi: c.course.manoeuvres.gybesPerMile,
      gybe_s: c.course.manoeuvres.gybe,
    },
    wind: {
      words: c.wind.words,
      tws_kn: c.wind.tws.map((v) => clean(toKnots(v))),
      share: c.wind.share.map(clean),
      sailed_by_all: clean(c.covered),
    },
    draws: c.draws,
    seed: c.seed,
    base_spread_s: clean(c.baseDeviation),
    ranking: c.ranking.map((s) => ({
      name: s.name,
      base: s.entrant === 0,
      changes: r.boats[s.entrant]!.differences,
      time_s: clean(s.secondsPerMile),
      difference_s: clean(s.difference),
      spread_s: clean(s.deviation),
      spread_by_wind_s: s.windDeviations.map(clean),
      worst:
        s.worst === undefined ? null : { tws_kn: clean(toKnots(s.worst.tws)), loss_s: clean(s.worst.loss) },
      against_base:
        s.againstBase === undefined
          ? null
          : {
              quicker: clean(s.againstBase.quicker),
              mean_s: clean(s.againstBase.mean),
              spread_s: clean(s.againstBase.deviation),
              low_10_s: clean(s.againstBase.low),
              high_90_s: clean(s.againstBase.high),
              draws: s.againstBase.draws,
              draws_left_out: s.againstBase.leftOut,
              draws_partly: s.againstBase.partly,
              variance_shares: Object.fromEntries(
                s.againstBase.shares.map((v, i) => [c.spreads[i]!.factor, clean(v)]),
              ),
              variance_rest: clean(s.againstBase.rest),
            },
      time_by_wind_s: c.times[s.entrant]!.map(clean),
      not_sailed: s.unsailed.map((u) => ({ tws_kn: clean(toKnots(u.tws)), reason: u.reason })),
      difference_by_wind_and_point_s: c.differences[s.entrant]!.map((row) => row.map(clean)),
      warnings: r.boats[s.entrant]!.warnings.map(warningText),
    })),
    quicker: Object.fromEntries(c.quicker.map((row, i) => [c.names[i]!, row.map(clean)])),
    points_of_sail_deg: POINTS_OF_SAIL.map((a) => clean(degrees(a))),
    crossovers: c.crossovers.map((x) => ({
      tws_kn: clean(toKnots(x.tws)),
      quicker_below: c.names[x.quickerBelow],
      quicker_above: c.names[x.quickerAbove],
    })),
    uncertain: c.spreads.map((s) => ({
      constant: s.factor,
      words: s.words,
      sigma: s.sigma,
      source: s.source,
    })),
  };
  return `${JSON.stringify(out, null, 2)}\n`;
}

type Row = readonly string[];

/** An HTML table; the first cell of a row is its head. Cells are HTML. */
export function htmlTable(
  caption: string,
  heads: Row,
  rows: readonly Row[],
  texts: readonly number[] = [0],
): string {
  const left = (i: number): string => (texts.includes(i) ? ' class="text"' : '');
  const head = heads.map((h, i) => `<th scope="col"${left(i)}>${h}</th>`).join('');
  const cell = (c: string, i: number): string => {
    if (c.startsWith('<td')) return c;
    return i === 0 ? `<th scope="row"${left(i)}>${c}</th>` : `<td${left(i)}>${c}</td>`;
  };
  return `<div class="scroll" style="margin-bottom:18px" tabindex="0" role="region" aria-label="${escapeHtml(caption)}"><table><caption>${escapeHtml(caption)}</caption><thead><tr>${head}</tr></thead><tbody>${rows.map((r) => `<tr>${r.map(cell).join('')}</tr>`).join('')}</tbody></table></div>`;
}

/** A cell of a heat map: gains in the accent's colour, losses in the warning's, both by size; the figure has its sign. */
function heatCell(v: number, most: number): string {
  if (!Number.isFinite(v)) return '<td class="none">no time</td>';
  const share = most > 0 ? Math.min(1, Math.abs(v) / most) : 0;
  const strength = Math.round(55 * Math.sqrt(share));
  const colour = v < 0 ? 'var(--accent)' : 'var(--warn)';
  const style =
    strength === 0 ? '' : ` style="background:color-mix(in srgb,${colour} ${strength}%,var(--sheet))"`;
  return `<td${style}>${signed(v)}</td>`;
}

function heatMap(c: Comparison, k: number): string {
  const all = c.differences
    .slice(1)
    .flat(2)
    .map(Math.abs)
    .filter(Number.isFinite)
    .sort((a, b) => a - b);
  const most = all.length > 0 ? all[Math.floor(0.95 * (all.length - 1))]! : 0;
  const rows = c.wind.tws.map((v, i) => [
    kn(v),
    heatCell(c.times[k]![i]! - c.times[0]![i]!, most),
    ...POINTS_OF_SAIL.map((_, j) => heatCell(c.differences[k]![i]![j]!, most)),
  ]);
  const heads = [
    'wind<small>kn</small>',
    'course',
    ...POINTS_OF_SAIL.map((a) => `${pointName(a)}${/^\d/.test(pointName(a)) ? '<small>deg</small>' : ''}`),
  ];
  return htmlTable(`${oneLine(c.names[k]!)} less the base, s/nmi`, heads, rows, []);
}

/** The comparison as a page that needs nothing beside itself and runs no scripts. */
export function comparisonPage(r: ComparisonReport): string {
  const c = r.comparison;
  const e = (text: string): string => escapeHtml(oneLine(text));
  const drawn = c.draws > 0;
  const ranking = htmlTable(
    'Ranking by expected time on this course and wind',
    [
      '',
      'boat',
      'time<small>s/nmi</small>',
      'to base<small>s/nmi</small>',
      ...(drawn ? ['spread of it<small>s/nmi</small>', '10 to 90 %<small>s/nmi</small>', 'beats base'] : []),
      'loses most<small>s/nmi</small>',
      'at<small>kn</small>',
    ],
    c.ranking.map((s, i) => [
      `${i + 1}`,
      e(s.name),
      fixed(s.secondsPerMile, 1),
      s.entrant === 0 ? 'base' : signed(s.difference),
      ...(drawn
        ? s.againstBase === undefined
          ? ['', '', '']
          : [
              fixed(s.againstBase.deviation, 1),
              `${signed(s.againstBase.low)} to ${signed(s.againstBase.high)}`,
              chance(s.againstBase.quicker),
            ]
        : []),
      s.worst === undefined ? '' : fixed(s.worst.loss, 1),
      s.worst === undefined || s.worst.loss === 0 ? '' : kn(s.worst.tws),
    ]),
    [1],
  );
  const changes = htmlTable(
    'What each variant changes',
    ['variant', 'key', 'from', 'to'],
    r.boats
      .slice(1)
      .flatMap((b) =>
        b.differences.length === 0
          ? [[e(b.name), 'no difference', '', '']]
          : b.differences.map((d, i) => [
              i === 0 ? e(b.name) : '',
              e(d.key),
              e(d.before) || '-',
              e(d.after) || '-',
            ]),
      ),
    [0, 1, 2, 3],
  );
  const list = (items: readonly string[]): string =>
    items.length === 0 ? '' : `<ul>${items.map((f) => `<li>${escapeHtml(f)}</li>`).join('')}</ul>`;
  const gaps = c.times.slice(1).map((row) => row.map((t, i) => t - c.times[0]![i]!));
  const told = gaps.flat().filter((d) => Number.isFinite(d));
  const curves =
    c.wind.tws.length < 2 || !told.some((d) => d !== 0)
      ? '<p class="soft">No curve of the differences: one wind only, or no difference.</p>'
      : lineChartSvg(
          {
            title: 'Time on the course less that of the base, over wind speed',
            description: `Difference in seconds per nautical mile for ${c.names.length - 1} variants; below zero is quicker.`,
            xLabel: 'true wind speed, kn',
            yLabel: 'difference, s/nmi',
            lines: c.names.slice(1).map((name, k) => ({
              name: oneLine(name),
              x: c.wind.tws.map(toKnots),
              y: gaps[k]!,
              colour: (2 * k + 1) % 9,
              ...(k % 3 > 0 ? { dash: k % 3 === 1 ? '8 4' : '2 4' } : {}),
            })),
            // Room below zero where nothing is quicker: the scale needs a height.
            yFrom: Math.min(-0.05 * Math.max(...told.map(Math.abs)), ...told),
          },
          'differences-chart',
        );
  const halves = c.names
    .slice(1)
    .map((_, k) =>
      halfPolarsSvg(
        r.polars[0]!,
        r.polars[k + 1]!,
        oneLine(c.names[0]!),
        oneLine(c.names[k + 1]!),
        `half-${k}`,
      ),
    )
    .join('\n');
  const shares = htmlTable(
    'Share of the variance of each difference that an uncertain constant accounts for',
    [
      'constant',
      'one standard deviation',
      ...c.ranking.filter((s) => s.againstBase).map((s) => e(s.name)),
      'source',
    ],
    c.spreads.map((spread, i) => [
      escapeHtml(spread.words),
      `${fixed(100 * spread.sigma, 0)} %`,
      ...c.ranking
        .filter((s) => s.againstBase)
        .map((s) => (s.againstBase!.shares.length === 0 ? '-' : percent(s.againstBase!.shares[i]!))),
      `<td class="text wide">${escapeHtml(spread.source)}</td>`,
    ]),
  );
  const pairs = htmlTable(
    'How often the boat of the row is quicker than that of the column',
    ['', ...c.names.map(e)],
    c.names.map((name, i) => [
      e(name),
      ...c.quicker[i]!.map((p, j) => (i === j ? '' : Number.isFinite(p) ? chance(p) : '-')),
    ]),
  );
  const warnings = rangesLeft(r);
  return staticPage({
    title: `${oneLine(c.names[0]!)}: variants compared`,
    lead: `${courseWords(c)}. Wind: ${c.wind.words}; ${significant(toKnots(c.wind.tws[0]!), 3)} to ${significant(toKnots(c.wind.tws[c.wind.tws.length - 1]!), 3)} kn.`,
    sections: [
      { id: 'ranking', heading: 'Ranking', html: `${ranking}\n${list(findings(c))}` },
      { id: 'changes', heading: 'Changes', html: changes },
      {
        id: 'differences',
        heading: 'Differences',
        html: `<p class="soft">Seconds per nautical mile less the base; negative is quicker. Beat and run by best VMG, every other direction by the quickest mix of two states.</p>${c.names
          .slice(1)
          .map((_, k) => heatMap(c, k + 1))
          .join('\n')}\n<div style="max-width:680px">${curves}</div>`,
      },
      ...(drawn
        ? [
            {
              id: 'certainty',
              heading: 'How sure',
              html: `<p>${escapeHtml(certaintySentence(c))}</p><p>${escapeHtml(WHAT_IT_COVERS)}</p>${pairs}${shares}${list(
                c.ranking
                  .filter((s) => (s.againstBase?.leftOut ?? 0) + (s.againstBase?.partly ?? 0) > 0)
                  .map(
                    (s) =>
                      `${oneLine(s.name)}: ${s.againstBase!.leftOut} draws left out, no wind sailed by both; ${s.againstBase!.partly} with some wind left out`,
                  ),
              )}`,
            },
          ]
        : []),
      {
        id: 'polars',
        heading: 'Polars',
        html: `<p class="soft">The base to the right, the variant to the left; knots outward, true wind angle from the top.</p><div class="charts">${halves}</div>`,
      },
      ...(warnings.length > 0
        ? [{ id: 'ranges', heading: 'Outside the range of a method', html: list(warnings) }]
        : []),
    ],
  });
}
