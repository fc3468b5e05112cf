/** One thing wrong with a boat file. */
export interface BoatFileProblem {
  /** Line and column in the text, from 1. */
  readonly line: number;
  readonly column: number;
  /** The file, where it is another one than the boat file. */
  readonly file?: string;
  /** Path of keys such as `sails.main.luff`; empty for the file as a whole. */
  readonly key: string;
  readonly message: string;
  readonly hint: string;
}

/** How many problems are written out; the rest are counted. */
const SHOWN = 10;

/** A boat file that cannot be used: every problem with its place, one line each in the message. */
export class BoatFileError extends Error {
  constructor(
    readonly file: string,
    readonly problems: readonly BoatFileProblem[],
    total: number = problems.length,
  ) {
    super(
      [
        ...problems.slice(0, SHOWN).map((p) => problemLine(file, p)),
        ...(total > SHOWN ? [`... and ${total - SHOWN} more`] : []),
      ].join('\n'),
    );
    this.name = 'BoatFileError';
  }
}

/** `boats/mine.yaml:14:9 sails.main.luff: 5200 m is outside 0.5 m to 40 m; is it in millimetres?` */
function problemLine(file: string, p: BoatFileProblem): string {
  const key = p.key === '' ? 'file' : p.key;
  return `${p.file ?? file}:${p.line}:${p.column} ${key}: ${p.message}${p.hint === '' ? '' : `; ${p.hint}`}`;
}

/** Collects problems; keeps the first few dozen and counts on. */
export class ProblemList {
  readonly problems: BoatFileProblem[] = [];
  total = 0;

  constructor(readonly file: string) {}

  get full(): boolean {
    return this.total >= 50;
  }

  add(problem: BoatFileProblem): void {
    this.total++;
    if (this.problems.length < 50) this.problems.push(problem);
  }

  /** @throws BoatFileError when there are problems, in the order of their places in the text */
  throwIfAny(): void {
    if (this.total === 0) return;
    const sorted = [...this.problems].sort((a, b) => a.line - b.line || a.column - b.column);
    throw new BoatFileError(this.file, sorted, this.total);
  }
}
