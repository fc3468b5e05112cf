import { escapeHtml } from './escape.js';
import { fixed } from './numbers.js';

/** One line of a chart. */
export interface ChartLine {
  readonly name: string;
  readonly x: readonly number[];
  readonly y: readonly number[];
  /** Number of the line's colour in the page's style (0 to 8), and its dash pattern. */
  readonly colour: number;
  readonly dash?: string;
  readonly width?: number;
}

/** A chart of lines as inline SVG, in the page's own colours (so that themes and print apply). */
export interface LineChart {
  readonly title: string;
  /** What a reader who cannot see the chart should know. */
  readonly description: string;
  readonly xLabel: string;
  readonly yLabel: string;
  readonly lines: readonly ChartLine[];
  /** Ranges of x that are shaded, each with words for its legend. */
  readonly shades?: readonly { readonly from: number; readonly to: number; readonly words: string }[];
  /** Single marks on the chart. */
  readonly marks?: readonly { readonly x: number; readonly y: number; readonly words: string }[];
  readonly yFrom?: number;
  /** Same scale along both axes: for drawings. The height follows. */
  readonly equal?: boolean;
}

const WIDTH = 560;
const HEIGHT = 380;
const LEFT = 58;
const RIGHT = 14;
const TOP = 12;
const BOTTOM = 46;

/** Round steps of an axis: 1, 2 or 5 times a power of ten, about `most` of them. */
export function axisSteps(from: number, to: number, most: number): number[] {
  const span = to - from;
  if (!(span > 0)) return [from];
  const raw = span / most;
  const power = 10 ** Math.floor(Math.log10(raw));
  const step = [1, 2, 5, 10].map((f) => f * power).find((s) => s >= raw * 0.999)!;
  const out: number[] = [];
  for (let k = Math.ceil(from / step - 1e-9); k * step <= to + 1e-9 * span; k++) out.push(k * step);
  return out;
}

/** Text of a chart: it scales with its container and carries a title and a description for screen readers. */
export function lineChartSvg(c: LineChart, id: string): string {
  const xs = c.lines.flatMap((l) => l.x);
  const ys = [...c.lines.flatMap((l) => l.y), ...(c.marks ?? []).map((m) => m.y)].filter(Number.isFinite);
  const x0 = Math.min(0, ...xs);
  const x1 = Math.max(x0 + 1e-9, ...xs);
  const y0 = c.yFrom ?? Math.min(0, ...ys);
  const most = Math.max(...ys);
  const y1 = most + Math.max(1e-9, 0.04 * Math.max(Math.abs(most), most - y0));
  const height = c.equal ? TOP + BOTTOM + ((y1 - y0) / (x1 - x0)) * (WIDTH - LEFT - RIGHT) : HEIGHT;
  const px = (v: number): number => LEFT + ((v - x0) / (x1 - x0)) * (WIDTH - LEFT - RIGHT);
  const py = (v: number): number => height - BOTTOM - ((v - y0) / (y1 - y0)) * (height - BOTTOM - TOP);
  const n = (v: number): string => fixed(v, 1);
  const parts: string[] = [];
  for (const s of c.shades ?? []) {
    const a = Math.max(x0, s.from);
    const b = Math.min(x1, s.to);
    if (b > a) {
      parts.push(
        `<rect class="chart-shade" x="${n(px(a))}" y="${TOP}" width="${n(px(b) - px(a))}" height="${height - TOP - BOTTOM}"><title>${escapeHtml(s.words)}</title></rect>`,
      );
    }
  }
  const number = (v: number): string => String(Number(v.toPrecision(6)));
  for (const v of axisSteps(x0, x1, 9)) {
    parts.push(
      `<line class="chart-grid" x1="${n(px(v))}" x2="${n(px(v))}" y1="${TOP}" y2="${height - BOTTOM}"/>`,
      `<text class="chart-text" x="${n(px(v))}" y="${height - BOTTOM + 16}" text-anchor="middle">${number(v)}</text>`,
    );
  }
  for (const v of axisSteps(y0, y1, c.equal ? Math.max(2, Math.round(height / 50)) : 7)) {
    parts.push(
      `<line class="chart-grid" x1="${LEFT}" x2="${WIDTH - RIGHT}" y1="${n(py(v))}" y2="${n(py(v))}"/>`,
      `<text class="chart-text" x="${LEFT - 6}" y="${n(py(v) + 4)}" text-anchor="end">${number(v)}</text>`,
    );
  }
  for (const l of c.lines) {
    const points: string[] = [];
    let pen = false;
    for (let i = 0; i < l.x.length; i++) {
      if (!Number.isFinite(l.y[i]!)) {
        pen = false;
        continue;
      }
      points.push(`${pen ? 'L' : 'M'}${n(px(l.x[i]!))} ${n(py(l.y[i]!))}`);
      pen = true;
    }
    parts.push(
      `<path class="chart-line s${l.colour}" d="${points.join('')}" stroke-width="${l.width ?? 2}"${l.dash ? ` stroke-dasharray="${l.dash}"` : ''}><title>${escapeHtml(l.name)}</title></path>`,
    );
  }
  for (const m of c.marks ?? []) {
    parts.push(
      `<circle class="chart-mark" cx="${n(px(m.x))}" cy="${n(py(m.y))}" r="4"><title>${escapeHtml(m.words)}</title></circle>`,
    );
  }
  const legend = c.lines
    .map(
      (l) =>
        `<li><svg class="chart-key" viewBox="0 0 30 8" aria-hidden="true"><path class="chart-line s${l.colour}" d="M0 4L30 4" stroke-width="${l.width ?? 2}"${l.dash ? ` stroke-dasharray="${l.dash}"` : ''}/></svg>${escapeHtml(l.name)}</li>`,
    )
    .concat(
      (c.shades ?? []).map(
        (s) =>
          `<li><svg class="chart-key" viewBox="0 0 30 8" aria-hidden="true"><rect class="chart-shade" width="30" height="8"/></svg>${escapeHtml(s.words)}</li>`,
      ),
    )
    .join('');
  return `<figure class="chart"><figcaption>${escapeHtml(c.title)}</figcaption>
<svg viewBox="0 0 ${WIDTH} ${height}" role="img" aria-labelledby="${id}-t ${id}-d"><title id="${id}-t">${escapeHtml(c.title)}</title><desc id="${id}-d">${escapeHtml(c.description)}</desc>
${parts.join('\n')}
<line class="chart-axis" x1="${LEFT}" x2="${WIDTH - RIGHT}" y1="${n(py(Math.max(y0, Math.min(0, y1))))}" y2="${n(py(Math.max(y0, Math.min(0, y1))))}"/>
<text class="chart-text" x="${(LEFT + WIDTH - RIGHT) / 2}" y="${height - 8}" text-anchor="middle">${escapeHtml(c.xLabel)}</text>
<text class="chart-text" transform="translate(14 ${(height - BOTTOM + TOP) / 2}) rotate(-90)" text-anchor="middle">${escapeHtml(c.yLabel)}</text>
</svg><ul class="chart-legend">${legend}</ul></figure>`;
}
