import type { Lines, MainDimensions, Station } from './types.js';

/**
 * A round-bilge hull made from main dimensions, where there is no lines plan. Each section is half a superellipse of
 * exponent n below the water, which sets the midship coefficient; areas and waterline breadths along the hull follow
 * (1 - u^2)^c on each side of the fullest section, with the two exponents of the area curve solved for prismatic
 * coefficient and centre of buoyancy and those of the waterline for its coefficient. Local draft is area over breadth,
 * so that displacement = Cp Cm Lwl Bwl Tc holds by construction. Topsides run straight to a sheer of the given beam.
 * The shapes are a judgement; the coefficients are met.
 * @throws RangeError naming the dimension or coefficient, its value and what is allowed
 */
export function generateRoundBilge(d: MainDimensions): Lines {
  positive('lwl', d.lwl);
  positive('bwl', d.bwl);
  positive('canoeDraft', d.canoeDraft);
  positive('freeboard', d.freeboard);
  check('cp', d.cp, 0.42, 0.72);
  check('cm', d.cm, 0.51, 0.95);
  check('cwp', d.cwp, 0.55, 0.9);
  check('lcbAft', d.lcbAft, -0.06, 0.1);
  if (!(d.beamMax >= d.bwl && Number.isFinite(d.beamMax)))
    throw new RangeError(`beam ${d.beamMax} m is less than the waterline beam ${d.bwl} m`);
  const n = superellipseExponent(d.cm);
  const fullest = -d.lcbAft; // of Lwl from amidships, forward positive
  const lf = 0.5 - fullest;
  const la = 0.5 + fullest;
  const { forward, aft } = areaExponents(d.cp, -d.lcbAft, fullest, lf, la);
  const ratio = Math.sqrt(aft / forward);
  const waterline = waterlineExponent(d.cwp, lf, la, ratio);
  const stations: Station[] = [];
  const half = 20;
  const points = 28;
  for (let i = 0; i <= 2 * half; i++) {
    // Dense at the ends, with a station at the fullest section.
    const x =
      i <= half
        ? -0.5 + la * (1 - Math.cos((0.5 * Math.PI * i) / half))
        : 0.5 - lf * (1 - Math.cos((0.5 * Math.PI * (2 * half - i)) / half));
    const onBow = x >= fullest;
    const u = Math.min(1, onBow ? (x - fullest) / lf : (fullest - x) / la);
    const base = Math.max(0, 1 - u * u);
    const area = base ** (onBow ? forward : aft);
    const width = base ** (onBow ? waterline : waterline * ratio);
    const b = 0.5 * d.bwl * width;
    const draft = width > 0 ? (d.canoeDraft * area) / width : 0;
    // Sheer: pointed bow, broad stern (judgement).
    const sheer = 0.5 * d.beamMax * (onBow ? base ** 0.45 : 1 - 0.22 * u * u);
    const y: number[] = [];
    const z: number[] = [];
    for (let k = 0; k <= points; k++) {
      // Equal angles round the bilge: dense at the keel and at the water.
      const t = (0.5 * Math.PI * k) / points;
      const s = 1 - Math.cos(t) ** (2 / n);
      y.push(b * Math.sin(t) ** (2 / n));
      z.push(-draft * (1 - s));
    }
    const up = 8;
    for (let k = 1; k <= up; k++) {
      y.push(b + (Math.max(b, sheer) - b) * (k / up));
      z.push((d.freeboard * k) / up);
    }
    stations.push({ x: x * d.lwl, y, z });
  }
  return { stations };
}

function positive(name: string, value: number): void {
  if (!(value > 0 && Number.isFinite(value)))
    throw new RangeError(`${name} is ${value} m; it must be a finite length above 0`);
}

function check(name: string, value: number, low: number, high: number): void {
  if (!(value >= low && value <= high)) {
    throw new RangeError(`${name} ${value} is outside ${low} to ${high}, which a generated hull can take`);
  }
}

/** Integral of (1 - u^2)^c and of u (1 - u^2)^c over 0 .. 1. */
function powerIntegrals(c: number): { i: number; j: number } {
  // I = sqrt(pi)/2 Gamma(c+1)/Gamma(c+3/2)
  return {
    i: 0.5 * Math.sqrt(Math.PI) * Math.exp(logGamma(c + 1) - logGamma(c + 1.5)),
    j: 1 / (2 * (c + 1)),
  };
}

/** Logarithm of the gamma function (Lanczos, 9 terms). */
function logGamma(x: number): number {
  const g = [
    0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
    12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
  ];
  const y = x - 1;
  let s = g[0]!;
  for (let i = 1; i < 9; i++) s += g[i]! / (y + i);
  const t = y + 7.5;
  return 0.5 * Math.log(2 * Math.PI) + (y + 0.5) * Math.log(t) - t + Math.log(s);
}

/** Exponent of a superellipse whose quarter has the area coefficient cm. */
function superellipseExponent(cm: number): number {
  let lo = 1;
  let hi = 30;
  for (let k = 0; k < 100; k++) {
    const n = 0.5 * (lo + hi);
    const area = Math.exp(2 * logGamma(1 + 1 / n) - logGamma(1 + 2 / n));
    if (area < cm) lo = n;
    else hi = n;
  }
  return 0.5 * (lo + hi);
}

/** Exponents fore and aft that give cp and the centre lcb (of Lwl, forward positive), by Newton. */
function areaExponents(
  cp: number,
  lcb: number,
  fullest: number,
  lf: number,
  la: number,
): { forward: number; aft: number } {
  const f = (cf: number, ca: number): [number, number] => {
    const a = powerIntegrals(cf);
    const b = powerIntegrals(ca);
    const area = lf * a.i + la * b.i;
    const centre = (lf * (fullest * a.i + lf * a.j) + la * (fullest * b.i - la * b.j)) / area;
    return [area - cp, centre - lcb];
  };
  let cf = 1.3;
  let ca = 1.3;
  for (let k = 0; k < 60; k++) {
    const [p, q] = f(cf, ca);
    if (Math.abs(p) + Math.abs(q) < 1e-13) return { forward: cf, aft: ca };
    const h = 1e-6;
    const [p1, q1] = f(cf + h, ca);
    const [p2, q2] = f(cf, ca + h);
    const [a, b, c, d] = [(p1 - p) / h, (p2 - p) / h, (q1 - q) / h, (q2 - q) / h];
    const det = a * d - b * c;
    let df = -(p * d - b * q) / det;
    let da = -(a * q - c * p) / det;
    const most = Math.max(Math.abs(df) / cf, Math.abs(da) / ca);
    if (most > 0.3) {
      df *= 0.3 / most;
      da *= 0.3 / most;
    }
    cf += df;
    ca += da;
  }
  const [p, q] = f(cf, ca);
  if (Math.abs(p) + Math.abs(q) > 1e-9) {
    throw new RangeError(
      `no smooth hull has a prismatic coefficient ${cp} with its buoyancy ${-100 * lcb} % aft`,
    );
  }
  return { forward: cf, aft: ca };
}

function waterlineExponent(cwp: number, lf: number, la: number, ratio: number): number {
  let lo = 0.02;
  let hi = 4;
  for (let k = 0; k < 100; k++) {
    const c = 0.5 * (lo + hi);
    const area = lf * powerIntegrals(c).i + la * powerIntegrals(c * ratio).i;
    if (area > cwp) lo = c;
    else hi = c;
  }
  return 0.5 * (lo + hi);
}
