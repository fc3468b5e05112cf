import type { Fluid } from './types.js';

/**
 * Density [kg/m3] and kinematic viscosity [m2/s] of water at 5 to 30 deg C.
 * Source: ITTC Recommended Procedure 7.5-02-01-03, Fresh Water and Seawater Properties, the tabulated values at
 * 5, 10, 15, 20, 25 and 30 deg C (from memory; the 15 deg C row is checked in test/outside/wind.ts).
 */
const WATER = {
  celsius: [5, 10, 15, 20, 25, 30],
  salt: {
    density: [1027.72, 1026.98, 1026.02, 1024.81, 1023.39, 1021.77],
    viscosity: [1.5645e-6, 1.3604e-6, 1.1892e-6, 1.0541e-6, 0.9425e-6, 0.8503e-6],
  },
  fresh: {
    density: [999.97, 999.7, 999.1, 998.21, 997.05, 995.65],
    viscosity: [1.5181e-6, 1.3063e-6, 1.1386e-6, 1.0034e-6, 0.8927e-6, 0.8008e-6],
  },
} as const;

function between(x: number, xs: readonly number[], ys: readonly number[]): number {
  let i = 0;
  while (i < xs.length - 2 && x > xs[i + 1]!) i++;
  const w = (x - xs[i]!) / (xs[i + 1]! - xs[i]!);
  return ys[i]! + w * (ys[i + 1]! - ys[i]!);
}

/**
 * Sea or fresh water at a temperature.
 * @param celsius 0 to 35 deg C; between the table's temperatures linear, beyond them carried on linearly
 * @throws RangeError outside 0 to 35 deg C
 */
export function water(kind: 'salt' | 'fresh', celsius = 15): Fluid {
  if (!(celsius >= 0 && celsius <= 35))
    throw new RangeError(`water at ${celsius} deg C is outside 0 to 35 deg C`);
  const t = WATER[kind];
  return {
    density: between(celsius, WATER.celsius, t.density),
    kinematicViscosity: between(celsius, WATER.celsius, t.viscosity),
  };
}

/**
 * Dry air at sea level pressure (101 325 Pa): ideal gas, and Sutherland's law for the viscosity (constants as in
 * the U.S. Standard Atmosphere, 1976). 15 deg C gives 1.225 kg/m3.
 * @throws RangeError outside -20 to 50 deg C
 */
export function air(celsius = 15): Fluid {
  if (!(celsius >= -20 && celsius <= 50))
    throw new RangeError(`air at ${celsius} deg C is outside -20 to 50 deg C`);
  const kelvin = celsius + 273.15;
  const density = 101325 / (287.053 * kelvin);
  const dynamic = (1.458e-6 * kelvin ** 1.5) / (kelvin + 110.4);
  return { density, kinematicViscosity: dynamic / density };
}
