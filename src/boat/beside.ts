/** Reads a file that lies beside the boat file, by the name the boat file gives. @throws BesideError */
export type ReadBeside = (name: string) => Uint8Array;

/** A file beside the boat file that cannot be had. */
export class BesideError extends Error {
  constructor(
    message: string,
    readonly hint: string,
  ) {
    super(message);
    this.name = 'BesideError';
  }
}

/** Stands in where there is no folder to look in: text from standard input or from memory. */
export const nothingBeside: ReadBeside = () => {
  throw new BesideError(
    'another file is named, but this boat has no folder of its own',
    'save the boat file in the same folder and name it instead',
  );
};

/**
 * A name below the boat file's own folder, in parts: boat files come from others, and must not reach elsewhere.
 * @throws BesideError
 */
export function partsBeside(name: string): string[] {
  const parts = name.split(/[\\/]+/);
  const outside = /^[\\/]|^[A-Za-z]:/.test(name) || parts.includes('..') || name.includes('\0');
  if (outside)
    throw new BesideError(
      "the name leads out of the boat file's folder",
      'put the file beside the boat file',
    );
  return parts;
}
