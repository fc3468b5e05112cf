import { existsSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { boatJsonSchema, type StarterKind, starterBoat } from '../boat/index.js';
import { OutputError, writeFiles } from '../publish/index.js';
import { UsageError } from './errors.js';
import { print, printRaw } from './output.js';

export interface NewArguments {
  readonly file: string;
  readonly kind: StarterKind;
  readonly force: boolean;
}

const SCHEMA = 'boat.schema.json';

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
    const folder = dirname(a.file);
    // The schema that the first line names, so that editors complete and check; one that is there already stays.
    const beside = existsSync(join(folder, SCHEMA))
      ? []
      : [{ name: SCHEMA, content: `${JSON.stringify(boatJsonSchema(), null, 2)}\n` }];
    writeFiles(folder, [{ name, content }, ...beside], { overwrite: a.force });
  } catch (error) {
    if (error instanceof OutputError && error.message.endsWith('exists already'))
      throw new UsageError(`${error.message}; --force replaces it`);
    throw error;
  }
  print(`${a.file} written. Put your own figures in, then: polarwright check ${a.file}`);
}
