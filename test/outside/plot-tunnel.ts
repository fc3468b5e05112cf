/** Draws the tunnel polar of a una rig with the prediction into a page: `tsx test/outside/plot-tunnel.ts FOLDER`. */
import { lineChartSvg, writeFiles } from '../../src/publish/index.js';
import { staticPage } from '../../src/publish/page-shell.js';
import { coefficients, TUNNEL, unaRig } from './sail-forces.js';

const DEG = Math.PI / 180;
const rig = unaRig();
const prices = [0, 0.02, 0.05, 0.08, 0.1, 0.12, 0.14, 0.16, 0.18, 0.2, 0.22, 0.25, 0.3, 0.5, 2];
const eased = [30, 40, 60].map((deg) => ({
  deg,
  points: prices.map((p) => coefficients(rig, deg * DEG, p)),
}));
const square = Array.from({ length: 41 }, (_, i) => 40 + 1.25 * i).map((a) => ({
  a,
  ...coefficients(rig, (a + 90) * DEG),
}));
const charts = [
  lineChartSvg(
    {
      title:
        'Lift over drag: measured, and eased at 30, 40 and 60 deg apparent; beyond: incidence 40 to 90 deg',
      description: 'Measured polar with the predictions.',
      xLabel: 'drag coefficient',
      yLabel: 'lift coefficient',
      lines: [
        { name: 'measured', x: TUNNEL.cd, y: TUNNEL.cl, colour: 1, width: 3 },
        ...eased.map((e, k) => ({
          name: `eased at ${e.deg} deg`,
          x: e.points.map((p) => p.cd),
          y: e.points.map((p) => p.cl),
          colour: 4 + k,
          dash: '6 3',
        })),
        { name: 'separated', x: square.map((s) => s.cd), y: square.map((s) => s.cl), colour: 0, dash: '2 3' },
      ],
    },
    'polar',
  ),
  lineChartSvg(
    {
      title: 'Lift and drag over incidence',
      description: 'Measured lift and drag with the separated branch of the prediction.',
      xLabel: 'incidence, deg',
      yLabel: 'coefficient',
      lines: [
        { name: 'lift, measured', x: TUNNEL.alpha, y: TUNNEL.cl, colour: 1, width: 3 },
        { name: 'drag, measured', x: TUNNEL.alpha, y: TUNNEL.cd, colour: 4, width: 3 },
        {
          name: 'lift, predicted',
          x: square.map((s) => s.a),
          y: square.map((s) => s.cl),
          colour: 1,
          dash: '6 3',
        },
        {
          name: 'drag, predicted',
          x: square.map((s) => s.a),
          y: square.map((s) => s.cd),
          colour: 4,
          dash: '6 3',
        },
      ],
    },
    'incidence',
  ),
];
const page = staticPage({
  title: 'A una rig in the tunnel, and predicted',
  lead: 'Measured polar attributed to Marchaj (second-hand), mast and boom included.',
  sections: [{ id: 'polars', heading: 'Polars', html: `<div class="charts">${charts.join('\n')}</div>` }],
});
console.log(writeFiles(process.argv[2] ?? 'reports', [{ name: 'una-rig.html', content: page }]).join('\n'));
