import { DEGREE, FOOT, INCH, KNOT, POUND } from './constants.js';

/** What a number in a text can be. Results are in m, m2, m3, kg, rad, m/s, kg/m3, N, deg C, s, or a plain ratio. */
export type QuantityKind =
  | 'length'
  | 'area'
  | 'volume'
  | 'mass'
  | 'angle'
  | 'speed'
  | 'density'
  | 'force'
  | 'temperature'
  | 'time'
  | 'ratio';

/**
 * How a kind is written: the unit a bare number is taken in and shown in, the factor from that unit to the
 * result, and every unit the quick reader knows, as factors to the result.
 */
export interface KindDefinition {
  readonly noun: string;
  readonly bareUnit: string;
  readonly bareFactor: number;
  readonly example: string;
  readonly units: Readonly<Record<string, number>>;
}

// Factors are composed as mathjs composes them (prefix times unit, then the power), so that both agree to the
// last bit, and to one unit in the last place where a unit is itself a quotient ("km/h").
const LENGTH = {
  m: 1,
  meter: 1,
  meters: 1,
  metre: 1,
  metres: 1,
  km: 1000,
  dm: 0.1,
  cm: 0.01,
  mm: 0.001,
  ft: FOOT,
  foot: FOOT,
  feet: FOOT,
  "'": FOOT,
  in: INCH,
  inch: INCH,
  inches: INCH,
  '"': INCH,
  yd: 0.9144,
  yard: 0.9144,
  yards: 0.9144,
} as const;

const powers = (n: number, marks: readonly string[]): Record<string, number> => {
  const out: Record<string, number> = {};
  for (const unit of ['m', 'cm', 'mm', 'ft', 'in', 'yd'] as const) {
    for (const mark of marks) out[`${unit}${mark}`] = LENGTH[unit] ** n;
  }
  return out;
};

export const KINDS: Readonly<Record<QuantityKind, KindDefinition>> = {
  length: { noun: 'a length', bareUnit: 'm', bareFactor: 1, example: '4.2 m', units: LENGTH },
  area: {
    noun: 'an area',
    bareUnit: 'm2',
    bareFactor: 1,
    example: '7.06 m2',
    units: { ...powers(2, ['2', '^2', '²']), sqft: FOOT * FOOT },
  },
  volume: {
    noun: 'a volume',
    bareUnit: 'm3',
    bareFactor: 1,
    example: '0.07 m3',
    units: {
      ...powers(3, ['3', '^3', '³']),
      cm3: 1e-6,
      l: 0.001,
      L: 0.001,
      litre: 0.001,
      litres: 0.001,
      liter: 0.001,
    },
  },
  mass: {
    noun: 'a mass',
    bareUnit: 'kg',
    bareFactor: 1,
    example: '75 kg',
    units: {
      kg: 1,
      g: 0.001,
      t: 1000,
      tonne: 1000,
      tonnes: 1000,
      lb: POUND,
      lbs: POUND,
      lbm: POUND,
      pound: POUND,
      pounds: POUND,
      oz: POUND / 16,
      stone: 14 * POUND,
    },
  },
  angle: {
    noun: 'an angle',
    bareUnit: 'deg',
    bareFactor: DEGREE,
    example: '12 deg',
    units: { deg: DEGREE, degree: DEGREE, degrees: DEGREE, '°': DEGREE, rad: 1, radian: 1, radians: 1 },
  },
  speed: {
    noun: 'a speed',
    bareUnit: 'm/s',
    bareFactor: 1,
    example: '10 kn',
    units: {
      'm/s': 1,
      'km/h': 1000 / 3600,
      kmh: 1000 / 3600,
      kn: KNOT,
      kt: KNOT,
      kts: KNOT,
      knot: KNOT,
      knots: KNOT,
      mph: 1609.344 / 3600,
      'ft/s': FOOT,
    },
  },
  density: {
    noun: 'a density',
    bareUnit: 'kg/m3',
    bareFactor: 1,
    example: '1025 kg/m3',
    units: { 'kg/m3': 1, 'kg/m^3': 1, 'kg/m³': 1, 'g/cm3': 0.001 / 0.01 ** 3, 'kg/l': 1000, 'kg/L': 1000 },
  },
  force: {
    noun: 'a force',
    bareUnit: 'N',
    bareFactor: 1,
    example: '40 N',
    units: { N: 1, kN: 1000, newton: 1, newtons: 1, kgf: 9.80665, lbf: 4.4482216152605 },
  },
  time: {
    noun: 'a time',
    bareUnit: 's',
    bareFactor: 1,
    example: '3.5 s',
    units: { s: 1, sec: 1, seconds: 1, min: 60 },
  },
  temperature: {
    noun: 'a temperature',
    bareUnit: 'degC',
    bareFactor: 1,
    example: '15 degC',
    units: { degC: 1, '°C': 1, C: 1, celsius: 1 },
  },
  ratio: {
    noun: 'a plain ratio or a percentage',
    bareUnit: '',
    bareFactor: 1,
    example: '0.56 or 56 %',
    units: { '%': 0.01, percent: 0.01 },
  },
};

/** A text that is no quantity of the kind wanted; `hint` says what may have been meant. */
export class QuantityError extends Error {
  constructor(
    message: string,
    readonly hint: string,
  ) {
    super(message);
    this.name = 'QuantityError';
  }
}

/**
 * Reads what the quick reader cannot: returns the value in SI base units, or undefined when the text is no
 * quantity of that kind. `loadUnitEngine` makes one from mathjs.
 */
export type UnitEngine = (text: string, kind: QuantityKind) => number | undefined;

const NUMBER = String.raw`[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?`;
const PLAIN = new RegExp(`^(${NUMBER})$`);
/** A number, perhaps with a common fraction behind it ("3 1/2"), and a unit. */
const PART = new RegExp(
  String.raw`\s*(${NUMBER})(?:\s+(\d+)/([1-9]\d*))?\s*(°C|['"°%]|[A-Za-z][A-Za-z°/^²³]*[23]?)`,
  'y',
);

/**
 * Reads a quantity from text: "4.2", "4200 mm", "16 ft 3 in", "5' 3\"", "56 %". A bare number is taken in m, m2,
 * m3, kg, deg, m/s, kg/m3, N or deg C; angles come out in rad.
 * @param engine makes a reader for everything else ("2 * 3.1 m"); called only when it is needed
 * @throws QuantityError with a hint
 */
export function parseQuantity(text: string, kind: QuantityKind, engine?: () => UnitEngine): number {
  const quick = quickQuantity(text, kind);
  if (quick !== undefined) return quick;
  const trimmed = text.trim();
  const { noun, example } = KINDS[kind];
  if (trimmed === '') throw new QuantityError(`nothing written where ${noun} is wanted`, `write ${example}`);
  if (/^[+-]?\.?(nan|inf(inity)?)$/i.test(trimmed)) {
    throw new QuantityError(`"${shown(text)}" is not a finite number`, `write ${noun} such as ${example}`);
  }
  for (const other of Object.keys(KINDS) as QuantityKind[]) {
    if (other === kind || PLAIN.test(trimmed) || quickQuantity(text, other) === undefined) continue;
    throw new QuantityError(
      `"${shown(text)}" is ${KINDS[other].noun}, but ${noun} is wanted`,
      `write ${noun} such as ${example}`,
    );
  }
  if (/\d,\d/.test(trimmed)) {
    throw new QuantityError(
      `"${shown(text)}" is not ${noun}`,
      `write a decimal point: ${trimmed.replace(/(\d),(\d)/g, '$1.$2')}`,
    );
  }
  const slow = /\d/.test(trimmed) && trimmed.length <= 80 ? engine?.()(trimmed, kind) : undefined;
  if (slow !== undefined && Number.isFinite(slow)) return slow;
  throw new QuantityError(
    `"${shown(text)}" is not ${noun}`,
    `write a number with a unit, such as ${example}${unitAdvice(kind)}`,
  );
}

function unitAdvice(kind: QuantityKind): string {
  const names = Object.keys(KINDS[kind].units).filter((u) => /^[A-Za-z/]+[23]?$/.test(u) && u.length <= 5);
  return names.length > 1 ? ` (units: ${names.slice(0, 10).join(', ')})` : '';
}

function shown(text: string): string {
  return text.length > 40 ? `${text.slice(0, 37)}...` : text;
}

/** The quick reader: a bare number, or numbers each with a unit of the table, added up. Undefined otherwise. */
export function quickQuantity(text: string, kind: QuantityKind): number | undefined {
  const { units, bareFactor } = KINDS[kind];
  const trimmed = text.trim();
  if (trimmed === '' || trimmed.length > 80) return undefined;
  if (PLAIN.test(trimmed)) {
    const value = Number(trimmed) * bareFactor;
    return Number.isFinite(value) ? value : undefined;
  }
  let sum = 0;
  let sign = 1;
  let last = Number.POSITIVE_INFINITY;
  PART.lastIndex = 0;
  let parts = 0;
  while (PART.lastIndex < trimmed.length) {
    const match = PART.exec(trimmed);
    if (match === null) return undefined;
    const factor = Object.hasOwn(units, match[4]!) ? units[match[4]!] : undefined;
    // "16 ft 3 in": units fall, and only the first number may carry a sign.
    if (factor === undefined || factor >= last || (parts > 0 && /^[+-]/.test(match[1]!))) return undefined;
    const fraction = match[2] === undefined ? 0 : Number(match[2]) / Number(match[3]);
    if (parts === 0 && match[1]!.startsWith('-')) sign = -1;
    const size = Math.abs(Number(match[1])) + fraction;
    sum += match[4] === '%' || match[4] === 'percent' ? size / 100 : size * factor;
    last = factor;
    parts++;
  }
  // "5 kg 3 %" or "2 m2 3 cm2" mean nothing: only lengths, masses and angles are written in two parts.
  if (parts > 1 && kind !== 'length' && kind !== 'mass') return undefined;
  return Number.isFinite(sum) ? sign * sum : undefined;
}

/** A value in SI base units written in the unit that a bare number of this kind is taken in: "4.2 m". */
export function writeQuantity(value: number, kind: QuantityKind, digits = 4): string {
  const { bareUnit, bareFactor } = KINDS[kind];
  const number = Number((value / bareFactor).toPrecision(digits));
  return bareUnit === '' ? `${number}` : `${number} ${bareUnit}`;
}
