/**
 * Direction numbers of Sobol's sequence after Joe & Kuo 2008 (SIAM J. Sci. Comput. 30, 2635-2654), from memory: degree
 * and inner coefficients of the primitive polynomial, and the initial odd numbers, for the second dimension on.
 * test/rooms/sobol.test.ts holds every dimension and every pair of them to their equidistribution.
 */
const JOE_KUO: readonly (readonly [degree: number, inner: number, m: readonly number[]])[] = [
  [1, 0, [1]],
  [2, 1, [1, 3]],
  [3, 1, [1, 3, 1]],
  [3, 2, [1, 1, 1]],
  [4, 1, [1, 1, 3, 3]],
  [4, 4, [1, 3, 5, 13]],
  [5, 2, [1, 1, 5, 5, 17]],
  [5, 4, [1, 1, 5, 5, 5]],
  [5, 7, [1, 1, 7, 11, 19]],
  [5, 11, [1, 1, 5, 1, 1]],
  [5, 13, [1, 1, 1, 3, 11]],
  [5, 14, [1, 3, 5, 5, 31]],
  [6, 1, [1, 3, 3, 9, 7, 49]],
];

const BITS = 32;

/** Most dimensions there are numbers for. */
export const SOBOL_DIMENSIONS = JOE_KUO.length + 1;

function directions(dimension: number): Uint32Array {
  const v = new Uint32Array(BITS);
  if (dimension === 0) {
    for (let i = 0; i < BITS; i++) v[i] = 2 ** (BITS - 1 - i);
    return v;
  }
  const [s, inner, m] = JOE_KUO[dimension - 1]!;
  for (let i = 0; i < BITS; i++) {
    if (i < s) {
      v[i] = (m[i]! << (BITS - 1 - i)) >>> 0;
      continue;
    }
    let x = v[i - s]! ^ (v[i - s]! >>> s);
    for (let k = 1; k < s; k++) if ((inner >> (s - 1 - k)) & 1) x ^= v[i - k]!;
    v[i] = x >>> 0;
  }
  return v;
}

/** A well-mixed 32-bit number of two (the finaliser of MurmurHash3, from memory). */
function mixed(seed: number, stream: number): number {
  let h = (seed ^ Math.imul(stream + 1, 0x9e3779b9)) >>> 0;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return (h ^ (h >>> 16)) >>> 0;
}

/**
 * Points of Sobol's low-discrepancy sequence in the open unit cube, digitally shifted by the seed. A point depends on
 * its number and the seed alone, so that any part of the sequence can be made anywhere.
 * @param dimensions 1 to SOBOL_DIMENSIONS
 * @throws RangeError for other dimensions
 */
export function sobolPoints(dimensions: number, seed: number): (index: number) => Float64Array {
  if (!(Number.isInteger(dimensions) && dimensions >= 1 && dimensions <= SOBOL_DIMENSIONS))
    throw new RangeError(`a Sobol sequence has 1 to ${SOBOL_DIMENSIONS} dimensions here, not ${dimensions}`);
  const v = Array.from({ length: dimensions }, (_, j) => directions(j));
  const shift = v.map((_, j) => mixed(seed, j));
  return (index) => {
    const gray = (index ^ (index >>> 1)) >>> 0;
    return Float64Array.from(v, (numbers, j) => {
      let x = shift[j]!;
      for (let i = 0; i < BITS; i++) if ((gray >>> i) & 1) x ^= numbers[i]!;
      return ((x >>> 0) + 0.5) / 2 ** BITS;
    });
  };
}

/**
 * Quantile of the standard normal distribution, relative error below 1.2e-9 (Acklam 2003, from memory).
 * @param p 0 < p < 1
 */
export function normalQuantile(p: number): number {
  const a = [
    -39.69683028665376, 220.9460984245205, -275.9285104469687, 138.357751867269, -30.66479806614716,
    2.506628277459239,
  ] as const;
  const b = [
    -54.47609879822406, 161.5858368580409, -155.6989798598866, 66.80131188771972, -13.28068155288572,
  ] as const;
  const c = [
    -0.007784894002430293, -0.3223964580411365, -2.400758277161838, -2.549732539343734, 4.374664141464968,
    2.938163982698783,
  ] as const;
  const d = [0.007784695709041462, 0.3224671290700398, 2.445134137142996, 3.754408661907416] as const;
  if (p > 0.5) return -normalQuantile(1 - p);
  if (p < 0.02425) {
    const q = Math.sqrt(-2 * Math.log(p));
    return (
      (((((c[0] * q + c[1]) * q + c[2]) * q + c[3]) * q + c[4]) * q + c[5]) /
      ((((d[0] * q + d[1]) * q + d[2]) * q + d[3]) * q + 1)
    );
  }
  const q = p - 0.5;
  const r = q * q;
  return (
    ((((((a[0] * r + a[1]) * r + a[2]) * r + a[3]) * r + a[4]) * r + a[5]) * q) /
    (((((b[0] * r + b[1]) * r + b[2]) * r + b[3]) * r + b[4]) * r + 1)
  );
}
