import { formOf } from './form.js';
import { immerse, prepareLines, resampled } from './hydrostatics.js';
import type { Lines, MainDimensions, Station } from './types.js';

/** One station as it is written down: place aft of the stem, half-breadths at heights from the keel up; one unit. */
export interface WrittenStation {
  readonly aft: number;
  readonly halfBreadths: readonly number[];
  readonly heights: readonly number[];
}

/** A table of offsets that cannot be used: which row (from 1, 0 for the whole) and what to do about it. */
export class OffsetsError extends RangeError {
  constructor(
    readonly row: number,
    message: string,
    readonly hint: string,
  ) {
    super(message);
    this.name = 'OffsetsError';
  }
}

/**
 * Reads a table of offsets from CSV text: a header line, then one row per point with the columns `aft_of_stem`,
 * `half_breadth` and `height` in any order, points of a station together and from the keel up. Comma or semicolon as
 * delimiter, decimal points; lines that begin with # are comments.
 * @param unit metres in one unit of the table
 * @throws OffsetsError
 */
export function readOffsets(text: string, unit = 1): WrittenStation[] {
  const rows = text.replace(/^\uFEFF/, '').split(/\r\n|\n|\r/);
  let columns: { aft: number; half: number; height: number } | undefined;
  const stations: { aft: number; halfBreadths: number[]; heights: number[] }[] = [];
  rows.forEach((line, i) => {
    if (line.trim() === '' || line.startsWith('#')) return;
    const cells = line.split(/[;,]/).map((c) => c.trim());
    if (columns === undefined) {
      const place = (name: string): number => {
        const at = cells.findIndex((c) => c.toLowerCase() === name);
        if (at < 0) {
          throw new OffsetsError(
            i + 1,
            `the header has no column ${name}`,
            'write aft_of_stem,half_breadth,height',
          );
        }
        return at;
      };
      columns = { aft: place('aft_of_stem'), half: place('half_breadth'), height: place('height') };
      return;
    }
    const number = (at: number, name: string): number => {
      const cell = cells[at] ?? '';
      const value = cell === '' ? Number.NaN : Number(cell);
      if (!Number.isFinite(value)) {
        throw new OffsetsError(
          i + 1,
          `"${cell.slice(0, 40)}" is no number for ${name}`,
          'numbers have decimal points and no unit',
        );
      }
      return value * unit;
    };
    const aft = number(columns.aft, 'aft_of_stem');
    const half = number(columns.half, 'half_breadth');
    const height = number(columns.height, 'height');
    if (half < 0)
      throw new OffsetsError(
        i + 1,
        `half-breadth ${half} is negative`,
        'give one side only, from the centreline',
      );
    const last = stations[stations.length - 1];
    if (last !== undefined && last.aft === aft) {
      last.halfBreadths.push(half);
      last.heights.push(height);
    } else {
      if (stations.some((s) => s.aft === aft)) {
        throw new OffsetsError(
          i + 1,
          `the station at ${aft} comes twice`,
          'keep the points of a station together',
        );
      }
      stations.push({ aft, halfBreadths: [half], heights: [height] });
    }
  });
  if (columns === undefined)
    throw new OffsetsError(0, 'the table is empty', 'write aft_of_stem,half_breadth,height');
  return stations;
}

/** Lines in body axes, and the main dimensions they have at the design waterline. */
export interface FairedLines {
  readonly lines: Lines;
  readonly dimensions: MainDimensions;
  /** Where the fore end of the design waterline lies on the given scale, aft of its zero. */
  readonly foreEnd: number;
}

/**
 * Puts written stations into body axes (origin amidships of the waterline at height 0) and works out what they measure.
 * @throws OffsetsError when they make no hull
 */
export function linesFromStations(written: readonly WrittenStation[]): FairedLines {
  if (written.length < 5) {
    throw new OffsetsError(
      0,
      `${written.length} stations found; at least 5 are needed`,
      'ten or more make a fair hull',
    );
  }
  const sorted = [...written].sort((a, b) => b.aft - a.aft);
  const stations = sorted.map((s): Station => {
    if (s.halfBreadths.length !== s.heights.length) {
      throw new OffsetsError(
        0,
        `the station at ${s.aft} m has ${s.halfBreadths.length} half-breadths but ${s.heights.length} heights`,
        'each height needs its half-breadth',
      );
    }
    if (s.heights.length < 2) {
      throw new OffsetsError(
        0,
        `the station at ${s.aft} m has fewer than two points`,
        'give points from the keel up',
      );
    }
    for (let i = 1; i < s.heights.length; i++) {
      if (
        s.heights[i]! < s.heights[i - 1]! - 1e-9 &&
        i < s.heights.length - 1 &&
        s.heights[i]! < s.heights[0]! - 1e-9
      ) {
        throw new OffsetsError(
          0,
          `the station at ${s.aft} m does not begin at its keel`,
          'write its points from the keel up',
        );
      }
    }
    return { x: -s.aft, y: s.halfBreadths, z: s.heights };
  });
  for (let i = 1; i < stations.length; i++) {
    if (stations[i]!.x - stations[i - 1]!.x < 1e-6) {
      throw new OffsetsError(
        0,
        `two stations stand at ${-stations[i]!.x} m`,
        'give every station a place of its own',
      );
    }
  }
  return inBodyAxes({ stations });
}

/** Shifts lines along x so that the design waterline (z = 0) has its middle at 0, and measures them. */
export function inBodyAxes(raw: Lines): FairedLines {
  const p = prepareLines(resampled(raw));
  const flotation = { heel: 0, height: 0, trim: 0 };
  const im = immerse(p, flotation);
  if (!(im.volume > 0)) {
    throw new OffsetsError(
      0,
      'nothing of the hull is below height 0',
      'heights count from the design waterline, negative below it',
    );
  }
  const form = formOf(p, flotation, im, 0, 0, 1);
  if (!(form.lwl > 0) || !(form.bwl > 0)) {
    throw new OffsetsError(
      0,
      'the waterline at height 0 has no length or breadth',
      'does the hull reach above height 0?',
    );
  }
  const foreX = form.lcbFromForward + im.x;
  const middle = foreX - 0.5 * form.lwl;
  const lines: Lines = { stations: raw.stations.map((s) => ({ ...s, x: s.x - middle })) };
  const amidships = [...lines.stations].sort((a, b) => Math.abs(a.x) - Math.abs(b.x))[0]!;
  const dimensions: MainDimensions = {
    lwl: form.lwl,
    bwl: form.bwl,
    canoeDraft: form.canoeDraft,
    cp: form.cp,
    cm: form.cm,
    cwp: form.cwp,
    lcbAft: form.lcbFromForward / form.lwl - 0.5,
    freeboard: Math.max(...amidships.z),
    beamMax: 2 * Math.max(...lines.stations.map((s) => Math.max(...s.y))),
  };
  return { lines, dimensions, foreEnd: -foreX };
}
