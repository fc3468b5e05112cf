import type { Field } from './fields.js';
import { boatFile, explain } from './schema.js';

export type StarterKind = 'dinghy' | 'keelboat';

/** Values of the starter files; keys without one are written as comments with what happens without them. */
type Values = { readonly [key: string]: string | Values };

const DINGHY: Values = {
  name: 'My dinghy',
  note: 'Replace every figure by one of your own boat.',
  hull: {
    length_overall: '4.0 m',
    waterline_length: '3.7 m',
    beam_overall: '1.45 m',
    waterline_beam: '1.1 m',
  },
  weights: { hull: { mass: '65 kg' }, rig: { mass: '10 kg' } },
  crew: { count: '1', mass_each: '75 kg', style: 'hiking', aft_of_stem: '2.1 m' },
  foils: {
    centreboard: { aft_of_stem: '1.4 m', root_chord: '42 cm', span: '0.8 m' },
    rudder: { aft_of_stem: '3.75 m', root_chord: '26 cm', draft: '0.6 m' },
  },
  rig: { mast_aft_of_stem: '0.6 m', mast_height: '6 m' },
  sails: { main: { kind: 'mainsail', luff: '5 m', foot: '2.5 m', area: '6.8 m2' } },
  sail_sets: { 'all weathers': '[main]' },
};

const KEELBOAT: Values = {
  name: 'My keelboat',
  note: 'Replace every figure by one of your own boat.',
  hull: {
    length_overall: '25 ft 6 in',
    waterline_length: '6.5 m',
    beam_overall: '2.6 m',
    waterline_beam: '2.05 m',
  },
  weights: {
    hull: { mass: '900 kg' },
    ballast: { mass: '700 kg' },
    rig: { mass: '85 kg' },
    gear: { mass: '150 kg' },
  },
  crew: { count: '4', mass_each: '75 kg', style: 'rail', aft_of_stem: '4.1 m' },
  foils: {
    keel: { aft_of_stem: '2.85 m', root_chord: '0.85 m', draft: '1.5 m' },
    rudder: { aft_of_stem: '6.0 m', root_chord: '42 cm', draft: '1.1 m' },
  },
  rig: { mast_aft_of_stem: '2.5 m', mast_height: '11 m' },
  sails: {
    main: { kind: 'mainsail', luff: '9 m', foot: '3.2 m', area: '16.5 m2' },
    jib: { kind: 'jib', luff: '8 m', area: '12 m2' },
  },
  sail_sets: { 'main and jib': '[main, jib]' },
};

/**
 * An annotated boat file to start from: what is known of every boat filled in, everything else as comments that say
 * what is assumed without it. It reads as it stands.
 * @throws RangeError for another kind
 */
export function starterBoat(kind: StarterKind): string {
  const values = kind === 'dinghy' ? DINGHY : kind === 'keelboat' ? KEELBOAT : undefined;
  if (values === undefined) throw new RangeError(`starter boat "${kind}" is not one of dinghy, keelboat`);
  const out = [
    '# yaml-language-server: $schema=./boat.schema.json',
    '# Write units beside the numbers (m, cm, mm, ft, in, kg, lb, m2, deg, kn, %). Bare numbers are taken in',
    '# m, m2, kg, deg and m/s. Lines that begin with # are comments: remove the # to give the value yourself.',
    '# "aft_of_stem" is the distance aft of the fore end of the design waterline; heights are above the waterline.',
  ];
  writeSection(boatFile, values, 0, out);
  return `${out.join('\n')}\n`;
}

/** Sections of which a boat has one. */
const INSTEAD: Readonly<Record<string, string>> = { keel: 'centreboard', centreboard: 'keel' };

const WIDTH = 108;

function writeSection(
  field: Field & { type: 'section' },
  values: Values,
  depth: number,
  out: string[],
): void {
  const pad = '  '.repeat(depth);
  for (const [key, inner] of Object.entries(field.keys) as [string, Field][]) {
    const value = values[key];
    if (depth === 0 && value !== undefined) out.push('');
    if (value === undefined) {
      // A section that another stands for is not listed: a keel where there is a board.
      if (INSTEAD[key] !== undefined && values[INSTEAD[key]] !== undefined) continue;
      if (depth === 0) out.push('');
      comment(explain(inner), pad, out);
      if (inner.type === 'section') {
        out.push(`${pad}# ${key}:`);
        for (const [name, f] of Object.entries(inner.keys) as [string, Field][]) {
          comment(explain(f), `${pad}#   `, out);
          out.push(`${pad}#   ${name}:`);
        }
      } else {
        out.push(`${pad}# ${key}:`);
      }
      continue;
    }
    comment(inner.describe, pad, out);
    writeValue(key, inner, value, depth, out);
  }
}

function writeValue(key: string, field: Field, value: string | Values, depth: number, out: string[]): void {
  const pad = '  '.repeat(depth);
  if (typeof value === 'string') {
    out.push(`${pad}${key}: ${value}`);
    return;
  }
  out.push(`${pad}${key}:`);
  if (field.type === 'section') writeSection(field, value, depth + 1, out);
  if (field.type !== 'named') return;
  let explained = false;
  for (const [name, entry] of Object.entries(value)) {
    if (typeof entry === 'string' || explained) writeShort(name, entry, depth + 1, out);
    else writeValue(name, field.entry, entry, depth + 1, out);
    explained = true;
  }
}

/** Second and later entries of a kind: without the comments of the first. */
function writeShort(name: string, entry: string | Values, depth: number, out: string[]): void {
  const pad = '  '.repeat(depth);
  if (typeof entry === 'string') {
    out.push(`${pad}${name}: ${entry}`);
    return;
  }
  out.push(`${pad}${name}:`);
  for (const [key, value] of Object.entries(entry)) writeShort(key, value, depth + 1, out);
}

function comment(text: string, pad: string, out: string[]): void {
  const mark = '# ';
  let line = '';
  for (const word of text.split(' ')) {
    if (line !== '' && pad.length + mark.length + line.length + word.length + 1 > WIDTH) {
      out.push(`${pad}${mark}${line}`);
      line = word;
    } else {
      line = line === '' ? word : `${line} ${word}`;
    }
  }
  out.push(`${pad}${mark}${line}`);
}
