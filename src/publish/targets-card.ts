import { degrees } from '../units/index.js';
import { CAUTIONS } from './cautions.js';
import { escapeHtml } from './escape.js';
import { fixed, significant } from './numbers.js';
import { pageHead } from './page-head.js';
import { oneLine, shortened } from './plain-text.js';
import { type SpeedUnit, speedIn } from './table-format.js';
import { percentTable, type TargetCard, type TargetCell } from './targets.js';
import { percent, sharesText, threeFigures } from './targets-text.js';

/** Paper of the printed card; width and height in mm (ISO 216). */
export const CARD_PAPERS = { A5: [148, 210], A6: [105, 148] } as const;
export type CardPaper = keyof typeof CARD_PAPERS;

/** Margin [mm] most printers keep to, and room for a laminating seam (judgement). */
const MARGIN = 5;
/** Winds and reaching angles that fit a card in large type; fewer winds where many sail sets have to be named. */
const WINDS = 9;
const WINDS_MANY_SAILS = 7;
const MANY_SAILS = 6;
const ANGLES = 6;

const SHORT_CAUTION =
  'Predicted, not measured: no judgement of stability, strength or safety. Flat water. Local rules and qualified advice come first.';

/** A list in pieces of nearly equal length, none longer than `most`. */
function pieces<T>(list: readonly T[], most: number): T[][] {
  const count = Math.ceil(list.length / most);
  const size = Math.ceil(list.length / Math.max(1, count));
  return Array.from({ length: count }, (_, k) => list.slice(k * size, (k + 1) * size));
}

const th = (text: string, unit = '', scope = 'col'): string =>
  `<th scope="${scope}">${escapeHtml(text)}${unit === '' ? '' : `<small>${escapeHtml(unit)}</small>`}</th>`;

/** Letters for the sail sets of a card, in the order they appear. */
function sailLetters(cells: readonly TargetCell[]): ReadonlyMap<string, string> {
  const sets = [...new Set(cells.flatMap((c) => (c.ok ? [c.state.sailSet] : [])))];
  return new Map(sets.map((s, i) => [s, i < 26 ? String.fromCharCode(65 + i) : String(i + 1)]));
}

function bestVmgTable(winds: TargetCard['winds'], course: 'up' | 'down', unit: SpeedUnit): string {
  const speed = (v: number): string => threeFigures(speedIn(unit, v));
  const whole = (v: number): string => `${fixed(degrees(v), 0)}°`;
  const share = (v: number): string => `${fixed(100 * v, 0)} %`;
  const crew = (v: number): string => (v < -0.005 ? `${share(-v)} lee` : share(v));
  const letters = sailLetters(winds.map((w) => w[course]));
  const board = winds.some((w) => w[course].ok && w[course].state.boardDown < 0.995);
  const cells = (list: readonly string[]): string => list.map((t) => `<td>${escapeHtml(t)}</td>`).join('');
  const rows = winds.map((w): string => {
    const cell = w[course];
    const head = th(fixed(speedIn(unit, w.tws), 1), '', 'row');
    if (!cell.ok) {
      const reason = shortened(oneLine(cell.reason), 75);
      return `<tr>${head}<td class="none" colspan="5">${escapeHtml(cell.why)}</td></tr><tr class="more"><td class="none" colspan="6">${escapeHtml(reason)}</td></tr>`;
    }
    const s = cell.state;
    const main = [whole(s.twa), speed(Math.abs(cell.vmg)), whole(cell.awa), whole(s.heel)];
    const more = [
      letters.get(s.sailSet)!,
      fixed(speedIn(unit, cell.aws), 1),
      `${fixed(degrees(s.leeway), 1)}°`,
      share(s.ease),
      crew(s.crewShare),
      board ? share(s.boardDown) : '',
    ];
    return `<tr>${head}<td class="main">${speed(cell.speed)}</td>${cells(main)}</tr><tr class="more">${cells(more)}</tr>`;
  });
  const head = (unit1: string, large: string, small: string): string =>
    `<th scope="col">${large}${unit1 === '' ? '' : ` <span>${escapeHtml(unit1)}</span>`}<small>${small}</small></th>`;
  const heads = [
    head(unit, 'TWS', 'sails'),
    head(unit, 'speed', 'AWS'),
    head('', 'TWA', 'leeway'),
    head(unit, 'VMG', 'ease'),
    head('', 'AWA', 'crew'),
    head('', 'heel', board ? 'board' : ''),
  ];
  const key = [...letters].map(
    ([set, letter]) => `<span>${letter} ${escapeHtml(shortened(oneLine(set), 60))}</span>`,
  );
  const sails = key.length === 0 ? '' : `<p class="key${key.length > 4 ? ' many' : ''}">${key.join(' ')}</p>`;
  return `<table class="vmg"><thead><tr>${heads.join('')}</tr></thead><tbody>${rows.join('')}</tbody></table>${sails}`;
}

function reachTable(
  winds: TargetCard['winds'],
  angles: readonly { at: number; k: number }[],
  unit: SpeedUnit,
): string {
  const cell = (c: TargetCell): string =>
    c.ok
      ? `<td class="main">${threeFigures(speedIn(unit, c.speed))}</td>`
      : `<td class="none">${escapeHtml(c.why)}</td>`;
  const heads = angles.map(({ at }) => th(`${significant(degrees(at), 4)}°`)).join('');
  const rows = winds.map(
    (w) =>
      `<tr>${th(fixed(speedIn(unit, w.tws), 1), '', 'row')}${angles.map(({ k }) => cell(w.reach[k]!)).join('')}</tr>`,
  );
  return `<table class="reach"><thead><tr>${th('TWS', unit)}${heads}</tr></thead><tbody>${rows.join('')}</tbody></table>`;
}

function percentTableHtml(card: TargetCard, course: 'up' | 'down', unit: SpeedUnit): string {
  const t = percentTable(card, course);
  const heads = t.tws.map((v) => th(fixed(speedIn(unit, v), 1))).join('');
  const rows = t.rows.map((r) => {
    const cells = r.speeds.map((v) => `<td>${threeFigures(speedIn(unit, v))}</td>`);
    const aim = r.percent === 100 ? ' class="aim"' : '';
    return `<tr${aim}>${th(`${r.percent} %`, '', 'row')}${cells.join('')}</tr>`;
  });
  return `<table class="percent"><caption>Find the boat speed (${unit}) below the wind speed.</caption><thead><tr>${th('TWS', unit)}${heads}</tr></thead><tbody>${rows.join('')}</tbody></table>`;
}

function reading(card: TargetCard): string {
  const facts = [
    `True wind speed (TWS) is quoted at ${significant(card.windHeight, 3)} m above the water; a masthead or handheld reading at another height differs.`,
    'TWA is measured from the course through the water, AWA from the heading.',
    `Speeds are ${sharesText(card)}.${card.share < 1 ? ' Angles, heel, leeway, ease and crew are those of the full prediction.' : ''}`,
    'The small figures stand below the large ones: the letter of the sails, AWS, leeway, ease (share of the sails’ heeling moment given up), crew (arm as a share of fully out; lee: to leeward), board (share lowered).',
    'Percent of target: find the boat speed in the column of the wind; the percent stands at the left.',
  ];
  const list = (items: readonly string[]): string =>
    `<ul>${items.map((i) => `<li>${escapeHtml(i)}</li>`).join('')}</ul>`;
  return `${list(facts)}<h3>Cautions</h3>${list(CAUTIONS)}`;
}

/** Sizes in shares of the paper's width, so that one style serves both papers. */
function style(paper: CardPaper): string {
  const [w, h] = CARD_PAPERS[paper];
  const mm = (share: number): string => `${(share * w).toFixed(2)}mm`;
  return `
@page { size: ${w}mm ${h}mm; margin: 0; }
* { box-sizing: border-box; }
html { -webkit-text-size-adjust: 100%; text-size-adjust: 100%; }
body { margin: 0; background: #fff; color: #000; font: ${mm(0.03)}/1.3 "Liberation Sans", Arial, Helvetica, system-ui, sans-serif; }
.card { width: ${w}mm; height: ${h - 0.4}mm; padding: ${MARGIN}mm; overflow: hidden; display: flex; flex-direction: column; break-inside: avoid; background: #fff; }
.card:not(:last-child) { break-after: page; }
.head { border-bottom: ${mm(0.006)} solid #000; padding-bottom: ${mm(0.012)}; margin-bottom: ${mm(0.012)}; }
h1, h2 { margin: 0; font-size: ${mm(0.052)}; line-height: 1.15; }
.title { display: flex; justify-content: space-between; align-items: baseline; gap: ${mm(0.03)}; }
h1, h2 { flex: none; }
.boat { margin: 0; min-width: 0; font-size: ${mm(0.036)}; font-weight: 700; white-space: nowrap; overflow: hidden; text-overflow: ellipsis; }
.meta { margin: 0; font-size: ${mm(0.028)}; overflow-wrap: anywhere; }
.foot { margin: auto 0 0; padding-top: ${mm(0.012)}; border-top: ${mm(0.003)} solid #000; font-size: ${mm(0.024)}; line-height: 1.25; }
table { width: 100%; border-collapse: collapse; table-layout: fixed; font-variant-numeric: tabular-nums; }
th, td { text-align: right; padding: 0 ${mm(0.008)}; white-space: nowrap; overflow: hidden; }
thead th { font-size: ${mm(0.03)}; border-bottom: ${mm(0.003)} solid #000; vertical-align: bottom; }
thead small { display: block; font-weight: 400; }
.vmg td, .vmg tbody th, .reach td, .reach tbody th { font-size: ${mm(0.045)}; line-height: 1.14; }
.vmg tbody th, .reach tbody th { vertical-align: top; border-right: ${mm(0.003)} solid #000; }
.main { font-weight: 700; }
.vmg .more td { font-size: ${mm(0.031)}; line-height: 1.15; padding-bottom: ${mm(0.006)}; border-bottom: ${mm(0.0015)} solid #000; }
.vmg .more td:first-child:not(.none) { border-right: ${mm(0.003)} solid #000; }
thead span { font-weight: 400; }
.key { margin: ${mm(0.01)} 0 0; font-size: ${mm(0.028)}; }
.key span { display: inline-block; max-width: 49%; margin-right: 2%; overflow: hidden; text-overflow: ellipsis; white-space: nowrap; vertical-align: bottom; }
.key.many span { max-width: 31%; }
.reach tbody td, .reach tbody th { padding-top: ${mm(0.014)}; padding-bottom: ${mm(0.014)}; border-bottom: ${mm(0.0015)} solid #000; }
.vmg td.none { text-align: left; text-overflow: ellipsis; }
.vmg th:first-child, .reach th:first-child { width: 15%; }
.reach td.none { font-size: ${mm(0.024)}; white-space: normal; }
.percent th, .percent td { font-size: ${mm(0.036)}; line-height: 1.36; padding: 0 ${mm(0.006)}; }
.percent th:first-child { width: 15%; }
.percent tbody tr:nth-child(5n) > * { border-bottom: ${mm(0.0015)} solid #000; }
.percent tbody th { border-right: ${mm(0.003)} solid #000; }
.percent .aim > * { font-weight: 700; border-top: ${mm(0.003)} solid #000; border-bottom: ${mm(0.003)} solid #000; }
.percent caption { text-align: left; }
.reading { font-size: ${mm(0.03)}; }
.reading ul { margin: 0; padding-left: 1.1em; }
.reading li { margin-bottom: ${mm(0.012)}; }
h3 { margin: ${mm(0.02)} 0 ${mm(0.01)}; font-size: ${mm(0.036)}; }
@media screen { .card { border: 1px solid #000; margin: 8px auto; } }
`;
}

/**
 * The target cards as a page made for printing: black on white, one card a page, in large type. More winds or angles
 * than fit a card go on to the next. No scripts; its policy lets it load nothing.
 */
export function targetsCardPage(card: TargetCard, unit: SpeedUnit, paper: CardPaper): string {
  const name = shortened(oneLine(card.boatName), 60);
  const label = shortened(oneLine(card.label), 40);
  const meta = `Wind at ${significant(card.windHeight, 3)} m. Speeds in ${unit}.`;
  const off =
    card.shares.length === 0
      ? ''
      : ` ${percent(card.share)} of prediction (${card.shares.map((s) => `${s.what} ${percent(s.share)}`).join(', ')}).`;
  const windGroups = pieces(card.winds, WINDS);
  const vmgGroups = (course: 'up' | 'down') =>
    windGroups.some((g) => sailLetters(g.map((w) => w[course])).size > MANY_SAILS)
      ? pieces(card.winds, WINDS_MANY_SAILS)
      : windGroups;
  const aimed = (course: 'up' | 'down') => windGroups.filter((g) => g.some((w) => w[course].ok));
  const angleGroups = pieces(
    card.reachAngles.map((at, k) => ({ at, k })),
    ANGLES,
  );
  const numbered = <T>(
    title: string,
    groups: readonly T[],
    html: (g: T) => string,
  ): { title: string; html: string }[] =>
    groups.map((g, i) => ({
      title: groups.length > 1 ? `${title} ${i + 1} of ${groups.length}` : title,
      html: html(g),
    }));
  const cards = [
    ...numbered('Upwind', vmgGroups('up'), (g) => bestVmgTable(g, 'up', unit)),
    ...numbered('Downwind', vmgGroups('down'), (g) => bestVmgTable(g, 'down', unit)),
    ...numbered(
      'Reaching',
      angleGroups.flatMap((a) => windGroups.map((w) => ({ a, w }))),
      ({ a, w }) => reachTable(w, a, unit),
    ),
    ...numbered('Percent of target, up', aimed('up'), (winds) =>
      percentTableHtml({ ...card, winds }, 'up', unit),
    ),
    ...numbered('Percent of target, down', aimed('down'), (winds) =>
      percentTableHtml({ ...card, winds }, 'down', unit),
    ),
    { title: 'How to read the cards', html: `<div class="reading">${reading(card)}</div>` },
  ];
  const body = cards
    .map(
      ({ title, html }, i) => `<section class="card" id="card-${i + 1}" aria-labelledby="title-${i + 1}">
<div class="head"><div class="title"><${i === 0 ? 'h1' : 'h2'} id="title-${i + 1}">${escapeHtml(title)}</${i === 0 ? 'h1' : 'h2'}>
<p class="boat">${escapeHtml(name)}</p></div>
<p class="meta">${escapeHtml(meta + off)}${label === '' ? '' : ` <b>${escapeHtml(label)}</b>`}</p></div>
${html}
<p class="foot">${escapeHtml(SHORT_CAUTION)}</p>
</section>`,
    )
    .join('\n');
  return `${pageHead(`${name}: target card, ${paper}`, style(paper))}
<body>
<main>
${body}
</main>
</body>
</html>
`;
}
