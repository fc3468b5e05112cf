import { HULL, type Hull } from './types.js';

/** Parts of a hull's resistance over speed at one heel. */
export interface ResistanceCurve {
  /** Heel [rad]. */
  readonly heel: number;
  /** Speeds [m/s] and Froude numbers on the floating waterline length. */
  readonly speed: readonly number[];
  readonly froude: readonly number[];
  /** Total [N], and the parts by place in HULL [N]. */
  readonly total: readonly number[];
  readonly parts: readonly (readonly number[])[];
}

/** Evaluates a prepared hull at the given speeds [m/s] and heel [rad]. */
export function resistanceCurve(
  hull: Hull,
  heel: number,
  speeds: readonly number[],
  gravity: number,
): ResistanceCurve {
  const out = new Float64Array(HULL.count);
  const parts: number[][] = Array.from({ length: HULL.count }, () => []);
  const total: number[] = [];
  const scale = Math.sqrt(gravity * hull.form.lwl);
  for (const v of speeds) {
    total.push(hull.resistanceInto(v, heel, out));
    for (let i = 0; i < HULL.count; i++) parts[i]!.push(out[i]!);
  }
  return { heel, speed: speeds, froude: speeds.map((v) => v / scale), total, parts };
}
