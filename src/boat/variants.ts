import {
  type Document,
  isAlias,
  isMap,
  isScalar,
  isSeq,
  LineCounter,
  type Node,
  Pair,
  parseDocument,
  Scalar,
  stringify,
  YAMLMap,
  type YAMLSeq,
} from 'yaml';
import { KINDS, nearest, parseQuantity, QuantityError, type UnitEngine } from '../units/index.js';
import type { Field } from './fields.js';
import { BoatFileError } from './problems.js';
import { fieldAt } from './schema.js';

/** Where a change is written. */
export interface Place {
  readonly file: string;
  readonly line: number;
  readonly column: number;
}

/** One difference from a boat file: a new value at a path of keys. Plain data. */
export interface Change {
  /** Keys from the top; places in lists from 1, as `[2]`. */
  readonly path: readonly string[];
  /** The new value as YAML text; undefined: the key is left out. */
  readonly value: string | undefined;
  readonly place: Place;
}

/** A named set of changes. */
export interface Variant {
  readonly name: string;
  readonly changes: readonly Change[];
}

/** A change as people read it: what stood there and what stands there now; empty where nothing stands. */
export interface Difference {
  readonly key: string;
  readonly before: string;
  readonly after: string;
}

/** Words that take a key out of the file. */
const LEFT_OUT = 'left out';
/** Most steps of one range, most ranges in one variant of a boat file, most variants of one sweep. */
const MOST_STEPS = 1000;
const MOST_RANGES = 2;
const MOST_VARIANTS = 1_000_000;

const NUMBER = String.raw`[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?`;
const RANGE = new RegExp(
  String.raw`^(times |plus |minus )?\s*(${NUMBER})\s*(\S*)\s+to\s+(${NUMBER})\s*(.*?)\s+in\s+(\d+)\s+steps?$`,
  'i',
);
const RELATIVE = /^(times|plus|minus)\s+(\S.*)$/;

/** Path of keys as people read it: `sail_sets.upwind[2]`. */
export function showPath(path: readonly string[]): string {
  return path.reduce(
    (text, key) =>
      key.startsWith('[')
        ? text + key
        : `${text}${text === '' ? '' : '.'}${/^[\w +'-]{1,40}$/u.test(key) ? key : JSON.stringify(key).slice(0, 50)}`,
    '',
  );
}

/**
 * The values a text stands for: "8 to 10 m in 5 steps" is five of them, both ends among them; "3 or 4" is two;
 * anything else itself.
 * @returns a message instead where a range makes no sense
 */
export function valuesOf(
  text: string,
): readonly string[] | { readonly message: string; readonly hint: string } {
  const range = RANGE.exec(text.trim());
  if (range !== null) {
    const [, word = '', from, unitFrom = '', to, unitTo = '', steps] = range;
    const unit = unitTo === '' ? unitFrom : unitTo;
    const [a, b, n] = [Number(from), Number(to), Number(steps)];
    if (unitFrom !== '' && unitFrom !== unit)
      return { message: `the range "${text}" has two units`, hint: 'write both ends in one unit' };
    if (!(n >= 2 && n <= MOST_STEPS))
      return {
        message: `${n} steps are asked for; 2 to ${MOST_STEPS} are allowed`,
        hint: 'take other steps',
      };
    return Array.from({ length: n }, (_, i) => {
      const v = Number((a + ((b - a) * i) / (n - 1)).toPrecision(10));
      return `${word}${v}${unit === '' ? '' : ` ${unit}`}`;
    });
  }
  if (/\sto\s.*\ssteps?$/.test(text))
    return { message: `"${text}" is no range`, hint: 'write it as: 8 to 10 m in 5 steps' };
  return text.includes(' or ') ? text.split(/\s+or\s+/).map((t) => t.trim()) : [text];
}

/** Splits a key with dots into a path below `base`, by what the definition and the names in the file say. */
function pathOf(base: readonly string[], key: string, known: (path: readonly string[]) => boolean): string[] {
  const path = [...base];
  let rest = key.trim();
  while (rest !== '') {
    const item = /^(\[\d+\])\.?/.exec(rest);
    if (item !== null) {
      path.push(item[1]!);
      rest = rest.slice(item[0].length);
      continue;
    }
    const field = fieldAt(path);
    if (field?.type === 'named') {
      // A name may hold dots: the longest one that the file knows.
      const cuts = [...rest.matchAll(/\.|\[|$/g)].map((m) => m.index).reverse();
      const cut = cuts.find((at) => at > 0 && known([...path, rest.slice(0, at)]));
      if (cut !== undefined) {
        path.push(rest.slice(0, cut));
        rest = rest.slice(cut).replace(/^\./, '');
        continue;
      }
    }
    const cut = /^[^.[]+/.exec(rest)?.[0].length ?? rest.length;
    path.push(rest.slice(0, cut).trim());
    rest = rest.slice(cut).replace(/^\./, '');
  }
  return path;
}

type Complain = (message: string, hint: string, place: Place, path: readonly string[]) => void;

/** Complains of the first key of a path that the definition does not know. */
function checkPath(path: readonly string[], place: Place, complain: Complain): boolean {
  for (let i = 0; i < path.length; i++) {
    const above: Field | undefined = fieldAt(path.slice(0, i));
    const key = path[i]!;
    const fits =
      above?.type === 'section'
        ? Object.hasOwn(above.keys, key) && !(i === 0 && key === 'variants')
        : above?.type === 'named' || (above?.type === 'list' && key.startsWith('['));
    if (fits) continue;
    const keys = above?.type === 'section' ? Object.keys(above.keys).filter((k) => k !== 'variants') : [];
    const near = nearest(key, keys);
    complain(
      `there is no "${key}" ${i === 0 ? 'in a boat file' : `in ${showPath(path.slice(0, i))}`}`,
      near !== undefined
        ? `did you mean "${near}"?`
        : keys.length > 0
          ? `known here: ${keys.join(', ')}`
          : 'keys are written as in the boat file, with dots between: rig.mast_height',
      place,
      path,
    );
    return false;
  }
  return path.length > 0;
}

/** Changes that go together, each value a choice of several: one axis of a grid. */
interface Axis {
  readonly paths: readonly (readonly string[])[];
  readonly values: readonly (string | undefined)[];
  readonly place: Place;
}

/** Reads differences (a map of keys, nested or with dots) into axes. */
function axesOf(
  map: YAMLMap,
  placeAt: (node: unknown) => Place,
  known: (path: readonly string[]) => boolean,
  complain: Complain,
): Axis[] {
  const axes: Axis[] = [];
  const walk = (node: YAMLMap, base: readonly string[]): void => {
    for (const pair of node.items) {
      const key = isScalar(pair.key) ? String(pair.key.value) : '';
      const place = placeAt(pair.key);
      const paths = key.split(/\s*,\s*/).map((k) => pathOf(base, k, known));
      if (!paths.every((p) => checkPath(p, place, complain))) continue;
      const value = pair.value as Node | null;
      if (isMap(value) && paths.length === 1 && fieldAt(paths[0]!)?.type !== 'list') {
        walk(value, paths[0]!);
        continue;
      }
      const text = valueText(value);
      if (text === undefined) {
        complain(
          'nothing is written here',
          `write the new value, or "${LEFT_OUT}" to take the key away`,
          place,
          paths[0]!,
        );
        continue;
      }
      const at = placeAt(value);
      // Only single values have ranges and choices; a text may hold the word "or".
      const plain = isScalar(value) && paths.every((p) => fieldAt(p)?.type !== 'text');
      const values = plain ? valuesOf(text) : [text];
      if ('message' in values) complain(values.message, values.hint, at, paths[0]!);
      else axes.push({ paths, values: values.map((v) => (v === LEFT_OUT ? undefined : v)), place: at });
    }
  };
  walk(map, []);
  return axes;
}

function valueText(node: Node | null): string | undefined {
  if (node === null || (isScalar(node) && node.value === null)) return undefined;
  if (isScalar(node))
    return typeof node.value === 'string' ? node.value : (node.source ?? String(node.value));
  return JSON.stringify((node as Document | YAMLSeq).toJSON());
}

/** Every combination of the axes' values, the last axis fastest, as variants. */
function expanded(name: string, axes: readonly Axis[]): Variant[] {
  let variants: Variant[] = [{ name, changes: [] }];
  for (const axis of axes) {
    variants = variants.flatMap((v) =>
      axis.values.map((value) => {
        const label = `${axis.paths[0]!.at(-1)} ${value ?? LEFT_OUT}`;
        return {
          name: axis.values.length > 1 ? `${v.name}${v.name === '' ? '' : ', '}${label}` : v.name,
          changes: [...v.changes, ...axis.paths.map((path) => ({ path, value, place: axis.place }))],
        };
      }),
    );
  }
  return variants;
}

interface Source {
  readonly doc: Document;
  readonly root: YAMLMap;
  readonly placeAt: (node: unknown) => Place;
}

function sourceOf(text: string, file: string): Source | undefined {
  const lines = new LineCounter();
  const doc = parseDocument(text, {
    lineCounter: lines,
    prettyErrors: false,
    logLevel: 'silent',
    schema: 'core',
  });
  if (doc.errors.length > 0 || !isMap(doc.contents)) return undefined;
  const placeAt = (node: unknown): Place => {
    const offset = (node as { range?: readonly number[] | null } | null)?.range?.[0] ?? 0;
    const { line, col } = lines.linePos(offset);
    return { file, line: Math.max(1, line), column: Math.max(1, col) };
  };
  return { doc, root: doc.contents, placeAt };
}

/** Collects complaints about one file and throws them together. */
function collector(file: string): { complain: Complain; throwIfAny(): void } {
  const problems: ConstructorParameters<typeof BoatFileError>[1][number][] = [];
  return {
    complain: (message, hint, place, path) =>
      problems.push({ line: place.line, column: place.column, key: showPath(path), message, hint }),
    throwIfAny: () => {
      if (problems.length > 0) throw new BoatFileError(file, problems);
    },
  };
}

function knownIn(text: string, file: string): (path: readonly string[]) => boolean {
  const source = sourceOf(text, file);
  return (path) => source !== undefined && find(source.root, path) !== undefined;
}

/**
 * The variants that a boat file holds under `variants:`, ranges and grids expanded. Changes are checked for keys that
 * do not exist; their values are checked when a variant is read.
 * @throws BoatFileError
 */
export function variantsIn(text: string, file = 'boat file'): Variant[] {
  const source = sourceOf(text, file);
  const section = source?.root.get('variants', true);
  if (source === undefined || !isMap(section)) return [];
  const { complain, throwIfAny } = collector(file);
  const known = (path: readonly string[]): boolean => find(source.root, path) !== undefined;
  const out: Variant[] = [];
  for (const pair of section.items) {
    const name = isScalar(pair.key) ? String(pair.key.value) : '';
    const at = ['variants', name];
    const say: Complain = (message, hint, place, path) => complain(message, hint, place, [...at, ...path]);
    if (!isMap(pair.value)) {
      say(
        'changes are wanted here',
        'write keys and values, such as rig.mast_height: 9 m',
        source.placeAt(pair.key),
        [],
      );
      continue;
    }
    const axes = axesOf(pair.value, source.placeAt, known, say);
    if (axes.filter((a) => a.values.length > 1).length > MOST_RANGES)
      say(
        `more than ${MOST_RANGES} ranges in one variant`,
        'a sweep takes any number',
        source.placeAt(pair.key),
        [],
      );
    else out.push(...expanded(name, axes));
  }
  throwIfAny();
  return out;
}

/**
 * Variants from a file that holds only differences. Its own `name` names them.
 * @param base text of the boat file that is varied
 * @throws BoatFileError
 */
export function variantsFromFile(text: string, file: string, fallbackName: string, base: string): Variant[] {
  const source = sourceOf(text, file);
  const { complain, throwIfAny } = collector(file);
  if (source === undefined) {
    complain(
      'the file holds no keys and values',
      'write differences such as rig.mast_height: 9 m',
      { file, line: 1, column: 1 },
      [],
    );
    throwIfAny();
    return [];
  }
  const axes = axesOf(source.root, source.placeAt, knownIn(base, file), complain);
  throwIfAny();
  const named = source.root.get('name');
  return expanded(typeof named === 'string' ? named : fallbackName, axes);
}

/** True where a file describes a whole boat, not only differences from one. */
export function isWholeBoat(text: string): boolean {
  const root = sourceOf(text, '')?.root;
  return root !== undefined && ['name', 'hull', 'weights', 'crew', 'foils', 'rig'].every((k) => root.has(k));
}

/**
 * The grid of a sweep, from texts such as "rig.mast_height = 8 to 10 m in 5 steps", in order, the last fastest.
 * @param base text of the boat file that is varied
 * @throws BoatFileError naming the text
 */
export function variantGrid(
  texts: readonly string[],
  base: string,
  label = '--vary',
): { readonly count: number; at(index: number): Variant } {
  const known = knownIn(base, label);
  const { complain, throwIfAny } = collector(label);
  const axes: Axis[] = [];
  texts.forEach((text, i) => {
    const place = { file: label, line: i + 1, column: 1 };
    const cut = text.indexOf('=');
    if (cut < 0) {
      complain(`"${text}" has no "="`, 'write it as: rig.mast_height = 8 to 10 m in 5 steps', place, []);
      return;
    }
    const paths = text
      .slice(0, cut)
      .split(/\s*,\s*/)
      .map((k) => pathOf([], k, known));
    if (!paths.every((p) => checkPath(p, place, complain))) return;
    const values = valuesOf(text.slice(cut + 1).trim());
    if ('message' in values) complain(values.message, values.hint, place, paths[0]!);
    else axes.push({ paths, values: values.map((v) => (v === LEFT_OUT ? undefined : v)), place });
  });
  const count = axes.reduce((n, a) => n * a.values.length, 1);
  if (count > MOST_VARIANTS)
    complain(
      `${count} variants`,
      `at most ${MOST_VARIANTS} in one sweep`,
      { file: label, line: 1, column: 1 },
      [],
    );
  throwIfAny();
  const at = (index: number): Variant => {
    let rest = index;
    const picked = [...axes].reverse().map((a) => {
      const value = a.values[rest % a.values.length];
      rest = Math.floor(rest / a.values.length);
      return { a, value };
    });
    picked.reverse();
    return {
      name: picked.map(({ a, value }) => `${a.paths[0]!.at(-1)} ${value ?? LEFT_OUT}`).join(', '),
      changes: picked.flatMap(({ a, value }) => a.paths.map((path) => ({ path, value, place: a.place }))),
    };
  };
  return { count, at };
}

/** The node at a path below a collection; undefined where there is none. */
function find(root: Node, path: readonly string[]): Node | undefined {
  let node: Node | undefined = root;
  for (const key of path) {
    if (isSeq(node) && key.startsWith('['))
      node = node.items[Number(key.slice(1, -1)) - 1] as Node | undefined;
    else if (isMap(node)) node = pairOf(node, key)?.value as Node | undefined;
    else return undefined;
    if (node === undefined || node === null) return undefined;
  }
  return node;
}

function pairOf(map: YAMLMap, key: string): Pair | undefined {
  return map.items.find((p) => isScalar(p.key) && String(p.key.value) === key) as Pair | undefined;
}

/** Marks a node as written by the i-th change: its place is then not one in the boat file's text. */
function mark(node: Node, i: number): void {
  node.range = [-(i + 1), -(i + 1), -(i + 1)];
  if (isMap(node))
    for (const p of node.items) {
      if (p.key !== null) mark(p.key as Node, i);
      if (p.value !== null) mark(p.value as Node, i);
    }
  if (isSeq(node)) for (const item of node.items) mark(item as Node, i);
}

/** How a relative value ("times 1.1", "plus 0.2 m") comes out on what the file says. */
function relative(
  text: string,
  field: Field | undefined,
  base: Node | undefined,
  engine: (() => UnitEngine) | undefined,
): { readonly text: string } | { readonly message: string; readonly hint: string } | undefined {
  const match = RELATIVE.exec(text);
  if (match === null || (field?.type !== 'quantity' && field?.type !== 'count')) return undefined;
  const [, word, rest] = match as unknown as [string, string, string];
  const said = base === undefined || !isScalar(base) ? undefined : valueText(base);
  if (said === undefined)
    return {
      message: `"${text}" needs a value in the boat file to start from`,
      hint: 'write the new value out',
    };
  const kind = field.type === 'quantity' ? field.kind : 'ratio';
  try {
    const from = parseQuantity(said, kind, engine);
    const by = parseQuantity(rest, word === 'times' ? 'ratio' : kind, engine);
    const value = word === 'times' ? from * by : word === 'plus' ? from + by : from - by;
    const { bareUnit, bareFactor } = KINDS[kind];
    const number = Number((value / bareFactor).toPrecision(9));
    return { text: bareUnit === '' ? `${number}` : `${number} ${bareUnit}` };
  } catch (error) {
    if (error instanceof QuantityError) return { message: error.message, hint: error.hint };
    throw error;
  }
}

/**
 * Writes changes into a parsed boat file. Nodes that come from the i-th change have the range [-(i + 1), ...].
 * @param complain takes a message for the i-th change
 */
export function applyChanges(
  root: YAMLMap,
  changes: readonly Change[],
  engine: (() => UnitEngine) | undefined,
  complain: (i: number, message: string, hint: string) => void,
): Difference[] {
  const differences: Difference[] = [];
  changes.forEach((change, i) => {
    const { path } = change;
    let parent: Node = root;
    for (const [k, key] of path.slice(0, -1).entries()) {
      let next = find(parent, [key]);
      if (next === undefined && isMap(parent)) {
        if (change.value === undefined) break;
        next = new YAMLMap();
        mark(next, i);
        const name = new Scalar(key);
        mark(name, i);
        const pair = pairOf(parent, key);
        if (pair === undefined) parent.items.push(new Pair(name, next));
        else pair.value = next;
      }
      if (next === undefined || isAlias(next) || isScalar(next)) {
        const what = showPath(path.slice(0, k + 1));
        if (next !== undefined && isAlias(next))
          complain(i, `${what} is written as an alias (*name)`, 'write it out to vary a part of it');
        else complain(i, `there is no ${what} to change`, 'check the names against the boat file');
        return;
      }
      parent = next;
    }
    const last = path[path.length - 1]!;
    const old = find(parent, [last]);
    const before = old === undefined ? '' : shownNode(old);
    if (change.value === undefined) {
      if (old === undefined || !isMap(parent)) {
        complain(i, 'there is nothing here to leave out', 'check the key against the boat file');
        return;
      }
      parent.items = parent.items.filter((p) => !(isScalar(p.key) && String(p.key.value) === last));
      differences.push({ key: showPath(path), before, after: '' });
      return;
    }
    const moved = relative(change.value, fieldAt(path), old, engine);
    if (moved !== undefined && 'message' in moved) {
      complain(i, moved.message, moved.hint);
      return;
    }
    const text = moved?.text ?? change.value;
    const node = nodeOf(text);
    if (node === undefined) {
      complain(i, `"${text.slice(0, 40)}" cannot be read`, 'write a value as in the boat file');
      return;
    }
    mark(node, i);
    if (isSeq(parent)) {
      const at = Number(last.slice(1, -1)) - 1;
      if (old === undefined) {
        complain(i, `the list has ${parent.items.length} entries`, 'lists are counted from 1');
        return;
      }
      parent.items[at] = node;
    } else if (isMap(parent)) {
      const pair = pairOf(parent, last);
      const name = new Scalar(last);
      mark(name, i);
      if (pair === undefined) parent.items.push(new Pair(name, node));
      else pair.value = node;
    }
    differences.push({ key: showPath(path), before, after: shownNode(node) });
  });
  return differences;
}

/** A value's node: lists and maps in brackets as YAML, everything else as it stands. */
function nodeOf(text: string): Node | undefined {
  if (!/^\s*[[{]/.test(text)) {
    const node = new Scalar<unknown>(text);
    return node;
  }
  const doc = parseDocument(text, { prettyErrors: false, logLevel: 'silent', schema: 'core' });
  return doc.errors.length > 0 || doc.contents === null ? undefined : (doc.contents as Node);
}

function shownNode(node: Node): string {
  if (isScalar(node)) return valueText(node) ?? '';
  return stringify(node, { collectionStyle: 'flow', lineWidth: 0 }).trim();
}

/** What changes do to a boat file's text, as a list to read. @throws nothing: what does not apply is left out */
export function differencesOf(text: string, changes: readonly Change[]): Difference[] {
  const source = sourceOf(text, '');
  return source === undefined ? [] : applyChanges(source.root, changes, undefined, () => {});
}

/** The differences between two whole boat files, key by key, variants aside. */
export function fileDifferences(before: string, after: string): Difference[] {
  const leaves = (text: string): Map<string, string> => {
    const out = new Map<string, string>();
    const walk = (node: Node | null, path: readonly string[]): void => {
      if (node === null) return;
      if (isMap(node))
        for (const p of node.items)
          walk(p.value as Node | null, [...path, isScalar(p.key) ? String(p.key.value) : '']);
      else out.set(showPath(path), shownNode(node));
    };
    const source = sourceOf(text, '');
    if (source !== undefined)
      for (const p of source.root.items)
        if (isScalar(p.key) && p.key.value !== 'variants')
          walk(p.value as Node | null, [String(p.key.value)]);
    return out;
  };
  const [a, b] = [leaves(before), leaves(after)];
  return [...new Set([...a.keys(), ...b.keys()])]
    .filter((key) => a.get(key) !== b.get(key))
    .map((key) => ({ key, before: a.get(key) ?? '', after: b.get(key) ?? '' }));
}
