import type { OutsideCheck } from './check.js';

/** Every comparison with the outside, in the order in which the table prints them. Each topic has a file. */
export const allChecks: readonly OutsideCheck[] = [];
