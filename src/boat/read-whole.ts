import type { UnitEngine } from '../units/index.js';
import { assembleBoat } from './assemble.js';
import type { ReadBeside } from './beside.js';
import { BoatFileError } from './problems.js';
import { readBoatSpec } from './read.js';
import type { Boat } from './types.js';
import type { Change } from './variants.js';

/**
 * Reads a boat file's text and assembles the boat. Pure: no files are opened but by `beside`.
 * @param fileName only for messages
 * @param engine reads unusual quantities ("2 * 3.1 m"); see `loadUnitEngine`
 * @param changes makes a variant of the boat
 * @throws BoatFileError with every problem's line, column, key and hint
 */
export function readWhole(
  text: string | Uint8Array,
  fileName = 'boat file',
  engine?: () => UnitEngine,
  beside?: ReadBeside,
  changes: readonly Change[] = [],
): Boat {
  const read = readBoatSpec(text, fileName, engine, beside, changes);
  try {
    return assembleBoat(read);
  } catch (error) {
    // The lower rooms name value and range of what they cannot make; the file's reader owns the place.
    if (!(error instanceof RangeError)) throw error;
    throw new BoatFileError(fileName, [
      {
        line: 1,
        column: 1,
        key: '',
        message: `no boat can be made of these figures: ${error.message}`,
        hint: 'check the dimensions of the part named',
      },
    ]);
  }
}
