import { mkdirSync, statSync } from 'node:fs';
import { dirname } from 'node:path';

/**
 * Makes a folder and those above it that are missing, one by one: the runtime's own way of making them all never ends
 * where a file system takes none (/proc).
 * @returns the topmost folder made; undefined when all were there
 * @throws the file system's error
 */
export function makeFolder(folder: string): string | undefined {
  if (statSync(folder, { throwIfNoEntry: false })?.isDirectory()) return undefined;
  const parent = dirname(folder);
  const above = parent === folder ? undefined : makeFolder(parent);
  try {
    mkdirSync(folder);
  } catch (error) {
    // Another run may have made it in the meantime.
    if ((error as NodeJS.ErrnoException).code === 'EEXIST' && statSync(folder).isDirectory()) return above;
    throw error;
  }
  return above ?? folder;
}
