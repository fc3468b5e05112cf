import { toKnots } from '../units/index.js';
import { UsageError } from './errors.js';

/** Most values one list may hold. */
const MOST = 200;

interface Allowed {
  /** Option, for messages. */
  readonly option: string;
  readonly unit: string;
  readonly least: number;
  readonly most: number;
  /** Other units that may stand behind the values, and how many of `unit` each is. */
  readonly others: Readonly<Record<string, number>>;
}

/** Wind speeds [kn] and angles [deg] that make sense to ask for. */
export const WIND_SPEEDS: Allowed = {
  option: '--tws',
  unit: 'kn',
  least: 0.5,
  most: 60,
  others: { kn: 1, 'm/s': toKnots(1), 'km/h': toKnots(1 / 3.6) },
};
export const WIND_ANGLES: Allowed = {
  option: '--twa',
  unit: 'deg',
  least: 0,
  most: 180,
  others: { deg: 1, rad: 180 / Math.PI },
};

/** Wind speeds that make sense to ask for, bare numbers in a unit of choice. */
export function windSpeedsIn(unit: 'kn' | 'm/s' | 'km/h', option = '--tws'): Allowed {
  const { others, least, most } = WIND_SPEEDS;
  const per = others[unit]!;
  const round = (v: number): number => Number((v / per).toFixed(1));
  return {
    option,
    unit,
    least: round(least),
    most: round(most),
    others: Object.fromEntries(Object.entries(others).map(([u, factor]) => [u, factor / per])),
  };
}

/** Decimals of speeds. @throws UsageError */
export function readDecimals(text: string | undefined): number | undefined {
  if (text === undefined) return undefined;
  if (!/^[0-6]$/.test(text.trim()))
    throw new UsageError(`--decimals: "${text}" is not a whole number from 0 to 6`);
  return Number(text);
}

/** Least percent of a predicted speed that is taken for one (judgement: below, it is the part taken off). */
const LEAST_PERCENT = 30;

/** A percent of the predicted speed, as a share. @throws UsageError naming the option and what is allowed */
export function readPercent(text: string, option: string): number {
  const t = text.trim().replace(/\s*%$/, '');
  const value = /^(\d+\.?\d*|\.\d+)$/.test(t) ? Number(t) : Number.NaN;
  if (!(value >= LEAST_PERCENT && value <= 100))
    throw new UsageError(
      `${option}: "${text}" is not a percent from ${LEAST_PERCENT} to 100; it is what is left of the predicted speed, such as 95`,
    );
  return value / 100;
}

/** Splits a unit off the end of a list: "3,5,7 m/s" gives "3,5,7" and its factor. */
function withoutUnit(text: string, allowed: Allowed): { values: string; factor: number } {
  const match = /^(.*?[\d.])\s*([a-z/]+)\s*$/i.exec(text);
  if (match === null) return { values: text, factor: 1 };
  const unit = match[2]!.toLowerCase();
  const factor = Object.hasOwn(allowed.others, unit) ? allowed.others[unit]! : undefined;
  if (factor === undefined) {
    throw new UsageError(
      `${allowed.option}: "${match[2]}" is no unit of it; use ${Object.keys(allowed.others).join(', ')}, or none for ${allowed.unit}`,
    );
  }
  return { values: match[1]!, factor };
}

function plainNumber(text: string, allowed: Allowed): number {
  const t = text.trim();
  if (!/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(t))
    throw new UsageError(
      `${allowed.option}: "${t}" is not a number; write a list such as 4,6,8 or a range from:to:step such as 4:20:2`,
    );
  const value = Number(t);
  return value;
}

function inRange(value: number, allowed: Allowed): number {
  if (!(value >= allowed.least && value <= allowed.most))
    throw new UsageError(
      `${allowed.option}: ${value} ${allowed.unit} is outside ${allowed.least} to ${allowed.most} ${allowed.unit}`,
    );
  return value;
}

/**
 * Reads a list ("4,6,8"), a range from:to:step ("4:20:2") or both mixed ("4:12:2,15").
 * @returns rising values without repeats, in the unit of `allowed`
 * @throws UsageError naming the option, the value and what is allowed
 */
export function readList(text: string, allowed: Allowed): number[] {
  const values: number[] = [];
  const { values: list, factor } = withoutUnit(text, allowed);
  const add = (given: number): void => {
    values.push(inRange(factor === 1 ? given : Number((given * factor).toFixed(9)), allowed));
    if (values.length > MOST)
      throw new UsageError(`${allowed.option}: more than ${MOST} values; take a larger step`);
  };
  for (const part of list.split(',')) {
    if (part.trim() === '')
      throw new UsageError(`${allowed.option}: a value is missing in "${text}"; write a list such as 4,6,8`);
    const bounds = part.split(':');
    if (bounds.length === 1) {
      add(plainNumber(part, allowed));
      continue;
    }
    if (bounds.length !== 3)
      throw new UsageError(`${allowed.option}: write a range as from:to:step, such as 4:20:2, not "${part}"`);
    const [from, to, step] = bounds.map((b) => plainNumber(b, allowed)) as [number, number, number];
    inRange(from * factor, allowed);
    inRange(to * factor, allowed);
    if (!(step > 0) || to < from)
      throw new UsageError(
        `${allowed.option}: in "${part}" the step must be above 0 and the end not before the start`,
      );
    const count = Math.floor((to - from) / step + 1e-9);
    if (count >= MOST)
      throw new UsageError(`${allowed.option}: more than ${MOST} values; take a larger step`);
    for (let i = 0; i <= count; i++) add(Number((from + i * step).toFixed(9)));
  }
  return [...new Set(values)].sort((a, b) => a - b);
}

/** Reads one value. @throws UsageError naming the option, the value and what is allowed */
export function readOne(text: string, allowed: Allowed): number {
  if (/[,:]/.test(text)) throw new UsageError(`${allowed.option}: one value is wanted here, not "${text}"`);
  const { values, factor } = withoutUnit(text, allowed);
  return inRange(plainNumber(values, allowed) * factor, allowed);
}

/** Shares, and the mass of a whole crew. */
export const SHARES: Allowed = { option: '', unit: '', least: 0, most: 1, others: {} };
export const CREW_MASS: Allowed = {
  option: '--crew-mass',
  unit: 'kg',
  least: 25,
  most: 4000,
  others: { kg: 1, lb: 0.45359237 },
};
