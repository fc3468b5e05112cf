import { DEGREE, KINDS } from '../units/index.js';
import type { Field, SectionField, ValueOf } from './fields.js';

/**
 * The one definition of the boat file. Fore-and-aft places are distances aft of the fore end of the design
 * waterline (the waterline on which the given waterline_length is measured); forward of it they are negative.
 * Heights are above that waterline. Ranges are in the unit of a bare number (m, m2, m3, kg, deg, m/s).
 */
const AFT = 'aft of the fore end of the design waterline (negative when forward of it)';
const NO_SOURCE = 'common practice, no source';

const foilKeys = {
  aft_of_stem: {
    type: 'quantity',
    kind: 'length',
    range: [-1, 30],
    missing: 'required',
    describe: `Leading edge of the foil where it leaves the hull, ${AFT}.`,
  },
  root_chord: {
    type: 'quantity',
    kind: 'length',
    range: [0.05, 5],
    missing: 'required',
    unless: 'chords',
    describe: 'Chord of the foil where it leaves the hull.',
  },
  chords: {
    type: 'list',
    count: [2, 40],
    describe:
      'Chords at even steps from root to tip, straight between them: any planform. Instead of root_chord and tip_chord.',
    entry: { type: 'quantity', kind: 'length', range: [0.005, 5], describe: 'One chord.' },
  },
  tip_chord: {
    type: 'quantity',
    kind: 'length',
    range: [0.02, 5],
    missing: { rule: '0.6 of the root chord (judgement)' },
    describe: 'Chord of the foil at its tip.',
  },
  span: {
    type: 'quantity',
    kind: 'length',
    range: [0.1, 5],
    describe: 'Height of the foil from where it leaves the hull to its tip. Give this or draft.',
  },
  draft: {
    type: 'quantity',
    kind: 'length',
    range: [0.1, 6],
    describe: 'Depth of the tip below the waterline. Give this or span.',
  },
  sweep: {
    type: 'quantity',
    kind: 'angle',
    range: [-20, 60],
    missing: {
      rule: 'straight trailing edge for a rudder, straight quarter-chord line otherwise (judgement)',
    },
    describe:
      'Sweep of the line a quarter of the chord behind the leading edge, positive when the tip lies aft.',
  },
} as const satisfies Record<string, Field>;

const thickness = (rule: string) =>
  ({
    type: 'quantity',
    kind: 'ratio',
    range: [0.01, 0.3],
    missing: { rule },
    describe: 'Thickness of the section over its chord.',
    hint: 'thickness is a share of the chord, such as 10 %',
  }) as const satisfies Field;

const liftLimit = (rule: string) =>
  ({
    type: 'quantity',
    kind: 'ratio',
    range: [0.3, 2],
    missing: { rule },
    describe: 'Largest lift coefficient before the foil stalls or draws air.',
  }) as const satisfies Field;

const width = (describe: string) =>
  ({ type: 'quantity', kind: 'length', range: [0.02, 20], describe }) as const satisfies Field;

const rootDepth = (rule: string) =>
  ({
    type: 'quantity',
    kind: 'length',
    range: [0, 2],
    missing: { rule },
    describe: 'Depth below the waterline at which the foil leaves the hull.',
  }) as const satisfies Field;

const kickedUp = {
  type: 'quantity',
  kind: 'angle',
  range: [0, 60],
  missing: { rule: '0: fully down' },
  describe: 'Angle by which the blade is swung aft about its root, its span measured along the blade.',
} as const satisfies Field;

const twin = {
  type: 'section',
  describe: 'Two blades side by side instead of one on the centreline. The other keys describe one of them.',
  keys: {
    apart: {
      type: 'quantity',
      kind: 'length',
      range: [0.1, 6],
      missing: 'required',
      describe: 'Distance between the two where they leave the hull.',
    },
    cant: {
      type: 'quantity',
      kind: 'angle',
      range: [0, 40],
      missing: { rule: '0: upright' },
      describe: 'Lean of each blade from upright, its tip outwards.',
    },
    lowered: {
      type: 'choice',
      choices: ['both', 'leeward'],
      missing: { rule: 'both' },
      describe: 'Which of them are down while sailing.',
    },
  },
} as const satisfies Field;

const keelKeys = {
  ...foilKeys,
  thickness: thickness(`12 % for a ballasted fin, 8 % for a board (${NO_SOURCE})`),
  lift_limit: liftLimit('1.2, a symmetrical section in the tank (judgement)'),
  root_depth: rootDepth('the canoe draft'),
} as const satisfies Record<string, Field>;

export const boatFile = {
  type: 'section',
  describe: 'A sailing boat: dimensions, weights, crew, foils, rig and sails.',
  missing: 'required',
  keys: {
    name: { type: 'text', longest: 80, missing: 'required', describe: 'What the boat is called.' },
    note: {
      type: 'text',
      longest: 2000,
      describe: 'Anything worth remembering: where the figures come from, when measured.',
    },
    water: {
      type: 'section',
      describe: 'The water the boat floats in.',
      keys: {
        kind: {
          type: 'choice',
          choices: ['salt', 'fresh'],
          missing: { rule: `salt (${NO_SOURCE})` },
          describe: 'Salt or fresh water.',
        },
        temperature: {
          type: 'quantity',
          kind: 'temperature',
          range: [0, 35],
          missing: { rule: '15 degC, the standard temperature of towing-tank work' },
          describe: 'Temperature of the water.',
        },
      },
    },
    wind: {
      type: 'section',
      describe: 'How the true wind is quoted, and how it grows with height.',
      keys: {
        measured_at: {
          type: 'quantity',
          kind: 'length',
          range: [1, 50],
          missing: { rule: '10 m, the meteorological standard height' },
          describe: 'Height above the water at which true wind speeds are quoted.',
        },
        profile: {
          type: 'choice',
          choices: ['log', 'power'],
          missing: { rule: 'log, the neutral surface layer' },
          describe: 'Law by which the wind grows with height.',
        },
        roughness: {
          type: 'quantity',
          kind: 'length',
          range: [1e-6, 0.1],
          missing: { rule: `0.2 mm, open water in a moderate breeze (${NO_SOURCE})` },
          describe: 'Roughness length of the water for the log law.',
          hint: 'roughness of water is a fraction of a millimetre, such as 0.2 mm',
        },
        exponent: {
          type: 'quantity',
          kind: 'ratio',
          range: [0, 0.5],
          missing: { rule: `0.1 for the power law (${NO_SOURCE})` },
          describe: 'Exponent of the power law.',
        },
        air_temperature: {
          type: 'quantity',
          kind: 'temperature',
          range: [-20, 50],
          missing: { rule: '15 degC, the standard atmosphere' },
          describe: 'Temperature of the air, which sets its density.',
        },
      },
    },
    hull: {
      type: 'section',
      missing: 'required',
      describe:
        'Main dimensions of the hull, from which a round-bilge hull is generated, or its lines, from which they are measured.',
      keys: {
        length_overall: {
          type: 'quantity',
          kind: 'length',
          range: [1.5, 30],
          missing: { rule: '1.1 times the waterline length (judgement)' },
          describe: 'Length of the hull overall.',
        },
        waterline_length: {
          type: 'quantity',
          kind: 'length',
          range: [1.5, 30],
          missing: 'required',
          unless: 'lines',
          describe: 'Length of the design waterline, crew aboard and level.',
        },
        beam_overall: {
          type: 'quantity',
          kind: 'length',
          range: [0.3, 8],
          missing: { rule: '1.3 times the waterline beam (judgement)' },
          describe: 'Greatest beam of the hull, at the sheer.',
        },
        waterline_beam: {
          type: 'quantity',
          kind: 'length',
          range: [0.3, 8],
          missing: 'required',
          unless: 'lines',
          describe: 'Greatest beam of the design waterline.',
        },
        canoe_draft: {
          type: 'quantity',
          kind: 'length',
          range: [0.03, 2],
          missing: {
            rule: 'from the displacement: volume / (Cp Cm Lwl Bwl), exact for the coefficients used',
          },
          describe: 'Depth of the hull below the waterline without keel, board or rudder.',
        },
        freeboard: {
          type: 'quantity',
          kind: 'length',
          range: [0.05, 3],
          missing: { rule: '0.10 of the waterline length (judgement)' },
          describe: 'Height of the side amidships above the waterline.',
        },
        prismatic: {
          type: 'quantity',
          kind: 'ratio',
          range: [0.45, 0.75],
          missing: { rule: '0.56, the middle of the Delft series (0.52 to 0.60)' },
          describe: 'Prismatic coefficient Cp of the hull without foils.',
        },
        midship: {
          type: 'quantity',
          kind: 'ratio',
          range: [0.5, 0.95],
          missing: { rule: '0.72, the middle of the Delft series (0.65 to 0.78)' },
          describe: 'Midship coefficient Cm: fullness of the largest section.',
        },
        waterplane: {
          type: 'quantity',
          kind: 'ratio',
          range: [0.55, 0.9],
          missing: { rule: '0.70 for a hull that planes, 0.68 otherwise (judgement)' },
          describe: 'Waterplane coefficient Cwp: area of the waterline over length times beam.',
        },
        buoyancy_aft_of_stem: {
          type: 'quantity',
          kind: 'length',
          range: [0.5, 20],
          missing: {
            rule: 'under the common centre of weights and crew, so that the boat floats level, kept within 0 to 6 % of the waterline length abaft amidships',
          },
          describe: `Centre of buoyancy of the hull, ${AFT}.`,
        },
        lines: {
          type: 'section',
          describe:
            'Lines plan: stations here, a table of offsets or a mesh in a file beside this one. Everything about the shape is then measured from it.',
          keys: {
            stations: {
              type: 'list',
              count: [5, 200],
              describe: 'Stations, half of each section from the keel up.',
              entry: {
                type: 'section',
                describe: 'One station.',
                keys: {
                  aft_of_stem: {
                    type: 'quantity',
                    kind: 'length',
                    range: [-5, 35],
                    missing: 'required',
                    describe: `Place of the station, ${AFT}.`,
                  },
                  heights: {
                    type: 'list',
                    count: [2, 200],
                    missing: 'required',
                    describe: 'Heights of the points, from the keel up.',
                    entry: {
                      type: 'quantity',
                      kind: 'length',
                      range: [-10, 10],
                      describe: 'Height of a point.',
                    },
                  },
                  half_breadths: {
                    type: 'list',
                    count: [2, 200],
                    missing: 'required',
                    describe: 'Half-breadths at those heights.',
                    entry: {
                      type: 'quantity',
                      kind: 'length',
                      range: [0, 8],
                      describe: 'Distance of a point from the centreline.',
                    },
                  },
                },
              },
            },
            table: {
              type: 'text',
              longest: 200,
              describe:
                'Name of a CSV file beside this one with the columns aft_of_stem, half_breadth and height, one row a point, from the keel up.',
            },
            mesh: {
              type: 'text',
              longest: 200,
              describe: 'Name of an OBJ or STL file beside this one: the bare hull as triangles.',
            },
            unit: {
              type: 'choice',
              choices: ['m', 'cm', 'mm', 'ft', 'in'],
              missing: { rule: 'm' },
              describe: 'Unit of the table or mesh.',
            },
            forward: {
              type: 'choice',
              choices: ['x', '-x', 'y', '-y', 'z', '-z'],
              missing: { rule: 'x' },
              describe: 'Axis of the mesh that points forward.',
            },
            up: {
              type: 'choice',
              choices: ['x', '-x', 'y', '-y', 'z', '-z'],
              missing: { rule: 'z' },
              describe: 'Axis of the mesh that points up.',
            },
            cuts: {
              type: 'count',
              range: [11, 201],
              missing: { rule: '41' },
              describe: 'Stations cut through a mesh, closer together at the ends.',
            },
            waterline_height: {
              type: 'quantity',
              kind: 'length',
              range: [-10, 10],
              missing: { rule: '0' },
              describe: 'Height of the design waterline on the scale of the lines.',
            },
          },
        },
        planes: {
          type: 'yes-no',
          missing: {
            rule: 'yes when the waterline length is over 5.7 times the cube root of the displaced volume (judgement)',
          },
          describe: 'Whether the hull can plane.',
        },
        wave_resistance: {
          type: 'choice',
          choices: ['delft-2008', 'delft-1998'],
          missing: { rule: 'delft-2008, the later fit of the same towing-tank series' },
          describe: 'Published regression for the residuary (wave-making) resistance.',
        },
        roughness: {
          type: 'quantity',
          kind: 'length',
          range: [0, 0.01],
          missing: { rule: '0: a smooth hull' },
          describe:
            'Height of an even sand roughness on the hull: 0.05 mm well kept, 0.2 mm slimy (judgement).',
          hint: 'it is in metres when no unit is given',
        },
        measured_resistance: {
          type: 'list',
          count: [3, 100],
          describe:
            'Measured upright resistance of the bare hull, speeds rising; used instead of the regressions.',
          entry: {
            type: 'section',
            describe: 'One measured point.',
            keys: {
              speed: {
                type: 'quantity',
                kind: 'speed',
                range: [0, 30],
                missing: 'required',
                describe: 'Speed through the water.',
              },
              force: {
                type: 'quantity',
                kind: 'force',
                range: [0, 1e5],
                missing: 'required',
                describe: 'Resistance.',
              },
            },
          },
        },
      },
    },
    weights: {
      type: 'named',
      count: [1, 40],
      missing: 'required',
      describe:
        'Everything that has weight, without the crew, under names of your choice (hull, rig, gear, ...). A part called "ballast" is taken to be in the keel.',
      entry: {
        type: 'section',
        describe: 'One part of the weight.',
        keys: {
          mass: {
            type: 'quantity',
            kind: 'mass',
            range: [0.01, 50000],
            missing: 'required',
            describe: 'Mass of the part.',
          },
          aft_of_stem: {
            type: 'quantity',
            kind: 'length',
            range: [-5, 35],
            missing: {
              rule: '54 % of the waterline length, for ballast the middle of the keel, for the rig the mast (judgement)',
            },
            describe: `Centre of the part, ${AFT}.`,
          },
          height: {
            type: 'quantity',
            kind: 'length',
            range: [-6, 30],
            missing: {
              rule: '0.4 of the freeboard, for ballast 60 % of the way down the keel, for the rig 45 % of the mast height (judgement)',
            },
            describe: 'Height of its centre above the waterline; negative below.',
          },
        },
      },
    },
    crew: {
      type: 'section',
      missing: 'required',
      describe: 'The people aboard.',
      keys: {
        count: {
          type: 'count',
          range: [1, 20],
          missing: { rule: `1 (${NO_SOURCE})` },
          describe: 'How many sail.',
        },
        mass_each: {
          type: 'quantity',
          kind: 'mass',
          range: [25, 200],
          missing: { rule: `75 kg, dressed for sailing (${NO_SOURCE})` },
          describe: 'Mass of one of the crew, dressed for sailing.',
          hint: 'this is the mass of one person; write the number of people under count',
        },
        style: {
          type: 'choice',
          choices: ['hiking', 'trapeze', 'rail'],
          missing: { rule: 'rail on a boat with ballast, hiking otherwise (judgement)' },
          describe: 'How they balance the boat: hiking (feet under straps), trapeze, or sitting on the rail.',
        },
        on_trapeze: {
          type: 'count',
          range: [1, 20],
          missing: { rule: `1 when the style is trapeze (${NO_SOURCE})` },
          describe: 'How many of them are on a trapeze; the others hike.',
        },
        reach: {
          type: 'quantity',
          kind: 'length',
          range: [-1, 2],
          missing: {
            rule: 'centre of the body outboard of the gunwale: hiking 0.35 m, trapeze 1.0 m, rail -0.07 m; the mean for several (common practice for a person of 1.80 m, no source)',
          },
          describe: 'Mean distance of the centres of their bodies outboard of the gunwale, fully out.',
        },
        arm_leeward: {
          type: 'quantity',
          kind: 'length',
          range: [0, 5],
          missing: { rule: '0.7 of half the beam (judgement)' },
          describe: 'How far to leeward of the centreline their common centre can move.',
        },
        aft_of_stem: {
          type: 'quantity',
          kind: 'length',
          range: [0, 30],
          missing: { rule: '62 % of the waterline length on the rail, 56 % otherwise (judgement)' },
          describe: `Common centre of the crew when trimmed for the design waterline, ${AFT}.`,
        },
        foremost: {
          type: 'quantity',
          kind: 'length',
          range: [0, 30],
          missing: { rule: '12 % of the waterline length forward of their usual place (judgement)' },
          describe: `Foremost place of their common centre, ${AFT}.`,
        },
        aftmost: {
          type: 'quantity',
          kind: 'length',
          range: [0, 30],
          missing: {
            rule: '20 % of the waterline length aft of their usual place, at most 95 % from the stem (judgement)',
          },
          describe: `Aftmost place of their common centre, ${AFT}.`,
        },
        height: {
          type: 'quantity',
          kind: 'length',
          range: [-0.5, 5],
          missing: { rule: '0.25 m above the side deck (judgement)' },
          describe: 'Height of the centre of their bodies above the waterline, sitting.',
        },
        drag_area: {
          type: 'quantity',
          kind: 'area',
          range: [0, 20],
          missing: {
            rule: 'each hiking 0.40 m2, on a trapeze 0.55 m2; on the rail the first 0.30 m2 and 0.12 m2 for each further one, sheltered (judgement)',
          },
          describe: 'Drag coefficient times area of the whole crew in the wind.',
        },
      },
    },
    foils: {
      type: 'section',
      missing: 'required',
      describe: 'Keel or centreboard, and rudder.',
      keys: {
        keel: {
          type: 'section',
          describe: 'A fixed fin keel. Give this or a centreboard.',
          keys: {
            ...keelKeys,
            volume: {
              type: 'quantity',
              kind: 'volume',
              range: [1e-4, 10],
              missing: {
                rule: 'ballast over 7200 kg/m3 (cast iron), or without ballast 0.68 thickness chord2 span (exact for a four-digit section)',
              },
              describe: 'Volume of fin and bulb.',
            },
            bulb: {
              type: 'section',
              describe:
                'A streamlined body at the tip of the fin. Its drag is counted; its end-plate effect is not.',
              keys: {
                length: {
                  type: 'quantity',
                  kind: 'length',
                  range: [0.1, 6],
                  missing: 'required',
                  describe: 'Length of the bulb.',
                },
                diameter: {
                  type: 'quantity',
                  kind: 'length',
                  range: [0.02, 1.5],
                  missing: 'required',
                  describe: 'Its greatest diameter; the mean of width and height where it is not round.',
                },
              },
            },
          },
        },
        centreboard: {
          type: 'section',
          describe: 'A board that can be raised. Give this or a keel.',
          keys: {
            ...keelKeys,
            raises_to: {
              type: 'quantity',
              kind: 'ratio',
              range: [0.25, 1],
              missing: { rule: '0.3: three tenths of the board stays down (judgement)' },
              describe:
                'Smallest share of the board left below the hull while sailing; the crew choose between this and all of it.',
            },
            kicked_up: kickedUp,
            twin,
          },
        },
        rudder: {
          type: 'section',
          missing: 'required',
          describe: 'The rudder.',
          keys: {
            ...foilKeys,
            thickness: thickness(`10 % (${NO_SOURCE})`),
            hung: {
              type: 'choice',
              choices: ['transom', 'under_hull'],
              missing: {
                rule: 'on the transom (it cuts the surface) when its root is within 2 % of the waterline end or beyond (judgement)',
              },
              describe: 'On the transom, cutting the surface, or under the hull.',
            },
            lift_limit: liftLimit('1.2 under the hull, 0.85 on the transom, where it draws air (judgement)'),
            kicked_up: kickedUp,
            twin,
            root_depth: rootDepth('0 on the transom, half the canoe draft under the hull (judgement)'),
          },
        },
      },
    },
    rig: {
      type: 'section',
      missing: 'required',
      describe: 'Mast, boom and rigging.',
      keys: {
        mast_aft_of_stem: {
          type: 'quantity',
          kind: 'length',
          range: [-1, 25],
          missing: 'required',
          describe: `Fore side of the mast, ${AFT}.`,
        },
        mast_height: {
          type: 'quantity',
          kind: 'length',
          range: [1, 50],
          missing: 'required',
          describe: 'Top of the mast above the waterline.',
        },
        mast_diameter: {
          type: 'quantity',
          kind: 'length',
          range: [0.02, 0.5],
          missing: { rule: '0.011 of the mast height (judgement)' },
          describe: 'Mean of the mast section, fore and aft and athwart.',
        },
        stayed: {
          type: 'yes-no',
          missing: { rule: 'yes when a jib is among the sails (judgement)' },
          describe: 'Whether shrouds and a forestay hold the mast.',
        },
        forestay_height: {
          type: 'quantity',
          kind: 'length',
          range: [0.5, 50],
          missing: { rule: '80 % of the mast height (judgement)' },
          describe: 'Height above the waterline at which the forestay meets the mast.',
        },
        rigging_area: {
          type: 'quantity',
          kind: 'area',
          range: [0, 5],
          missing: {
            rule: 'four wires as long as the mast is high, 1/2000 of it thick; 0 for an unstayed mast (judgement)',
          },
          describe: 'Length times diameter of all shrouds and stays, added up.',
        },
        boom_height: {
          type: 'quantity',
          kind: 'length',
          range: [0.1, 10],
          missing: {
            rule: 'the tack of the mainsail, or the freeboard plus 8 % of the mast height (judgement)',
          },
          describe: 'Height of the boom above the waterline at the mast.',
        },
        boom_length: {
          type: 'quantity',
          kind: 'length',
          range: [0.3, 15],
          missing: { rule: '1.03 of the foot of the mainsail (judgement)' },
          describe: 'Length of the boom.',
        },
        pole_length: {
          type: 'quantity',
          kind: 'length',
          range: [0.2, 12],
          missing: { rule: 'as long as the mast stands aft of the stem (judgement)' },
          describe: 'Length of the spinnaker pole, from the mast.',
        },
        sprit_length: {
          type: 'quantity',
          kind: 'length',
          range: [0, 6],
          missing: { rule: '12 % of the waterline length where there is a gennaker or reacher (judgement)' },
          describe: 'Length of the bowsprit before the fore end of the waterline.',
        },
        mizzen_mast: {
          type: 'section',
          describe: 'A second mast, of a yawl, ketch or cat-ketch.',
          keys: {
            aft_of_stem: {
              type: 'quantity',
              kind: 'length',
              range: [0, 30],
              missing: 'required',
              describe: `Fore side of the second mast, ${AFT}.`,
            },
            height: {
              type: 'quantity',
              kind: 'length',
              range: [1, 50],
              missing: 'required',
              describe: 'Its top above the waterline.',
            },
            diameter: {
              type: 'quantity',
              kind: 'length',
              range: [0.02, 0.5],
              missing: { rule: '0.011 of its height (judgement)' },
              describe: 'Mean of its section.',
            },
          },
        },
        mast_drag: {
          type: 'quantity',
          kind: 'ratio',
          range: [0.1, 1.5],
          missing: {
            rule: '1.1, a cylinder below its critical Reynolds number; along a luff eight tenths of it count (judgement)',
          },
          describe: 'Drag coefficient of the mast section on its diameter, bare.',
        },
        boom_limit: {
          type: 'quantity',
          kind: 'angle',
          range: [30, 110],
          missing: { rule: '78 deg with shrouds, 85 deg without (judgement)' },
          describe: 'Largest angle of the boom from the centreline.',
        },
      },
    },
    sails: {
      type: 'named',
      count: [1, 12],
      missing: 'required',
      describe: 'The sails, under names of your choice.',
      entry: {
        type: 'section',
        describe: 'One sail.',
        keys: {
          kind: {
            type: 'choice',
            choices: ['mainsail', 'mizzen', 'jib', 'spinnaker', 'gennaker', 'reacher'],
            missing: 'required',
            describe:
              'What kind of sail it is. spinnaker: symmetric, on a pole; gennaker: asymmetric, from a sprit; reacher: flat, on a tight luff before the forestay.',
          },
          luff: {
            type: 'quantity',
            kind: 'length',
            range: [0.5, 40],
            missing: {
              rule: 'mainsail: from the boom to 1 % under the top of the mast; jib: 94 % of the way from its tack to the forestay at the mast; off-wind sail: the way from tack to head (judgement)',
            },
            describe: 'Length of the fore edge; under a gaff, up to the throat.',
          },
          foot: {
            type: 'quantity',
            kind: 'length',
            range: [0.3, 15],
            missing: {
              rule: 'from the area when that is given; otherwise mainsail 0.38 of the luff, jib 0.40, off-wind sail 0.55 (judgement)',
            },
            describe: 'Length of the lower edge.',
          },
          area: {
            type: 'quantity',
            kind: 'area',
            range: [0.5, 200],
            describe: 'Area of the cloth. With luff and foot it sets the roach of a mainsail.',
          },
          quarter_width: width('Mainsail: width from leech to luff at a quarter of the height.'),
          half_width: {
            ...width('Width at half the height, of a mainsail or an off-wind sail.'),
            missing: {
              rule: 'off-wind sail: from the area and the foot, or as wide as the foot (judgement)',
            },
          },
          three_quarter_width: width('Mainsail: width at three quarters of the height.'),
          upper_width: width('Mainsail: width at seven eighths of the height.'),
          head_width: {
            type: 'quantity',
            kind: 'length',
            range: [0, 5],
            missing: { rule: 'mainsail: 5 % of the foot (judgement)' },
            describe: 'Mainsail only: width at the head.',
          },
          gaff_length: {
            type: 'quantity',
            kind: 'length',
            range: [0.2, 12],
            describe: 'Mainsail only: length of the gaff that spreads the head of a four-cornered sail.',
          },
          gaff_angle: {
            type: 'quantity',
            kind: 'angle',
            range: [0, 88],
            missing: { rule: '60 deg where there is a gaff (judgement)' },
            describe: 'Angle of the gaff above the horizontal.',
          },
          luff_perpendicular: {
            type: 'quantity',
            kind: 'length',
            range: [0.2, 15],
            describe:
              'Jib only: shortest distance from the clew to the luff. Gives the foot, with its overlap of the mast.',
          },
          goose_wing: {
            type: 'yes-no',
            missing: { rule: 'jib: no' },
            describe: 'Jib only: it is set to windward on a pole before the wind.',
          },
          head_height: {
            type: 'quantity',
            kind: 'length',
            range: [0.5, 50],
            missing: {
              rule: 'off-wind sail: 0.5 % of the mast height above the forestay, for a gennaker 97 % of the mast height (judgement)',
            },
            describe: 'Off-wind sail only: height of its head above the waterline.',
          },
          projected: {
            type: 'quantity',
            kind: 'ratio',
            range: [0.5, 1],
            missing: { rule: 'spinnaker 80 %, gennaker 85 %, reacher 97 % (judgement)' },
            describe: 'Off-wind sail only: share of its cloth that the wind sees.',
          },
          reefs: {
            type: 'list',
            count: [1, 4],
            describe:
              'Mainsail or mizzen: share of the height that stays up with each reef taken in, the first one first, as [85 %, 70 %]. Each makes a sail set of its own.',
            entry: {
              type: 'quantity',
              kind: 'ratio',
              range: [0.3, 0.97],
              describe: 'Share of the height left.',
            },
          },
          section: {
            type: 'section',
            describe: 'How its sections behave, where you know better than the table of section limits.',
            keys: {
              least_drag: {
                type: 'quantity',
                kind: 'ratio',
                range: [0, 0.2],
                missing: { rule: 'from the table of section limits for its kind' },
                describe: 'Drag coefficient of a section at its best lift coefficient.',
              },
              drag_rise: {
                type: 'quantity',
                kind: 'ratio',
                range: [0.001, 0.5],
                missing: { rule: 'from the table of section limits for its kind' },
                describe: 'Growth of that drag with the square of the lift coefficient away from it.',
              },
              least_drag_lift: {
                type: 'quantity',
                kind: 'ratio',
                range: [0, 1.5],
                missing: { rule: 'from the table of section limits for its kind' },
                describe: 'Lift coefficient at which the drag is least.',
              },
              square_drag: {
                type: 'quantity',
                kind: 'ratio',
                range: [0.5, 2],
                missing: { rule: 'from the table of section limits for its kind' },
                describe: 'Force coefficient when the sail stands square to the wind.',
              },
            },
          },
          roach: {
            type: 'quantity',
            kind: 'ratio',
            range: [-0.2, 0.6],
            missing: { rule: 'mainsail: from the area when that is given; otherwise 15 % (judgement)' },
            describe:
              'Mainsail only: share by which the chord at half height exceeds the straight line from clew to head.',
          },
          tack_aft_of_stem: {
            type: 'quantity',
            kind: 'length',
            range: [-5, 25],
            missing: {
              rule: 'mainsail: the mast; jib: 2 % of the waterline length aft of the stem; spinnaker: the end of the pole; gennaker and reacher: the end of the sprit (judgement)',
            },
            describe: `Fore lower corner of the sail, ${AFT}.`,
          },
          tack_height: {
            type: 'quantity',
            kind: 'length',
            range: [0, 10],
            missing: {
              rule: 'mainsail: the boom; jib, gennaker and reacher: freeboard plus 2 % of the mast height; spinnaker: freeboard plus 12 % (judgement)',
            },
            describe: 'Height of that corner above the waterline.',
          },
          lift_limit: {
            type: 'quantity',
            kind: 'ratio',
            range: [0.8, 2.5],
            missing: { rule: 'from the table of section limits for its kind' },
            describe: 'Largest lift coefficient of its sections.',
          },
        },
      },
    },
    sail_sets: {
      type: 'named',
      count: [1, 12],
      missing: { rule: 'one set with all the sails' },
      describe: 'Which sails go up together: a name of your choice and the list of their names.',
      entry: {
        type: 'list',
        count: [1, 4],
        describe: 'The sails of the set.',
        entry: { type: 'text', longest: 80, describe: 'Name of a sail.' },
      },
    },
    measured_rigs: {
      type: 'named',
      count: [1, 8],
      describe:
        'Sail sets known by coefficients from a tunnel or a computation, under names of your choice. Each is one more sail set.',
      entry: {
        type: 'section',
        describe: 'One sail set by its coefficients.',
        keys: {
          area: {
            type: 'quantity',
            kind: 'area',
            range: [0.5, 400],
            missing: 'required',
            describe: 'Area the coefficients refer to.',
          },
          centre_aft_of_stem: {
            type: 'quantity',
            kind: 'length',
            range: [-2, 25],
            missing: 'required',
            describe: `Centre of effort, ${AFT}.`,
          },
          centre_height: {
            type: 'quantity',
            kind: 'length',
            range: [0.3, 30],
            missing: 'required',
            describe:
              'Height of the centre of effort above the waterline, where a row gives none of its own.',
          },
          effective_height: {
            type: 'quantity',
            kind: 'length',
            range: [0.5, 60],
            missing: { rule: '1.1 times the mast height (judgement)' },
            describe:
              'Height whose square says how much of the drag is induced: lift^2 area / (pi height^2).',
          },
          windage: {
            type: 'choice',
            choices: ['included', 'left out'],
            missing: { rule: 'left out: hull, mast, rigging and crew are added' },
            describe: 'Whether the coefficients include hull, mast, rigging and crew.',
          },
          table: {
            type: 'text',
            longest: 200,
            describe:
              'Name of a CSV file beside this one with the columns awa (degrees), lift, drag and, if known, height (m).',
          },
          rows: {
            type: 'list',
            count: [3, 200],
            describe: 'The coefficients here: apparent wind angles rising. Instead of a table.',
            entry: {
              type: 'section',
              describe: 'One angle.',
              keys: {
                awa: {
                  type: 'quantity',
                  kind: 'angle',
                  range: [0, 180],
                  missing: 'required',
                  describe: 'Apparent wind angle.',
                },
                lift: {
                  type: 'quantity',
                  kind: 'ratio',
                  range: [-1, 4],
                  missing: 'required',
                  describe: 'Lift coefficient: across the apparent wind.',
                },
                drag: {
                  type: 'quantity',
                  kind: 'ratio',
                  range: [0, 4],
                  missing: 'required',
                  describe: 'Drag coefficient: along the apparent wind.',
                },
                height: {
                  type: 'quantity',
                  kind: 'length',
                  range: [0.3, 30],
                  describe: 'Height of the centre of effort above the waterline.',
                },
              },
            },
          },
        },
      },
    },
    waves: {
      type: 'section',
      describe:
        'The sea, and what it costs in your own figures. Left out: flat water. No general method for boats this small is built in; the coefficients come from your tests or a seakeeping calculation.',
      keys: {
        height: {
          type: 'quantity',
          kind: 'length',
          range: [0, 5],
          describe: 'Significant wave height in every wind. Give this or fetch.',
        },
        fetch: {
          type: 'quantity',
          kind: 'length',
          range: [10, 1000000],
          describe:
            'Open water to windward: wave height then grows with the wind (JONSWAP). Give this or height.',
        },
        period: {
          type: 'quantity',
          kind: 'time',
          range: [0.3, 25],
          missing: {
            rule: 'with fetch: the peak period of the same growth law; with height it is needed only when the figures below are given by period',
          },
          describe: 'Peak period of the sea.',
        },
        added_resistance: {
          type: 'list',
          count: [1, 400],
          missing: 'required',
          describe:
            'Added resistance R over rho g Bwl^2/Lwl Hs^2 by true wind angle, rising, and by period where it is given; the ends hold beyond them.',
          entry: {
            type: 'section',
            describe: 'One angle.',
            keys: {
              twa: {
                type: 'quantity',
                kind: 'angle',
                range: [0, 180],
                missing: 'required',
                describe: 'True wind angle from the course; waves are taken to run with the wind.',
              },
              period: {
                type: 'quantity',
                kind: 'time',
                range: [0.3, 25],
                describe:
                  'Peak period this row belongs to. Give it for all rows, sorted by period, or for none.',
              },
              coefficient: {
                type: 'quantity',
                kind: 'ratio',
                range: [-1, 5],
                missing: 'required',
                describe: 'R / (rho g Bwl^2/Lwl Hs^2) at that angle.',
              },
            },
          },
        },
      },
    },
    variants: {
      type: 'named',
      count: [1, 200],
      describe:
        'Named changes to this boat, to be compared with it: keys as in the file, nested or with dots between (rig.mast_height: 9 m).',
      entry: {
        type: 'differences',
        describe:
          'New values. Also "times 1.1", "plus 0.2 m", "left out"; a range "8 to 10 m in 5 steps" or a choice "3 or 4" makes several variants, two of them a grid.',
      },
    },
    limits: {
      type: 'section',
      describe: 'What the crew accept.',
      keys: {
        heel: {
          type: 'quantity',
          kind: 'angle',
          range: [5, 40],
          missing: { rule: '30 deg with ballast, 20 deg without (judgement)' },
          describe: 'Largest angle of heel.',
        },
        rudder: {
          type: 'quantity',
          kind: 'angle',
          range: [3, 45],
          missing: { rule: '15 deg (judgement)' },
          describe: 'Largest rudder angle.',
        },
      },
    },
  },
} as const satisfies SectionField;

/** What the file says, keys as written, quantities in SI and rad. */
export type BoatFileValue = ValueOf<typeof boatFile>;

/** The field at a path of keys, through named entries and lists. Undefined when there is none. */
export function fieldAt(path: readonly string[]): Field | undefined {
  let field: Field | undefined = boatFile;
  for (const key of path) {
    if (field === undefined) return undefined;
    if (field.type === 'section') {
      field = Object.hasOwn(field.keys, key) ? field.keys[key] : undefined;
    } else if (field.type === 'named' || field.type === 'list') {
      field = field.entry;
    } else {
      return undefined;
    }
  }
  return field;
}

type JsonSchema = Record<string, unknown>;

/** JSON Schema (draft 2020-12) of the boat file, so that editors complete, explain and check it. */
export function boatJsonSchema(): JsonSchema {
  return {
    $schema: 'https://json-schema.org/draft/2020-12/schema',
    title: 'Boat file',
    ...schemaOf(boatFile),
  };
}

function schemaOf(field: Field): JsonSchema {
  const description = explain(field);
  switch (field.type) {
    case 'quantity': {
      const { bareUnit, example } = KINDS[field.kind];
      const [low, high] = field.range;
      const unit = bareUnit === '' ? '' : ` ${bareUnit}`;
      return {
        description: `${description} Allowed: ${low}${unit} to ${high}${unit}.`,
        anyOf: [
          { type: 'number', minimum: low, maximum: high },
          { type: 'string', pattern: '\\d', maxLength: 80 },
        ],
        examples: [example],
      };
    }
    case 'count':
      return { description, type: 'integer', minimum: field.range[0], maximum: field.range[1] };
    case 'choice':
      return { description, enum: [...field.choices] };
    case 'yes-no':
      return { description, enum: ['yes', 'no', true, false] };
    case 'text':
      return { description, type: 'string', maxLength: field.longest };
    case 'section': {
      const required = Object.entries(field.keys)
        .filter(([, f]) => (f as Field).missing === 'required' && (f as Field).unless === undefined)
        .map(([key]) => key);
      const either = Object.entries(field.keys).flatMap(([key, f]) =>
        (f as Field).unless === undefined
          ? []
          : [
              {
                anyOf: [key, (f as Field).unless!].map((k) => ({ required: [k], properties: { [k]: true } })),
              },
            ],
      );
      return {
        description,
        type: 'object',
        additionalProperties: false,
        ...(required.length > 0 ? { required } : {}),
        ...(either.length > 0 ? { allOf: either } : {}),
        properties: Object.fromEntries(
          Object.entries(field.keys).map(([key, f]) => [key, schemaOf(f as Field)]),
        ),
      };
    }
    case 'named':
      return {
        description,
        type: 'object',
        minProperties: field.count[0],
        maxProperties: field.count[1],
        additionalProperties: schemaOf(field.entry),
      };
    case 'differences':
      return { description, type: 'object', minProperties: 1 };
    case 'list':
      return {
        description,
        type: 'array',
        minItems: field.count[0],
        maxItems: field.count[1],
        items: schemaOf(field.entry),
      };
  }
}

/** Description with the rule that stands in for a missing value. */
export function explain(field: Field): string {
  if (field.missing === undefined || field.missing === 'required') return field.describe;
  return `${field.describe} If missing: ${field.missing.rule}.`;
}

/** Range of a quantity or count in SI and rad. */
export function rangeSi(field: Field): readonly [number, number] | undefined {
  if (field.type === 'count') return field.range;
  if (field.type !== 'quantity') return undefined;
  const factor = field.kind === 'angle' ? DEGREE : 1;
  return [field.range[0] * factor, field.range[1] * factor];
}
