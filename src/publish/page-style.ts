/** Style of the report page. Text keeps a contrast of 4.5 or more in both themes. */
export const PAGE_STYLE = `
:root {
  color-scheme: light dark;
  --ground: #f6f5f1; --sheet: #ffffff; --ink: #1b2530; --soft: #51606e; --rule: #d4d7d6; --grid: #dcdfde;
  --accent: #0b5c66; --stripe: #f3f4f1; --warn: #7a4300; --warn-ground: #fdf1df;
}
@media (prefers-color-scheme: dark) {
  :root {
    --ground: #10161c; --sheet: #161d25; --ink: #e7edf2; --soft: #a9b6c2; --rule: #33404c; --grid: #313d48;
    --accent: #7fd0d6; --stripe: #1b242d; --warn: #f3c98b; --warn-ground: #2a2114;
  }
}
* { box-sizing: border-box; }
html { -webkit-text-size-adjust: 100%; text-size-adjust: 100%; }
body {
  margin: 0; background: var(--ground); color: var(--ink);
  font: 16px/1.5 system-ui, -apple-system, "Segoe UI", Roboto, "Noto Sans", sans-serif;
}
.page { max-width: 1280px; margin: 0 auto; padding: 28px 24px 56px; }
header { margin-bottom: 20px; }
h1 { font-size: 1.9rem; line-height: 1.15; margin: 0 0 6px; letter-spacing: -0.01em; overflow-wrap: anywhere; }
h2 { font-size: 1.25rem; margin: 0 0 12px; }
h3 { font-size: 1rem; margin: 24px 0 8px; }
h2 + h3 { margin-top: 0; }
p { margin: 0 0 10px; max-width: 78ch; }
.soft { color: var(--soft); }
.note { overflow-wrap: anywhere; }
nav { display: flex; flex-wrap: wrap; gap: 4px 18px; margin-top: 12px; }
a { color: var(--accent); }
section, .sheet {
  background: var(--sheet); border: 1px solid var(--rule); border-radius: 10px; padding: 20px 22px; margin: 0 0 18px;
}
.pair { align-items: start; display: grid; grid-template-columns: minmax(0, 5fr) minmax(0, 7fr); gap: 18px; align-items: start; }
.pair > section { margin-bottom: 18px; height: 100%; }
#polar { width: 100%; height: 760px; }
.scroll { overflow-x: auto; }
.scroll:focus-visible, summary:focus-visible, a:focus-visible { outline: 2px solid var(--accent); outline-offset: 2px; }
table { border-collapse: collapse; width: 100%; font-size: 0.875rem; font-variant-numeric: tabular-nums; }
caption { text-align: left; font-weight: 600; padding: 0 0 6px; }
th, td { padding: 5px 9px; text-align: right; white-space: nowrap; }
th { font-weight: 600; }
thead th { border-bottom: 1px solid var(--ink); vertical-align: bottom; }
thead th small { display: block; font-weight: 400; color: var(--soft); font-size: 0.75rem; }
tbody tr:nth-child(even) > * { background: var(--stripe); }
tbody th { text-align: right; }
.targets th, .targets td { padding: 5px 6px; font-size: 0.8125rem; }
.targets { margin-bottom: 20px; }
#quantities { display: grid; grid-template-columns: repeat(auto-fit, minmax(min(100%, 440px), 1fr)); gap: 20px 32px; align-items: start; }
.narrow { margin-bottom: 12px; }
.text, thead th.text { text-align: left; }
.wide { white-space: normal; min-width: 14ch; overflow-wrap: anywhere; }
tr.best > * { font-weight: 600; border-top: 1px solid var(--rule); border-bottom: 1px solid var(--rule); }
tr.best .mark { color: var(--accent); }
td.none { text-align: left; color: var(--soft); white-space: normal; min-width: 22ch; }
details { border-top: 1px solid var(--rule); padding: 8px 0; }
details > .scroll { margin-top: 8px; }
summary { cursor: pointer; padding: 4px 0; }
summary b { display: inline-block; min-width: 4.5em; }
dl { margin: 0; display: grid; grid-template-columns: max-content 1fr; gap: 4px 16px; }
dt { font-weight: 600; }
dd { margin: 0; max-width: 70ch; }
dl.facts { display: block; columns: 3 22ch; margin-top: 14px; }
dl.facts dt, dl.facts dd { break-inside: avoid; }
dl.facts dt { break-after: avoid; font-weight: 400; color: var(--soft); }
dl.facts dd { margin-bottom: 6px; }
.cautions { background: var(--warn-ground); border-color: var(--warn); }
.cautions h2 { color: var(--warn); }
.cautions li { margin-bottom: 6px; max-width: 78ch; }
ul { margin: 0; padding-left: 1.2em; }
footer { color: var(--soft); font-size: 0.875rem; }
.charts { display: grid; grid-template-columns: repeat(auto-fit, minmax(min(100%, 380px), 1fr)); gap: 22px; }
.chart { margin: 0; break-inside: avoid; }
.chart figcaption { font-weight: 600; margin-bottom: 6px; }
.chart > svg { width: 100%; height: auto; display: block; }
.chart-line { fill: none; stroke-linejoin: round; }
.chart-grid { stroke: var(--grid); stroke-width: 1; }
.chart-axis { stroke: var(--ink); stroke-width: 1; }
.chart-shade { fill: var(--accent); fill-opacity: 0.09; }
.chart-text { fill: var(--ink); font-size: 13px; }
.cross { fill-opacity: 0.3; }
.chart.wide > svg { max-height: 420px; }
.chart-mark { fill: var(--sheet); stroke: var(--ink); stroke-width: 1.5; }
.chart-key { width: 30px; height: 8px; margin-right: 6px; vertical-align: middle; }
.chart-legend { list-style: none; padding: 0; display: flex; flex-wrap: wrap; gap: 2px 16px; font-size: 0.8125rem; margin-top: 6px; }
@media (max-width: 1120px) {
  .pair { align-items: start; grid-template-columns: minmax(0, 1fr); gap: 0; }
  .pair > section { height: auto; }
}
@media (max-width: 560px) {
  .page { padding: 18px 10px 36px; }
  section { padding: 14px 12px; border-radius: 8px; }
  h1 { font-size: 1.5rem; }
  #polar { height: 620px; }
  th, td { padding: 5px 7px; }
  dl { grid-template-columns: 1fr; gap: 0; }
  dd { margin-bottom: 8px; }
}
@media print {
  :root {
    color-scheme: light;
    --ground: #ffffff; --sheet: #ffffff; --ink: #000000; --soft: #444444; --rule: #bbbbbb; --grid: #cccccc;
    --accent: #000000; --stripe: #f4f4f4; --warn: #000000; --warn-ground: #ffffff;
  }
  body { font-size: 10pt; }
  .page { max-width: none; padding: 0; }
  nav { display: none; }
  section { border: 0; padding: 0; margin: 0 0 14pt; border-radius: 0; }
  .pair { align-items: start; display: block; }
  .scroll { overflow: visible; }
  table { font-size: 8pt; }
  th, td { padding: 2px 5px; }
  thead { display: table-header-group; }
  tr, #polar { break-inside: avoid; }
  h2, h3, summary, caption { break-after: avoid; }
  #polar { height: 720px; width: 480px; }
  .pair > section { height: auto; }
  .targets, .narrow, .cautions { break-inside: avoid; }
}
`;
