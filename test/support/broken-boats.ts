/**
 * Boat files that must be refused, each with one BoatFileError that names the line, the key and a way out.
 * Most are one sound file with a single change.
 */
export interface BrokenBoat {
  readonly name: string;
  readonly text: string | Uint8Array;
  readonly expect: RegExp;
}

/** A sound dinghy with a jib, and a sound keelboat, as short as the definition allows. */
export const soundDinghy = `name: Test dinghy
hull:
  waterline_length: 4 m
  waterline_beam: 1.1 m
  beam_overall: 1.5 m
weights:
  hull: { mass: 80 kg }
  rig: { mass: 12 kg }
crew:
  count: 2
  mass_each: 70 kg
  style: trapeze
foils:
  centreboard: { aft_of_stem: 1.6 m, root_chord: 40 cm, span: 0.9 m }
  rudder: { aft_of_stem: 4.05 m, root_chord: 26 cm, draft: 0.6 m }
rig:
  mast_aft_of_stem: 1.3 m
  mast_height: 6.6 m
  forestay_height: 5.2 m
sails:
  main: { kind: mainsail, luff: 5.6 m, foot: 2.4 m }
  jib: { kind: jib, luff: 4.3 m, area: 3.4 m2 }
sail_sets:
  upwind: [main, jib]
`;

export const soundKeelboat = `name: Test keelboat
hull:
  waterline_length: 6.1 m
  waterline_beam: 1.95 m
weights:
  hull: { mass: 750 kg }
  ballast: { mass: 520 kg, height: -1 m }
  rig: { mass: 80 kg }
crew:
  count: 4
  mass_each: 75 kg
foils:
  keel: { aft_of_stem: 2.65 m, root_chord: 0.75 m, draft: 1.4 m }
  rudder: { aft_of_stem: 5.6 m, root_chord: 40 cm, draft: 1 m }
rig:
  mast_aft_of_stem: 2.3 m
  mast_height: 10 m
sails:
  main: { kind: mainsail, luff: 8.2 m, area: 14 m2 }
`;

function changed(text: string, from: string, to: string): string {
  if (!text.includes(from)) throw new Error(`the sound boat has no "${from}"`);
  return text.replace(from, to);
}

const dinghy = (from: string, to: string): string => changed(soundDinghy, from, to);
const keelboat = (from: string, to: string): string => changed(soundKeelboat, from, to);
const bomb = (levels: number): string => {
  const lines = ['a0: &a0 [x, x, x, x, x, x, x, x, x]'];
  for (let i = 1; i < levels; i++) {
    lines.push(`a${i}: &a${i} [${Array.from({ length: 9 }, () => `*a${i - 1}`).join(', ')}]`);
  }
  return `${lines.join('\n')}\n${soundDinghy}`;
};

export const brokenBoats: readonly BrokenBoat[] = [
  // No boat file at all.
  { name: 'empty', text: '', expect: /:1:1 file: the file is empty; the starter boat/ },
  { name: 'only spaces', text: '  \n \n', expect: /:1:1 file: the file is empty/ },
  { name: 'only a comment', text: '# nothing\n', expect: /file: the file (is empty|must be).*; / },
  {
    name: 'binary',
    text: new Uint8Array([0x89, 0x50, 0x4e, 0x47, 0, 1, 2, 3]),
    expect: /:1:1 file: .*not UTF-8.*; save it/,
  },
  {
    name: 'binary that decodes',
    text: 'name: x\n\u0000\u0001',
    expect: /:2:1 file: .*not text; boat files are plain/,
  },
  {
    name: 'latin 1',
    text: new Uint8Array([0x6e, 0x3a, 0x20, 0xe9, 0x0a]),
    expect: /not UTF-8 text; save it/,
  },
  {
    name: 'too large',
    text: `note: ${'x'.repeat(1_000_100)}`,
    expect: /file: the file has 1000106 characters; .*; is it really/,
  },
  {
    name: 'a list at the top',
    text: '- name: x\n',
    expect: /:1:1 file: the file must be a list of keys.*; begin with "name/,
  },
  {
    name: 'a sentence at the top',
    text: 'once upon a time\n',
    expect: /:1:1 file: the file must be a list of keys/,
  },
  {
    name: 'two documents',
    text: `${soundDinghy}---\n${soundDinghy}`,
    expect: /:\d+:\d+ file: .*more than one document; one boat a file/,
  },
  { name: 'a row of brackets', text: `note: ${'['.repeat(5000)}`, expect: /:1:1 .*nested too deeply; / },
  { name: 'a stair of dashes', text: `note:\n${'- '.repeat(5000)}x`, expect: /:2:1 .*nested too deeply; / },
  {
    name: 'deep braces in a value',
    text: dinghy('4 m', `${'{a: '.repeat(60)}1${'}'.repeat(60)}`),
    expect: /:3:1 .*nested too deeply/,
  },
  { name: 'alias bomb', text: bomb(9), expect: /:1:1 a0: unknown key; known here: name/ },
  {
    name: 'alias bomb in a known place',
    text: dinghy(
      'sail_sets:\n  upwind: [main, jib]',
      `sail_sets:\n  a: &a [main, jib]\n${Array.from({ length: 300 }, (_, i) => `  s${i}: *a`).join('\n')}`,
    ),
    expect: /sail_sets.*(aliases \(\*name\) are used too often; write|301 entries found)/,
  },
  {
    name: 'alias to itself',
    text: dinghy('upwind: [main, jib]', 'upwind: &u [*u, main]'),
    expect: /sail_sets\.upwind\[1\]: .*; /,
  },
  {
    name: 'alias without anchor',
    text: dinghy('1.1 m', '*beam'),
    expect: /:4:\d+ hull\.waterline_beam: .*; write the value out/,
  },
  {
    name: 'tab indent',
    text: dinghy('  waterline_beam', '\twaterline_beam'),
    expect: /:4:\d+ hull\.waterline_beam: .*; indent with spaces/,
  },
  {
    name: 'unclosed bracket',
    text: dinghy('[main, jib]', '[main, jib'),
    expect: /:24:\d+ sail_sets\.upwind: .*; a bracket/,
  },
  { name: 'unclosed quote', text: dinghy('Test dinghy', '"Test dinghy'), expect: /:\d+:\d+ \S+: .*; / },
  {
    name: 'bad indent',
    text: dinghy('  waterline_beam', '    waterline_beam'),
    expect: /:[34]:\d+ hull\.waterline_\w+: .*; /,
  },
  {
    name: 'local tag',
    text: dinghy('1.1 m', '!beam 1.1 m'),
    expect: /:4:\d+ hull\.waterline_beam: .*; remove the tag/,
  },
  {
    name: 'code tag',
    text: dinghy('1.1 m', '!!js/function "x"'),
    expect: /:4:\d+ hull\.waterline_beam: .*; remove the tag/,
  },
  {
    name: 'binary tag',
    text: dinghy('Test dinghy', '!!binary aGVsbG8='),
    expect: /:1:\d+ name: .*; remove the tag/,
  },
  {
    name: 'merge key',
    text: dinghy('hull:\n', 'hull:\n  <<: { a: 1 }\n'),
    expect: /:3:3 hull\.\S+: unknown key; /,
  },

  // Keys.
  {
    name: 'missing name',
    text: dinghy('name: Test dinghy\n', ''),
    expect: /:1:1 name: missing: a text is needed; what the boat/,
  },
  {
    name: 'missing hull',
    text: dinghy('hull:\n  waterline_length: 4 m\n  waterline_beam: 1.1 m\n  beam_overall: 1.5 m\n', ''),
    expect: /:1:1 hull: missing: a section.*; main dimensions/,
  },
  {
    name: 'missing waterline',
    text: dinghy('  waterline_length: 4 m\n', ''),
    expect: /:3:3 hull\.waterline_length: missing: a length such as 4\.2 m is needed; length of the design/,
  },
  {
    name: 'missing rudder',
    text: dinghy('  rudder: { aft_of_stem: 4.05 m, root_chord: 26 cm, draft: 0.6 m }\n', ''),
    expect: /foils\.rudder: missing/,
  },
  {
    name: 'missing rig',
    text: keelboat('rig:\n  mast_aft_of_stem: 2.3 m\n  mast_height: 10 m\n', ''),
    expect: / rig: missing: .*; mast, boom/,
  },
  {
    name: 'missing sails',
    text: keelboat('sails:\n  main: { kind: mainsail, luff: 8.2 m, area: 14 m2 }\n', ''),
    expect: / sails: missing: .*; the sails/,
  },
  {
    name: 'missing kind of sail',
    text: keelboat('kind: mainsail, ', ''),
    expect: /:19:9 sails\.main\.kind: missing: one of mainsail, mizzen, jib, spinnaker/,
  },
  {
    name: 'no sails listed',
    text: keelboat('main: { kind: mainsail, luff: 8.2 m, area: 14 m2 }', '{}'),
    expect: /sails: 0 entries found; 1 to 12/,
  },
  {
    name: 'slip in a key',
    text: dinghy('waterline_beam', 'waterlin_beam'),
    expect: /:4:3 hull\.waterlin_beam: unknown key; did you mean "waterline_beam"\?/,
  },
  {
    name: 'unknown key',
    text: dinghy('crew:\n', 'crew:\n  captain: Ahab\n'),
    expect: /crew\.captain: unknown key; known here: count/,
  },
  {
    name: 'capital key',
    text: dinghy('rig:\n', 'Rig:\n'),
    expect: /:\d+:1 Rig: unknown key; did you mean "rig"\?/,
  },
  {
    name: 'duplicate key',
    text: dinghy('  beam_overall: 1.5 m\n', '  beam_overall: 1.5 m\n  beam_overall: 1.6 m\n'),
    expect: /:6:3 hull\.beam_overall: this key is written twice; it stands in line 5/,
  },
  {
    name: 'duplicate sail',
    text: dinghy('  jib: {', '  main: {'),
    expect: /sails\.main: this key is written twice; it stands in line/,
  },
  {
    name: 'prototype key',
    text: dinghy('hull:\n', 'hull:\n  __proto__: 3\n'),
    expect: /hull\.__proto__: unknown key; /,
  },
  {
    name: 'a list as a key',
    text: dinghy('hull:\n', 'hull:\n  ? [a, b]\n  : 3\n'),
    expect: /hull: a key must be a plain word; /,
  },
  {
    name: 'empty value',
    text: dinghy('waterline_beam: 1.1 m', 'waterline_beam:'),
    expect: /:4:\d+ hull\.waterline_beam: nothing is written here.*; greatest beam/,
  },

  // Kinds.
  {
    name: 'a list for a number',
    text: dinghy('waterline_beam: 1.1 m', 'waterline_beam: [1.1 m]'),
    expect: /:4:19 hull\.waterline_beam: a list found, but a length/,
  },
  {
    name: 'keys for a number',
    text: dinghy('waterline_beam: 1.1 m', 'waterline_beam: { m: 1.1 }'),
    expect: /hull\.waterline_beam: keys found, but a length/,
  },
  {
    name: 'a number for a section',
    text: dinghy('main: { kind: mainsail, luff: 5.6 m, foot: 2.4 m }', 'main: 7 m2'),
    expect: /sails\.main: a single value found, but a section/,
  },
  {
    name: 'a word for a number',
    text: dinghy('waterline_beam: 1.1 m', 'waterline_beam: wide'),
    expect: /"wide" is not a length; write a number with a unit, such as 4\.2 m/,
  },
  {
    name: 'a name for a list',
    text: dinghy('[main, jib]', 'main'),
    expect: /sail_sets\.upwind: a single value found, but a list is wanted; .*\[one, two\]/,
  },
  {
    name: 'half a person',
    text: dinghy('count: 2', 'count: 1.5'),
    expect: /crew\.count: "1\.5" is not a whole number from 1 to 20; /,
  },
  {
    name: 'an unknown style',
    text: dinghy('style: trapeze', 'style: trapez'),
    expect: /crew\.style: "trapez" is not one of .*; did you mean "trapeze"\?/,
  },
  {
    name: 'neither yes nor no',
    text: keelboat('rig:\n', 'rig:\n  stayed: maybe\n'),
    expect: /rig\.stayed: "maybe" is neither yes nor no; write yes or no/,
  },
  {
    name: 'a mass for a length',
    text: dinghy('1.1 m', '1.1 kg'),
    expect: /:4:19 hull\.waterline_beam: "1\.1 kg" is a mass, but a length is wanted; /,
  },
  {
    name: 'an unheard-of unit',
    text: dinghy('1.1 m', '1.1 cubits'),
    expect: /hull\.waterline_beam: "1\.1 cubits" is not a length; .*units: m/,
  },
  {
    name: 'a decimal comma',
    text: dinghy('1.1 m', '1,1 m'),
    expect: /hull\.waterline_beam: "1,1 m" is not a length; write a decimal point: 1\.1 m/,
  },

  // Numbers.
  {
    name: 'NaN',
    text: dinghy('1.1 m', '.nan'),
    expect: /hull\.waterline_beam: "\.nan" is not a finite number; /,
  },
  {
    name: 'infinity',
    text: dinghy('80 kg', '.inf'),
    expect: /:\d+:\d+ weights\.hull\.mass: "\.inf" is not a finite number; /,
  },
  { name: 'a number beyond numbers', text: dinghy('80 kg', '1e999 kg'), expect: /weights\.hull\.mass: .*; / },
  {
    name: 'hexadecimal',
    text: dinghy('1.1 m', '0x10'),
    expect: /hull\.waterline_beam: "0x10" is not a length; /,
  },
  {
    name: 'millimetres without a unit',
    text: dinghy('5.6 m', '5600'),
    expect: /sails\.main\.luff: 5600 m is outside 0\.5 m to 40 m; is it in millimetres\?/,
  },
  {
    name: 'feet without a unit',
    text: dinghy('waterline_length: 4 m', 'waterline_length: 60'),
    expect: /hull\.waterline_length: 60 m is outside 1\.5 m to 30 m; is it in (feet|centimetres)\?/,
  },
  {
    name: 'a negative length',
    text: dinghy('1.1 m', '-1.1 m'),
    expect: /hull\.waterline_beam: -1\.1 m .*is outside .*; is the sign right\?/,
  },
  {
    name: 'negative ballast',
    text: keelboat('520 kg', '-520 kg'),
    expect: /weights\.ballast\.mass: -520 kg .*is outside .*; is the sign right\?/,
  },
  {
    name: 'a heavy person',
    text: dinghy('70 kg', '140 kg').replace('140 kg', '280 kg'),
    expect: /crew\.mass_each: .* is outside 25 kg to 200 kg; this is the mass of one person/,
  },
  {
    name: 'per cent without a sign',
    text: dinghy('beam_overall: 1.5 m', 'prismatic: 56'),
    expect: /hull\.prismatic: 56 is outside 0\.45 to 0\.75; is it in per cent\?/,
  },
  {
    name: 'a huge boat',
    text: dinghy('waterline_length: 4 m', 'waterline_length: 1e9 m'),
    expect: /hull\.waterline_length: 1e9 m .*is outside .*; check the number and its unit/,
  },

  // Parts that do not fit each other.
  {
    name: 'a draft far too deep',
    text: dinghy('beam_overall: 1.5 m', 'canoe_draft: 0.4 m'),
    expect:
      /:5:\d+ hull\.canoe_draft: with a draft of 0\.4 m the hull displaces .*; about 0\.\d+ m would fit/,
  },
  {
    name: 'a draft far too shallow',
    text: keelboat('waterline_beam: 1.95 m', 'waterline_beam: 1.95 m\n  canoe_draft: 0.1 m'),
    expect: /hull\.canoe_draft: .*weights and crew need .*; about/,
  },
  {
    name: 'narrower than its waterline',
    text: dinghy('beam_overall: 1.5 m', 'beam_overall: 1.0 m'),
    expect: /:5:\d+ hull\.beam_overall: the hull \(1 m\) is narrower .*; are .* swapped/,
  },
  {
    name: 'shorter than its waterline',
    text: dinghy('beam_overall: 1.5 m', 'length_overall: 3.8 m'),
    expect: /hull\.length_overall: the hull \(3\.8 m\) is shorter .*; are .* swapped/,
  },
  {
    name: 'a round waterline',
    text: dinghy('waterline_beam: 1.1 m', 'waterline_beam: 3.5 m').replace('1.5 m', '4 m'),
    expect: /hull\.waterline_beam: the waterline is 1\.14 times .*; check/,
  },
  {
    name: 'a boat of lead',
    text: dinghy('80 kg', '9 t'),
    expect: /weights: a waterline of 4 m does not go with .*; check the masses/,
  },
  {
    name: 'a coefficient clash',
    text: dinghy('beam_overall: 1.5 m', 'prismatic: 0.75\n  midship: 0.95\n  waterplane: 0.55'),
    expect: /hull\.waterplane: .*do not make a hull.*; leave one/,
  },
  {
    name: 'a sail above the mast',
    text: dinghy('luff: 5.6 m', 'luff: 7 m'),
    expect:
      /:\d+:\d+ sails\.main\.luff: the head is 7\.\d+ m above the water, above the top of the mast \(6\.6 m\); check/,
  },
  {
    name: 'a jib longer than its stay',
    text: dinghy('luff: 4.3 m', 'luff: 5.5 m'),
    expect: /sails\.jib\.luff: the luff \(5\.5 m\) is longer .*; check/,
  },
  {
    name: 'a jib behind the mast',
    text: dinghy('luff: 4.3 m', 'luff: 4.3 m, tack_aft_of_stem: 1.5 m'),
    expect: /sails\.jib\.tack_aft_of_stem: the tack \(1\.5 m aft.*not in front of the mast.*; /,
  },
  {
    name: 'an area that does not fit',
    text: dinghy('foot: 2.4 m', 'foot: 2.4 m, area: 20 m2'),
    expect: /sails\.main\.area: 20 m2 does not go with .*; leave/,
  },
  {
    name: 'a jib with a roach',
    text: dinghy('area: 3.4 m2', 'area: 3.4 m2, roach: 10 %'),
    expect: /sails\.jib\.roach: a jib has no roach here; /,
  },
  {
    name: 'a mast in the water',
    text: keelboat('mast_height: 10 m', 'mast_height: 1 m'),
    expect: /rig\.mast_height: the mast ends 1 m .*; /,
  },
  {
    name: 'a mast at the stern',
    text: keelboat('mast_aft_of_stem: 2.3 m', 'mast_aft_of_stem: 6 m'),
    expect: /rig\.mast_aft_of_stem: the mast stands 6 m aft.*; /,
  },
  {
    name: 'a forestay above the mast',
    text: dinghy('forestay_height: 5.2 m', 'forestay_height: 8 m'),
    expect: /rig\.forestay_height: .*above its top \(6\.6 m\); /,
  },
  {
    name: 'a rudder ahead of the keel',
    text: keelboat('aft_of_stem: 5.6 m', 'aft_of_stem: 1 m'),
    expect:
      /foils\.rudder\.aft_of_stem: the rudder \(1 m aft of the stem\) is not behind the keel.*; are the two swapped/,
  },
  {
    name: 'a keel ahead of the boat',
    text: keelboat('aft_of_stem: 2.65 m', 'aft_of_stem: -0.5 m'),
    expect: /foils\.keel\.aft_of_stem: .*outside 10 to 95 %.*; /,
  },
  {
    name: 'a keel inside the hull',
    text: keelboat('draft: 1.4 m', 'draft: 0.2 m'),
    expect: /foils\.keel\.draft: the tip \(0\.2 m down\) is no deeper.*; draft counts/,
  },
  {
    name: 'keel and board',
    text: keelboat(
      '  rudder:',
      '  centreboard: { aft_of_stem: 2 m, root_chord: 0.5 m, span: 1 m }\n  rudder:',
    ),
    expect: /foils: both keel and centreboard are given; give one/,
  },
  {
    name: 'neither keel nor board',
    text: keelboat('  keel: { aft_of_stem: 2.65 m, root_chord: 0.75 m, draft: 1.4 m }\n', ''),
    expect: /foils: neither keel nor centreboard is given; give one/,
  },
  {
    name: 'span and draft',
    text: keelboat('draft: 1.4 m', 'draft: 1.4 m, span: 1 m'),
    expect: /foils\.keel: both span and draft are given; give span/,
  },
  {
    name: 'ballast without a keel',
    text: dinghy('  rig: { mass: 12 kg }', '  ballast: { mass: 12 kg }'),
    expect: /weights\.ballast: there is ballast, but no keel.*; /,
  },
  {
    name: 'a keel that floats the boat',
    text: keelboat('draft: 1.4 m', 'draft: 1.4 m, volume: 2 m3'),
    expect: /foils\.keel\.volume: the keel alone would float .*; /,
  },
  {
    name: 'a boat that falls over',
    text: keelboat('rig: { mass: 80 kg }', 'rig: { mass: 800 kg, height: 9 m }'),
    expect: /weights\.rig\.height: the boat falls over at rest.*; check the heights/,
  },
  {
    name: 'more on the wire than aboard',
    text: dinghy('style: trapeze', 'style: trapeze\n  on_trapeze: 3'),
    expect: /crew\.on_trapeze: 3 of a crew of 2 cannot.*; /,
  },
  {
    name: 'a trapeze while hiking',
    text: dinghy('style: trapeze', 'style: hiking\n  on_trapeze: 1'),
    expect: /crew\.on_trapeze: .*the style is hiking; /,
  },
  {
    name: 'crew limits the wrong way round',
    text: dinghy('count: 2', 'count: 2\n  aft_of_stem: 2 m\n  foremost: 3 m'),
    expect: /crew\.foremost: .*not between.*; /,
  },
  {
    name: 'a set with an unknown sail',
    text: dinghy('[main, jib]', '[main, jip]'),
    expect: /:\d+:\d+ sail_sets\.upwind\[2\]: there is no sail called "jip"; did you mean "jib"\?/,
  },
  {
    name: 'two mainsails in a set',
    text: dinghy('kind: jib, luff: 4.3 m, area: 3.4 m2', 'kind: mainsail, luff: 4.3 m, foot: 2 m'),
    expect: /sail_sets\.upwind: main and jib are both of the kind mainsail.*; /,
  },
  {
    name: 'resistance with falling speeds',
    text: dinghy(
      'beam_overall: 1.5 m',
      'measured_resistance:\n    - { speed: 2 kn, force: 10 N }\n    - { speed: 4 kn, force: 40 N }\n    - { speed: 3 kn, force: 90 N }',
    ),
    expect: /:8:\d+ hull\.measured_resistance\[3\]: the speed is not above.*; /,
  },
  {
    name: 'a roughness for the power law',
    text: keelboat('hull:\n', 'wind: { profile: power, roughness: 0.2 mm }\nhull:\n'),
    expect: /:2:\d+ wind\.roughness: the power profile has no roughness; /,
  },
  {
    name: 'a mast in the wake',
    text: keelboat('rig: { mass: 80 kg }', 'rig: { mass: 600 kg, aft_of_stem: 30 m }'),
    expect:
      /:8:\d+ weights\.rig\.aft_of_stem: the centre of mass of boat and crew lies at .* outside 35 to 70 %; places/,
  },
];
