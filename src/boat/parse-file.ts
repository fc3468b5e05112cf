import {
  type Document,
  isAlias,
  isMap,
  isScalar,
  isSeq,
  LineCounter,
  type ParsedNode,
  parseAllDocuments,
  type Scalar,
  type YAMLMap,
} from 'yaml';
import { KINDS, nearest, parseQuantity, QuantityError, type UnitEngine } from '../units/index.js';
import type { Field, QuantityField } from './fields.js';
import { BoatFileError, ProblemList } from './problems.js';
import { type BoatFileValue, boatFile, rangeSi } from './schema.js';
import { applyChanges, type Change, showPath, variantsIn } from './variants.js';

/** Largest boat file [characters or bytes]: 1 MB. */
const LARGEST = 1_000_000;
/** Most uses of aliases (*name), and deepest nesting of brackets: far beyond any boat. */
const MOST_ALIASES = 200;
const DEEPEST = 40;

export type Path = readonly string[];

/** What a file says, with the places where it says it. */
export interface ParsedFile {
  readonly value: BoatFileValue;
  readonly problems: ProblemList;
  /** Adds a problem at a key, or at the nearest key above it that is in the file. */
  complain(path: Path, message: string, hint: string): void;
}

/**
 * Reads the text of a boat file by its definition: quantities to SI, choices, names; ranges are checked.
 * Problems are collected, not thrown, but for a text that is no YAML at all.
 * @param changes written into the text's keys before they are read; problems name the places of the changes
 * @throws BoatFileError
 */
export function parseBoatFile(
  input: string | Uint8Array,
  file: string,
  engine?: () => UnitEngine,
  changes: readonly Change[] = [],
): ParsedFile {
  const problems = new ProblemList(file);
  const whole = (message: string, hint: string, line = 1, column = 1, key = ''): never => {
    throw new BoatFileError(file, [{ line, column, key, message, hint }]);
  };
  const text = typeof input === 'string' ? input : decode(input, whole);
  if (text.length > LARGEST) {
    whole(`the file has ${text.length} characters; at most ${LARGEST} are read`, 'is it really a boat file?');
  }
  // biome-ignore lint/suspicious/noControlCharactersInRegex: this looks for them
  const control = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f\ufffd]/.exec(text);
  if (control !== null) {
    const line = text.slice(0, control.index).split('\n').length;
    whole('the file holds characters that are not text', 'boat files are plain UTF-8 text', line);
  }
  if (text.trim() === '') whole('the file is empty', 'the starter boat shows what to write');
  const deep = deepLine(text);
  if (deep > 0)
    whole('brackets or dashes are nested too deeply', 'a boat file needs at most six levels', deep);

  const lines = new LineCounter();
  const documents = ((): ReturnType<typeof parseAllDocuments> => {
    try {
      return parseAllDocuments(text, {
        lineCounter: lines,
        prettyErrors: false,
        uniqueKeys: false,
        logLevel: 'silent',
        version: '1.2',
        schema: 'core',
      });
    } catch (error) {
      return whole(
        `the text cannot be read as YAML (${error instanceof Error ? error.message.split('\n')[0] : 'unknown cause'})`,
        'is it nested too deeply?',
      );
    }
  })();
  if (!Array.isArray(documents) || documents.length === 0) {
    return whole('the file is empty', 'the starter boat shows what to write');
  }
  const list = documents as Document.Parsed[];
  const doc = list[0]!;
  const troubles = list.flatMap((d) => [...d.errors, ...d.warnings]);
  if (troubles.length > 0) {
    const rows = text.split('\n');
    for (const trouble of troubles.slice(0, 50)) {
      let { line, col } = lines.linePos(trouble.pos[0]);
      // An unclosed bracket is noticed at the end of the text: point at the last line that says something.
      while (line > 1 && (rows[line - 1] ?? '').trim() === '') {
        line--;
        col = 1;
      }
      problems.add({
        line: Math.max(1, line),
        column: Math.max(1, col),
        key: keyAround(rows, line),
        message: trouble.message.split('\n')[0]!.replace(/\.$/, ''),
        hint: yamlHint(trouble.code, trouble.message, rows[line - 1] ?? ''),
      });
    }
    problems.throwIfAny();
  }
  if (list.length > 1) {
    const { line, col } = lines.linePos(list[1]!.range[0]);
    whole('the file holds more than one document', 'one boat a file: remove the line ---', line, col);
  }
  const root = doc.contents;
  if (!isMap(root)) {
    whole(
      'the file must be a list of keys and values at the top',
      'begin with "name: " and a name; the starter boat shows the rest',
    );
  }

  const places = new Map<string, number>();
  const id = (path: Path): string => path.join('\u0001');
  const complain = (path: Path, message: string, hint: string, offset?: number): void => {
    let at = offset;
    for (let n = path.length; at === undefined && n > 0; n--) at = places.get(id(path.slice(0, n)));
    if (at !== undefined && at < 0) {
      // Nodes that a change has written bear its number: see `applyChanges`.
      problems.add({ ...changes[-at - 1]!.place, key: showPath(path), message, hint });
      return;
    }
    const { line, col } = lines.linePos(at ?? 0);
    problems.add({ line: Math.max(1, line), column: Math.max(1, col), key: showPath(path), message, hint });
  };
  applyChanges(root as YAMLMap, changes, engine, (i, message, hint) => {
    problems.add({ ...changes[i]!.place, key: showPath(changes[i]!.path), message, hint });
  });

  let aliases = 0;
  const startOf = (node: unknown): number | undefined => {
    const range = (node as { range?: readonly number[] | null } | null)?.range;
    return range?.[0];
  };

  const read = (field: Field, given: unknown, path: Path): unknown => {
    if (problems.full) return undefined;
    let node = given as ParsedNode | null;
    const offset = startOf(node);
    if (offset !== undefined && path.length > 0) places.set(id(path), offset);
    if (node !== null && isAlias(node)) {
      if (++aliases > MOST_ALIASES) {
        if (aliases === MOST_ALIASES + 1)
          complain(path, 'aliases (*name) are used too often', 'write the values out');
        return undefined;
      }
      node = (node.resolve(doc) ?? null) as ParsedNode | null;
      if (node === null) {
        complain(path, 'this alias (*name) leads nowhere', 'write the value out');
        return undefined;
      }
    }
    if (node !== null && typeof node.tag === 'string' && node.tag !== '') {
      complain(path, 'tags (!name) are not allowed', `remove the tag ${node.tag.slice(0, 40)}`);
      return undefined;
    }
    const empty = node === null || (isScalar(node) && node.value === null);
    if (empty) {
      complain(path, `nothing is written here, but ${wanted(field)} is wanted`, hintOf(field));
      return undefined;
    }
    if (field.type === 'section' || field.type === 'named') return readMap(field, node, path);
    if (field.type === 'list') return readList(field, node, path);
    if (field.type === 'differences') return undefined;
    if (!isScalar(node)) {
      complain(
        path,
        `${isMap(node) ? 'keys' : 'a list'} found, but ${wanted(field)} is wanted`,
        hintOf(field),
      );
      return undefined;
    }
    return readScalar(field, node, path);
  };

  const readMap = (field: Field & { type: 'section' | 'named' }, node: unknown, path: Path): unknown => {
    if (!isMap(node)) {
      complain(path, `${kindOf(node)} found, but ${wanted(field)} is wanted`, hintOf(field));
      return undefined;
    }
    const out: Record<string, unknown> = Object.create(null);
    const seen = new Map<string, number>();
    let count = 0;
    for (const pair of node.items) {
      if (problems.full) return out;
      const key = isScalar(pair.key) ? scalarText(pair.key) : '';
      const at = startOf(pair.key) ?? startOf(node);
      const below = [...path, key];
      if (key === '' || !isScalar(pair.key)) {
        complain(path, 'a key must be a plain word', hintOf(field), at);
        continue;
      }
      const before = seen.get(key);
      if (before !== undefined) {
        const first = lines.linePos(before).line;
        complain(below, 'this key is written twice', `it stands in line ${first} already; keep one`, at);
        continue;
      }
      seen.set(key, at ?? 0);
      if (field.type === 'section') {
        if (!Object.hasOwn(field.keys, key)) {
          const likely = nearest(key, Object.keys(field.keys));
          complain(
            below,
            'unknown key',
            likely !== undefined
              ? `did you mean "${likely}"?`
              : `known here: ${Object.keys(field.keys).join(', ')}`,
            at,
          );
          continue;
        }
        places.set(id(below), at ?? 0);
        out[key] = read(field.keys[key]!, pair.value, below);
      } else {
        if (key.length > 80) {
          complain(below, 'this name is longer than 80 characters', 'use a shorter name', at);
          continue;
        }
        count++;
        places.set(id(below), at ?? 0);
        out[key] = read(field.entry, pair.value, below);
      }
    }
    if (field.type === 'named' && (count < field.count[0] || count > field.count[1])) {
      complain(
        path,
        `${count} entries found; ${field.count[0]} to ${field.count[1]} are allowed`,
        hintOf(field),
      );
    }
    if (field.type === 'section') {
      for (const [key, inner] of Object.entries(field.keys)) {
        if (inner.missing !== 'required' || seen.has(key)) continue;
        if (inner.unless !== undefined && seen.has(inner.unless)) continue;
        const near = [...seen.keys()].find((k) => !Object.hasOwn(field.keys, k) && nearest(k, [key]) === key);
        if (near === undefined) {
          complain([...path, key], `missing: ${wanted(inner)} is needed`, hintOf(inner), startOf(node));
        }
      }
    }
    return out;
  };

  const readList = (field: Field & { type: 'list' }, node: unknown, path: Path): unknown => {
    if (!isSeq(node)) {
      complain(path, `${kindOf(node)} found, but a list is wanted`, `${hintOf(field)} (as [one, two])`);
      return undefined;
    }
    if (node.items.length < field.count[0] || node.items.length > field.count[1]) {
      complain(
        path,
        `${node.items.length} entries found; ${field.count[0]} to ${field.count[1]} are allowed`,
        hintOf(field),
      );
      return undefined;
    }
    return node.items.map((item, i) => read(field.entry, item, [...path, `[${i + 1}]`]));
  };

  const readScalar = (field: Field, node: Scalar, path: Path): unknown => {
    const said = scalarText(node);
    switch (field.type) {
      case 'text':
        if (said.trim() === '') complain(path, 'the text is empty', hintOf(field));
        else if (said.length > field.longest) {
          complain(path, `the text is longer than ${field.longest} characters`, 'shorten it');
        }
        return said;
      case 'yes-no': {
        const word = said.trim().toLowerCase();
        if (word === 'yes' || word === 'true') return true;
        if (word === 'no' || word === 'false') return false;
        complain(path, `"${clip(said)}" is neither yes nor no`, 'write yes or no');
        return undefined;
      }
      case 'choice': {
        if (field.choices.includes(said)) return said;
        const likely = nearest(said, field.choices);
        complain(
          path,
          `"${clip(said)}" is not one of ${field.choices.join(', ')}`,
          likely !== undefined ? `did you mean "${likely}"?` : `choose one of ${field.choices.join(', ')}`,
        );
        return undefined;
      }
      case 'count': {
        const value = /^\d{1,9}$/.test(said.trim()) ? Number(said) : Number.NaN;
        const [low, high] = field.range;
        if (value >= low && value <= high) return value;
        complain(path, `"${clip(said)}" is not a whole number from ${low} to ${high}`, hintOf(field));
        return undefined;
      }
      case 'quantity':
        return readQuantity(field, said, path);
      default:
        return undefined;
    }
  };

  const readQuantity = (field: QuantityField, said: string, path: Path): number | undefined => {
    let value: number;
    try {
      value = parseQuantity(said, field.kind, engine);
    } catch (error) {
      if (!(error instanceof QuantityError)) throw error;
      complain(path, error.message, error.hint);
      return undefined;
    }
    const [low, high] = rangeSi(field)!;
    if (value >= low && value <= high) return value;
    const { bareUnit, bareFactor } = KINDS[field.kind];
    const unit = bareUnit === '' ? '' : ` ${bareUnit}`;
    const bare = /^[-+\d.e]+$/i.test(said.trim());
    const number = Number((value / bareFactor).toPrecision(6));
    const shown = bare ? `${clip(said.trim())}${unit}` : `${clip(said)} (${number}${unit})`;
    complain(
      path,
      `${shown} is outside ${field.range[0]}${unit} to ${field.range[1]}${unit}`,
      field.hint ?? mixUp(field, value / bareFactor) ?? 'check the number and its unit',
    );
    return undefined;
  };

  const value = read(boatFile, root, []) as BoatFileValue;
  // Variants that lead nowhere are told of with the file itself, not only when they are asked for.
  if (value.variants !== undefined && changes.length === 0) variantsIn(text, file);
  return { value, problems, complain };
}

/** Path of keys around a line of a text that is no sound YAML, judged by the indents. */
function keyAround(rows: readonly string[], line: number): string {
  const keys: string[] = [];
  let indent = Number.POSITIVE_INFINITY;
  for (let i = line - 1; i >= 0 && i > line - 200 && indent > 0; i--) {
    const found = /^(\s*)([A-Za-z_][\w -]{0,40}):/.exec(rows[i] ?? '');
    if (found === null || found[1]!.length >= indent) continue;
    keys.unshift(found[2]!);
    indent = found[1]!.length;
  }
  return keys.join('.');
}

/** Units people mix up, as factors to the bare unit of the kind. */
const MIX_UPS: Partial<Record<QuantityField['kind'], readonly (readonly [string, number])[]>> = {
  length: [
    ['millimetres', 0.001],
    ['centimetres', 0.01],
    ['feet', 0.3048],
    ['inches', 0.0254],
  ],
  area: [
    ['square feet', 0.09290304],
    ['square centimetres', 1e-4],
  ],
  mass: [
    ['tonnes', 1000],
    ['grams', 0.001],
    ['pounds', 0.45359237],
  ],
  angle: [['radians', 180 / Math.PI]],
  ratio: [['per cent', 0.01]],
  volume: [['litres', 0.001]],
};

function mixUp(field: QuantityField, number: number): string | undefined {
  const [low, high] = field.range;
  const fits = (x: number): boolean => x >= low && x <= high;
  for (const [unit, factor] of MIX_UPS[field.kind] ?? []) {
    if (fits(number * factor)) return `is it in ${unit}?`;
  }
  return fits(-number) ? 'is the sign right?' : undefined;
}

function scalarText(node: Scalar): string {
  if (typeof node.value === 'string') return node.value;
  return node.source ?? String(node.value);
}

function clip(text: string): string {
  return text.length > 40 ? `${text.slice(0, 37)}...` : text;
}

function kindOf(node: unknown): string {
  if (isMap(node)) return 'keys';
  if (isSeq(node)) return 'a list';
  return 'a single value';
}

function wanted(field: Field): string {
  switch (field.type) {
    case 'quantity':
      return `${KINDS[field.kind].noun} such as ${KINDS[field.kind].example}`;
    case 'count':
      return 'a whole number';
    case 'choice':
      return `one of ${field.choices.join(', ')}`;
    case 'yes-no':
      return 'yes or no';
    case 'text':
      return 'a text';
    case 'section':
      return `a section with keys such as ${Object.keys(field.keys).slice(0, 3).join(', ')}`;
    case 'named':
      return 'a section with a name for each entry';
    case 'list':
      return 'a list';
    case 'differences':
      return 'a section with keys as in this file';
  }
}

function hintOf(field: Field): string {
  return (
    field.hint ?? `${field.describe.charAt(0).toLowerCase()}${field.describe.slice(1).replace(/\.$/, '')}`
  );
}

function yamlHint(code: string, message: string, content: string): string {
  if (content.includes('\t')) return 'indent with spaces, not with tabs';
  if (/^Flow /.test(message)) return 'a bracket or brace may be missing';
  switch (code) {
    case 'BAD_INDENT':
      return 'entries of one section must stand under each other';
    case 'TAG_RESOLVE_FAILED':
      return 'remove the tag (the word after "!")';
    case 'BAD_ALIAS':
      return 'write the value out instead of *name';
    case 'MISSING_CHAR':
      return 'a bracket, a quotation mark, or the colon after a key may be missing';
    case 'BLOCK_AS_IMPLICIT_KEY':
    case 'MULTILINE_IMPLICIT_KEY':
      return 'is there a colon too many, or an indent missing?';
    default:
      return 'check colons, indents and quotation marks in this line';
  }
}

function decode(bytes: Uint8Array, whole: (message: string, hint: string) => never): string {
  if (bytes.length > LARGEST) {
    return whole(
      `the file has ${bytes.length} bytes; at most ${LARGEST} are read`,
      'is it really a boat file?',
    );
  }
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return whole('the file is not UTF-8 text', 'save it as plain UTF-8 text');
  }
}

/** First line with brackets, dashes or question marks nested deeper than allowed, or 0. */
function deepLine(text: string): number {
  let depth = 0;
  let line = 1;
  let marks = 0;
  for (let i = 0; i < text.length; i++) {
    const c = text[i];
    if (c === '\n') {
      line++;
      marks = 0;
    } else if (c === '[' || c === '{') {
      if (++depth > DEEPEST) return line;
    } else if (c === ']' || c === '}') {
      depth = Math.max(0, depth - 1);
    } else if ((c === '-' || c === '?' || c === ':') && text[i + 1] === ' ') {
      if (++marks > DEEPEST) return line;
    }
  }
  return 0;
}
