/**
 * Energy of the wake of one or more lifting lines that shear off on one upright trace.
 *
 * A line carries a circulation that is linear between its nodes and zero at both ends (or free at a sealed root).
 * In the plane far behind, the induced drag of the whole wake is
 *
 *   Di = 1/2 rho G'A G,   A = -(1/2 pi) T'K T,
 *   K(e,e') = double integral over two wake strips of ln|s - t| - ln(s + t),
 *
 * with T the slopes of the circulation by its nodal values and the second logarithm the image in the sea surface
 * (Munk 1921; Katz & Plotkin, Low-Speed Aerodynamics, 2001, section 8). By Munk's stagger theorem lines at different
 * fore-and-aft positions share the trace, so lines with nodes of their own couple exactly.
 */
export interface WakeLine {
  /** Node heights rising from foot to head, ends included. */
  readonly nodes: Float64Array;
  /** The circulation need not vanish at the foot (a line sealed to the image plane). */
  readonly sealed: boolean;
}

/** Share of the end cell by which a free end is moved outward in the wake: makes a single line exact. */
const TIP_SHIFT = 0.135;

/** Cosine-spaced nodes from foot to head with n nodes between them (for a sealed foot: half a cosine). */
export function wakeLine(foot: number, head: number, n: number, sealed = false): WakeLine {
  const nodes = new Float64Array(n + 2);
  for (let i = 0; i <= n + 1; i++) {
    const w = i / (n + 1);
    nodes[i] =
      foot + (head - foot) * (sealed ? Math.sin(0.5 * Math.PI * w) : 0.5 * (1 - Math.cos(Math.PI * w)));
  }
  return { nodes, sealed };
}

/** Number of unknown nodal circulations of a line. */
export function unknownsOf(line: WakeLine): number {
  return line.nodes.length - (line.sealed ? 1 : 2);
}

/** Second integral of ln|t|: G2'' = ln|t|. */
function g2(t: number): number {
  const a = Math.abs(t);
  return a < 1e-300 ? 0 : 0.5 * t * t * Math.log(a) - 0.75 * t * t;
}

/** The lines' places in the plane far behind: y of each trace and whether the image is there. */
export interface WakeOptions {
  /** Mirror in the surface z = 0. */
  readonly image: boolean;
}

/** The line's nodes with the free ends moved outward. */
function shiftedNodes(line: WakeLine, options: WakeOptions): Float64Array {
  const { nodes, sealed } = line;
  const last = nodes.length - 1;
  const shifted = Float64Array.from(nodes);
  shifted[last]! += TIP_SHIFT * (nodes[last]! - nodes[last - 1]!);
  if (!sealed) {
    const foot = nodes[0]! - TIP_SHIFT * (nodes[1]! - nodes[0]!);
    shifted[0] = options.image ? Math.max(0, foot) : foot;
  }
  return shifted;
}

/** Height of each unknown node and the width its circulation counts for in the lift (trapezoids to the moved ends). */
export function unknownNodes(line: WakeLine, options: WakeOptions): { z: Float64Array; width: Float64Array } {
  const shifted = shiftedNodes(line, options);
  const n = unknownsOf(line);
  const z = new Float64Array(n);
  const width = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const j = i + (line.sealed ? 0 : 1);
    z[i] = line.nodes[j]!;
    width[i] = 0.5 * (shifted[j + 1]! - shifted[Math.max(0, j - 1)]!);
  }
  return { z, width };
}

/**
 * The energy matrix A, row-major over all unknown nodes line after line; symmetric.
 * @param lines lines on one upright trace
 */
export function wakeEnergyMatrix(lines: readonly WakeLine[], options: WakeOptions): Float64Array {
  // Wake strips with their end points and the two unknowns whose difference is their slope.
  const lo: number[] = [];
  const hi: number[] = [];
  const below: number[] = []; // unknown at the lower end, -1 where the circulation is zero
  const above: number[] = [];
  let offset = 0;
  for (const line of lines) {
    const { nodes, sealed } = line;
    const last = nodes.length - 1;
    const shifted = shiftedNodes(line, options);
    for (let e = 0; e < last; e++) {
      lo.push(shifted[e]!);
      hi.push(shifted[e + 1]!);
      below.push(sealed ? offset + e : e === 0 ? -1 : offset + e - 1);
      above.push(e === last - 1 ? -1 : sealed ? offset + e + 1 : offset + e);
    }
    offset += unknownsOf(line);
  }
  const n = offset;
  const a = new Float64Array(n * n);
  const add = (i: number, j: number, v: number): void => {
    if (i >= 0 && j >= 0) a[i * n + j]! += v;
  };
  for (let e = 0; e < lo.length; e++) {
    for (let f = 0; f <= e; f++) {
      const [p, q, r, s] = [lo[e]!, hi[e]!, lo[f]!, hi[f]!];
      let k = -g2(q - s) + g2(q - r) + g2(p - s) - g2(p - r);
      if (options.image) k -= g2(q + s) - g2(q + r) - g2(p + s) + g2(p + r);
      const v = -k / (2 * Math.PI * (q - p) * (s - r));
      for (const [i, si] of [
        [above[e]!, 1],
        [below[e]!, -1],
      ] as const) {
        for (const [j, sj] of [
          [above[f]!, 1],
          [below[f]!, -1],
        ] as const) {
          add(i, j, si * sj * v);
          if (e !== f) add(j, i, si * sj * v);
        }
      }
    }
  }
  return a;
}
