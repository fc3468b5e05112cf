import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { basename } from 'node:path';
import { type Boat, BoatFileError, readBoat, readBoatFile } from '../boat/index.js';
import { type MathjsModule, type UnitEngine, unitEngineFrom } from '../units/index.js';
import { UsageError } from './errors.js';

let engine: UnitEngine | undefined;

/** Loads mathjs when an unusual quantity needs it. */
export function unitEngine(): UnitEngine {
  engine ??= unitEngineFrom(createRequire(import.meta.url)('mathjs') as MathjsModule);
  return engine;
}

export function standardInput(): Uint8Array {
  try {
    return readFileSync(0);
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code;
    if (code === 'EOF' || code === 'EAGAIN') return new Uint8Array(0);
    throw new UsageError(`standard input cannot be read (${code ?? 'unknown cause'})`);
  }
}

/**
 * Reads the boat named on the command line; "-" is standard input.
 * @throws UsageError with every problem of the file
 */
export function loadBoat(path: string): Boat {
  try {
    return path === '-' ? readBoat(standardInput(), 'standard input', unitEngine) : readBoatFile(path);
  } catch (error) {
    if (error instanceof BoatFileError) throw new UsageError(error.message);
    throw error;
  }
}

/** What files about a boat are called after: her file's name, or her own where she came from standard input. */
export function reportName(path: string, boat: Boat): string {
  return path === '-' ? boat.spec.name : basename(path).replace(/\.[^.]+$/, '');
}
