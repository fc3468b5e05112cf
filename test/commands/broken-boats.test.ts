import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { brokenBoats } from '../support/broken-boats.js';
import { type Run, runCommand, runMain, scratchFolder } from '../support/command.js';

const folder = scratchFolder();
const path = join(folder.path, 'broken.yaml');
afterAll(folder.remove);

/** One message on standard error, no stack, nothing on standard output, nothing written. */
function expectRefused(run: Run, wanted: RegExp): void {
  expect(run.code).toBe(2);
  expect(run.out).toBe('');
  expect(run.err).toMatch(wanted);
  expect(run.err).not.toMatch(/^\s+at .+:\d+:\d+\)?$/m);
  expect(run.err).not.toMatch(/node_modules|Internal failure|\bError:/);
  expect(run.err.endsWith('\n')).toBe(true);
  expect(run.err.trim().split('\n').length).toBeLessThanOrEqual(12);
  expect(folder.list()).toEqual(['broken.yaml']);
}

describe('a broken boat file given to a command', () => {
  it.each(brokenBoats)('ends it with one message: $name', async ({ name, text, expect: wanted }) => {
    writeFileSync(path, text);
    // From disk no more is read than shows that a file is too large: it is counted in bytes, up to there.
    const message = name === 'too large' ? /file: the file has \d+ bytes; .*; is it really/ : wanted;
    expectRefused(await runMain(['polar', path, '--out', join(folder.path, 'reports')]), message);
  });

  const few = brokenBoats.filter((b) => b.text.length < 10_000).filter((_, i) => i % 20 === 0);
  it.each(few)('ends a whole process the same way: $name', ({ text, expect: wanted }) => {
    writeFileSync(path, text);
    expectRefused(runCommand(['polar', path, '--out', join(folder.path, 'reports')]), wanted);
    const piped = runCommand(['check', '-'], { input: text });
    expectRefused(piped, wanted);
    expect(piped.err).toMatch(/^standard input:\d+:\d+ /);
  });

  it('never sends control characters of the file to the terminal', async () => {
    writeFileSync(path, 'name: x\n"\\e[31mhull\\u202e": 1\n');
    const run = await runMain(['check', path]);
    expect(run.code).toBe(2);
    expect(run.err).toMatch(/hull/);
    expect([...run.err].some((c) => c !== '\n' && (c < ' ' || c === '\u202e' || c === '\u007f'))).toBe(false);
  });
});
