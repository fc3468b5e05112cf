import {
  type FairedLines,
  linesFromMesh,
  linesFromStations,
  type MeshAxis,
  OffsetsError,
  readObj,
  readOffsets,
  readStl,
} from '../hull/index.js';
import { KINDS } from '../units/index.js';
import { BesideError, partsBeside, type ReadBeside } from './beside.js';
import type { BoatFileValue } from './schema.js';

type Complain = (path: readonly string[], what: string, hint: string) => void;
type LinesFile = NonNullable<BoatFileValue['hull']['lines']>;

/** Largest difference, of Lwl, between the zero of a table's places and the fore end of its waterline. */
const FORE_END = 0.01;
/** Stations cut through a mesh when the file does not say: more do not change the figures of smooth hulls. */
const MESH_STATIONS = 41;
/** Main dimensions that lines settle; given beside them they could only contradict. */
const SETTLED = [
  'waterline_length',
  'waterline_beam',
  'beam_overall',
  'canoe_draft',
  'freeboard',
  'prismatic',
  'midship',
  'waterplane',
  'buoyancy_aft_of_stem',
] as const;

/** Reads the lines plan a boat file gives or names; undefined when there is none, or after complaining. */
export function readLines(
  file: BoatFileValue,
  complain: Complain,
  beside: ReadBeside,
): FairedLines | undefined {
  const given = file.hull.lines;
  if (given === undefined) return undefined;
  const path = ['hull', 'lines'];
  const ways = (['stations', 'table', 'mesh'] as const).filter((k) => given[k] !== undefined);
  if (ways.length !== 1) {
    complain(
      path,
      ways.length === 0 ? 'no lines are given' : `${ways.join(' and ')} are all given`,
      'give one of stations, table and mesh',
    );
    return undefined;
  }
  for (const key of SETTLED) {
    if (file.hull[key] === undefined) continue;
    complain(['hull', key], 'this is measured from the lines', 'remove it, or remove hull.lines');
  }
  const way = ways[0]!;
  for (const key of ['forward', 'up', 'cuts'] as const) {
    if (way !== 'mesh' && given[key] !== undefined)
      complain([...path, key], 'this belongs to a mesh only', 'remove it');
  }
  if (way === 'stations' && given.unit !== undefined)
    complain([...path, 'unit'], 'stations in the boat file carry their own units', 'remove it');
  const name = way === 'stations' ? '' : given[way]!;
  try {
    if (way !== 'stations') partsBeside(name);
    const lines = linesOf(given, way, beside);
    const { dimensions, foreEnd } = lines;
    if (way !== 'mesh' && Math.abs(foreEnd) > FORE_END * dimensions.lwl) {
      complain(
        [...path, way],
        `the waterline begins ${say(Math.abs(foreEnd))} m ${foreEnd > 0 ? 'aft' : 'forward'} of the place 0 of the stations`,
        `places count from the fore end of the waterline: ${foreEnd > 0 ? 'take' : 'add'} ${say(Math.abs(foreEnd))} m ${foreEnd > 0 ? 'off' : 'to'} each`,
      );
      return undefined;
    }
    return lines;
  } catch (error) {
    if (error instanceof BesideError) complain([...path, way], `${name}: ${error.message}`, error.hint);
    else if (error instanceof OffsetsError) {
      const place =
        error.row > 0 && name !== '' ? `${name}, line ${error.row}: ` : name === '' ? '' : `${name}: `;
      complain([...path, way], place + error.message, error.hint);
    } else throw error;
    return undefined;
  }
}

function linesOf(given: LinesFile, way: 'stations' | 'table' | 'mesh', beside: ReadBeside): FairedLines {
  const height = given.waterline_height ?? 0;
  const lowered = (heights: readonly number[]): number[] => heights.map((h) => h - height);
  const unit = KINDS.length.units[given.unit ?? 'm']!;
  if (way === 'stations') {
    return linesFromStations(
      given.stations!.map((s) => ({
        aft: s.aft_of_stem,
        halfBreadths: s.half_breadths,
        heights: lowered(s.heights),
      })),
    );
  }
  if (way === 'table') {
    const written = readOffsets(textOf(beside(given.table!)), unit);
    return linesFromStations(written.map((s) => ({ ...s, heights: lowered(s.heights) })));
  }
  const bytes = beside(given.mesh!);
  const mesh = /\.obj$/i.test(given.mesh!) ? readObj(textOf(bytes)) : readStl(bytes);
  return linesFromMesh(mesh, {
    unit,
    forward: (given.forward ?? 'x') as MeshAxis,
    up: (given.up ?? 'z') as MeshAxis,
    waterline: height,
    stations: given.cuts ?? MESH_STATIONS,
  });
}

function textOf(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    throw new BesideError('the file is not UTF-8 text', 'save it as plain text');
  }
}

function say(value: number): string {
  return `${Number(value.toPrecision(3))}`;
}
