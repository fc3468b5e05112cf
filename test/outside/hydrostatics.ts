import {
  floatAt,
  immerse,
  type Lines,
  prepareLines,
  rightingArmOf,
  type Station,
  wettedArea,
} from '../../src/hull/index.js';
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
