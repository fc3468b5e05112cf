import { existsSync, readFileSync } from 'node:fs';
import { basename } from 'node:path';
import {
  type Boat,
  BoatFileError,
  type Change,
  type Difference,
  differencesOf,
  fileDifferences,
  isWholeBoat,
  readBoat,
  readBoatFile,
  type Variant,
  variantsFromFile,
  variantsIn,
} from '../boat/index.js';
import { nearest } from '../units/index.js';
import { loadBoat, standardInput, unitEngine } from './boat-input.js';
import { UsageError } from './errors.js';

/** A boat of a comparison with what sets it apart. */
export interface NamedBoat {
  readonly name: string;
  readonly boat: Boat;
  readonly differences: readonly Difference[];
}

/** The text of a boat file, once read, and its variants as boats. */
export interface VariedFile {
  readonly path: string;
  readonly text: string;
  readonly base: Boat;
  read(changes: readonly Change[]): Boat;
}

const told = <T>(what: string, make: () => T): T => {
  try {
    return make();
  } catch (error) {
    if (error instanceof BoatFileError)
      throw new UsageError(what === '' ? error.message : `${what}:\n${error.message}`);
    throw error;
  }
};

/** Reads the boat file that is varied; "-" is standard input. @throws UsageError */
export function loadVaried(path: string): VariedFile {
  const decode = (bytes: Uint8Array): string => new TextDecoder().decode(bytes);
  if (path === '-') {
    const bytes = standardInput();
    const read = (changes: readonly Change[]): Boat =>
      told('', () => readBoat(bytes, 'standard input', unitEngine, undefined, changes));
    return { path, text: decode(bytes), base: read([]), read };
  }
  const base = loadBoat(path);
  return {
    path,
    text: decode(readFileSync(path)),
    base,
    read: (changes) => told('', () => readBoatFile(path, changes)),
  };
}

/**
 * The variants named on the command line: names of the boat file's own variants (a name stands for all that its ranges
 * make), files with differences, or whole boat files. None named: all of the file's own.
 * @throws UsageError
 */
export function loadVariants(file: VariedFile, named: readonly string[]): NamedBoat[] {
  const own = told('', () => variantsIn(file.text, file.path));
  const make = (v: Variant): NamedBoat => ({
    name: v.name,
    boat: told(`variant "${v.name}"`, () => file.read(v.changes)),
    differences: differencesOf(file.text, v.changes),
  });
  if (named.length === 0) return own.map(make);
  return named.flatMap((name) => {
    const mine = own.filter((v) => v.name === name || v.name.startsWith(`${name}, `));
    if (mine.length > 0) return mine.map(make);
    if (!existsSync(name)) {
      const known = own.map((v) => v.name);
      const near = nearest(name, known);
      throw new UsageError(
        `there is no variant "${name}", and no such file; ${
          near !== undefined
            ? `did you mean "${near}"?`
            : known.length > 0
              ? `${file.path} has ${known.slice(0, 12).join(', ')}`
              : `${file.path} has no variants of its own: write them under variants:, or name files`
        }`,
      );
    }
    let text: string;
    try {
      text = readFileSync(name, 'utf8');
    } catch (error) {
      throw new UsageError(
        `${name} cannot be read (${(error as NodeJS.ErrnoException).code ?? 'unknown cause'})`,
      );
    }
    if (isWholeBoat(text)) {
      const boat = loadBoat(name);
      return [{ name: boat.spec.name, boat, differences: fileDifferences(file.text, text) }];
    }
    return told('', () =>
      variantsFromFile(text, name, basename(name).replace(/\.[^.]+$/, ''), file.text),
    ).map(make);
  });
}
