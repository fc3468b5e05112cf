import { createHash } from 'node:crypto';
import { createRequire } from 'node:module';
import type { SpeedPoint, SpeedRow, SpeedTable } from '../polar/index.js';
import { rounded } from './numbers.js';
import { oneLine, shortened } from './plain-text.js';
import { TableFileError } from './read-cells.js';
import { checkSize, type TableReading } from './read-table.js';

type Zod = typeof import('zod').z;

/** Version of the Signal K specification whose schemas the output follows. */
export const SIGNAL_K_VERSION = '1.5.1';

/** Five decimals of m/s and rad: finer than two decimals of knots and degrees. */
const DECIMALS = 5;
const plain = (value: number): number => Number(value.toFixed(DECIMALS)) + 0;

/** An identifier shaped like a version 4 UUID, made from a text: the same text gives the same one. */
function uuidOf(text: string): string {
  const h = createHash('sha256').update(text).digest('hex');
  const variant = '89ab'[Number.parseInt(h[16]!, 16) % 4];
  return `${h.slice(0, 8)}-${h.slice(8, 12)}-4${h.slice(13, 16)}-${variant}${h.slice(17, 20)}-${h.slice(20, 32)}`;
}

const pair = (p: SpeedPoint): [number, number] => [plain(p.twa), plain(p.speed)];

function windData(row: SpeedRow) {
  return {
    trueWindSpeed: plain(row.tws),
    ...(row.beat && { optimalBeats: [pair(row.beat)] }),
    ...(row.gybe && { optimalGybes: [pair(row.gybe)] }),
    // VMG of the printed figures, so that it can be checked in the file.
    angleData: row.points.map(pair).map(([twa, speed]) => [twa, speed, plain(speed * Math.cos(twa))]),
  };
}

/**
 * A speed table as a Signal K document: one vessel with `performance.polars`, in m/s and rad, with the angles and
 * speeds of best VMG. Source: Signal K specification 1.5.1, schema groups/performance.json.
 * @param description what stands beside the figures: wind height, how cells were filled, cautions
 */
export function signalKPolar(table: SpeedTable, description: string): string {
  const name = shortened(oneLine(table.name), 80) || 'boat';
  const data = table.rows.map(windData);
  const id = uuidOf(JSON.stringify([name, data]));
  const vessel = `urn:mrn:signalk:uuid:${uuidOf(`vessel ${name}`)}`;
  const polar = {
    id,
    name,
    description: oneLine(description),
    source: { label: 'polarwright' },
    windData: data,
  };
  const document = {
    version: SIGNAL_K_VERSION,
    self: `vessels.${vessel}`,
    vessels: {
      [vessel]: { uuid: vessel, name, performance: { polars: { [id]: polar }, activePolar: id } },
    },
  };
  // Pairs and triples of numbers on one line each; texts hold no line breaks and stay as they are.
  const json = JSON.stringify(document, null, 1).replace(/\[\n([\d\s.,e-]+?)\n\s*\]/g, (_, inner: string) => {
    return `[${inner.trim().replace(/\s+/g, ' ')}]`;
  });
  return `${json}\n`;
}

/** The shape a polar must have to be read. */
function polarShape(z: Zod) {
  const speed = z.number().min(0).max(60);
  const angle = z
    .number()
    .min(-2 * Math.PI)
    .max(2 * Math.PI + 1e-3);
  const points = z.array(z.tuple([angle, speed]).rest(z.number())).max(800);
  return z.object({
    name: z.string().optional(),
    windData: z
      .array(
        z.object({
          trueWindSpeed: speed,
          optimalBeats: points.optional(),
          optimalGybes: points.optional(),
          angleData: points,
        }),
      )
      .min(1)
      .max(400),
  });
}

let shape: ReturnType<typeof polarShape> | undefined;

/** The checking library takes nearly a tenth of a second to load: only reading needs it. */
function polarReader(): ReturnType<typeof polarShape> {
  shape ??= polarShape((createRequire(import.meta.url)('zod') as typeof import('zod')).z);
  return shape;
}

type Tree = { readonly [key: string]: unknown };
const isTree = (v: unknown): v is Tree => typeof v === 'object' && v !== null && !Array.isArray(v);
const child = (v: unknown, key: string): unknown => (isTree(v) && Object.hasOwn(v, key) ? v[key] : undefined);

/** Every polar in a Signal K document, a vessel, a `performance` or `polars` branch, or a polar alone. */
function polarsIn(tree: unknown): { id: string; polar: Tree; active: boolean }[] {
  if (!isTree(tree)) return [];
  if (Array.isArray(tree.windData)) return [{ id: String(tree.id ?? ''), polar: tree, active: true }];
  const vessels = child(tree, 'vessels');
  if (isTree(vessels)) return Object.values(vessels).flatMap(polarsIn);
  const performance = child(tree, 'performance') ?? tree;
  const polars = child(performance, 'polars') ?? performance;
  if (!isTree(polars)) return [];
  return Object.entries(polars)
    .filter((e): e is [string, Tree] => isTree(e[1]) && Array.isArray(e[1].windData))
    .map(([id, polar]) => ({ id, polar, active: child(performance, 'activePolar') === id }));
}

const first = (list: readonly (readonly number[])[] | undefined): SpeedPoint | undefined => {
  const p = list?.find((q) => q[0]! >= 0);
  return p === undefined ? undefined : { twa: p[0]!, speed: p[1]! };
};

/**
 * Reads the polar of a Signal K document, or of a part of one; the active polar where there are several.
 * @throws TableFileError with file, place, value and what is allowed
 */
export function readSignalKPolar(text: string, file: string): TableReading {
  let tree: unknown;
  try {
    tree = JSON.parse(text.replace(/^\ufeff/, ''));
  } catch (error) {
    const message = oneLine(error instanceof Error ? error.message : String(error));
    throw new TableFileError(file, undefined, `this is no JSON: ${shortened(message, 100)}`, '');
  }
  const found = polarsIn(tree);
  const chosen = found.find((p) => p.active) ?? found[0];
  if (chosen === undefined)
    throw new TableFileError(
      file,
      undefined,
      'there is no polar with windData in it',
      'a Signal K document holds polars under vessels.*.performance.polars',
    );
  const read = polarReader().safeParse(chosen.polar);
  if (!read.success) {
    const issue = read.error.issues[0]!;
    const place = issue.path
      .map((k) => (typeof k === 'number' ? `[${k}]` : `.${String(k)}`))
      .join('')
      .slice(1);
    throw new TableFileError(
      file,
      undefined,
      `${place}: ${oneLine(issue.message)}`,
      'speeds are m/s from 0 to 60, angles rad',
    );
  }
  let otherTack = 0;
  const rows = read.data.windData
    .map((w): SpeedRow => {
      const own = w.angleData.filter((p) => p[0] >= 0 && p[0] <= Math.PI + 1e-3);
      otherTack += w.angleData.length - own.length;
      return {
        tws: w.trueWindSpeed,
        points: own.map((p) => ({ twa: Math.min(p[0], Math.PI), speed: p[1] })).sort((a, b) => a.twa - b.twa),
        beat: first(w.optimalBeats),
        gybe: first(w.optimalGybes),
      };
    })
    .sort((a, b) => a.tws - b.tws);
  const twice = rows.find((r, i) => i > 0 && r.tws === rows[i - 1]!.tws);
  if (twice !== undefined)
    throw new TableFileError(
      file,
      undefined,
      `trueWindSpeed ${twice.tws} comes twice`,
      'every wind speed stands once',
    );
  for (const r of rows) {
    const again = r.points.find(
      (p, i) => i > 0 && p.twa === r.points[i - 1]!.twa && p.speed !== r.points[i - 1]!.speed,
    );
    if (again !== undefined)
      throw new TableFileError(
        file,
        undefined,
        `angle ${rounded(again.twa, 6)} comes twice at trueWindSpeed ${r.tws}, with different speeds`,
        'every angle stands once',
      );
  }
  checkSize(file, rows);
  const name = read.data.name ?? '';
  return {
    table: { name, windHeight: undefined, rows },
    notes: [
      { what: 'form', value: 'Signal K', grounds: 'm/s and rad by its specification' },
      {
        what: 'polar',
        value: shortened(oneLine(name || chosen.id), 40),
        grounds: found.length > 1 ? `one of ${found.length} in the file` : 'the only one in the file',
      },
      ...(otherTack > 0
        ? [{ what: 'points of the other tack', value: String(otherTack), grounds: 'left out' }]
        : []),
    ],
  };
}

/** True where a text is the JSON form of a table: it begins with a brace. */
export const looksLikeJson = (text: string): boolean => /^\ufeff?\s*\{/.test(text);
