import type { Lines } from '../../src/hull/index.js';

/** A hull's lines in the forms designers hand over. Places aft of the fore end of the waterline of length lwl. */

export function asOffsets(lines: Lines, lwl: number): string {
  const rows = ['aft_of_stem,half_breadth,height'];
  for (const s of lines.stations) rows.push(...s.y.map((y, i) => `${0.5 * lwl - s.x},${y},${s.z[i]}`));
  return `${rows.join('\n')}\n`;
}

/** Both sides, quadrilaterals; x forward, z up, `scale` units to a metre. */
export function asObj(lines: Lines, scale = 1): string {
  const out: string[] = ['o hull'];
  const m = lines.stations[0]!.y.length;
  for (const side of [1, -1])
    for (const s of lines.stations)
      out.push(...s.y.map((y, i) => `v ${s.x * scale} ${side * y * scale} ${s.z[i]! * scale}`));
  const half = lines.stations.length * m;
  for (let a = 0; a + 1 < lines.stations.length; a++)
    for (let i = 0; i + 1 < m; i++) {
      const p = a * m + i + 1;
      const q = p + m;
      out.push(`f ${p} ${p + 1} ${q + 1} ${q}`, `f ${half + p} ${half + q} ${half + q + 1} ${half + p + 1}`);
    }
  return `${out.join('\n')}\n`;
}

/** One side only, triangles. */
export function triangles(lines: Lines): [number, number, number][] {
  const out: [number, number, number][] = [];
  for (let a = 0; a + 1 < lines.stations.length; a++) {
    const [s, t] = [lines.stations[a]!, lines.stations[a + 1]!];
    const corner = (q: typeof s, i: number): [number, number, number] => [q.x, q.y[i]!, q.z[i]!];
    for (let i = 0; i + 1 < s.y.length; i++)
      out.push(
        corner(s, i),
        corner(s, i + 1),
        corner(t, i + 1),
        corner(s, i),
        corner(t, i + 1),
        corner(t, i),
      );
  }
  return out;
}

export function asTextStl(lines: Lines): string {
  const corners = triangles(lines);
  const out = ['solid hull'];
  for (let i = 0; i < corners.length; i += 3) {
    out.push(' facet normal 0 0 0', '  outer loop');
    for (let k = 0; k < 3; k++) out.push(`   vertex ${corners[i + k]!.join(' ')}`);
    out.push('  endloop', ' endfacet');
  }
  return `${[...out, 'endsolid hull'].join('\n')}\n`;
}

export function asBinaryStl(lines: Lines): Uint8Array {
  const corners = triangles(lines);
  const count = corners.length / 3;
  const bytes = new Uint8Array(84 + 50 * count);
  const view = new DataView(bytes.buffer);
  view.setUint32(80, count, true);
  for (let t = 0; t < count; t++)
    for (let k = 0; k < 9; k++)
      view.setFloat32(84 + 50 * t + 12 + 4 * k, corners[3 * t + Math.floor(k / 3)]![k % 3]!, true);
  return bytes;
}

/** A boat file with its main dimensions replaced by lines. */
export function withLines(text: string, lines: string): string {
  return text
    .replace(
      /^ {2}(waterline_length|waterline_beam|beam_overall|canoe_draft|freeboard|prismatic|midship|waterplane|buoyancy_aft_of_stem):.*\n/gm,
      '',
    )
    .replace(/^hull:\n/m, `hull:\n  lines:\n${lines.replace(/^/gm, '    ')}\n`);
}
