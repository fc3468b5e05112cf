import type { OutsideCheck } from './check.js';
import { checks as foils } from './foils.js';
import { checks as liftingLine } from './lifting-line.js';
import { checks as sailForces } from './sail-forces.js';
import { checks as wind } from './wind.js';

/** Every comparison with the outside, in the order in which the table prints them. Each topic has a file. */
export const allChecks: readonly OutsideCheck[] = [...wind, ...liftingLine, ...sailForces, ...foils];
