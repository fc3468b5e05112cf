import { escapeHtml } from './escape.js';
import { axisSteps } from './line-chart.js';
import { fixed } from './numbers.js';

export interface TornadoBar {
  readonly name: string;
  /** Effect of less and of more of it; NaN where there is none to show. */
  readonly less: number;
  readonly more: number;
}

const WIDTH = 560;
const LEFT = 158;
const RIGHT = 14;
const ROW = 22;
const BOTTOM = 44;

/** Bars to either side of zero, the widest on top, as inline SVG. More of a quantity is filled, less of it is hollow. */
export function tornadoSvg(title: string, bars: readonly TornadoBar[], step: string, id: string): string {
  const reach = (b: TornadoBar): number =>
    Math.max(0, ...[b.less, b.more].filter(Number.isFinite).map(Math.abs));
  const rows = [...bars].sort((a, b) => reach(b) - reach(a));
  const most = Math.max(0.1, ...rows.map(reach)) * 1.05;
  const height = rows.length * ROW + BOTTOM + 6;
  const n = (v: number): string => fixed(v, 1);
  const px = (v: number): number => LEFT + ((v + most) / (2 * most)) * (WIDTH - LEFT - RIGHT);
  const parts: string[] = [];
  for (const v of axisSteps(-most, most, 6))
    parts.push(
      `<line class="chart-grid" x1="${n(px(v))}" x2="${n(px(v))}" y1="4" y2="${height - BOTTOM}"/>`,
      `<text class="chart-text" x="${n(px(v))}" y="${height - BOTTOM + 16}" text-anchor="middle">${Number(v.toPrecision(6))}</text>`,
    );
  rows.forEach((b, i) => {
    const y = 6 + i * ROW;
    parts.push(
      `<text class="chart-text" x="${LEFT - 8}" y="${y + 14}" text-anchor="end">${escapeHtml(b.name)}</text>`,
    );
    // Both may lie on one side of zero: half a row each.
    for (const [which, v, place] of [
      ['less', b.less, 0],
      ['more', b.more, 1],
    ] as const) {
      if (!Number.isFinite(v)) continue;
      const [a, z] = [Math.min(px(0), px(v)), Math.max(px(0), px(v))];
      const style =
        which === 'more' ? 'fill:var(--accent);stroke:var(--accent)' : 'fill:none;stroke:var(--accent)';
      parts.push(
        `<rect style="${style}" x="${n(a)}" y="${y + 2 + place * 8}" width="${n(Math.max(0.5, z - a))}" height="7"><title>${escapeHtml(`${b.name} ${which === 'more' ? '+' : '-'}${step}: ${fixed(v, 1)} s/nmi`)}</title></rect>`,
      );
    }
  });
  parts.push(`<line class="chart-axis" x1="${n(px(0))}" x2="${n(px(0))}" y1="4" y2="${height - BOTTOM}"/>`);
  return `<figure class="chart"><figcaption>${escapeHtml(title)}</figcaption>
<svg viewBox="0 0 ${WIDTH} ${height}" role="img" aria-labelledby="${id}-t ${id}-d"><title id="${id}-t">${escapeHtml(title)}</title><desc id="${id}-d">Change of the time for less and more of ${rows.length} quantities; the figures are in the table.</desc>
${parts.join('\n')}
<text class="chart-text" x="${(LEFT + WIDTH - RIGHT) / 2}" y="${height - 8}" text-anchor="middle">s/nmi; filled: +${step}, hollow: -${step}</text>
</svg></figure>`;
}
