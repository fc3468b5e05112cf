import { type FairedLines, inBodyAxes, OffsetsError } from './stations.js';
import type { Station } from './types.js';

/** Triangles, nine numbers each (three corners x, y, z), in the file's own unit and axes. */
export type Triangles = Float64Array;

/** Largest mesh read: far more than a hull needs. */
const MOST_TRIANGLES = 2_000_000;

/** Reads the triangles of an OBJ text; faces of more corners are cut into fans. @throws OffsetsError with the line */
export function readObj(text: string): Triangles {
  const points: number[] = [];
  const out: number[] = [];
  text.split(/\r\n|\n|\r/).forEach((line, i) => {
    const words = line.trim().split(/\s+/);
    if (words[0] === 'v') {
      for (let k = 1; k <= 3; k++) {
        const v = Number(words[k]);
        if (words[k] === undefined || !Number.isFinite(v)) {
          throw new OffsetsError(i + 1, `"${line.trim().slice(0, 40)}" is no point`, 'a point is v x y z');
        }
        points.push(v);
      }
    } else if (words[0] === 'f') {
      const corners = words.slice(1).map((w) => {
        const n = Number(w.split('/')[0]);
        const at = n < 0 ? points.length / 3 + n : n - 1;
        if (!Number.isInteger(n) || at < 0 || at >= points.length / 3) {
          throw new OffsetsError(
            i + 1,
            `a face names point ${w.slice(0, 20)}, of ${points.length / 3} so far`,
            'is the file whole?',
          );
        }
        return at;
      });
      if (corners.length < 3)
        throw new OffsetsError(i + 1, 'a face has fewer than three corners', 'is the file whole?');
      for (let k = 1; k + 1 < corners.length; k++) {
        for (const c of [corners[0]!, corners[k]!, corners[k + 1]!]) {
          out.push(points[3 * c]!, points[3 * c + 1]!, points[3 * c + 2]!);
        }
      }
      if (out.length > 9 * MOST_TRIANGLES)
        throw new OffsetsError(i + 1, 'the mesh has too many triangles', 'coarsen it');
    }
  });
  if (out.length === 0)
    throw new OffsetsError(0, 'the file has no faces', 'export the hull as polygons, not as curves');
  return Float64Array.from(out);
}

/** Reads the triangles of an STL file, text or binary. @throws OffsetsError */
export function readStl(bytes: Uint8Array): Triangles {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const count = bytes.byteLength >= 84 ? view.getUint32(80, true) : -1;
  if (count >= 0 && bytes.byteLength === 84 + 50 * count) {
    if (count === 0 || count > MOST_TRIANGLES) {
      throw new OffsetsError(
        0,
        `the mesh has ${count} triangles; 1 to ${MOST_TRIANGLES} are read`,
        'export it anew',
      );
    }
    const out = new Float64Array(9 * count);
    for (let t = 0; t < count; t++) {
      for (let k = 0; k < 9; k++) {
        const v = view.getFloat32(84 + 50 * t + 12 + 4 * k, true);
        if (!Number.isFinite(v))
          throw new OffsetsError(t + 1, 'a corner is not a finite number', 'export it anew');
        out[9 * t + k] = v;
      }
    }
    return out;
  }
  const text = new TextDecoder().decode(bytes);
  if (!/^\s*solid\b/.test(text)) {
    throw new OffsetsError(
      0,
      'this is neither a text nor a whole binary STL file',
      'is it cut short, or another format?',
    );
  }
  const out: number[] = [];
  text.split(/\r\n|\n|\r/).forEach((line, i) => {
    const words = line.trim().split(/\s+/);
    if (words[0] !== 'vertex') return;
    for (let k = 1; k <= 3; k++) {
      const v = Number(words[k]);
      if (words[k] === undefined || !Number.isFinite(v)) {
        throw new OffsetsError(
          i + 1,
          `"${line.trim().slice(0, 40)}" is no corner`,
          'a corner is vertex x y z',
        );
      }
      out.push(v);
    }
  });
  if (out.length === 0 || out.length % 9 !== 0) {
    throw new OffsetsError(
      0,
      `${out.length / 3} corners found, which make no whole triangles`,
      'is the file cut short?',
    );
  }
  return Float64Array.from(out);
}

/** A direction of the file's axes. */
export type MeshAxis = 'x' | '-x' | 'y' | '-y' | 'z' | '-z';

export interface MeshPlacement {
  /** Metres in one unit of the file. */
  readonly unit: number;
  readonly forward: MeshAxis;
  readonly up: MeshAxis;
  /** Height of the design waterline on the file's upward axis [m]. */
  readonly waterline: number;
  /** Stations cut through the mesh. */
  readonly stations: number;
}

function axis(a: MeshAxis): { at: number; sign: number } {
  return { at: 'xyz'.indexOf(a.slice(-1)), sign: a.startsWith('-') ? -1 : 1 };
}

/**
 * Cuts a hull's triangles into stations. The mesh may be one side or both, open or with a deck; where both sides are
 * there the side of positive breadth is taken. Small gaps along a section are bridged.
 * @throws OffsetsError when the cuts make no hull
 */
export function linesFromMesh(mesh: Triangles, place: MeshPlacement): FairedLines {
  const f = axis(place.forward);
  const u = axis(place.up);
  if (f.at === u.at) throw new OffsetsError(0, 'forward and up are the same axis', 'name two different axes');
  const sideAt = 3 - f.at - u.at;
  const n = mesh.length / 3;
  const x = new Float64Array(n);
  const y = new Float64Array(n);
  const z = new Float64Array(n);
  let least = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  let right = 0;
  let left = 0;
  for (let i = 0; i < n; i++) {
    x[i] = place.unit * f.sign * mesh[3 * i + f.at]!;
    y[i] = place.unit * mesh[3 * i + sideAt]!;
    z[i] = place.unit * u.sign * mesh[3 * i + u.at]! - place.waterline;
    least = Math.min(least, x[i]!);
    most = Math.max(most, x[i]!);
    right = Math.max(right, y[i]!);
    left = Math.max(left, -y[i]!);
  }
  const length = most - least;
  if (!(length > 0))
    throw new OffsetsError(0, 'the mesh has no length along its forward axis', 'check mesh_forward');
  // One side only: fold it to positive breadths. Both: keep the positive one.
  const fold = right < 0.02 * left ? -1 : 1;
  const both = right > 0.02 * left && left > 0.02 * right;
  const stations: Station[] = [];
  for (let k = 0; k < place.stations; k++) {
    const w = 0.5 * (1 - Math.cos((Math.PI * k) / (place.stations - 1)));
    const at = least + length * (2e-5 + (1 - 4e-5) * w) + 1e-9 * length;
    const pieces: [number, number, number, number][] = [];
    for (let t = 0; t < n; t += 3) {
      const cut: [number, number][] = [];
      for (let e = 0; e < 3; e++) {
        const i = t + e;
        const j = t + ((e + 1) % 3);
        const a = x[i]! - at;
        const b = x[j]! - at;
        if (a < 0 === b < 0) continue;
        const s = a / (a - b);
        cut.push([fold * (y[i]! + s * (y[j]! - y[i]!)), z[i]! + s * (z[j]! - z[i]!)]);
      }
      if (cut.length !== 2) continue;
      const [p, q] = cut as [[number, number], [number, number]];
      const tiny = 1e-7 * length;
      if (both && p[0] < tiny && q[0] < tiny && !(Math.abs(p[0]) < tiny && Math.abs(q[0]) < tiny)) continue;
      pieces.push([p[0], p[1], q[0], q[1]]);
    }
    const section = chain(pieces, 0.05 * length);
    if (section !== undefined) stations.push({ x: at, y: section.y, z: section.z });
  }
  if (stations.length < 5) {
    throw new OffsetsError(
      0,
      `only ${stations.length} cuts through the mesh made a section`,
      'check mesh_forward and mesh_up',
    );
  }
  return inBodyAxes({ stations });
}

/** Joins pieces of a section into one line from the keel up; undefined when there is none. */
function chain(
  pieces: readonly (readonly [number, number, number, number])[],
  reach: number,
): { y: number[]; z: number[] } | undefined {
  if (pieces.length === 0) return undefined;
  let start: [number, number] | undefined;
  for (const [ya, za, yb, zb] of pieces) {
    for (const [py, pz] of [
      [ya, za],
      [yb, zb],
    ] as const) {
      if (start === undefined || pz < start[1] - 1e-9 || (Math.abs(pz - start[1]) <= 1e-9 && py < start[0]))
        start = [py, pz];
    }
  }
  const used = new Uint8Array(pieces.length);
  const y = [Math.max(0, start![0])];
  const z = [start![1]];
  let [ey, ez] = start!;
  for (let step = 0; step < pieces.length; step++) {
    let best = -1;
    let turned = false;
    let gap = reach;
    for (let i = 0; i < pieces.length; i++) {
      if (used[i]) continue;
      const [ya, za, yb, zb] = pieces[i]!;
      const a = Math.hypot(ya - ey, za - ez);
      const b = Math.hypot(yb - ey, zb - ez);
      if (a < gap) {
        gap = a;
        best = i;
        turned = false;
      }
      if (b < gap) {
        gap = b;
        best = i;
        turned = true;
      }
    }
    if (best < 0) break;
    used[best] = 1;
    const [ya, za, yb, zb] = pieces[best]!;
    const far: [number, number] = turned ? [ya, za] : [yb, zb];
    const near: [number, number] = turned ? [yb, zb] : [ya, za];
    for (const [py, pz] of [near, far]) {
      if (Math.hypot(py - ey, pz - ez) < 1e-9) continue;
      y.push(Math.max(0, py));
      z.push(pz);
      [ey, ez] = [py, pz];
    }
  }
  return y.length >= 2 ? { y, z } : undefined;
}
