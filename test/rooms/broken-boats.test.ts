import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { BoatFileError, readBoatFile, readBoatSpec } from '../../src/boat/index.js';
import { brokenBoats, soundDinghy, soundKeelboat } from '../support/broken-boats.js';

function errorOf(run: () => unknown): unknown {
  try {
    run();
  } catch (error) {
    return error;
  }
  return undefined;
}

const folder = mkdtempSync(join(tmpdir(), 'broken-boats-'));
afterAll(() => rmSync(folder, { recursive: true }));

describe('a broken boat file', () => {
  it('is broken by its one change alone: the files it is made from are sound', () => {
    for (const text of [soundDinghy, soundKeelboat]) expect(() => readBoatSpec(text)).not.toThrow();
    expect(brokenBoats.length).toBeGreaterThanOrEqual(45);
    expect(new Set(brokenBoats.map((b) => b.name)).size).toBe(brokenBoats.length);
  });

  it.each(brokenBoats)('is refused in plain words: $name', ({ text, expect: wanted }) => {
    const start = performance.now();
    const error = errorOf(() => readBoatSpec(text, 'broken.yaml'));
    expect(error).toBeInstanceOf(BoatFileError);
    const { message, problems } = error as BoatFileError;
    expect(message).toMatch(wanted);
    for (const line of message.split('\n')) {
      expect(line).toMatch(/^(broken\.yaml:[1-9]\d*:[1-9]\d* \S.*: .+; .+|\.\.\. and \d+ more)$/);
    }
    expect(message.split('\n').length).toBeLessThanOrEqual(11);
    for (const p of problems) expect(p.hint).not.toBe('');
    expect(message).not.toMatch(/undefined|NaN\b.*NaN|\[object/);
    expect(performance.now() - start).toBeLessThan(1500);
  });

  it('is refused from disk just as from text', () => {
    for (const { name, text } of brokenBoats.filter((b) => b.text.length < 10_000)) {
      const path = join(folder, 'boat.yaml');
      writeFileSync(path, text);
      expect(
        errorOf(() => readBoatFile(path)),
        name,
      ).toBeInstanceOf(BoatFileError);
    }
  });

  it('that is not there, or is a folder, is refused too', () => {
    const missing = errorOf(() => readBoatFile(join(folder, 'none.yaml')));
    expect(missing).toBeInstanceOf(BoatFileError);
    expect((missing as Error).message).toMatch(/none\.yaml:1:1 file: there is no such file; check the path/);
    const directory = errorOf(() => readBoatFile(folder));
    expect((directory as Error).message).toMatch(/this is a folder/);
  });

  it('has all its problems told at once, ten of them in full', () => {
    const text = soundDinghy.replace(/ m\b/g, ' kg').replace(/ cm\b/g, ' kg');
    const error = errorOf(() => readBoatSpec(text, 'b')) as BoatFileError;
    expect(error.message.split('\n')).toHaveLength(11);
    expect(error.message).toMatch(/\n\.\.\. and \d+ more$/);
    const lines = error.problems.map((p) => p.line);
    expect(lines).toEqual([...lines].sort((a, b) => a - b));
  });

  it('with ninety thousand keys is refused in good time', () => {
    const text = Array.from({ length: 90_000 }, (_, i) => `k${i}: 1`).join('\n');
    const start = performance.now();
    expect(errorOf(() => readBoatSpec(text))).toBeInstanceOf(BoatFileError);
    expect(performance.now() - start).toBeLessThan(3000);
  });
});
