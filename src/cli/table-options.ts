import { readFileSync, statSync } from 'node:fs';
import {
  type AngleUnit,
  DELIMITERS,
  looksLikeJson,
  readDelimitedTable,
  readSignalKPolar,
  type SpeedUnit,
  TableFileError,
  type TableFormat,
  type TableHints,
  type TableLayout,
  type TableReading,
} from '../publish/index.js';
import { standardInput } from './boat-input.js';
import { UsageError } from './errors.js';

/** Options of delimited text that reading and writing share, as written on the command line. */
export interface TableWords {
  readonly delimiter: string | undefined;
  readonly decimalMark: string | undefined;
  readonly windUnit: string | undefined;
  readonly speedUnit: string | undefined;
  readonly angleUnit: string | undefined;
}

/** A delimiter by its name, or one character. @throws UsageError */
export function readDelimiter(text: string | undefined): string | undefined {
  if (text === undefined) return undefined;
  if (Object.hasOwn(DELIMITERS, text)) return DELIMITERS[text]!;
  if (!/^[^\w\s"'.+-]$/u.test(text))
    throw new UsageError(
      `--delimiter: "${text}" is none of ${Object.keys(DELIMITERS).join(', ')}, nor one character that cannot stand in a number`,
    );
  return text;
}

/** What the words say about a table. Choices are checked by the command line's own list. */
export function tableHints(w: TableWords, layout?: string): TableHints {
  return {
    layout: layout as TableLayout | undefined,
    delimiter: readDelimiter(w.delimiter),
    decimalMark: w.decimalMark === undefined ? undefined : w.decimalMark === 'comma' ? ',' : '.',
    windUnit: w.windUnit as SpeedUnit | undefined,
    speedUnit: w.speedUnit as SpeedUnit | undefined,
    angleUnit: w.angleUnit as AngleUnit | undefined,
  };
}

/** A format with what the words change. @throws UsageError where delimiter and decimal mark are the same */
export function formatWith(base: TableFormat, w: TableWords): TableFormat {
  const { layout: _, ...hints } = tableHints(w);
  const changed = Object.fromEntries(Object.entries(hints).filter(([, v]) => v !== undefined));
  const f: TableFormat = { ...base, ...changed };
  const places = f.angleUnit === 'rad' ? { angleDecimals: 4 } : {};
  if (f.delimiter === f.decimalMark)
    throw new UsageError(
      '--delimiter and --decimal-mark are both a comma; take --delimiter semicolon or tab',
    );
  return { ...f, ...places };
}

/** Largest file [bytes] that is taken for a table. */
const LARGEST = 5e6;

/** Reads a table of boat speeds, in either form; "-" is standard input. @throws UsageError */
export function loadTable(path: string, hints: TableHints): TableReading {
  const name = path === '-' ? 'standard input' : path;
  const bytes = path === '-' ? standardInput() : fileBytes(path);
  if (bytes.length > LARGEST)
    throw new UsageError(`${name}: ${bytes.length} bytes are more than a table has (${LARGEST})`);
  let text: string;
  try {
    text = new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    text = new TextDecoder('latin1').decode(bytes);
  }
  if (text.includes('\0')) throw new UsageError(`${name}: this is not a text file`);
  try {
    return looksLikeJson(text) ? readSignalKPolar(text, name) : readDelimitedTable(text, name, hints);
  } catch (error) {
    if (error instanceof TableFileError) throw new UsageError(error.message);
    throw error;
  }
}

function fileBytes(path: string): Uint8Array {
  try {
    if (!statSync(path).isFile()) throw new UsageError(`${path}: this is not a file`);
    return statSync(path).size > LARGEST ? new Uint8Array(LARGEST + 1) : readFileSync(path);
  } catch (error) {
    if (error instanceof UsageError) throw error;
    const code = (error as NodeJS.ErrnoException).code;
    throw new UsageError(
      `${path}: ${code === 'ENOENT' ? 'there is no such file' : `cannot be read (${code ?? 'unknown cause'})`}`,
    );
  }
}
