import { unknownNodes, wakeEnergyMatrix, wakeLine } from '../../src/lifting-line/index.js';
import { createBoxQp, luFactor, luSolve, solveBoxQp } from '../../src/numerics/index.js';
import { ellipticEK } from '../support/elliptic.js';
import { leastDrag, spanEfficiency } from '../support/loading.js';
import { absolute, type OutsideCheck, relative } from './check.js';

const N = 16;

/** Span efficiency of one line over its image, e = 2 R (b/h)^2: exact by complete elliptic integrals. */
function gapEfficiency(gapOverSpan: number): number {
  const a = gapOverSpan;
  const b = 1 + gapOverSpan;
  const { e, k } = ellipticEK(Math.sqrt(1 - (a / b) ** 2));
  return 2 * (1 + (a / b) ** 2 - (2 * e) / k) * b * b;
}

function gap(g: number): number {
  const o = leastDrag(g, 1 + g, N, { image: true });
  return spanEfficiency(o.lift, o.drag, 1);
}

/** Least drag for given lift and root bending moment on a half span of s, sealed to a mirror; over the elliptic's. */
function jones(span: number): number {
  // Elliptic wing of half span 1 with the same lift and the same moment: centre of lift at 4/(3 pi).
  const reference = leastDrag(0, 1, 64, { image: true, sealed: true });
  const wanted = reference.moment / reference.lift;
  let lo = 0;
  let hi = 3;
  let at = leastDrag(0, span, 64, { image: true, sealed: true, price: hi });
  for (let i = 0; i < 60; i++) {
    const mid = 0.5 * (lo + hi);
    at = leastDrag(0, span, 64, { image: true, sealed: true, price: mid });
    if (at.moment / at.lift > wanted) lo = mid;
    else hi = mid;
  }
  return at.drag / at.lift ** 2 / (reference.drag / reference.lift ** 2);
}

/** Drag excess delta of a rectangular wing by Fourier series: Glauert's equation with `terms` odd terms. */
function rectangularDelta(aspect: number, terms: number): number {
  const mu = Math.PI / (2 * aspect); // a0 c / (4 b), a0 = 2 pi
  const a = new Float64Array(terms * terms);
  const rhs = new Float64Array(terms);
  for (let i = 0; i < terms; i++) {
    const t = (Math.PI * (i + 1)) / (2 * terms + 1);
    for (let j = 0; j < terms; j++) {
      const n = 2 * j + 1;
      a[i * terms + j] = Math.sin(n * t) * (mu * n + Math.sin(t));
    }
    rhs[i] = mu * Math.sin(t);
  }
  const p = new Int32Array(terms);
  luFactor(terms, a, p);
  luSolve(terms, a, p, rhs);
  let delta = 0;
  for (let j = 1; j < terms; j++) delta += (2 * j + 1) * (rhs[j]! / rhs[0]!) ** 2;
  return delta;
}

/** The same wing by piecewise-linear circulation: section slope 2 pi on the energy matrix. */
function rectangularDeltaByWake(aspect: number, n: number): number {
  const span = aspect;
  const line = wakeLine(-span / 2, span / 2, n);
  const a = wakeEnergyMatrix([line], { image: false });
  const { width } = unknownNodes(line, { image: false });
  // G = pi c V (alpha - w/V) with w = (A G) / (2 width): (diag(width/pi) + A/2) G = width alpha.
  const m = new Float64Array(n * n);
  const rhs = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) m[i * n + j] = 0.5 * a[i * n + j]!;
    m[i * n + i]! += width[i]! / Math.PI;
    rhs[i] = width[i]!;
  }
  const p = new Int32Array(n);
  luFactor(n, m, p);
  luSolve(n, m, p, rhs);
  let lift = 0;
  let drag = 0;
  for (let i = 0; i < n; i++) {
    lift += width[i]! * rhs[i]!;
    for (let j = 0; j < n; j++) drag += 0.5 * rhs[i]! * a[i * n + j]! * rhs[j]!;
  }
  return 1 / spanEfficiency(lift, drag, span) - 1;
}

/** Mutual drag factor of two equal elliptic loadings one above the other, in the plane far behind. */
function biplaneSigma(g: number): number {
  // Mutual energy by quadrature over the two wakes; the same integral of one elliptic loading with itself is pi/4.
  const m = 400;
  let mutual = 0;
  for (let i = 0; i < m; i++) {
    const ti = (Math.PI * (i + 0.5)) / m;
    for (let j = 0; j < m; j++) {
      const tj = (Math.PI * (j + 0.5)) / m;
      const dy = 0.5 * (Math.cos(ti) - Math.cos(tj));
      // Slope of sin(t) along y times dy is cos(t) dt.
      mutual += Math.cos(ti) * Math.cos(tj) * 0.5 * Math.log(dy * dy + g * g);
    }
  }
  mutual *= -1 / (2 * Math.PI);
  mutual *= (Math.PI / m) ** 2;
  return mutual / (Math.PI / 4);
}

export const checks: readonly OutsideCheck[] = [
  {
    source: 'exact: Munk / Prandtl',
    quantity: 'span efficiency of an isolated line, 16 nodes',
    tolerance: 2e-4,
    errorUnit: 'relative',
    note: 'piecewise-linear circulation with moved ends',
    run: () => {
      const o = leastDrag(-1, 1, N, { image: false });
      return [relative('isolated', 1, spanEfficiency(o.lift, o.drag, 2))];
    },
  },
  {
    source: 'exact: image principle',
    quantity: 'span efficiency sealed to the mirror, own span',
    tolerance: 0.005,
    errorUnit: 'relative',
    run: () => {
      const o = leastDrag(0, 1, N, { image: true, sealed: true });
      return [relative('sealed', 2, spanEfficiency(o.lift, o.drag, 1))];
    },
  },
  {
    source: 'exact: two collinear lines, complete elliptic integrals',
    quantity: 'span efficiency over a gap of 0.05, 0.10, 0.20 span',
    tolerance: 0.001,
    errorUnit: 'relative',
    run: () => [0.05, 0.1, 0.2].map((g) => relative(`gap ${g}`, gapEfficiency(g), gap(g))),
  },
  {
    source: 'exact: two collinear lines, complete elliptic integrals',
    quantity: 'span efficiency over a gap of 0.01 span',
    tolerance: 0.003,
    errorUnit: 'relative',
    run: () => [relative('gap 0.01', gapEfficiency(0.01), gap(0.01))],
  },
  {
    source: 'the same formula, evaluated independently',
    quantity: 'elliptic-integral formula itself',
    tolerance: 1e-5,
    errorUnit: 'relative',
    run: () =>
      [
        [0.05, 1.2107],
        [0.1, 1.14557],
        [0.01, 1.36032],
      ].map(([g, v]) => relative(`gap ${g}`, v!, gapEfficiency(g!))),
  },
  {
    source: 'R. T. Jones 1950 (from memory, closed form verified)',
    quantity: 'least drag at given lift and bending moment, span 1.15',
    tolerance: 0.003,
    errorUnit: 'relative',
    run: () => [relative('span 1.15', (1 + 8 * (1 - 1 / 1.15) ** 2) / 1.15 ** 2, jones(1.15))],
  },
  {
    source: 'Prandtl 1933, bell loading (from memory)',
    quantity: 'drag at span 1.2247 and equal moment of inertia of lift',
    tolerance: 0.004,
    errorUnit: 'relative',
    run: () => {
      const span = Math.sqrt(1.5);
      const line = wakeLine(-span, span, 64);
      const a = wakeEnergyMatrix([line], { image: false });
      const { z, width } = unknownNodes(line, { image: false });
      let lift = 0;
      let drag = 0;
      const bell = Float64Array.from(z, (y) => (1 - (y / span) ** 2) ** 1.5);
      for (let i = 0; i < z.length; i++) {
        lift += width[i]! * bell[i]!;
        for (let j = 0; j < z.length; j++) drag += 0.5 * bell[i]! * a[i * z.length + j]! * bell[j]!;
      }
      const e = leastDrag(-1, 1, 64, { image: false });
      return [relative('bell', 8 / 9, drag / lift ** 2 / (e.drag / e.lift ** 2))];
    },
  },
  {
    source: 'exact: Fourier series (Glauert), a0 = 2 pi',
    quantity: 'drag excess of a rectangular wing, A 6',
    tolerance: 0.001,
    errorUnit: '',
    run: () => [
      absolute('series of 200 terms', 0.0483, rectangularDelta(6, 200)),
      absolute('wake energy, 64 nodes', 0.0483, rectangularDeltaByWake(6, 64)),
    ],
  },
  {
    source: 'computed independently; Prandtl biplane (from memory)',
    quantity: 'mutual drag of two elliptic loadings',
    tolerance: 0.005,
    errorUnit: 'relative',
    run: () =>
      [
        [0.1, 0.6565],
        [0.2, 0.4842],
        [0.5, 0.2322],
      ].map(([g, v]) => relative(`gap/span ${g}`, v!, biplaneSigma(g!))),
  },
  {
    source: 'exact: Munk 1921, stagger theorem',
    quantity: 'two coincident half-strength lines against one',
    tolerance: 1e-5,
    errorUnit: 'relative',
    note: 'lines on one trace share their wake wherever they stand fore and aft',
    run: () => {
      const one = wakeLine(0.1, 1.1, N);
      const a1 = wakeEnergyMatrix([one], { image: true });
      const a2 = wakeEnergyMatrix([one, one], { image: true });
      const g = Float64Array.from({ length: N }, (_, i) => Math.sin((Math.PI * (i + 1)) / (N + 1)));
      let d1 = 0;
      let d2 = 0;
      for (let i = 0; i < N; i++) for (let j = 0; j < N; j++) d1 += g[i]! * a1[i * N + j]! * g[j]!;
      const h = (i: number) => 0.5 * g[i % N]!;
      for (let i = 0; i < 2 * N; i++) for (let j = 0; j < 2 * N; j++) d2 += h(i) * a2[i * 2 * N + j]! * h(j);
      return [relative('same drag', d1, d2)];
    },
  },
  {
    source: "exact: d'Alembert; Kutta-Joukowski",
    quantity: 'force on a cylinder from its surface pressure',
    tolerance: 1e-12,
    errorUnit: 'of rho V G',
    run: () => {
      const force = (circulation: number): [number, number] => {
        let x = 0;
        let y = 0;
        const m = 64;
        for (let i = 0; i < m; i++) {
          const t = (2 * Math.PI * i) / m;
          const ut = -2 * Math.sin(t) - circulation / (2 * Math.PI);
          const pressure = 0.5 * (1 - ut * ut);
          x -= pressure * Math.cos(t) * ((2 * Math.PI) / m);
          y -= pressure * Math.sin(t) * ((2 * Math.PI) / m);
        }
        return [x, y];
      };
      const still = force(0);
      const turned = force(3);
      return [
        absolute('no circulation, drag', 0, still[0]),
        absolute('no circulation, lift', 0, still[1]),
        absolute('circulation 3, drag', 0, turned[0]),
        absolute('circulation 3, lift', 3, turned[1]),
      ];
    },
  },
  {
    source: 'exact: convex problem',
    quantity: 'optimality conditions of the loading problem',
    tolerance: 1e-10,
    errorUnit: 'relative',
    run: () => {
      const line = wakeLine(0.2, 1.2, N);
      const qp = createBoxQp(N);
      qp.h.set(wakeEnergyMatrix([line], { image: true }));
      const { width } = unknownNodes(line, { image: true });
      for (let i = 0; i < N; i++) {
        qp.g[i] = width[i]!;
        qp.upper[i] = 0.6 + 0.02 * i;
      }
      solveBoxQp(qp);
      let worst = 0;
      for (let i = 0; i < N; i++) {
        let slope = qp.g[i]!;
        for (let j = 0; j < N; j++) slope -= qp.h[i * N + j]! * qp.x[j]!;
        const x = qp.x[i]!;
        const wrong = x <= 0 ? Math.max(0, slope) : x >= qp.upper[i]! ? Math.max(0, -slope) : Math.abs(slope);
        worst = Math.max(worst, wrong / qp.g[i]!);
      }
      return [absolute('worst condition', 0, worst)];
    },
  },
];
