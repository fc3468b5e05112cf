import type { OutsideCheck } from './check.js';
import { checks as delft } from './delft.js';
import { checks as foils } from './foils.js';
import { checks as friction } from './friction.js';
import { checks as hydrostatics } from './hydrostatics.js';
import { checks as liftingLine } from './lifting-line.js';
import { checks as planing } from './planing.js';
import { checks as sailForces } from './sail-forces.js';
import { checks as sailTheory } from './sail-theory.js';
import { checks as wholeBoats } from './whole-boats.js';
import { checks as wind } from './wind.js';

/** Every comparison with the outside, in the order in which the table prints them. Each topic has a file. */
export const allChecks: readonly OutsideCheck[] = [
  ...wind,
  ...friction,
  ...hydrostatics,
  ...delft,
  ...planing,
  ...foils,
  ...liftingLine,
  ...sailTheory,
  ...sailForces,
  ...wholeBoats,
];
