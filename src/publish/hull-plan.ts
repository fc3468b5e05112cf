import { type Boat, rightingArms } from '../boat/index.js';
import { floatAt, immerse, type Lines, prepareLines, resampled } from '../hull/index.js';
import { degrees, radians } from '../units/index.js';
import { escapeHtml } from './escape.js';
import { type ChartLine, lineChartSvg } from './line-chart.js';
import { fixed, significant } from './numbers.js';
import { staticPage } from './page-shell.js';
import { oneLine } from './plain-text.js';

/** Stations drawn in the body plan, and waterlines below and above the design waterline, as shares of draft and freeboard. */
const SECTIONS = 11;
const LEVELS = { below: [0.75, 0.5, 0.25], above: [0.5, 1] } as const;
const HEELS = Array.from({ length: 73 }, (_, i) => 2.5 * i);

/** Half-breadth of a section at a height, by the outermost crossing; NaN where it does not reach. */
function halfBreadthAt(s: Lines['stations'][number], z: number): number {
  let widest = Number.NaN;
  for (let k = 0; k + 1 < s.z.length; k++) {
    const a = s.z[k]! - z;
    const b = s.z[k + 1]! - z;
    if (a === 0 && b === 0) widest = Math.max(Number.isNaN(widest) ? 0 : widest, s.y[k]!, s.y[k + 1]!);
    else if (a <= 0 !== b <= 0 || b === 0) {
      const t = a / (a - b);
      const y = s.y[k]! + t * (s.y[k + 1]! - s.y[k]!);
      widest = Number.isNaN(widest) ? y : Math.max(widest, y);
    }
  }
  return widest;
}

function evenly<T>(list: readonly T[], count: number): T[] {
  if (list.length <= count) return [...list];
  return Array.from({ length: count }, (_, i) => list[Math.round((i * (list.length - 1)) / (count - 1))]!);
}

function table(caption: string, heads: readonly string[], rows: readonly (readonly string[])[]): string {
  const head = heads.map((h) => `<th scope="col">${escapeHtml(h)}</th>`).join('');
  const body = rows
    .map(
      (r) =>
        `<tr>${r.map((c, i) => (i === 0 ? `<th scope="row">${c}</th>` : `<td>${c}</td>`)).join('')}</tr>`,
    )
    .join('');
  return `<details><summary>${escapeHtml(caption)}</summary><div class="scroll" tabindex="0" role="region" aria-label="${escapeHtml(caption)}"><table><caption>${escapeHtml(caption)}</caption><thead><tr>${head}</tr></thead><tbody>${body}</tbody></table></div></details>`;
}

/** Drawings of a hull from its lines: body plan, waterlines, section areas, righting arms. One page without scripts. */
export function hullPlanPage(boat: Boat): string {
  const { spec, hull, lines } = boat;
  const d = spec.hull.dimensions;
  const aft = (x: number): number => 0.5 * d.lwl - x;
  const stations = lines.stations;
  // Sections nearest to even places along the hull, whatever the spacing of the given ones.
  const [first, last] = [stations[0]!.x, stations[stations.length - 1]!.x];
  const drawn = [
    ...new Set(
      Array.from({ length: SECTIONS }, (_, i) => first + ((last - first) * i) / (SECTIONS - 1)).map(
        (x) => [...stations].sort((a, b) => Math.abs(a.x - x) - Math.abs(b.x - x))[0]!,
      ),
    ),
  ];
  const body: ChartLine[] = drawn.map((s, i) => ({
    name: `${fixed(aft(s.x), 2)} m aft${s.x > 0 ? ' (right half)' : ' (left half)'}`,
    x: s.y.map((y) => (s.x > 0 ? y : -y)),
    y: s.z,
    colour: i % 9,
    width: 1.6,
  }));
  const wide = 0.55 * d.beamMax;
  body.push({ name: 'design waterline', x: [-wide, wide], y: [0, 0], colour: 1, dash: '6 4', width: 1 });

  const levels = [
    ...LEVELS.below.map((f) => -f * d.canoeDraft),
    0,
    ...LEVELS.above.map((f) => f * d.freeboard),
  ];
  const waterlines: ChartLine[] = levels.map((z, i) => {
    const points = stations
      .map((s) => ({ x: aft(s.x), y: halfBreadthAt(s, z) }))
      .filter((p) => Number.isFinite(p.y))
      .sort((a, b) => a.x - b.x);
    return {
      name: z === 0 ? 'design waterline' : `${fixed(z, 2)} m`,
      x: points.map((p) => p.x),
      y: points.map((p) => p.y),
      colour: i % 9,
      width: z === 0 ? 3 : 1.6,
    };
  });

  const prepared = prepareLines(resampled(lines));
  const request = { volume: hull.canoe.mass / spec.water.density, x: hull.canoe.x, z: hull.canoe.z };
  const floating = floatAt(prepared, request, 0).immersed;
  const design = immerse(prepared, { heel: 0, height: 0, trim: 0 });
  const xs = prepared.lines.stations.map((s) => aft(s.x));
  const order = xs.map((_, i) => i).sort((a, b) => xs[a]! - xs[b]!);
  const pick = (values: ArrayLike<number>): number[] => order.map((i) => values[i]!);
  const areas: ChartLine[] = [
    {
      name: 'floating with the crew at their usual place',
      x: pick(xs),
      y: pick(floating.sections),
      colour: 4,
      width: 2.5,
    },
    {
      name: 'to the design waterline',
      x: pick(xs),
      y: pick(design.sections),
      colour: 1,
      dash: '6 4',
      width: 1.6,
    },
  ];

  const arms = rightingArms(boat, HEELS.map(radians));
  const deg = arms.map((a) => degrees(a.heel));
  const righting: ChartLine[] = [
    { name: 'crew inboard', x: deg, y: arms.map((a) => a.inboard), colour: 1, width: 2.5 },
    {
      name: 'crew at their outboard reach',
      x: deg,
      y: arms.map((a) => a.out),
      colour: 4,
      dash: '8 4',
      width: 2.5,
    },
  ];
  const held = arms.filter((a) => !a.freeTrim).length;

  const sectionTable = evenly(order, 21).map((i) => [
    fixed(xs[i]!, 2),
    fixed(floating.sections[i]!, 4),
    fixed(design.sections[i]!, 4),
  ]);
  const armTable = arms
    .filter((a) => Math.round(degrees(a.heel)) % 10 === 0 && Math.abs(degrees(a.heel) % 10) < 1e-6)
    .map((a) => [fixed(degrees(a.heel), 0), fixed(a.inboard, 3), fixed(a.out, 3)]);
  const vanishing = (key: 'inboard' | 'out'): string => {
    for (let i = 1; i < arms.length; i++) {
      const [p, q] = [arms[i - 1]![key], arms[i]![key]];
      if (p > 0 && q <= 0) return `${fixed(deg[i - 1]! + (2.5 * p) / (p - q), 0)} deg`;
    }
    return 'nowhere up to 180 deg';
  };
  const name = oneLine(spec.name);
  return staticPage({
    title: `${name}: the hull`,
    lead: `${spec.hull.lines === undefined ? 'Generated from main dimensions' : 'As given by its lines'}; displacement ${significant(boat.mass)} kg with the crew, prismatic coefficient ${significant(hull.form.cp, 3)}.`,
    sections: [
      {
        id: 'body-plan',
        heading: 'Body plan',
        html: lineChartSvg(
          {
            title: 'Sections: fore body to the right, after body to the left',
            description: `Half sections of the hull at ${drawn.length} places; breadth and height in metres from the design waterline.`,
            xLabel: 'breadth, m',
            yLabel: 'height, m',
            lines: body,
            yFrom: -1.1 * d.canoeDraft,
            equal: true,
          },
          'body-plan-chart',
        ),
      },
      {
        id: 'waterlines',
        heading: 'Waterlines',
        html: lineChartSvg(
          {
            title: 'Half-breadths at several heights, the stem to the left',
            description:
              'Half-breadth of the hull over the distance aft of the fore end of the waterline, one line for each height.',
            xLabel: 'aft of the fore end of the waterline, m',
            yLabel: 'half-breadth, m',
            lines: waterlines,
            equal: true,
          },
          'waterlines-chart',
        ),
      },
      {
        id: 'section-areas',
        heading: 'Section areas',
        html: `${lineChartSvg(
          {
            title: 'Immersed area of the sections along the hull',
            description:
              'Area of each section under water over the distance aft of the fore end of the waterline.',
            xLabel: 'aft of the fore end of the waterline, m',
            yLabel: 'area, m\u00b2',
            lines: areas,
          },
          'areas-chart',
        )}\n${table('Section areas as a table', ['aft, m', 'floating, m2', 'to design waterline, m2'], sectionTable)}`,
      },
      {
        id: 'righting-arms',
        heading: 'Righting arms',
        html: `${lineChartSvg(
          {
            title: 'Righting arm over heel',
            description: `Righting arm in metres over heel to 180 degrees. Crew inboard it vanishes at ${vanishing('inboard')}, crew out at ${vanishing('out')}.`,
            xLabel: 'heel, deg',
            yLabel: 'righting arm, m',
            lines: righting,
          },
          'righting-chart',
        )}
<p>Geometry only: hull closed and watertight to its sheer, nothing shifted or flooded, no mast or sail in the water, crew held in place. Crew inboard the arm vanishes at ${vanishing('inboard')}, with the crew out at ${vanishing('out')}. No judgement of stability.${held > 0 ? ` At ${held} of ${arms.length} angles no fore-and-aft balance was found; there the trim is held level.` : ''}</p>
${table('Righting arms as a table', ['heel, deg', 'crew inboard, m', 'crew out, m'], armTable)}`,
      },
    ],
  });
}
