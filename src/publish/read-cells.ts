/** A table from elsewhere that cannot be used. The message names file and line, the value, and what is allowed. */
export class TableFileError extends Error {
  override readonly name = 'TableFileError';
  constructor(file: string, line: number | undefined, message: string, hint: string) {
    super(`${file}${line === undefined ? '' : `:${line}`}: ${message}${hint === '' ? '' : `; ${hint}`}`);
  }
}

/** One line of a delimited text, in cells. */
export interface CellRow {
  /** From 1. */
  readonly line: number;
  readonly cells: readonly string[];
}

/** Cells of a line; quotes after RFC 4180 (within one line). A blank as delimiter stands for any run of blanks. */
function cellsOf(line: string, delimiter: string): string[] {
  if (delimiter === ' ') return line.trim().split(/[ \t]+/);
  const cells: string[] = [];
  let cell = '';
  let inside = false;
  for (let i = 0; i < line.length; i++) {
    const c = line[i]!;
    if (inside && c === '"' && line[i + 1] === '"') {
      cell += '"';
      i++;
    } else if (c === '"' && (inside || cell.trim() === '')) inside = !inside;
    else if (c === delimiter && !inside) {
      cells.push(cell.trim());
      cell = '';
    } else cell += c;
  }
  return [...cells, cell.trim()];
}

/** The rows of a delimited text: no empty lines, no lines that begin with "#", no column that is empty all the way. */
export function readCells(text: string, delimiter: string): CellRow[] {
  const rows = text
    .replace(/^\ufeff/, '')
    .split(/\r\n|\n|\r/)
    .map((l, i) => ({ line: i + 1, text: l }))
    .filter((l) => l.text.trim() !== '' && !/^\s*#/.test(l.text))
    .map((l) => ({ line: l.line, cells: cellsOf(l.text, delimiter) }));
  let widest = Math.max(0, ...rows.map((r) => r.cells.length));
  while (widest > 0 && rows.every((r) => (r.cells[widest - 1] ?? '') === '')) widest--;
  // An empty corner is lost between blanks.
  const lost = delimiter === ' ' && rows.slice(1).every((r) => r.cells.length === widest);
  return rows.map((r, i) => ({
    line: r.line,
    cells: lost && i === 0 && r.cells.length === widest - 1 ? ['', ...r.cells] : r.cells.slice(0, widest),
  }));
}

/** A number as written, with "." or "," for the decimals; undefined where it is none. */
export function numberIn(cell: string, mark: '.' | ','): number | undefined {
  const text = cell.replace(/\s*°$/, '');
  const plain = mark === ',' ? text.replace(',', '.') : text;
  if (mark === ',' && /\..*\./.test(plain)) return undefined;
  return /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain) ? Number(plain) : undefined;
}

/** A cell that says there is nothing. */
export const isMissing = (cell: string): boolean => /^(|-+|nan|n\/?a|null|none|\?)$/i.test(cell);

/** Decimals that a number is written with. */
export const decimalsIn = (cell: string, mark: '.' | ','): number => {
  const at = cell.indexOf(mark);
  return at < 0 ? 0 : cell.slice(at + 1).replace(/\D.*$/, '').length;
};

const CANDIDATES: readonly { readonly delimiter: string; readonly decimalMark: '.' | ',' }[] = [
  { delimiter: '\t', decimalMark: '.' },
  { delimiter: '\t', decimalMark: ',' },
  { delimiter: ';', decimalMark: '.' },
  { delimiter: ';', decimalMark: ',' },
  { delimiter: ',', decimalMark: '.' },
  { delimiter: '|', decimalMark: '.' },
  { delimiter: '|', decimalMark: ',' },
  { delimiter: ' ', decimalMark: '.' },
  { delimiter: ' ', decimalMark: ',' },
];

/** How well a text falls into numbers: cells that are numbers, less those that are neither number nor empty. */
function score(rows: readonly CellRow[], mark: '.' | ','): number {
  const width = rows[0]?.cells.length ?? 0;
  if (rows.length < 2 || width < 2) return Number.NEGATIVE_INFINITY;
  let sum = 0;
  for (const r of rows.slice(1)) {
    if (r.cells.length !== width) sum -= 2 * width;
    for (const c of r.cells) sum += numberIn(c, mark) !== undefined ? 1 : isMissing(c) ? 0 : -2;
  }
  return sum;
}

/**
 * The delimiter and decimal mark under which a text is most of all a table of numbers.
 * @param given what is known already
 */
export function guessCells(
  text: string,
  given: { readonly delimiter?: string | undefined; readonly decimalMark?: '.' | ',' | undefined },
): { readonly delimiter: string; readonly decimalMark: '.' | ','; readonly rows: readonly CellRow[] } {
  const own = given.delimiter;
  const known =
    own === undefined ? [] : (['.', ','] as const).map((decimalMark) => ({ delimiter: own, decimalMark }));
  const candidates = (own === undefined ? CANDIDATES : known).filter(
    (c) => given.decimalMark === undefined || c.decimalMark === given.decimalMark,
  );
  let best = { ...candidates[0]!, rows: readCells(text, candidates[0]!.delimiter) };
  let most = score(best.rows, best.decimalMark);
  for (const c of candidates.slice(1)) {
    const rows = readCells(text, c.delimiter);
    const s = score(rows, c.decimalMark);
    if (s > most) {
      most = s;
      best = { ...c, rows };
    }
  }
  return best;
}
