import { readFileSync } from 'node:fs';
import { type Boat, readBoat, rightingArms } from '../../src/boat/index.js';
import {
  floatAt,
  immerse,
  type Lines,
  prepareLines,
  rightingArmOf,
  rightingCurve,
  type Station,
  wettedArea,
} from '../../src/hull/index.js';
import { asObj, asOffsets, withLines } from '../support/lines.js';
import { absolute, type OutsideCheck, relative } from './check.js';

const DEG = Math.PI / 180;

function prism(length: number, y: readonly number[], z: readonly number[], n = 5): Lines {
  return {
    stations: Array.from({ length: n }, (_, i): Station => ({ x: length * (i / (n - 1) - 0.5), y, z })),
  };
}

/** Wigley's parabolic hull, L 10, B 1, T 0.625, with wall sides above the water. */
function wigley(): Lines {
  const [l, b, t] = [10, 1, 0.625];
  return {
    stations: Array.from({ length: 41 }, (_, i): Station => {
      const x = l * (i / 40 - 0.5);
      const y: number[] = [];
      const z: number[] = [];
      for (let k = 0; k <= 40; k++) {
        const zk = t * (k / 40 - 1);
        y.push(0.5 * b * (1 - ((2 * x) / l) ** 2) * (1 - (zk / t) ** 2));
        z.push(zk);
      }
      y.push(y[40]!);
      z.push(0.5);
      return { x, y, z };
    }),
  };
}

export const checks: readonly OutsideCheck[] = [
  {
    source: 'exact: Wigley parabolic hull, L/B 10, L/T 16',
    quantity: 'volume, waterplane, KB, BM, BM longitudinal, wetted area',
    tolerance: 0.0005,
    errorUnit: 'relative',
    note: '41 stations of 41 points',
    run: () => {
      const [l, b, t] = [10, 1, 0.625];
      const p = prepareLines(wigley());
      const f = { heel: 0, height: 0, trim: 0 };
      const im = immerse(p, f);
      return [
        relative('V/LBT', 0.4444444, im.volume / (l * b * t)),
        relative('Aw/LB', 0.6666667, im.waterplane / (l * b)),
        relative('KB/T', 0.625, (im.z + t) / t),
        relative('BM T/B2', 0.0857143, ((im.transverse / im.volume) * t) / b ** 2),
        relative('BML T/L2', 0.075, ((im.longitudinal / im.volume) * t) / l ** 2),
        relative('Cp', 0.6666667, im.volume / (Math.max(...im.sections) * l)),
        relative('S/L2', 0.1488, wettedArea(p, f) / l ** 2),
      ];
    },
  },
  {
    source: 'exact: wall-sided formula, before the bilge emerges',
    quantity: 'righting arm of a box, 5, 10, 20 deg',
    tolerance: 1e-6,
    errorUnit: 'm',
    run: () => {
      const p = prepareLines(prism(10, [0, 1, 1], [-0.4, -0.4, 0.6]));
      const load = { volume: 8, x: 0, z: 0.1 };
      return [
        [5, 0.046761],
        [10, 0.0948619],
        [20, 0.2012894],
      ].map(([d, gz]) => {
        const { immersed } = floatAt(p, load, d! * DEG);
        return absolute(`${d} deg`, gz!, rightingArmOf(immersed, d! * DEG, load.z));
      });
    },
  },
  {
    source: 'exact: symmetry of a box about half depth; sides and bottom change places at 90 deg',
    quantity: 'righting arm of a half-sunk square box about its middle, 30 to 180 deg',
    tolerance: 1e-6,
    errorUnit: 'm',
    run: () => {
      // Side 2, immersed to half: about its middle the arm is that of the wall-sided formula up to 45 deg, and repeats
      // every 90 deg.
      const lines = prism(10, [0, 1, 1, 0], [-1, -1, 1, 1]);
      const load = { mass: 20 * 1000, x: 0, z: 0 };
      const arm = (d: number): number => {
        const t = ((d + 45) % 90) - 45;
        const tan = Math.tan(t * DEG);
        // Centre of buoyancy of the half square cut at slope tan: (tan/3, -1/2 + tan^2/6).
        return (tan / 3) * Math.cos(t * DEG) + (-0.5 + (tan * tan) / 6) * Math.sin(t * DEG);
      };
      const heels = [30, 60, 100, 135.5, 180];
      const got = rightingCurve(
        lines,
        load,
        1000,
        heels.map((d) => d * DEG),
      );
      return heels.map((d, i) => absolute(`${d} deg`, arm(d), got[i]!.arm));
    },
  },
  {
    source: 'the same hull by three ways in: main dimensions, offsets, mesh',
    quantity: 'volume, Cp, LCB, righting arm at 30 and 60 deg of the demo keelboat',
    tolerance: 0.005,
    errorUnit: 'relative',
    note: 'the mesh is cut at 41 stations of its own',
    run: () => {
      const text = readFileSync('boats/keelboat.yaml', 'utf8');
      const whole = readBoat(text, 'keelboat.yaml');
      const files: Record<string, string> = {
        'hull.csv': asOffsets(whole.lines, whole.spec.hull.dimensions.lwl),
        'hull.obj': asObj(whole.lines),
      };
      const heels = [30 * DEG, 60 * DEG];
      const of = (b: Boat): number[] => {
        const { form } = b.hull;
        const arms = rightingArms(b, heels).map((a) => a.inboard);
        return [form.volume, form.cp, form.lcbFromForward / form.lwl, ...arms];
      };
      const names = ['volume', 'Cp', 'LCB', 'GZ 30', 'GZ 60'];
      const expected = of(whole);
      return ['table: hull.csv', 'mesh: hull.obj'].flatMap((lines) => {
        const b = readBoat(withLines(text, lines), 'keelboat.yaml', undefined, (name) =>
          new TextEncoder().encode(files[name]),
        );
        return of(b).map((v, i) => relative(`${names[i]}, ${lines.split(':')[0]}`, expected[i]!, v));
      });
    },
  },
  {
    source: 'exact',
    quantity: 'trim of a box with its weight 0.05 m forward',
    tolerance: 1e-6,
    errorUnit: 'deg',
    run: () => {
      const p = prepareLines(prism(10, [0, 1, 1], [-0.4, -0.4, 0.6]));
      const { flotation } = floatAt(p, { volume: 8, x: 0.05, z: 0.1 }, 0);
      return [absolute('trim', 0.1395182, flotation.trim / DEG)];
    },
  },
  {
    source: 'exact',
    quantity: 'righting arm of a vee prism of 55 deg half angle',
    tolerance: 1e-6,
    errorUnit: 'm',
    run: () => {
      const t = Math.tan(55 * DEG);
      const p = prepareLines(prism(4, [0, 2 * t], [-0.5, 1.5]));
      const load = { volume: 4 * 0.25 * t, x: 0, z: 0.1 };
      return [
        [5, 0.0367104],
        [10, 0.0776105],
        [20, 0.2004315],
      ].map(([d, gz]) => {
        const { immersed } = floatAt(p, load, d! * DEG);
        return absolute(`${d} deg`, gz!, rightingArmOf(immersed, d! * DEG, load.z));
      });
    },
  },
  {
    source: 'exact: semicircular section',
    quantity: 'KB/T and BM/R',
    tolerance: 1e-3,
    errorUnit: '',
    run: () => {
      const y = Array.from({ length: 91 }, (_, i) => Math.sin(i * DEG));
      const z = Array.from({ length: 91 }, (_, i) => -Math.cos(i * DEG));
      const p = prepareLines(prism(6, [...y, 1], [...z, 0.5]));
      const im = immerse(p, { heel: 0, height: 0, trim: 0 });
      return [absolute('KB/T', 0.5755868, im.z + 1), absolute('BM/R', 0.4244132, im.transverse / im.volume)];
    },
  },
];
