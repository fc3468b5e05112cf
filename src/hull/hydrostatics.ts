import type { Lines, Station } from './types.js';

/** How a hull floats: its waterplane in body axes is Z = height + x tan(trim), Z the height after heeling. */
export interface Flotation {
  readonly heel: number;
  /** Height [m] of the water amidships over the design waterline, in the heeled frame. */
  readonly height: number;
  /** Bow-down trim [rad]. */
  readonly trim: number;
}

/** What is under water at a flotation. Lengths m; y to leeward, z up, both in the heeled frame. */
export interface Immersed {
  readonly volume: number;
  readonly x: number;
  readonly y: number;
  readonly z: number;
  readonly waterplane: number;
  /** Centre of flotation, x. */
  readonly flotationX: number;
  /** Transverse and longitudinal second moments of the waterplane about the centre of flotation [m4]. */
  readonly transverse: number;
  readonly longitudinal: number;
  /** Section areas by station [m2]. */
  readonly sections: Float64Array;
}

/** A hull's sections as closed polygons with integration weights along x, ready for clipping. */
export interface PreparedLines {
  readonly lines: Lines;
  readonly x: Float64Array;
  readonly weight: Float64Array;
  /** Closed polygons, leeward side positive y, anticlockwise or clockwise alike for all. */
  readonly polygonY: readonly Float64Array[];
  readonly polygonZ: readonly Float64Array[];
}

/**
 * Weights of Simpson's rule for unevenly spaced stations (parabolas through successive threes; a last odd interval by
 * the trapezoid rule).
 */
export function stationWeights(x: ArrayLike<number>): Float64Array {
  const n = x.length;
  const w = new Float64Array(n);
  let i = 0;
  for (; i + 2 < n; i += 2) {
    const h0 = x[i + 1]! - x[i]!;
    const h1 = x[i + 2]! - x[i + 1]!;
    const s = (h0 + h1) / 6;
    w[i]! += s * (2 - h1 / h0);
    w[i + 1]! += (s * (h0 + h1) ** 2) / (h0 * h1);
    w[i + 2]! += s * (2 - h0 / h1);
  }
  for (; i + 1 < n; i++) {
    const h = 0.5 * (x[i + 1]! - x[i]!);
    w[i]! += h;
    w[i + 1]! += h;
  }
  return w;
}

/**
 * @throws RangeError when stations do not go from aft to forward, or a section has fewer than two points or a
 *   negative half-breadth
 */
export function prepareLines(lines: Lines): PreparedLines {
  const { stations } = lines;
  if (stations.length < 3)
    throw new RangeError(`a hull needs three or more stations, not ${stations.length}`);
  stations.forEach((s: Station, i) => {
    if (i > 0 && !(s.x > stations[i - 1]!.x)) throw new RangeError('stations must run from aft to forward');
    if (s.y.length < 2 || s.y.length !== s.z.length)
      throw new RangeError(`station at x = ${s.x} m needs two or more points`);
    if (s.y.some((y) => !(y >= 0)))
      throw new RangeError(`station at x = ${s.x} m has a negative half-breadth`);
  });
  const x = Float64Array.from(stations, (s) => s.x);
  const polygonY: Float64Array[] = [];
  const polygonZ: Float64Array[] = [];
  for (const s of stations) {
    const k = s.y.length;
    const y = new Float64Array(2 * k);
    const z = new Float64Array(2 * k);
    for (let i = 0; i < k; i++) {
      y[i] = s.y[i]!;
      z[i] = s.z[i]!;
      y[2 * k - 1 - i] = -s.y[i]!;
      z[2 * k - 1 - i] = s.z[i]!;
    }
    polygonY.push(y);
    polygonZ.push(z);
  }
  return { lines, x, weight: stationWeights(x), polygonY, polygonZ };
}

/** Clips every section at the waterplane and integrates: exact for the polygons, Simpson along the hull. */
export function immerse(p: PreparedLines, f: Flotation): Immersed {
  const { x, weight, polygonY, polygonZ } = p;
  const n = x.length;
  const sin = Math.sin(f.heel);
  const cos = Math.cos(f.heel);
  const slope = Math.tan(f.trim);
  const sections = new Float64Array(n);
  let volume = 0;
  let mx = 0;
  let my = 0;
  let mz = 0;
  let plane = 0;
  let planeX = 0;
  let planeY = 0;
  let planeXX = 0;
  let planeYY = 0;
  for (let i = 0; i < n; i++) {
    const water = f.height + x[i]! * slope;
    const py = polygonY[i]!;
    const pz = polygonZ[i]!;
    const m = py.length;
    // Green's theorem over the clipped outline; the closing runs along the water are horizontal.
    let area = 0;
    let ay = 0;
    let az = 0;
    let b = 0;
    let by = 0;
    let byy = 0;
    let y0 = py[m - 1]! * cos + pz[m - 1]! * sin;
    let z0 = pz[m - 1]! * cos - py[m - 1]! * sin - water;
    for (let k = 0; k < m; k++) {
      const y1 = py[k]! * cos + pz[k]! * sin;
      const z1 = pz[k]! * cos - py[k]! * sin - water;
      let [ya, za, yb, zb] = [y0, z0, y1, z1];
      const under0 = z0 <= 0;
      const under1 = z1 <= 0;
      if (under0 !== under1) {
        const t = z0 / (z0 - z1);
        const yc = y0 + t * (y1 - y0);
        // Crossing: the waterline's ends, signed by direction so that widths add up over several pieces.
        const s = under1 ? -1 : 1;
        b += s * yc;
        by += s * 0.5 * yc * yc;
        byy += (s * yc * yc * yc) / 3;
        if (under0) {
          yb = yc;
          zb = 0;
        } else {
          ya = yc;
          za = 0;
        }
      }
      if (under0 || under1) {
        // With z measured from the water, closing edges at z = 0 add nothing to integrals of z dy.
        const dy = yb - ya;
        area -= 0.5 * (za + zb) * dy;
        az -= (dy * (za * za + za * zb + zb * zb)) / 6;
        ay -= (dy * (za * (2 * ya + yb) + zb * (ya + 2 * yb))) / 6;
      }
      y0 = y1;
      z0 = z1;
    }
    // Outline direction: keel to leeward sheer and over the deck back; make areas positive.
    const sign = area < 0 ? -1 : 1;
    area *= sign;
    ay *= sign;
    az *= sign;
    if (b < 0) {
      b = -b;
      by = -by;
      byy = -byy;
    }
    const w = weight[i]!;
    sections[i] = area;
    volume += w * area;
    mx += w * area * x[i]!;
    my += w * ay;
    mz += w * (az + area * water);
    plane += w * b;
    planeX += w * b * x[i]!;
    planeY += w * by;
    planeXX += w * b * x[i]! * x[i]!;
    planeYY += w * byy;
  }
  const safe = volume > 0 ? volume : Number.NaN;
  return {
    volume,
    x: mx / safe,
    y: my / safe,
    z: mz / safe,
    waterplane: plane,
    flotationX: planeX / plane,
    transverse: planeYY - (planeY * planeY) / plane,
    longitudinal: planeXX - (planeX * planeX) / plane,
    sections,
  };
}

/** Volume, and centre (x, z) of the load, that a hull must carry. */
export interface FloatRequest {
  readonly volume: number;
  readonly x: number;
  readonly z: number;
}

/**
 * Sinkage and trim at a heel such that the volume carries the weight and the centre of buoyancy lies under the centre
 * of gravity fore and aft: Newton with the waterplane as its matrix.
 * @throws RangeError when no flotation is found (the hull would sink or stand on end)
 */
export function floatAt(
  p: PreparedLines,
  request: FloatRequest,
  heel: number,
  start: { height: number; trim: number } = { height: 0, trim: 0 },
): { flotation: Flotation; immersed: Immersed } {
  let { height, trim } = start;
  const length = p.x[p.x.length - 1]! - p.x[0]!;
  const cos = Math.cos(heel);
  const zG = request.z * cos;
  for (let i = 0; i < 80; i++) {
    const im = immerse(p, { heel, height, trim });
    if (!(im.volume > 0) || !(im.waterplane > 0)) {
      height += 0.02 * length;
      continue;
    }
    const tan = Math.tan(trim);
    const f1 = im.volume - request.volume;
    const f2 = im.volume * (im.x - request.x + (im.z - zG) * tan);
    if (Math.abs(f1) < 1e-13 * request.volume && Math.abs(f2) < 1e-13 * request.volume * length) {
      return { flotation: { heel, height, trim }, immersed: im };
    }
    const xf = im.flotationX;
    const a11 = im.waterplane;
    const a12 = im.waterplane * xf;
    const a21 = im.waterplane * (xf - request.x + (height + xf * tan - zG) * tan);
    const a22 =
      im.longitudinal +
      im.waterplane * xf * (xf - request.x + (height + xf * tan - zG) * tan) +
      im.volume * (im.z - zG);
    const det = a11 * a22 - a12 * a21;
    let dh = -(f1 * a22 - a12 * f2) / det;
    let dt = -(a11 * f2 - a21 * f1) / det;
    const most = 0.03 * length;
    if (!(Math.abs(dh) < most)) dh = Math.sign(dh) * most;
    if (!(Math.abs(dt) < 0.05)) dt = Math.sign(dt) * 0.05;
    if (!Number.isFinite(dh) || !Number.isFinite(dt)) break;
    height += dh;
    trim += dt;
    if (Math.abs(dh) < 1e-14 * length && Math.abs(dt) < 1e-14) {
      return { flotation: { heel, height, trim }, immersed: immerse(p, { heel, height, trim }) };
    }
  }
  // Round-off can keep the last digits moving: accept what balances to 1e-9.
  const im = immerse(p, { heel, height, trim });
  const off =
    Math.abs(im.volume / request.volume - 1) +
    Math.abs(im.x - request.x + (im.z - zG) * Math.tan(trim)) / length;
  if (off < 1e-9) return { flotation: { heel, height, trim }, immersed: im };
  throw new RangeError(
    `the hull does not float: ${request.volume.toFixed(4)} m3 at x = ${request.x.toFixed(3)} m finds no balance at ${((heel * 180) / Math.PI).toFixed(0)} deg of heel`,
  );
}

/** Righting arm [m] at a flotation of a load whose centre is z above the design waterline on the centreline. */
export function rightingArmOf(im: Immersed, heel: number, z: number): number {
  return im.y - z * Math.sin(heel);
}

/**
 * Wetted area [m2] at a flotation: triangles between neighbouring stations, each clipped at the water. The end faces
 * are not counted. Sections need equal numbers of points (see `resampled`).
 */
export function wettedArea(p: PreparedLines, f: Flotation): number {
  const { x } = p;
  const sin = Math.sin(f.heel);
  const cos = Math.cos(f.heel);
  const slope = Math.tan(f.trim);
  let total = 0;
  for (let i = 0; i + 1 < x.length; i++) {
    const ya = p.polygonY[i]!;
    const za = p.polygonZ[i]!;
    const yb = p.polygonY[i + 1]!;
    const zb = p.polygonZ[i + 1]!;
    const xa = x[i]!;
    const xb = x[i + 1]!;
    const wa = f.height + xa * slope;
    const wb = f.height + xb * slope;
    const m = ya.length;
    const sheer = m / 2 - 1;
    for (let k = 0; k < m; k++) {
      // The run between the two sheers is the deck.
      if (k === sheer) continue;
      const l = k + 1 < m ? k + 1 : 0;
      const d00 = za[k]! * cos - ya[k]! * sin - wa;
      const d10 = zb[k]! * cos - yb[k]! * sin - wb;
      const d11 = zb[l]! * cos - yb[l]! * sin - wb;
      const d01 = za[l]! * cos - ya[l]! * sin - wa;
      if (d00 > 0 && d10 > 0 && d11 > 0 && d01 > 0) continue;
      total += clipped(xa, ya[k]!, za[k]!, d00, xb, yb[k]!, zb[k]!, d10, xb, yb[l]!, zb[l]!, d11);
      total += clipped(xa, ya[k]!, za[k]!, d00, xb, yb[l]!, zb[l]!, d11, xa, ya[l]!, za[l]!, d01);
    }
  }
  return total;
}

/** Area of the part of a triangle that is under the water; d is the height of each corner over it. */
function clipped(
  x0: number,
  y0: number,
  z0: number,
  d0: number,
  x1: number,
  y1: number,
  z1: number,
  d1: number,
  x2: number,
  y2: number,
  z2: number,
  d2: number,
): number {
  const under = (d0 <= 0 ? 1 : 0) + (d1 <= 0 ? 1 : 0) + (d2 <= 0 ? 1 : 0);
  if (under === 0) return 0;
  const ux = x1 - x0;
  const uy = y1 - y0;
  const uz = z1 - z0;
  const vx = x2 - x0;
  const vy = y2 - y0;
  const vz = z2 - z0;
  const cx = uy * vz - uz * vy;
  const cy = uz * vx - ux * vz;
  const cz = ux * vy - uy * vx;
  const area = 0.5 * Math.sqrt(cx * cx + cy * cy + cz * cz);
  if (under === 3) return area;
  // The share at the odd corner: product of the shares of its two edges.
  if (under === 1) {
    if (d0 <= 0) return area * cornerShare(d0, d1, d2);
    if (d1 <= 0) return area * cornerShare(d1, d0, d2);
    return area * cornerShare(d2, d0, d1);
  }
  if (d0 > 0) return area * (1 - cornerShare(d0, d1, d2));
  if (d1 > 0) return area * (1 - cornerShare(d1, d0, d2));
  return area * (1 - cornerShare(d2, d0, d1));
}

function cornerShare(a: number, b: number, c: number): number {
  return (a / (a - b)) * (a / (a - c));
}

/**
 * The same hull with every half section drawn with equally many points evenly along its girth: as many as its most
 * detailed section has, within 33 to 97. Unchanged if counts agree already.
 */
export function resampled(lines: Lines): Lines {
  const first = lines.stations[0]!.y.length;
  if (first <= 97 && lines.stations.every((s) => s.y.length === first)) return lines;
  const k = Math.min(97, Math.max(33, ...lines.stations.map((s) => s.y.length)));
  return {
    stations: lines.stations.map((s) => {
      const along = [0];
      for (let i = 1; i < s.y.length; i++) {
        along.push(along[i - 1]! + Math.hypot(s.y[i]! - s.y[i - 1]!, s.z[i]! - s.z[i - 1]!));
      }
      const total = along[along.length - 1]!;
      const y: number[] = [];
      const z: number[] = [];
      let j = 0;
      for (let i = 0; i < k; i++) {
        const target = (total * i) / (k - 1);
        while (j < along.length - 2 && along[j + 1]! < target) j++;
        const span = along[j + 1]! - along[j]!;
        const t = span > 0 ? (target - along[j]!) / span : 0;
        y.push(s.y[j]! + t * (s.y[j + 1]! - s.y[j]!));
        z.push(s.z[j]! + t * (s.z[j + 1]! - s.z[j]!));
      }
      return { x: s.x, y, z };
    }),
  };
}
