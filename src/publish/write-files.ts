import {
  closeSync,
  copyFileSync,
  existsSync,
  fsyncSync,
  linkSync,
  lstatSync,
  openSync,
  renameSync,
  rmdirSync,
  rmSync,
  writeSync,
} from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { makeFolder } from './make-folder.js';

/** A file that could not be written: the message names it and says why. */
export class OutputError extends Error {
  override readonly name = 'OutputError';
}

export interface OutputFile {
  /** Name within the folder, without separators. */
  readonly name: string;
  readonly content: string;
}

const CAUSES: Readonly<Record<string, string>> = {
  EACCES: 'permission denied',
  EPERM: 'not permitted',
  EROFS: 'the file system is read-only',
  ENOSPC: 'no space left',
  EDQUOT: 'no space left for this user',
  ENOTDIR: 'a file is in the way of a folder',
  EEXIST: 'a file is in the way of a folder',
  EISDIR: 'a folder is in the way',
  ENAMETOOLONG: 'the name is too long',
  ENOENT: 'there is no such folder',
};

function explained(path: string, error: unknown): OutputError {
  if (error instanceof OutputError) return error;
  const code = (error as NodeJS.ErrnoException).code;
  const cause = code === undefined ? String(error) : (CAUSES[code] ?? code);
  return new OutputError(`cannot write ${path}: ${cause}`, { cause: error });
}

function writeWhole(path: string, content: string): void {
  const file = openSync(path, 'wx', 0o666);
  try {
    const bytes = Buffer.from(content, 'utf8');
    for (let at = 0; at < bytes.length; ) at += writeSync(file, bytes, at);
    fsyncSync(file);
  } finally {
    closeSync(file);
  }
}

/** A second name for a file about to be replaced, or a copy where the file system knows no second names. */
function keep(path: string, kept: string): void {
  rmSync(kept, { force: true });
  try {
    linkSync(path, kept);
  } catch {
    copyFileSync(path, kept);
  }
}

/**
 * Writes all files whole or none: every one under a temporary name in the same folder first, then all renamed. What
 * was begun is undone on failure: temporary files and folders go, files already replaced come back. Existing files of these names are replaced unless
 * `overwrite` is false.
 * @returns the paths written
 * @throws OutputError naming the file and the cause
 */
export function writeFiles(
  folder: string,
  files: readonly OutputFile[],
  options: { readonly overwrite?: boolean } = {},
): string[] {
  const begun: string[] = [];
  const parts: string[] = [];
  const replaced: { readonly target: string; readonly kept: string | undefined }[] = [];
  let made: string | undefined;
  let current = folder;
  try {
    made = makeFolder(folder);
    const targets = files.map((f) => join(folder, f.name));
    for (const [i, file] of files.entries()) {
      current = targets[i]!;
      if (existsSync(current)) {
        if (options.overwrite === false) throw new OutputError(`${current} exists already`);
        if (lstatSync(current).isDirectory())
          throw new OutputError(`cannot write ${current}: a folder is in the way`);
      }
      const part = join(folder, `.polarwright-${process.pid}-${i}.part`);
      rmSync(part, { force: true });
      begun.push(part);
      parts.push(part);
      writeWhole(part, file.content);
    }
    for (const [i, target] of targets.entries()) {
      current = target;
      const kept = existsSync(target) ? join(folder, `.polarwright-${process.pid}-${i}.old`) : undefined;
      if (kept !== undefined) {
        begun.push(kept);
        keep(target, kept);
      }
      renameSync(parts[i]!, target);
      replaced.push({ target, kept });
    }
    for (const { kept } of replaced) if (kept !== undefined) rmSync(kept, { force: true });
    return targets;
  } catch (error) {
    for (const { target, kept } of replaced.reverse()) {
      if (kept === undefined) rmSync(target, { force: true });
      else renameSync(kept, target);
    }
    for (const path of begun) rmSync(path, { force: true });
    if (made !== undefined) removeEmpty(resolve(folder), resolve(made));
    throw explained(current, error);
  }
}

/** Removes the empty folders from `deepest` up to `topmost`. */
function removeEmpty(deepest: string, topmost: string): void {
  let path = deepest;
  for (;;) {
    try {
      rmdirSync(path);
    } catch {
      return; // not empty, or gone: somebody else's
    }
    if (path === topmost || path === dirname(path)) return;
    path = dirname(path);
  }
}
