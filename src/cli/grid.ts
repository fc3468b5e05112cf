import { UsageError } from './errors.js';

/** Most values one list may hold. */
const MOST = 200;

interface Allowed {
  /** Option, for messages. */
  readonly option: string;
  readonly unit: string;
  readonly least: number;
  readonly most: number;
}

/** Wind speeds [kn] and angles [deg] that make sense to ask for. */
export const WIND_SPEEDS: Allowed = { option: '--tws', unit: 'kn', least: 0.5, most: 60 };
export const WIND_ANGLES: Allowed = { option: '--twa', unit: 'deg', least: 0, most: 180 };

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
  const add = (value: number): void => {
    values.push(inRange(value, allowed));
    if (values.length > MOST)
      throw new UsageError(`${allowed.option}: more than ${MOST} values; take a larger step`);
  };
  for (const part of text.split(',')) {
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
    inRange(from, allowed);
    inRange(to, allowed);
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
  return inRange(plainNumber(text, allowed), allowed);
}
