/** A sea: significant wave height [m] and peak period [s]. */
export interface SeaState {
  readonly height: number;
  readonly period: number;
}

/**
 * Waves a steady wind raises over a fetch: g Hs / U^2 = 0.0016 (g F / U^2)^(1/2) and g Tp / U = 0.286 (g F / U^2)^(1/3),
 * held at the fully developed 0.243 and 8.134.
 * Source: Hasselmann et al. 1973 (JONSWAP) as given in the Shore Protection Manual 1984 (from memory).
 * @param u10 wind speed [m/s] at 10 m
 * @param fetch length of open water to windward [m]
 */
export function fetchLimitedSea(u10: number, fetch: number, gravity: number): SeaState {
  if (!(u10 > 0) || !(fetch > 0)) return { height: 0, period: 0 };
  const x = (gravity * fetch) / (u10 * u10);
  const height = Math.min(0.0016 * Math.sqrt(x), 0.243);
  const period = Math.min(0.286 * Math.cbrt(x), 8.134);
  return { height: (height * u10 * u10) / gravity, period: (period * u10) / gravity };
}
