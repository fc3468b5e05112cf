import type { Boat } from '../boat/index.js';
import { HULL, type ResistanceCurve, resistanceCurve } from '../hull/index.js';
import { degrees, radians, toKnots } from '../units/index.js';
import { type LineChart, lineChartSvg } from './line-chart.js';
import { fixed } from './numbers.js';

/** The hull's resistance over speed at several heel angles, ready to be published. */
export interface ResistanceReport {
  /** Displacement weight [N]. */
  readonly weight: number;
  /** Froude numbers between which the residuary regression was made. */
  readonly range: readonly [number, number];
  readonly planes: boolean;
  readonly curves: readonly ResistanceCurve[];
}

/** Names of the parts in tables and plots, in the order of HULL. */
export const RESISTANCE_PARTS: readonly {
  readonly place: number;
  readonly key: string;
  readonly name: string;
}[] = [
  { place: HULL.friction, key: 'friction_n', name: 'friction' },
  { place: HULL.residuary, key: 'residuary_n', name: 'residuary (waves)' },
  { place: HULL.heel, key: 'heel_n', name: 'increase with heel' },
  { place: HULL.keelResiduary, key: 'keel_residuary_n', name: 'keel residuary' },
  { place: HULL.keelHeel, key: 'keel_heel_n', name: 'keel residuary, heeled' },
  { place: HULL.planing, key: 'planing_n', name: 'what planing adds or takes' },
  { place: HULL.transom, key: 'transom_n', name: 'immersed transom' },
];

const HEELS = [0, 10, 20, 30];

/** Curves for heel angles of 0 to 30 deg (no further than the boat's own limit allows to compute). */
export function resistanceReport(boat: Boat): ResistanceReport {
  const { hull, spec } = boat;
  const top = (spec.hull.planing ? 1.25 : 0.62) * Math.sqrt(spec.gravity * hull.form.lwl);
  const speeds = Array.from({ length: 81 }, (_, i) => (top * i) / 80);
  return {
    weight: boat.mass * spec.gravity,
    range: [spec.hull.residuary === 'delft-1998' ? 0.1 : 0.15, 0.6],
    planes: spec.hull.planing,
    curves: HEELS.map((h) => resistanceCurve(hull, radians(h), speeds, spec.gravity)),
  };
}

/** Every part over speed and heel as CSV with plain headers. */
export function resistanceCsv(r: ResistanceReport, decimals = 3): string {
  const head = [
    'heel_deg',
    'speed_kn',
    'froude',
    'total_n',
    ...RESISTANCE_PARTS.map((p) => p.key),
    'total_over_weight',
    'regression',
  ];
  const lines = [head.join(',')];
  for (const c of r.curves) {
    c.speed.forEach((v, i) => {
      const fn = c.froude[i]!;
      const inside = fn >= r.range[0] && fn <= r.range[1];
      lines.push(
        [
          fixed(degrees(c.heel), 0),
          fixed(toKnots(v), decimals),
          fixed(fn, 4),
          fixed(c.total[i]!, decimals),
          ...RESISTANCE_PARTS.map((p) => fixed(c.parts[p.place]![i]!, decimals)),
          fixed(c.total[i]! / r.weight, 6),
          inside ? 'inside' : 'outside',
        ].join(','),
      );
    });
  }
  return `${lines.join('\r\n')}\r\n`;
}

/** The charts of the page: totals by heel, and the parts at each heel. */
export function resistanceHtml(r: ResistanceReport): string {
  const speed = r.curves[0]!.speed.map(toKnots);
  const scale = speed[speed.length - 1]! / r.curves[0]!.froude[speed.length - 1]!;
  const percent = (ys: readonly number[]): number[] => ys.map((y) => (100 * y) / r.weight);
  const shades = [
    {
      from: r.range[0] * scale,
      to: r.range[1] * scale,
      words: 'speeds the wave-resistance regression was made for',
    },
  ];
  const dashes = ['', '8 4', '2 4', '10 4 2 4', '4 4', '12 3', '1 3'];
  const totals: LineChart = {
    title: 'Resistance of the hull over speed, by heel',
    description:
      'Total resistance in percent of displacement weight over boat speed in knots, one line for each heel angle. The results file and the CSV hold the same figures.',
    xLabel: 'boat speed, kn',
    yLabel: 'resistance, % of weight',
    shades,
    lines: r.curves.map((c, k) => ({
      name: `${fixed(degrees(c.heel), 0)}\u00b0 of heel`,
      x: speed,
      y: percent(c.total),
      colour: [1, 4, 6, 8][k]!,
      ...(dashes[k] ? { dash: dashes[k] } : {}),
    })),
  };
  const charts = [lineChartSvg(totals, 'resistance-0')];
  for (const k of [0, 2]) {
    const c = r.curves[k]!;
    const heel = fixed(degrees(c.heel), 0);
    const lines = RESISTANCE_PARTS.map((p, i) => ({
      name: p.name,
      x: speed,
      y: percent(c.parts[p.place]!),
      colour: [0, 2, 3, 4, 5, 6, 7][i]!,
      ...(dashes[i] ? { dash: dashes[i] } : {}),
    })).filter((l) => l.y.some((y) => Math.abs(y) > 0.01));
    charts.push(
      lineChartSvg(
        {
          title: `Its parts at ${heel}\u00b0 of heel`,
          description: `Parts of the resistance at ${heel} degrees of heel in percent of displacement weight over boat speed in knots.`,
          xLabel: 'boat speed, kn',
          yLabel: 'resistance, % of weight',
          shades,
          lines: [{ name: 'total', x: speed, y: percent(c.total), colour: 1, width: 3 }, ...lines],
        },
        `resistance-${k + 1}`,
      ),
    );
  }
  return `<div class="charts">${charts.join('\n')}</div>
<p class="soft">Hull and keel volume only: keel, rudder and sails are in the force tables. ${r.planes ? 'Above the displacement range planing blends in; the curve never falls.' : 'Above Froude number 0.60 the ratio of the regression goes on with the slope before it.'}</p>`;
}
