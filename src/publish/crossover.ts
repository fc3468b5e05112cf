import { crossover, type Polar } from '../polar/index.js';
import { degrees, toKnots } from '../units/index.js';
import { csvText } from './csv.js';
import { escapeHtml } from './escape.js';
import { fixed } from './numbers.js';
import { oneLine } from './plain-text.js';

/** Letter that stands for the k-th sail set in the chart. */
const letter = (k: number): string => String.fromCharCode(65 + (k % 26));
/** A loss above this share is shown as a number of its own; below it the sets are as good as equal. */
const EVEN = 0.005;

/** Speed with every sail set, and what is lost by the slower ones, as CSV. */
export function crossoverCsv(polar: Polar, decimals = 3): string {
  const lines = ['tws_kn,twa_deg,fastest,sails,boat_speed_kn,lost_percent'];
  crossover(polar).forEach((row, i) => {
    row.forEach((cell, j) => {
      polar.sets.forEach((set, k) => {
        const v = set.speed[i]![j]!;
        lines.push(
          [
            fixed(toKnots(polar.tws[i]!), decimals),
            fixed(degrees(polar.twa[j]!), 2),
            k === cell.fastest ? 'yes' : 'no',
            csvText(set.name),
            Number.isNaN(v) ? '' : fixed(toKnots(v), decimals),
            Number.isNaN(v) ? '' : fixed(100 * cell.lost[k]!, 2),
          ].join(','),
        );
      });
    });
  });
  return `${lines.join('\r\n')}\r\n`;
}

const CELL = { width: 30, height: 26, left: 62, top: 8, bottom: 40 } as const;

/** Which sail set is fastest at each wind and angle, as a chart of letters and colours, with a table of losses behind it. */
export function crossoverHtml(polar: Polar): string {
  const cells = crossover(polar);
  const order = polar.twa.map((_, j) => j).sort((a, b) => polar.twa[a]! - polar.twa[b]!);
  const width = CELL.left + order.length * CELL.width + 10;
  const height = CELL.top + polar.tws.length * CELL.height + CELL.bottom;
  const parts: string[] = [];
  const kn = (v: number): string => fixed(toKnots(v), 1).replace(/\.0$/, '');
  polar.tws.forEach((tws, i) => {
    const y = CELL.top + (polar.tws.length - 1 - i) * CELL.height;
    parts.push(
      `<text class="chart-text" x="${CELL.left - 8}" y="${y + CELL.height / 2 + 5}" text-anchor="end">${kn(tws)} kn</text>`,
    );
    order.forEach((j, n) => {
      const { fastest, lost } = cells[i]![j]!;
      if (fastest < 0) return;
      const x = CELL.left + n * CELL.width;
      const others = lost
        .map((l, k) =>
          k === fastest || Number.isNaN(l)
            ? ''
            : `${oneLine(polar.sets[k]!.name)} ${fixed(100 * l, 1)} % slower`,
        )
        .filter((t) => t !== '')
        .join('; ');
      const even = lost.some((l, k) => k !== fastest && l < EVEN);
      parts.push(
        `<g><title>${escapeHtml(`${kn(tws)} kn, ${fixed(degrees(polar.twa[j]!), 0)} deg: ${oneLine(polar.sets[fastest]!.name)}${others === '' ? '' : `; ${others}`}`)}</title><rect class="cross c${fastest % 9}" x="${x}" y="${y}" width="${CELL.width - 1}" height="${CELL.height - 1}"/><text class="chart-text" x="${x + CELL.width / 2}" y="${y + CELL.height / 2 + 5}" text-anchor="middle">${letter(fastest)}${even ? '=' : ''}</text></g>`,
      );
    });
  });
  order.forEach((j, n) => {
    if (n % 3 !== 0) return;
    parts.push(
      `<text class="chart-text" x="${CELL.left + (n + 0.5) * CELL.width}" y="${height - CELL.bottom + 16}" text-anchor="middle">${fixed(degrees(polar.twa[j]!), 0)}</text>`,
    );
  });
  const used = polar.sets
    .map((s, k) => ({ s, k }))
    .filter(({ k }) => cells.some((row) => row.some((c) => c.fastest === k)));
  const legend = used
    .map(
      ({ s, k }) =>
        `<li><svg class="chart-key" viewBox="0 0 30 8" aria-hidden="true"><rect class="cross c${k % 9}" width="30" height="8"/></svg>${letter(k)}: ${escapeHtml(oneLine(s.name))}</li>`,
    )
    .join('');
  const never = polar.sets.filter((_, k) => !used.some((u) => u.k === k)).map((s) => oneLine(s.name));
  const head = order.map((j) => `<th scope="col">${fixed(degrees(polar.twa[j]!), 0)}</th>`).join('');
  const rows = polar.tws
    .map(
      (tws, i) =>
        `<tr><th scope="row">${kn(tws)}</th>${order
          .map((j) => {
            const { fastest, lost } = cells[i]![j]!;
            if (fastest < 0) return '<td>-</td>';
            const next = Math.min(...lost.filter((l, k) => k !== fastest && !Number.isNaN(l)));
            return `<td>${letter(fastest)}${Number.isFinite(next) ? `<small>${fixed(100 * next, 1)}</small>` : ''}</td>`;
          })
          .join('')}</tr>`,
    )
    .join('');
  const caption =
    'Fastest sail set by wind (kn) and true wind angle (deg), and per cent of speed lost with the next best';
  return `<figure class="chart wide"><figcaption>Fastest sail set</figcaption>
<svg viewBox="0 0 ${width} ${height}" role="img" aria-labelledby="cross-t cross-d"><title id="cross-t">Fastest sail set</title><desc id="cross-d">A letter for the fastest sail set at each true wind speed and angle; an equals sign where another is within half a per cent.</desc>
${parts.join('\n')}
<text class="chart-text" x="${(CELL.left + width) / 2}" y="${height - 6}" text-anchor="middle">true wind angle, deg</text>
</svg><ul class="chart-legend">${legend}</ul></figure>
<p class="soft">An equals sign marks cells where another set is within half a per cent.${never.length > 0 ? ` Never the fastest: ${escapeHtml(never.join(', '))}.` : ''}</p>
<details><summary>What the next best set would cost</summary><div class="scroll" tabindex="0" role="region" aria-label="${escapeHtml(caption)}"><table><caption>${escapeHtml(caption)}</caption><thead><tr><th scope="col">TWS</th>${head}</tr></thead><tbody>${rows}</tbody></table></div></details>`;
}
