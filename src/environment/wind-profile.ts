import type { WindProfile } from './types.js';

/** Heights below so many roughness lengths are taken there: the law means nothing at the surface itself. */
const LOWEST_OVER_ROUGHNESS = 500;

/** Roughness length [m] of open water in a moderate breeze; common practice. */
export const OPEN_WATER_ROUGHNESS = 0.0002;

/**
 * Logarithmic wind profile U(z)/U(ref) = ln(z/z0) / ln(ref/z0) of a neutral surface layer.
 * @param referenceHeight height [m] at which the wind is quoted
 * @param roughness z0 [m]
 * @throws RangeError when the reference height is not well above the roughness
 */
export function logWindProfile(referenceHeight: number, roughness = OPEN_WATER_ROUGHNESS): WindProfile {
  if (!(roughness > 0) || !(referenceHeight > 10 * roughness)) {
    throw new RangeError(
      `wind height ${referenceHeight} m must be more than ten times the roughness ${roughness} m`,
    );
  }
  const scale = 1 / Math.log(referenceHeight / roughness);
  const floor = LOWEST_OVER_ROUGHNESS * roughness;
  const low = scale * Math.log(floor / roughness);
  return {
    kind: 'log',
    referenceHeight,
    factor: (z) => (z > floor ? scale * Math.log(z / roughness) : low),
  };
}

/**
 * Power-law wind profile U(z)/U(ref) = (z/ref)^exponent; 0.09 to 0.14 over water is common practice.
 * @throws RangeError when the exponent is outside 0 to 1
 */
export function powerWindProfile(referenceHeight: number, exponent: number): WindProfile {
  if (!(exponent >= 0 && exponent < 1))
    throw new RangeError(`wind profile exponent ${exponent} is outside 0 to 1`);
  const floor = 0.01 * referenceHeight;
  return {
    kind: 'power',
    referenceHeight,
    factor: (z) => (Math.max(z, floor) / referenceHeight) ** exponent,
  };
}

/** Exponent of the power law that touches the log law at height z [m]: 1 / ln(z / z0), exact. */
export function shearExponent(z: number, roughness: number): number {
  return 1 / Math.log(z / roughness);
}

/**
 * Roughness length [m] of the sea at a wind speed U10 [m/s] at 10 m: Charnock's z0 = a u*^2 / g with
 * u* = kappa U10 / ln(10/z0), a = 0.0144, kappa = 0.41 (Garratt 1977), solved by fixed point.
 */
export function charnockRoughness(u10: number, gravity = 9.80665): number {
  let z0 = 1e-4;
  for (let i = 0; i < 60; i++) {
    const friction = (0.41 * u10) / Math.log(10 / z0);
    z0 = (0.0144 * friction * friction) / gravity;
  }
  return z0;
}
