import { basename, dirname } from 'node:path';
import { type StarterKind, starterBoat } from '../boat/index.js';
import { OutputError, writeFiles } from '../publish/index.js';
import { UsageError } from './errors.js';
import { print, printRaw } from './output.js';

export interface NewArguments {
  readonly file: string;
  readonly kind: StarterKind;
  readonly force: boolean;
}

/** Writes an annotated boat file to start from. */
export function newCommand(a: NewArguments): void {
  const content = starterBoat(a.kind);
  if (a.file === '-') {
    printRaw(content);
    return;
  }
  const name = basename(a.file);
  if (a.file.trim() === '' || name === '' || /[\\/]$/.test(a.file))
    throw new UsageError('new: name a file, such as boat.yaml');
  try {
    writeFiles(dirname(a.file), [{ name, content }], { overwrite: a.force });
  } catch (error) {
    if (error instanceof OutputError && error.message.endsWith('exists already'))
      throw new UsageError(`${error.message}; --force replaces it`);
    throw error;
  }
  print(`${a.file} written. Put your own figures in, then: polarwright check ${a.file}`);
}
