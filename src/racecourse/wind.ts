/** How often the wind blows how hard: true wind speeds [m/s], rising, and their shares of the time, adding up to 1. */
export interface WindTable {
  readonly words: string;
  readonly tws: readonly number[];
  readonly share: readonly number[];
}

/**
 * A table of frequencies; equal speeds are added up, shares brought to a sum of 1.
 * @throws RangeError when speeds or shares make no sense
 */
export function windTable(
  words: string,
  rows: readonly { readonly tws: number; readonly share: number }[],
): WindTable {
  const shares = new Map<number, number>();
  for (const r of rows) {
    if (!(r.tws > 0 && r.tws < 60)) throw new RangeError(`wind speed ${r.tws} m/s is outside 0 to 60 m/s`);
    if (!(r.share >= 0 && Number.isFinite(r.share))) throw new RangeError(`share ${r.share} is below 0`);
    shares.set(r.tws, (shares.get(r.tws) ?? 0) + r.share);
  }
  const total = [...shares.values()].reduce((a, b) => a + b, 0);
  if (!(total > 0)) throw new RangeError('the shares of the wind speeds add up to nothing');
  const kept = [...shares].filter(([, s]) => s > 0).sort((a, b) => a[0] - b[0]);
  return { words, tws: kept.map(([v]) => v), share: kept.map(([, s]) => s / total) };
}

/** One wind speed [m/s]. */
export const steadyWind = (tws: number, words: string): WindTable => windTable(words, [{ tws, share: 1 }]);

/**
 * A table from observations of the wind speed [m/s]: sorted into bands of equal width, each band standing at the mean
 * of what fell into it.
 * @param width of a band [m/s]
 */
export function observedWind(words: string, observations: readonly number[], width: number): WindTable {
  if (!(width > 0)) throw new RangeError(`band width ${width} m/s is not above 0`);
  const bands = new Map<number, { sum: number; count: number }>();
  for (const v of observations) {
    const key = Math.floor(v / width + 1e-9);
    const band = bands.get(key) ?? { sum: 0, count: 0 };
    bands.set(key, { sum: band.sum + v, count: band.count + 1 });
  }
  return windTable(
    words,
    [...bands.values()].map((b) => ({ tws: b.sum / b.count, share: b.count })),
  );
}

export interface WeibullWind {
  /** Scale c [m/s] and shape k of P(U < u) = 1 - exp(-(u/c)^k). */
  readonly scale: number;
  readonly shape: number;
  /** Winds [m/s] between which there is sailing. */
  readonly least: number;
  readonly most: number;
  /** Number of equally likely bands. */
  readonly bands: number;
}

/**
 * A Weibull wind between two limits, as equally likely bands, each standing at its median.
 * @throws RangeError when a figure makes no sense
 */
export function weibullWind(words: string, w: WeibullWind): WindTable {
  const { scale, shape, least, most, bands } = w;
  if (!(scale > 0) || !(shape > 0)) throw new RangeError('scale and shape of a Weibull wind must be above 0');
  if (!(least >= 0 && most > least)) throw new RangeError(`no wind lies between ${least} and ${most} m/s`);
  if (!(Number.isInteger(bands) && bands >= 1)) throw new RangeError(`${bands} is no number of bands`);
  const below = (u: number): number => -Math.expm1(-((u / scale) ** shape));
  const [p0, p1] = [below(least), below(most)];
  if (!(p1 - p0 > 1e-9)) throw new RangeError('hardly any wind lies between the limits');
  const rows = Array.from({ length: bands }, (_, i) => {
    const p = p0 + ((i + 0.5) / bands) * (p1 - p0);
    return { tws: scale * (-Math.log1p(-p)) ** (1 / shape), share: 1 };
  });
  return windTable(words, rows);
}

/** Scale [m/s] of the Weibull wind of a mean speed [m/s] and shape: mean / Gamma(1 + 1/k). */
export function weibullScale(mean: number, shape: number): number {
  return mean / gammaFunction(1 + 1 / shape);
}

/** Gamma function for x >= 1, by Stirling's series beyond 8 and the recurrence down to x; 1e-10 or better. */
function gammaFunction(x: number): number {
  let y = x;
  let product = 1;
  while (y < 8) product *= y++;
  const r = 1 / (y * y);
  const series = (1 / 12 - r * (1 / 360 - r * (1 / 1260 - r / 1680))) / y;
  return Math.exp((y - 0.5) * Math.log(y) - y + 0.5 * Math.log(2 * Math.PI) + series) / product;
}
