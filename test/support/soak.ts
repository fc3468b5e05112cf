import {
  createSetSolvers,
  describeOutcome,
  type SailingResult,
  solveAlone,
} from '../../src/equilibrium/index.js';
import { bruteForceSpeed } from './brute-force.js';
import { seeded } from './random.js';
import { randomBoat } from './random-boats.js';

const KNOT = 1852 / 3600;
const DEG = Math.PI / 180;

export interface SoakCount {
  combinations: number;
  refusedBoats: number;
  balanced: number;
  unbalanced: Record<string, number>;
  crashes: string[];
  notNumbers: string[];
  /** "No solution" that a brute-force look found a balanced state for, out of `looked`. */
  contradicted: string[];
  looked: number;
  worstResidual: number;
  /** Balanced states that are not proven to be the fastest. */
  unproven: number;
}

/**
 * Random boats (half sensible, half silly), winds of 1 to 40 kn and angles of 0 to 180 deg, each solved from nothing.
 * @param confirm share of the "no solution" answers that are looked into by brute force
 */
export function soak(
  combinations: number,
  seed: number,
  confirm: number,
  progress?: (done: number) => void,
): SoakCount {
  const random = seeded(seed);
  const count: SoakCount = {
    combinations: 0,
    refusedBoats: 0,
    balanced: 0,
    unbalanced: {},
    crashes: [],
    notNumbers: [],
    contradicted: [],
    looked: 0,
    worstResidual: 0,
    unproven: 0,
  };
  while (count.combinations < combinations) {
    const kind = random() < 0.5 ? 'sensible' : 'silly';
    let boat: ReturnType<typeof randomBoat>;
    try {
      boat = randomBoat(random, kind);
    } catch (error) {
      if (!(error instanceof RangeError)) count.crashes.push(`building: ${String(error)}`);
      count.refusedBoats++;
      continue;
    }
    const sets = createSetSolvers(boat);
    for (let k = 0; k < 20 && count.combinations < combinations; k++) {
      const set = sets[Math.floor(random() * sets.length)]!;
      const tws = (1 + 39 * random() ** 1.5) * KNOT;
      const twa = random() * 180 * DEG;
      const where = `${kind} boat after ${count.combinations}: ${(tws / KNOT).toFixed(2)} kn, ${(twa / DEG).toFixed(2)} deg`;
      count.combinations++;
      if (progress && count.combinations % 1000 === 0) progress(count.combinations);
      let r: SailingResult;
      try {
        r = describeOutcome(set, tws, twa, solveAlone(set.solver, tws, twa));
      } catch (error) {
        count.crashes.push(`${where}: ${String(error)}`);
        continue;
      }
      if (r.status === 'balanced') {
        count.balanced++;
        if (r.notes.some((n) => n.includes('not proven'))) count.unproven++;
        count.worstResidual = Math.max(count.worstResidual, r.residual);
        const values = [
          r.speed,
          r.leeway,
          r.heel,
          r.rudder,
          r.ease,
          r.crewArm,
          r.awa,
          r.aws,
          r.vmg,
          r.crewShare,
        ];
        if (!values.every(Number.isFinite)) count.notNumbers.push(where);
      } else {
        count.unbalanced[r.why] = (count.unbalanced[r.why] ?? 0) + 1;
        if (random() < confirm) {
          count.looked++;
          const speed = bruteForceSpeed(set.model, tws, twa, 8, 8, 30);
          if (speed > 0) count.contradicted.push(`${where}: ${r.why}, yet ${(speed / KNOT).toFixed(2)} kn`);
        }
      }
    }
  }
  return count;
}
