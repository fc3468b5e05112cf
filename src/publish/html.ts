import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { SailingResult } from '../equilibrium/index.js';
import { balanceHtml } from './balance-html.js';
import { CAUTIONS, ERROR_BANDS, ERROR_BANDS_SOURCE, METHODS } from './cautions.js';
import { crossoverHtml } from './crossover.js';
import { escapeHtml } from './escape.js';
import { type Decimals, decimalsFor, fixed, rounded, significant } from './numbers.js';
import { pageHead } from './page-head.js';
import { PAGE_SCRIPT } from './page-script.js';
import { PAGE_STYLE } from './page-style.js';
import { fileStem, oneLine } from './plain-text.js';
import { figures, type PolarReport, type StateFigures } from './report.js';
import { resistanceHtml } from './resistance.js';
import { rightingHtml } from './righting.js';
import { sailChartsHtml } from './sail-view.js';
import { COLOURS, seriesStyle } from './series-style.js';
import { warningText } from './text-table.js';

/** A value as JSON that may stand in a script element. */
export function scriptJson(value: unknown): string {
  return JSON.stringify(value)
    .replaceAll('<', '\\u003c')
    .replaceAll('>', '\\u003e')
    .replaceAll('&', '\\u0026')
    .replaceAll('\u2028', '\\u2028')
    .replaceAll('\u2029', '\\u2029');
}

/** A script's text that cannot end its element early, nor open a comment in it. */
export function inlineScript(script: string): string {
  return script.replace(/<\/(script)/gi, '<\\/$1').replace(/<!--/g, '<\\!--');
}

/** Dashes tell lines apart without colour; four of them against nine colours repeat after 36 lines. */
const DASHES = ['solid', 'dash', 'dot', 'dashdot'] as const;

/** Places of the facts shown when a point is pointed at; see `hoverFacts`. */
const HOVER =
  '<b>%{customdata[0]} kn wind</b><br>TWA %{customdata[1]}°<br>speed %{customdata[2]} kn<br>VMG %{customdata[3]} kn' +
  '<br>AWA %{customdata[4]}°<br>heel %{customdata[5]}°<br>leeway %{customdata[6]}°<br>ease %{customdata[7]}' +
  '<br>crew %{customdata[8]}<br>%{customdata[9]}<br>sails: %{customdata[10]}<extra></extra>';

function hoverFacts(f: StateFigures, d: Decimals): string[] {
  return [
    fixed(f.twsKn, 1),
    fixed(f.twaDeg, d.angle),
    fixed(f.speedKn, d.speed),
    fixed(Math.abs(f.vmgKn), d.speed),
    fixed(f.awaDeg, d.angle),
    fixed(f.heelDeg, d.angle),
    fixed(f.leewayDeg, d.angle),
    fixed(f.ease, d.share),
    fixed(f.crewShare, d.share) + (f.boardDown < 1 ? `, board ${fixed(f.boardDown, d.share)}` : ''),
    escapeHtml(f.regime),
    escapeHtml(oneLine(f.sailSet)),
  ];
}

/** Marks of the regimes that limit a boat; the others bear none. */
const REGIME_MARKS: Readonly<Record<string, string>> = {
  'crew full out': 'circle',
  easing: 'circle-open',
  reefed: 'square-open',
  'heel limited': 'triangle-up-open',
};

interface Point {
  readonly angle: number;
  readonly speed: number | null;
  readonly facts: readonly string[];
  readonly regime: string;
}

function pointOf(r: SailingResult, d: Decimals): Point {
  const f = figures(r);
  const angle = rounded(f.twaDeg, 7) ?? 0;
  if (f.status === 'unbalanced') return { angle, speed: null, facts: [], regime: '' };
  return { angle, speed: rounded(f.speedKn, 6), facts: hoverFacts(f, d), regime: f.regime };
}

/** Outline of the error band of one wind's curve, out along the high speeds and back along the low ones. */
function bandOf(report: PolarReport, i: number): { angle: number[]; speed: number[] } | null {
  const band = report.bands?.winds[i];
  if (band === undefined || band.length < 2) return null;
  const out = { angle: [] as number[], speed: [] as number[] };
  const add = (share: 'low' | 'high', b: (typeof band)[number]): void => {
    const state = report.polar.results[i]!.find((r) => r.twa === b.twa)!;
    const f = figures(state);
    if (f.status === 'unbalanced') return;
    out.angle.push(rounded(f.twaDeg, 7) ?? 0);
    out.speed.push(rounded(f.speedKn * b[share], 6) ?? 0);
  };
  for (const b of band) add('high', b);
  for (const b of [...band].reverse()) add('low', b);
  return out;
}

/** What the bands say, in words and as a table by point of sail. */
function bandsHtml(report: PolarReport): string {
  const { bands, polar } = report;
  if (bands === undefined)
    return '<p class="soft">No bands were computed for this page: the command has an option for them.</p>';
  const points = [
    { name: 'upwind', from: 0, to: 60 },
    { name: 'reaching', from: 60, to: 120 },
    { name: 'downwind', from: 120, to: 181 },
  ];
  const rows = polar.tws
    .map((_, i) => {
      const cells = points.map((p) => {
        const own = (bands.winds[i] ?? []).filter((b) => {
          const deg = (b.twa * 180) / Math.PI;
          return deg >= p.from && deg < p.to;
        });
        if (own.length === 0) return td('');
        const low = own.reduce((s, b) => s + b.low, 0) / own.length - 1;
        const high = own.reduce((s, b) => s + b.high, 0) / own.length - 1;
        return td(`${fixed(100 * low, 1)} to +${fixed(100 * high, 1)} %`);
      });
      return `<tr><th scope="row">${fixed(figures(polar.bestUp[i]!).twsKn, 1)}</th>${cells.join('')}</tr>`;
    })
    .join('');
  return `<p>The shaded bands of the diagram hold eight in ten of ${bands.draws} predictions, made anew with the model's uncertain constants drawn at random (hull, sails, foils, windage, righting moment, wind over height). Waves, gusts and the crew's skill are not in them.</p>
${scrolling('Bands', `<table><caption>Band of boat speed, by wind (kn) and point of sail</caption><thead><tr>${th('TWS', 'kn')}${points.map((p) => th(p.name)).join('')}</tr></thead><tbody>${rows}</tbody></table>`)}`;
}

/** Least distance of two labels below each other, as a share of the diagram's radius. */
const LABEL_ROOM = 0.038;

/** What the page's script draws. Each line is labelled where it ends, in two columns where lines end close by. */
function diagramData(report: PolarReport, d: Decimals): unknown {
  const { polar, boat } = report;
  let top = 0;
  const curves = polar.results.map((row, i) => {
    const best = [polar.bestUp[i]!, polar.bestDown[i]!]
      .filter((r) => r.status === 'balanced')
      .map((r) => pointOf(r, d));
    const points = row.map((r) => pointOf(r, d));
    for (const b of best) if (!points.some((p) => Math.abs(p.angle - b.angle) < 1e-6)) points.push(b);
    points.sort((a, b) => a.angle - b.angle);
    for (const p of points) if (p.speed !== null) top = Math.max(top, p.speed);
    const name = fixed(figures(polar.bestUp[i]!).twsKn, 1).replace(/\.0$/, '');
    return {
      name: `${name} kn`,
      mode: 'lines+markers+text',
      angle: points.map((p) => p.angle),
      speed: points.map((p) => p.speed),
      facts: points.map((p) => p.facts),
      marks: points.map((p) => REGIME_MARKS[p.regime] ?? ''),
      points,
      band: bandOf(report, i),
      best: {
        angle: best.map((p) => p.angle),
        speed: best.map((p) => p.speed),
        facts: best.map((p) => p.facts),
      },
    };
  });
  const room = LABEL_ROOM * top;
  const columns = [Number.NEGATIVE_INFINITY, Number.NEGATIVE_INFINITY];
  const labelled = curves.map(({ points, ...curve }) => {
    const last = points.findLast((p) => p.speed !== null);
    const column = last === undefined ? -1 : columns.findIndex((end) => Math.abs(last.speed! - end) >= room);
    if (column >= 0) columns[column] = last!.speed!;
    const label = column < 0 ? '' : `${curve.name}\u00a0\u00a0\u00a0${'\u00a0'.repeat(11 * column)}`;
    return {
      ...curve,
      label: points.map((p) => (p === last ? label : '')),
      labelPlace: (last?.angle ?? 0) > 170 ? 'middle left' : 'bottom center',
    };
  });
  return {
    curves: labelled,
    colours: COLOURS,
    dashes: DASHES,
    hover: HOVER,
    top: top > 0 ? 1.06 * top : 1,
    file: fileStem(boat.name, 'polar'),
  };
}

type Cell = string;
const th = (text: string, unit = '', left = false): Cell =>
  `<th scope="col"${left ? ' class="text"' : ''}>${escapeHtml(text)}${unit === '' ? '' : `<small>${escapeHtml(unit)}</small>`}</th>`;
const td = (text: string, kind = ''): Cell =>
  `<td${kind === '' ? '' : ` class="${kind}"`}>${escapeHtml(text)}</td>`;

function scrolling(label: string, table: string): string {
  return `<div class="scroll" tabindex="0" role="region" aria-label="${escapeHtml(label)}">${table}</div>`;
}

const TARGET_HEADS = [
  th('TWS', 'kn'),
  th('TWA', 'deg'),
  th('speed', 'kn'),
  th('VMG', 'kn'),
  th('AWA', 'deg'),
  th('heel', 'deg'),
  th('leeway', 'deg'),
  th('ease'),
  th('crew'),
  th('regime', '', true),
  th('sails', '', true),
];

function targetHtml(caption: string, results: readonly SailingResult[], d: Decimals): string {
  const rows = results.map((r) => {
    const f = figures(r);
    const head = `<th scope="row">${fixed(f.twsKn, 1)}</th>`;
    if (f.status === 'unbalanced')
      return `<tr>${head}<td class="none" colspan="10">${escapeHtml(`${f.why}: ${oneLine(f.reason)}`)}</td></tr>`;
    return `<tr>${head}${[
      td(fixed(f.twaDeg, d.angle)),
      td(fixed(f.speedKn, d.speed)),
      td(fixed(Math.abs(f.vmgKn), d.speed)),
      td(fixed(f.awaDeg, d.angle)),
      td(fixed(f.heelDeg, d.angle)),
      td(fixed(f.leewayDeg, d.angle)),
      td(fixed(f.ease, d.share)),
      td(fixed(f.crewShare, d.share)),
      td(f.regime, 'text'),
      td(oneLine(f.sailSet), 'text'),
    ].join('')}</tr>`;
  });
  return scrolling(
    caption,
    `<table class="targets"><caption>${escapeHtml(caption)}</caption><thead><tr>${TARGET_HEADS.join('')}</tr></thead><tbody>${rows.join('')}</tbody></table>`,
  );
}

const FULL_HEADS = [
  th('TWA', 'deg'),
  th('speed', 'kn'),
  th('VMG', 'kn'),
  th('AWS', 'kn'),
  th('AWA', 'deg'),
  th('heel', 'deg'),
  th('leeway', 'deg'),
  th('rudder', 'deg'),
  th('ease'),
  th('crew'),
  th('board'),
  th('regime', '', true),
  th('sails', '', true),
];

function fullTable(report: PolarReport, i: number, d: Decimals): string {
  const { polar } = report;
  const entries: { result: SailingResult; best: boolean }[] = polar.results[i]!.map((result) => ({
    result,
    best: false,
  }));
  for (const result of [polar.bestUp[i]!, polar.bestDown[i]!]) {
    if (result.status === 'unbalanced') continue;
    const at = entries.findIndex((e) => Math.abs(e.result.twa - result.twa) < 1e-9);
    if (at >= 0) entries[at] = { result, best: true };
    else entries.push({ result, best: true });
  }
  entries.sort((a, b) => a.result.twa - b.result.twa);
  const rows = entries.map(({ result, best }) => {
    const f = figures(result);
    const head = `<th scope="row">${fixed(f.twaDeg, d.angle)}</th>`;
    if (f.status === 'unbalanced')
      return `<tr>${head}<td class="none" colspan="12">${escapeHtml(`${f.why}: ${oneLine(f.reason)}`)}</td></tr>`;
    const regime = [f.regime, ...(best ? ['best VMG'] : []), ...f.notes.map(oneLine)].join('; ');
    return `<tr${best ? ' class="best"' : ''}>${head}${[
      td(fixed(f.speedKn, d.speed)),
      td(fixed(f.vmgKn, d.speed)),
      td(fixed(f.awsKn, d.speed)),
      td(fixed(f.awaDeg, d.angle)),
      td(fixed(f.heelDeg, d.angle)),
      td(fixed(f.leewayDeg, d.angle)),
      td(fixed(f.rudderDeg, d.angle)),
      td(fixed(f.ease, d.share)),
      td(fixed(f.crewShare, d.share)),
      td(fixed(f.boardDown, d.share)),
      td(regime, 'text'),
      td(oneLine(f.sailSet), 'text'),
    ].join('')}</tr>`;
  });
  const tws = fixed(figures(polar.bestUp[i]!).twsKn, 1);
  let fastest: StateFigures | undefined;
  let without = 0;
  for (const { result } of entries) {
    const f = figures(result);
    if (f.status === 'unbalanced') without++;
    else if (fastest === undefined || f.speedKn > fastest.speedKn) fastest = f;
  }
  const summary =
    (fastest === undefined
      ? 'no balanced state'
      : `fastest ${fixed(fastest.speedKn, d.speed)} kn at ${fixed(fastest.twaDeg, 0)}°`) +
    (without > 0 ? `; ${without} ${without === 1 ? 'angle' : 'angles'} without a balanced state` : '');
  return `<details${i === 0 ? ' open' : ''}><summary><b>${tws} kn</b> <span class="soft">${escapeHtml(summary)}</span></summary>${scrolling(
    `All states in ${tws} kn of wind`,
    `<table class="states"><thead><tr>${FULL_HEADS.join('')}</tr></thead><tbody>${rows.join('')}</tbody></table>`,
  )}</details>`;
}

/** Quantities of the glance, by the names they bear in the description. */
const GLANCE = [
  'displacement with crew',
  'waterline length',
  'waterline beam',
  'draft',
  'prismatic coefficient',
  'length over cube root of volume',
  'metacentric height GM',
  'can plane',
] as const;

/** Warnings first, then the few figures by which people know a boat. */
function glanceHtml(report: PolarReport): string {
  const { boat } = report;
  const warnings =
    boat.warnings.length === 0
      ? '<p>Every figure lies within the ranges of the methods used.</p>'
      : `<p><b>Outside the range of a method:</b></p><ul>${boat.warnings.map((w) => `<li>${escapeHtml(warningText(w))}</li>`).join('')}</ul>`;
  const rows = [
    ...GLANCE.map((q) => boat.description.find((r) => r.quantity === q)),
    ...boat.description.filter((r) => r.section === 'sails' && /^set .*: area$/.test(r.quantity)),
  ].filter((r) => r !== undefined);
  const facts = rows
    .map(
      (r) =>
        `<dt>${escapeHtml(oneLine(r.quantity))}</dt><dd>${escapeHtml(typeof r.value === 'number' ? significant(r.value) : oneLine(r.value))} ${escapeHtml(r.unit)}</dd>`,
    )
    .join('');
  return `${warnings}\n<dl class="facts">${facts}</dl>`;
}

function boatHtml(report: PolarReport): string {
  const { boat } = report;
  const sections = [...new Set(boat.description.map((r) => r.section))].map((section) => {
    const rows = boat.description
      .filter((r) => r.section === section)
      .map((r) => {
        const value = typeof r.value === 'number' ? significant(r.value) : oneLine(r.value);
        return `<tr>${td(oneLine(r.quantity), 'text wide')}${td(value)}${td(r.unit, 'text')}</tr>`;
      })
      .join('');
    return scrolling(
      `Quantities: ${oneLine(section)}`,
      `<table><caption>${escapeHtml(oneLine(section))}</caption><thead><tr>${th('quantity', '', true)}${th('value')}${th('unit', '', true)}</tr></thead><tbody>${rows}</tbody></table>`,
    );
  });
  const estimates = boat.estimates
    .map(
      (e) =>
        `<tr>${td(e.key, 'text')}${td(oneLine(e.value), 'text')}${td(oneLine(e.rule), 'text wide')}</tr>`,
    )
    .join('');
  const warnings = boat.warnings
    .map(
      (w) =>
        `<tr>${td(w.parameter, 'text')}${td(significant(w.value))}${td(`${significant(w.range[0])} to ${significant(w.range[1])}`)}${td(w.method, 'text wide')}${td(w.treatment, 'text wide')}</tr>`,
    )
    .join('');
  const none = (text: string): string => `<p class="soft">${escapeHtml(text)}</p>`;
  return [
    `<h3>Worked out from the boat file</h3><div id="quantities">${sections.join('')}</div>`,
    '<h3>Estimated, for want of a value in the file</h3>',
    estimates === ''
      ? none('Nothing: the file gives every value.')
      : scrolling(
          'Estimates',
          `<table id="estimates"><thead><tr>${th('key', '', true)}${th('value', '', true)}${th('rule', '', true)}</tr></thead><tbody>${estimates}</tbody></table>`,
        ),
    '<h3>Outside the range of a published method</h3>',
    warnings === ''
      ? none('Nothing: all parameters lie within the ranges of the methods used.')
      : scrolling(
          'Warnings',
          `<table id="warnings"><thead><tr>${th('parameter', '', true)}${th('value')}${th('range')}${th('method', '', true)}${th('what was done', '', true)}</tr></thead><tbody>${warnings}</tbody></table>`,
        ),
  ].join('\n');
}

let plotly: string | undefined;

/** The plotting library's text, read once, fit to stand in a script element. */
function plotlySource(): string {
  plotly ??= inlineScript(
    readFileSync(createRequire(import.meta.url).resolve('plotly.js-dist-min'), 'utf8').replace(
      /^\/\/# sourceMappingURL=.*$/m,
      '',
    ),
  );
  return plotly;
}

const sha256 = (script: string): string => `'sha256-${createHash('sha256').update(script).digest('base64')}'`;

/**
 * A page that needs nothing beside itself: polar diagram, targets, every state, the boat's quantities, how far to
 * trust it all, and where it comes from. Its content policy lets it run its own scripts and reach no network.
 * @param decimals of speeds; angles carry one less
 */
export function polarPage(report: PolarReport, decimals = 2): string {
  const d = decimalsFor(decimals);
  const { polar, boat } = report;
  const library = plotlySource();
  const script = inlineScript(PAGE_SCRIPT);
  const name = escapeHtml(oneLine(boat.name));
  const note = oneLine(boat.note);
  const height = significant(polar.windHeight, 3);
  const sails = sailChartsHtml(report.sails);
  return `${pageHead(`${oneLine(boat.name)}: predicted speeds`, `${PAGE_STYLE}${seriesStyle()}`, `${sha256(library)} ${sha256(script)}`)}
<body>
<div class="page">
<header>
<h1>${name}</h1>
<p>Predicted speeds in true winds of ${escapeHtml(polar.tws.map((_, i) => fixed(figures(polar.bestUp[i]!).twsKn, 1).replace(/\.0$/, '')).join(', '))} kn at ${height} m above flat water.</p>
${note === '' ? '' : `<p class="soft note">${escapeHtml(note)}</p>`}
<nav aria-label="Parts of this page"><a href="#glance">at a glance</a><a href="#diagram">diagram</a><a href="#targets">best VMG</a><a href="#states">all states</a>${polar.sets.length > 1 ? '<a href="#crossover">which sails when</a>' : ''}<a href="#balance">forces</a><a href="#righting-moment">righting moment</a><a href="#sails">sails</a><a href="#resistance">resistance</a><a href="#boat">the boat</a><a href="#trust">how far to trust it</a><a href="#methods">methods</a><a href="#cautions">cautions</a></nav>
</header>
<main>
<section id="glance" aria-labelledby="glance-title">
<h2 id="glance-title">At a glance</h2>
${glanceHtml(report)}
</section>
<div class="pair">
<section id="diagram" aria-labelledby="diagram-title">
<h2 id="diagram-title">Polar diagram</h2>
<p class="soft">Boat speed in knots outward, true wind angle from the course around; diamonds mark best VMG. Each line bears its true wind speed where it ends. Gaps are angles without a balanced state. Dots: crew full out; open circles: easing; open squares: reefed; open triangles: at the accepted heel.</p>
<div id="polar" role="figure" aria-label="Polar diagram: boat speed over true wind angle, one line for each wind speed. The tables on this page hold the same figures."></div>
<noscript><p>The diagram needs scripts; the tables hold the same figures.</p></noscript>
</section>
<section id="targets" aria-labelledby="targets-title">
<h2 id="targets-title">Best VMG</h2>
${targetHtml('To windward', polar.bestUp, d)}
${targetHtml('To leeward', polar.bestDown, d)}
${targetHtml('Fastest angle', polar.fastest, d)}
<h3>How to read it</h3>
<dl>
<dt>TWS, TWA</dt><dd>true wind speed, and angle from the course through the water</dd>
<dt>AWS, AWA</dt><dd>apparent wind at ${height} m: speed, and angle from the heading (past 180 by the lee)</dd>
<dt>VMG</dt><dd>speed made good straight to windward, or to leeward</dd>
<dt>ease</dt><dd>share of the sails' full heeling moment given up: 0 is full power</dd>
<dt>crew</dt><dd>the crew's arm as a share of fully out; below 0 to leeward</dd>
<dt>regime</dt><dd>what holds the boat up, or limits her: the crew's place, easing, or the accepted heel</dd>
</dl>
</section>
</div>
<section id="states" aria-labelledby="states-title">
<h2 id="states-title">All states, by wind speed</h2>
${polar.tws.map((_, i) => fullTable(report, i, d)).join('\n')}
</section>
${
  polar.sets.length > 1
    ? `<section id="crossover" aria-labelledby="crossover-title">
<h2 id="crossover-title">Which sails when</h2>
${crossoverHtml(polar)}
</section>`
    : ''
}
<section id="balance" aria-labelledby="balance-title">
<h2 id="balance-title">Balance of forces</h2>
${report.balances.map((b, i) => balanceHtml(b, `balance-${i}`)).join('\n')}
</section>
<section id="righting-moment" aria-labelledby="righting-title">
<h2 id="righting-title">Righting moment</h2>
${rightingHtml(report.righting)}
</section>
<section id="sails" aria-labelledby="sails-title">
<h2 id="sails-title">The sails</h2>
<p class="soft">Coefficients on each set's own area, upright, at full power, by apparent wind angle.</p>
${sails.coefficients}
${sails.loadings}
</section>
<section id="resistance" aria-labelledby="resistance-title">
<h2 id="resistance-title">Resistance of the hull</h2>
${resistanceHtml(report.resistance)}
</section>
<section id="boat" aria-labelledby="boat-title">
<h2 id="boat-title">The boat</h2>
${boatHtml(report)}
</section>
<div class="pair">
<section id="trust" aria-labelledby="trust-title">
<h2 id="trust-title">How far to trust it</h2>
<table class="narrow"><caption>Error to expect without calibration</caption><thead><tr>${th('where', '', true)}${th('share of boat speed')}</tr></thead><tbody>${ERROR_BANDS.map((b) => `<tr>${td(b.where, 'text wide')}${td(`± ${b.band}`)}</tr>`).join('')}</tbody></table>
<p class="soft">${escapeHtml(ERROR_BANDS_SOURCE)}</p>
${bandsHtml(report)}
</section>
<section id="cautions" class="cautions" aria-labelledby="cautions-title">
<h2 id="cautions-title">Cautions</h2>
<ul>${CAUTIONS.map((c) => `<li>${escapeHtml(c)}</li>`).join('')}</ul>
</section>
</div>
<section id="methods" aria-labelledby="methods-title">
<h2 id="methods-title">Methods and sources</h2>
${scrolling('Methods and sources', `<table><thead><tr>${th('part', '', true)}${th('method', '', true)}${th('source', '', true)}</tr></thead><tbody>${METHODS.map((m) => `<tr>${td(m.part, 'text')}${td(m.method, 'text wide')}${td(m.source, 'text wide')}</tr>`).join('')}</tbody></table>`)}
</section>
</main>
<footer>Written by polarwright. The page needs no network.</footer>
</div>
<script type="application/json" id="polar-data">${scriptJson(diagramData(report, d))}</script>
<script>${library}</script>
<script>${script}</script>
</body>
</html>
`;
}
