import type { Polar } from '../polar/index.js';
import { toKnots } from '../units/index.js';
import { escapeHtml } from './escape.js';
import { axisSteps } from './line-chart.js';
import { fixed } from './numbers.js';

const RADIUS = 210;
const SIDE = 250;
const TOP = 24;

/** Balanced states of one wind as points of a half diagram, rising in angle. */
function curve(polar: Polar, i: number): { twa: number; kn: number }[] {
  const states = [...polar.results[i]!, polar.bestUp[i]!, polar.bestDown[i]!];
  return states
    .flatMap((r) => (r.status === 'balanced' ? [{ twa: r.twa, kn: toKnots(r.speed) }] : []))
    .sort((a, b) => a.twa - b.twa);
}

/**
 * Two polars in one diagram as inline SVG: one to the right, the other to the left, and its outline thinly over the
 * right half, so that they can be laid against each other.
 */
export function halfPolarsSvg(
  right: Polar,
  left: Polar,
  rightName: string,
  leftName: string,
  id: string,
): string {
  const all = [right, left].flatMap((p) => p.tws.flatMap((_, i) => curve(p, i).map((q) => q.kn)));
  const top = Math.max(1, ...all);
  const n = (v: number): string => fixed(v, 1);
  const at = (twa: number, kn: number, side: number): string =>
    `${n(SIDE + (side * RADIUS * kn * Math.sin(twa)) / top)} ${n(TOP + RADIUS - (RADIUS * kn * Math.cos(twa)) / top)}`;
  const parts: string[] = [];
  for (const kn of axisSteps(0, top, 5).slice(1)) {
    const r = (RADIUS * kn) / top;
    parts.push(
      `<circle class="chart-grid" fill="none" cx="${SIDE}" cy="${TOP + RADIUS}" r="${n(r)}"/>`,
      `<text class="chart-text" x="${SIDE + 4}" y="${n(TOP + RADIUS - r - 3)}">${Number(kn.toPrecision(6))}</text>`,
    );
  }
  for (let deg = 30; deg <= 150; deg += 30) {
    const a = (deg * Math.PI) / 180;
    for (const side of [1, -1])
      parts.push(`<path class="chart-grid" d="M${SIDE} ${TOP + RADIUS}L${at(a, top, side)}"/>`);
  }
  parts.push(`<path class="chart-axis" d="M${SIDE} ${TOP}L${SIDE} ${TOP + 2 * RADIUS}"/>`);
  const draw = (polar: Polar, side: number, width: number, name: string): void => {
    polar.tws.forEach((v, i) => {
      const points = curve(polar, i);
      if (points.length < 2) return;
      const path = points.map((p, k) => `${k === 0 ? 'M' : 'L'}${at(p.twa, p.kn, side)}`).join('');
      const dash = i % 2 === 1 ? ' stroke-dasharray="7 3"' : '';
      parts.push(
        `<path class="chart-line s${i % 9}" d="${path}" stroke-width="${width}"${dash}><title>${escapeHtml(`${name}, ${fixed(toKnots(v), 1)} kn`)}</title></path>`,
      );
    });
  };
  draw(left, -1, 2.2, leftName);
  draw(right, 1, 2.2, rightName);
  draw(left, 1, 0.8, leftName);
  const legend = right.tws
    .map(
      (v, i) =>
        `<li><svg class="chart-key" viewBox="0 0 30 8" aria-hidden="true"><path class="chart-line s${i % 9}" d="M0 4L30 4" stroke-width="2.2"${i % 2 === 1 ? ' stroke-dasharray="7 3"' : ''}/></svg>${fixed(toKnots(v), 1)} kn</li>`,
    )
    .join('');
  const title = `${leftName} (left, and thin on the right) and ${rightName} (right)`;
  return `<figure class="chart"><figcaption>${escapeHtml(title)}</figcaption>
<svg viewBox="0 0 ${2 * SIDE} ${2 * RADIUS + 2 * TOP}" role="img" aria-labelledby="${id}-t ${id}-d"><title id="${id}-t">${escapeHtml(title)}</title><desc id="${id}-d">Polar diagrams in ${right.tws.length} winds, up to ${fixed(top, 1)} knots; the figures are in the tables.</desc>
${parts.join('\n')}
</svg><ul class="chart-legend">${legend}</ul></figure>`;
}
