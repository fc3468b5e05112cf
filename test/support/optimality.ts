import { createSetSolvers, solveAlone } from '../../src/equilibrium/index.js';
import { bruteForceSpeed } from './brute-force.js';
import { DEMO_BOATS, demoBoat } from './demo.js';
import { seeded } from './random.js';
import { randomBoat } from './random-boats.js';

const KNOT = 1852 / 3600;
const DEG = Math.PI / 180;

export interface OptimalityCount {
  states: number;
  /** Largest share by which a point of the grid was faster than the answer, and where. */
  worst: number;
  where: string;
  /** States where the grid was faster by more than the allowed share. */
  beaten: string[];
}

/** Random states of demo and random boats against a brute-force grid over speed, heel, depower and board. */
export function optimality(
  states: number,
  seed: number,
  grid: readonly [number, number, number],
  allowed = 0.0005,
): OptimalityCount {
  const random = seeded(seed);
  const count: OptimalityCount = { states: 0, worst: Number.NEGATIVE_INFINITY, where: '', beaten: [] };
  while (count.states < states) {
    let boat: ReturnType<typeof randomBoat>;
    try {
      boat = random() < 0.5 ? demoBoat(DEMO_BOATS[count.states % 3]!) : randomBoat(random, 'sensible');
    } catch {
      continue;
    }
    const sets = createSetSolvers(boat);
    for (let k = 0; k < 4 && count.states < states; k++) {
      const set = sets[Math.floor(random() * sets.length)]!;
      const tws = (3 + 20 * random()) * KNOT;
      const twa = (35 + 140 * random()) * DEG;
      const answer = solveAlone(set.solver, tws, twa);
      if (!answer.ok) continue;
      count.states++;
      const gain = bruteForceSpeed(set.model, tws, twa, ...grid) / answer.speed - 1;
      const where = `${boat.spec.name}, ${set.sailSet.name}, ${(tws / KNOT).toFixed(2)} kn, ${(twa / DEG).toFixed(1)} deg: ${(answer.speed / KNOT).toFixed(3)} kn, the grid ${(100 * gain).toFixed(3)} %`;
      if (gain > count.worst) {
        count.worst = gain;
        count.where = where;
      }
      if (gain > allowed) count.beaten.push(where);
    }
  }
  return count;
}
