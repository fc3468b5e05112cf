import { writeQuantity } from '../units/index.js';
import type { Path } from './parse-file.js';
import { fieldAt } from './schema.js';
import type { Estimate } from './types.js';
import { showPath } from './variants.js';

/** Fills in what a file leaves out, and records every value it fills in with the rule from the definition. */
export class Estimator {
  readonly estimates: Estimate[] = [];

  /** The given value, or the one made by the key's rule. */
  pick<T extends number | string | boolean>(path: Path, given: T | undefined, make: () => T): T {
    if (given !== undefined) return given;
    const value = make();
    this.record(path, value);
    return value;
  }

  /** Records a value that was made for a key. `rule` replaces the definition's where a rule has several branches. */
  record(path: Path, value: number | string | boolean, rule?: string): void {
    const field = fieldAt(path);
    const missing = field?.missing;
    const said = rule ?? (typeof missing === 'object' ? missing.rule : undefined);
    if (field === undefined || said === undefined) {
      throw new Error(`the boat file's definition has no rule for ${showPath(path)}`);
    }
    const text =
      typeof value === 'number'
        ? field.type === 'quantity'
          ? writeQuantity(value, field.kind)
          : `${value}`
        : typeof value === 'boolean'
          ? value
            ? 'yes'
            : 'no'
          : value;
    this.estimates.push({ key: showPath(path), value: text, rule: said });
  }
}
