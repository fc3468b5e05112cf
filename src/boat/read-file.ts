import { type MathjsModule, type UnitEngine, unitEngineFrom } from '../units/index.js';
import { BesideError, partsBeside } from './beside.js';
import type { BoatFileProblem } from './problems.js';
import { BoatFileError } from './problems.js';
import { readWhole } from './read-whole.js';
import type { Boat } from './types.js';
import type { Change } from './variants.js';

/** A little more than the reader takes, so that a file that is too large is known as such. */
const ENOUGH = 1_000_001;
/** Largest file beside a boat file: a hull's mesh. */
const BESIDE = 200_000_000;

let engine: UnitEngine | undefined;

/** mathjs takes some tenths of a second to load: it is loaded when a quantity needs it, and kept. */
function nodeUnitEngine(): UnitEngine {
  const { createRequire } = process.getBuiltinModule('node:module');
  engine ??= unitEngineFrom(createRequire(import.meta.url)('mathjs') as MathjsModule);
  return engine;
}

/**
 * Reads and assembles a boat file from disk. Node only; its modules are fetched on the first call, so that the rest
 * of the library also loads in a browser or a worker.
 * @throws BoatFileError when the file cannot be opened, or anything in it is wrong
 */
export function readBoatFile(path: string, changes: readonly Change[] = []): Boat {
  const { dirname, join } = process.getBuiltinModule('node:path');
  const folder = dirname(path);
  const own = (message: string, hint: string): never => {
    const problem: BoatFileProblem = { line: 1, column: 1, key: '', message, hint };
    throw new BoatFileError(path, [problem]);
  };
  const besideFail = (message: string, hint: string): never => {
    throw new BesideError(message, hint);
  };
  return readWhole(
    bytesOf(path, ENOUGH, 'a boat file', own),
    path,
    nodeUnitEngine,
    (name) => {
      const bytes = bytesOf(join(folder, ...partsBeside(name)), BESIDE, 'a file to read', besideFail);
      if (bytes.length >= BESIDE) besideFail('the file is larger than 200 MB', 'is it the right file?');
      return bytes;
    },
    changes,
  );
}

function bytesOf(
  path: string,
  enough: number,
  what: string,
  fail: (message: string, hint: string) => never,
): Uint8Array {
  const { closeSync, fstatSync, openSync, readSync } = process.getBuiltinModule('node:fs');
  let handle: number | undefined;
  try {
    handle = openSync(path, 'r');
    if (fstatSync(handle).isDirectory()) fail(`this is a folder, not ${what}`, 'name a file in it');
    let buffer = new Uint8Array(Math.min(enough, 1 << 20));
    let length = 0;
    while (length < enough) {
      if (length === buffer.length) {
        const larger = new Uint8Array(Math.min(enough, 4 * buffer.length));
        larger.set(buffer);
        buffer = larger;
      }
      const got = readSync(handle, buffer, length, buffer.length - length, null);
      if (got === 0) break;
      length += got;
    }
    return buffer.subarray(0, length);
  } catch (error) {
    if (error instanceof BoatFileError || error instanceof BesideError) throw error;
    const code = (error as { code?: string }).code ?? 'unknown cause';
    if (code === 'ENOENT') return fail('there is no such file', 'check the path');
    if (code === 'EACCES') return fail('the file may not be read', 'check its permissions');
    return fail(`the file cannot be read (${code})`, 'check the path');
  } finally {
    if (handle !== undefined) closeSync(handle);
  }
}
