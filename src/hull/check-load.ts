import type { HullLoad, HullOptions } from './types.js';

function positive(name: string, value: number, unit: string): void {
  if (!(value > 0 && Number.isFinite(value)))
    throw new RangeError(`${name} is ${value} ${unit}; it must be a finite number above 0`);
}

function finite(name: string, value: number, unit: string): void {
  if (!Number.isFinite(value))
    throw new RangeError(`${name} is ${value} ${unit}; it must be a finite number`);
}

/**
 * Refuses loads and options that no hull can be prepared from, before any of them can turn into a force that is not a
 * number. Units as in `HullLoad` and `HullOptions`.
 * @throws RangeError naming the value and what is allowed
 */
export function checkLoad(load: HullLoad, options: HullOptions): void {
  positive('the mass in the hull', load.mass, 'kg');
  finite('x of the centre of mass', load.x, 'm');
  finite('z of the centre of mass', load.z, 'm');
  positive('the density of the water', options.water.density, 'kg/m3');
  positive('the kinematic viscosity of the water', options.water.kinematicViscosity, 'm2/s');
  positive('gravity', options.gravity, 'm/s2');
  const { keel, measured, roughness, centreReach } = options;
  if (roughness !== undefined && !(roughness >= 0 && Number.isFinite(roughness)))
    throw new RangeError(`the roughness of the hull is ${roughness} m; it must be a finite number from 0`);
  if (keel) {
    positive('the volume of the keel', keel.volume, 'm3');
    positive('the draft of the keel', keel.draft, 'm');
    finite("the depth of the keel's centre", keel.centreDepth, 'm');
    if (keel.x !== undefined) finite("x of the keel's centre", keel.x, 'm');
  }
  if (centreReach && !(centreReach[0] <= centreReach[1])) {
    throw new RangeError(
      `the centre of gravity reaches from x = ${centreReach[0]} to ${centreReach[1]} m; the aft end comes first`,
    );
  }
  if (measured) checkMeasured(measured);
}

function checkMeasured({ speed, force }: NonNullable<HullOptions['measured']>): void {
  if (speed.length === 0 || speed.length !== force.length) {
    throw new RangeError(
      `the measured resistance has ${speed.length} speeds and ${force.length} forces; it needs one or more of each, in pairs`,
    );
  }
  speed.forEach((v, i) => {
    const before = i === 0 ? 0 : speed[i - 1]!;
    if (!(v > before && Number.isFinite(v))) {
      throw new RangeError(
        `measured speed ${v} m/s comes after ${before} m/s; speeds must rise from above 0 (rest, without force, is understood)`,
      );
    }
    const f = force[i]!;
    if (!(f >= 0 && Number.isFinite(f)))
      throw new RangeError(`measured force ${f} N at ${v} m/s; it must be a finite number from 0`);
  });
}
