import { type Boat, readBoatFile } from '../../src/boat/index.js';
import { type Polar, predictPolar } from '../../src/polar/index.js';

export const DEMO_BOATS = ['single-hander', 'trapeze-dinghy', 'keelboat'] as const;
export type DemoBoat = (typeof DEMO_BOATS)[number];

const boats = new Map<string, Boat>();
const polars = new Map<string, Polar>();

/** A demo boat, read once per test file. */
export function demoBoat(name: DemoBoat): Boat {
  let b = boats.get(name);
  if (b === undefined) {
    b = readBoatFile(`boats/${name}.yaml`);
    boats.set(name, b);
  }
  return b;
}

/** Its polar on the default grid, computed once per test file. */
export function demoPolar(name: DemoBoat): Polar {
  let p = polars.get(name);
  if (p === undefined) {
    p = predictPolar(demoBoat(name));
    polars.set(name, p);
  }
  return p;
}
