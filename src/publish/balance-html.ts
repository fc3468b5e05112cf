import type { ForceBalance } from '../equilibrium/index.js';
import { escapeHtml } from './escape.js';
import { fixed } from './numbers.js';
import { staticPage } from './page-shell.js';
import { oneLine } from './plain-text.js';
import { type BoatFacts, figures, type StateFigures } from './report.js';

const WIDTH = 360;
const HEIGHT = 320;

interface Arrow {
  readonly name: string;
  readonly x: number;
  readonly y: number;
  readonly dx: number;
  readonly dy: number;
  readonly colour: number;
}

/** A sketch in SVG: an outline and forces where they act, each arrow to the scale of the largest. */
function sketch(
  id: string,
  title: string,
  description: string,
  view: { readonly x: readonly [number, number]; readonly y: readonly [number, number] },
  outline: readonly (readonly [number, number])[],
  arrows: readonly Arrow[],
  reach: number,
): string {
  const scale = Math.min((WIDTH - 20) / (view.x[1] - view.x[0]), (HEIGHT - 20) / (view.y[1] - view.y[0]));
  const px = (x: number): number => WIDTH / 2 + (x - 0.5 * (view.x[0] + view.x[1])) * scale;
  const py = (y: number): number => HEIGHT / 2 - (y - 0.5 * (view.y[0] + view.y[1])) * scale;
  const most = Math.max(1e-9, ...arrows.map((a) => Math.hypot(a.dx, a.dy)));
  const drawn = arrows
    .filter((a) => Math.hypot(a.dx, a.dy) > 0.01 * most)
    .map((a) => {
      const k = (reach * scale) / most;
      const [x0, y0] = [px(a.x), py(a.y)];
      const [x1, y1] = [x0 + a.dx * k, y0 - a.dy * k];
      const length = Math.max(1e-9, Math.hypot(x1 - x0, y1 - y0));
      const head = Math.min(8, 0.5 * length);
      const [ux, uy] = [(x1 - x0) / length, (y1 - y0) / length];
      const n = (v: number): string => fixed(v, 1);
      return `<g><title>${escapeHtml(a.name)}</title><path class="chart-line s${a.colour}" stroke-width="2.5" d="M${n(x0)} ${n(y0)}L${n(x1)} ${n(y1)}M${n(x1 - head * (ux + 0.5 * uy))} ${n(y1 - head * (uy - 0.5 * ux))}L${n(x1)} ${n(y1)}L${n(x1 - head * (ux - 0.5 * uy))} ${n(y1 - head * (uy + 0.5 * ux))}"/><circle class="chart-mark" cx="${n(x0)}" cy="${n(y0)}" r="3"/></g>`;
    })
    .join('\n');
  const path = outline
    .map(([x, y], i) => `${i === 0 ? 'M' : 'L'}${fixed(px(x), 1)} ${fixed(py(y), 1)}`)
    .join('');
  const legend = arrows
    .filter((a) => Math.hypot(a.dx, a.dy) > 0.01 * most)
    .map(
      (a) =>
        `<li><svg class="chart-key" viewBox="0 0 30 8" aria-hidden="true"><path class="chart-line s${a.colour}" d="M0 4L30 4" stroke-width="2.5"/></svg>${escapeHtml(a.name)}</li>`,
    )
    .join('');
  return `<figure class="chart"><figcaption>${escapeHtml(title)}</figcaption><svg viewBox="0 0 ${WIDTH} ${HEIGHT}" role="img" aria-labelledby="${id}-t ${id}-d"><title id="${id}-t">${escapeHtml(title)}</title><desc id="${id}-d">${escapeHtml(description)}</desc>
<path class="chart-grid" fill="none" stroke-width="1.5" d="${path}Z"/>
${drawn}
</svg><ul class="chart-legend">${legend}</ul></figure>`;
}

/**
 * Plan and section sketch of a balance with the lines of action, and its force table. Plan: the bow up, leeward to the
 * right; section: seen from astern, leeward to the right.
 */
export function balanceHtml(balance: ForceBalance, id: string): string {
  const f = figures(balance.state) as StateFigures;
  const { lines } = balance;
  const half = 0.5 * lines.length;
  const hull: [number, number][] = [];
  for (let i = 0; i <= 20; i++) {
    const t = i / 20;
    hull.push([
      0.5 * lines.beam * Math.sin(Math.PI * Math.min(1, 0.15 + 0.85 * t)) ** 0.7,
      -half + 2 * half * t,
    ]);
  }
  const plan = [
    ...hull,
    ...hull
      .slice()
      .reverse()
      .map(([x, y]): [number, number] => [-x, y]),
  ];
  const force = (p: { forward: number; leeward: number }): number => Math.hypot(p.forward, p.leeward);
  const planArrows: Arrow[] = [
    {
      name: `air, ${fixed(force(lines.air), 0)} N`,
      x: lines.air.planOffset,
      y: lines.air.x,
      dx: lines.air.leeward,
      dy: lines.air.forward,
      colour: 4,
    },
    {
      name: `water, ${fixed(force(lines.water), 0)} N`,
      x: lines.water.planOffset,
      y: lines.water.x,
      dx: lines.water.leeward,
      dy: lines.water.forward,
      colour: 0,
    },
  ];
  const tilt = balance.state.heel;
  const turned = (y: number, z: number): [number, number] => [
    y * Math.cos(tilt) + z * Math.sin(tilt),
    z * Math.cos(tilt) - y * Math.sin(tilt),
  ];
  const section = (
    [
      [-0.5 * lines.beam, lines.freeboard],
      [-0.35 * lines.beam, 0],
      [-0.15 * lines.beam, -lines.canoeDraft],
      [-0.02 * lines.beam, -lines.canoeDraft],
      [-0.02 * lines.beam, -lines.draft],
      [0.02 * lines.beam, -lines.draft],
      [0.02 * lines.beam, -lines.canoeDraft],
      [0.15 * lines.beam, -lines.canoeDraft],
      [0.35 * lines.beam, 0],
      [0.5 * lines.beam, lines.freeboard],
      [0.02 * lines.beam, lines.freeboard],
      [0, lines.mastTop],
      [-0.02 * lines.beam, lines.freeboard],
    ] as const
  ).map(([y, z]) => turned(y, z));
  const at = (z: number): [number, number] => turned(0, z);
  const [airY, airZ] = at(lines.air.z);
  const [waterY, waterZ] = at(-lines.water.depth);
  const [crewY, crewZ] = turned(-balance.state.crewArm, lines.crewHeight);
  const [massY, massZ] = at(lines.massHeight);
  const sectionArrows: Arrow[] = [
    {
      name: `side force of the air, ${fixed(lines.air.leeward, 0)} N`,
      x: airY,
      y: airZ,
      dx: lines.air.leeward,
      dy: 0,
      colour: 4,
    },
    {
      name: `side force of the water, ${fixed(-lines.water.leeward, 0)} N`,
      x: waterY,
      y: waterZ,
      dx: lines.water.leeward,
      dy: 0,
      colour: 0,
    },
    {
      name: `weight of the crew, ${fixed(lines.crewWeight, 0)} N`,
      x: crewY,
      y: crewZ,
      dx: 0,
      dy: -lines.crewWeight,
      colour: 7,
    },
    {
      name: `weight of the boat, ${fixed(lines.boatWeight, 0)} N, not to scale`,
      x: massY,
      y: massZ,
      dx: 0,
      dy: -Math.min(lines.boatWeight, 1.5 * Math.max(lines.crewWeight, lines.air.leeward)),
      colour: 2,
    },
  ];
  const helm =
    Math.abs(f.rudderDeg) < 0.2
      ? 'no helm'
      : f.rudderDeg > 0
        ? `weather helm: ${fixed(f.rudderDeg, 1)} deg of rudder against a bow that turns to windward`
        : `lee helm: ${fixed(-f.rudderDeg, 1)} deg of rudder against a bow that falls off`;
  const rows = balance.rows
    .map(
      (r) =>
        `<tr><th scope="row">${escapeHtml(oneLine(r.name))}</th><td>${fixed(r.forward, 1)}</td><td>${fixed(r.leeward, 1)}</td><td>${fixed(r.roll, 1)}</td><td>${fixed(r.yaw, 1)}</td></tr>`,
    )
    .join('');
  const caption = `Forces and moments, ${fixed(f.twsKn, 1)} kn at ${fixed(f.twaDeg, 0)} deg`;
  const high = lines.mastTop;
  return `<h3>${fixed(f.twsKn, 1)} kn, ${fixed(f.twaDeg, 0)} deg: ${fixed(f.speedKn, 2)} kn</h3>
<p>Heel ${fixed(f.heelDeg, 1)} deg, leeway ${fixed(f.leewayDeg, 1)} deg, ${escapeHtml(f.regime)}, ${escapeHtml(oneLine(f.sailSet))}; ${helm}. The forces of air and water pass each other ${fixed(Math.abs(lines.lead), 2)} m apart at the same heel: that couple is what the rudder holds.</p>
<div class="charts">${sketch(
    `${id}-plan`,
    'Plan, the bow up, leeward to the right',
    'Resultant forces of air and water in the horizontal plane, drawn where they act.',
    { x: [-0.9 * half, 0.9 * half], y: [-1.15 * half, 1.15 * half] },
    plan,
    planArrows,
    0.6 * half,
  )}${sketch(
    `${id}-section`,
    'Section, seen from astern, leeward to the right',
    'Side forces of air and water and the weights of boat and crew, drawn where they act.',
    { x: [-0.55 * high, 0.75 * high], y: [-lines.draft * 1.15, high] },
    section,
    sectionArrows,
    0.4 * high,
  )}</div>
<details><summary>${escapeHtml(caption)}</summary><div class="scroll" tabindex="0" role="region" aria-label="${escapeHtml(caption)}"><table><caption>${escapeHtml(caption)}</caption><thead><tr><th scope="col">from</th><th scope="col">forward, N</th><th scope="col">to leeward, N</th><th scope="col">heeling, N m</th><th scope="col">bow to windward, N m</th></tr></thead><tbody>${rows}</tbody></table></div></details>`;
}

/** One state's balance as a page of its own. */
export function balancePage(boat: BoatFacts, balance: ForceBalance): string {
  const f = figures(balance.state) as StateFigures;
  return staticPage({
    title: `${oneLine(boat.name)}: balance of forces`,
    lead: `True wind ${fixed(f.twsKn, 1)} kn at ${fixed(f.twaDeg, 1)} deg from the course.`,
    sections: [{ id: 'balance', heading: 'Balance', html: balanceHtml(balance, 'balance') }],
  });
}
