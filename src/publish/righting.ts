import { type Boat, type RightingArms, rightingArms } from '../boat/index.js';
import type { SailingState } from '../equilibrium/index.js';
import type { Polar } from '../polar/index.js';
import { degrees, radians, toKnots } from '../units/index.js';
import { lineChartSvg } from './line-chart.js';
import { fixed } from './numbers.js';

/** Righting moments of a boat over heel, and where her best-VMG states sit on them. Plain data. */
export interface RightingReport {
  /** Displacement weight [N]. */
  readonly weight: number;
  readonly arms: readonly RightingArms[];
  /** Operating points: heel [rad], righting moment [N m] of hull and crew, and words. */
  readonly points: readonly { readonly heel: number; readonly moment: number; readonly words: string }[];
}

const HEELS = Array.from({ length: 25 }, (_, i) => radians(2.5 * i));

export function rightingReport(boat: Boat, polar: Polar): RightingReport {
  const weight = boat.mass * boat.spec.gravity;
  const crew = boat.spec.crew.mass * boat.spec.gravity;
  const states = polar.bestUp.filter((s): s is SailingState => s.status === 'balanced');
  return {
    weight,
    arms: rightingArms(boat, HEELS),
    points: states.map((s) => ({
      heel: s.heel,
      moment: weight * boat.hull.rightingArm(s.heel) + crew * s.crewArm * Math.cos(s.heel),
      words: `${fixed(toKnots(s.tws), 0)} kn, best VMG to windward: ${fixed(degrees(s.heel), 1)} deg of heel, crew ${fixed(s.crewShare, 2)}`,
    })),
  };
}

/** The chart, with the states of best VMG to windward marked on it. */
export function rightingHtml(r: RightingReport): string {
  const deg = r.arms.map((a) => degrees(a.heel));
  const moment = (arm: number): number => (r.weight * arm) / 1000;
  return `<div class="charts">${lineChartSvg(
    {
      title: 'Righting moment over heel',
      description:
        'Righting moment in kilonewton metres over heel, crew inboard and at their outboard reach. Circles mark the states of best VMG to windward, one for each wind speed.',
      xLabel: 'heel, deg',
      yLabel: 'righting moment, kN m',
      lines: [
        { name: 'crew inboard', x: deg, y: r.arms.map((a) => moment(a.inboard)), colour: 1, width: 2.5 },
        {
          name: 'crew at their outboard reach',
          x: deg,
          y: r.arms.map((a) => moment(a.out)),
          colour: 4,
          dash: '8 4',
          width: 2.5,
        },
      ],
      marks: r.points.map((p) => ({ x: degrees(p.heel), y: p.moment / 1000, words: p.words })),
    },
    'righting',
  )}<div><h3>States of best VMG to windward</h3><ul>${r.points.map((p) => `<li>${p.words}, ${fixed(p.moment / 1000, 2)} kN m</li>`).join('')}</ul>
<p class="soft">Geometry of the hull closed and watertight to its sheer, in flat water. No judgement of stability.</p></div></div>`;
}
