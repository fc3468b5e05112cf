import { KNOT } from './constants.js';
import type { QuantityKind, UnitEngine } from './quantity.js';

/** What is taken from mathjs: reading an expression, units, and arithmetic; nothing else can be called. */
const PARTS = [
  'evaluateDependencies',
  'createUnitDependencies',
  'unitDependencies',
  'addDependencies',
  'subtractDependencies',
  'multiplyDependencies',
  'divideDependencies',
  'powDependencies',
  'unaryMinusDependencies',
] as const;

/** The mathjs package as loaded, by either of its builds. */
export type MathjsModule = Readonly<Record<(typeof PARTS)[number], object>> & {
  readonly create: (parts: never) => unknown;
};

interface MathjsUnit {
  toNumber(unit: string): number;
  equalBase(other: MathjsUnit): boolean;
}

interface MathjsInstance {
  evaluate(text: string): unknown;
  unit(text: string): MathjsUnit;
  createUnit(name: string, definition: { definition: string; aliases: string[] }): unknown;
}

/** The unit each kind is read out in. */
const BASE: Readonly<Record<QuantityKind, string>> = {
  length: 'm',
  area: 'm2',
  volume: 'm3',
  mass: 'kg',
  angle: 'rad',
  speed: 'm/s',
  density: 'kg/m3',
  force: 'N',
  temperature: 'degC',
  time: 's',
  ratio: '',
};

/**
 * Only arithmetic on numbers and unit names is let through to the expression reader: no calls, no assignments, no
 * strings, no property access.
 */
const HARMLESS = /^[\dA-Za-z.+\-*/^%\s()]+$/;
const CALL = /[A-Za-z]\w*\s*\(/;

/** A unit engine on a loaded mathjs. mathjs takes 0.3 to 0.7 s to load, so the caller loads it when needed. */
export function unitEngineFrom(module: MathjsModule): UnitEngine {
  const parts = Object.assign({}, ...PARTS.map((name) => module[name]));
  const math = module.create(parts as never) as MathjsInstance;
  math.createUnit('kn', { definition: `${KNOT} m/s`, aliases: ['kt', 'kts', 'knot', 'knots'] });
  return (text, kind) => {
    if (text.length > 80 || !HARMLESS.test(text) || CALL.test(text)) return undefined;
    try {
      const value = math.evaluate(text);
      if (kind === 'ratio') return typeof value === 'number' ? value : undefined;
      if (typeof value !== 'object' || value === null || !('toNumber' in value)) return undefined;
      const quantity = value as MathjsUnit;
      if (!quantity.equalBase(math.unit(`1 ${BASE[kind]}`))) return undefined;
      const number = quantity.toNumber(BASE[kind]);
      return typeof number === 'number' && Number.isFinite(number) ? number : undefined;
    } catch {
      return undefined;
    }
  };
}

/** Loads mathjs and makes a unit engine of it, for surroundings where loading is asynchronous. */
export async function loadUnitEngine(): Promise<UnitEngine> {
  return unitEngineFrom((await import('mathjs')) as unknown as MathjsModule);
}
