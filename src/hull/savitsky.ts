import { frictionCoefficientIttc57 } from './friction.js';

/**
 * Prismatic planing surfaces. Source: Savitsky 1964, Hydrodynamic Design of Planing Hulls, Marine Technology 1(1).
 * Angles in deg as in the paper; other units consistent. Valid for speed coefficients 0.6 to 13, trim 2 to 15 deg and
 * mean wetted length up to 4 beams.
 */

const DEG = Math.PI / 180;

/** CL0 of a flat plate: trim^1.1 (0.0120 lambda^0.5 + 0.0055 lambda^2.5 / Cv^2). */
export function flatPlateLift(trim: number, lambda: number, cv: number): number {
  return trim ** 1.1 * (0.012 * Math.sqrt(lambda) + (0.0055 * lambda ** 2.5) / (cv * cv));
}

/** CL of a surface with deadrise: CL0 - 0.0065 deadrise CL0^0.6. */
export function deadriseLift(cl0: number, deadrise: number): number {
  return cl0 - 0.0065 * deadrise * cl0 ** 0.6;
}

/** CL0 that gives a required lift coefficient at a deadrise (inverse of `deadriseLift`). */
export function flatPlateLiftFor(cl: number, deadrise: number): number {
  let c = cl + 0.0065 * deadrise * cl ** 0.6;
  for (let i = 0; i < 100; i++) {
    const f = deadriseLift(c, deadrise) - cl;
    const next = c - f / (1 - 0.0039 * deadrise * c ** -0.4);
    const safe = next > 0 ? next : 0.5 * c;
    if (Math.abs(safe - c) < 1e-15 + 1e-14 * c) return safe;
    c = safe;
  }
  return c;
}

/** Mean wetted length over beam that gives CL0 at a trim and speed coefficient. */
export function wettedLengthFor(cl0: number, trim: number, cv: number): number {
  // Newton in the logarithm of the length, where the lift rises like a line between slopes 1/2 and 5/2.
  const want = Math.log(cl0 / trim ** 1.1);
  const squared = 1 / (cv * cv);
  let u = 0;
  for (let i = 0; i < 60; i++) {
    const lambda = Math.exp(u);
    const a = 0.012 * Math.sqrt(lambda);
    const b = 0.0055 * lambda * lambda * Math.sqrt(lambda) * squared;
    const step = (Math.log(a + b) - want) / ((0.5 * a + 2.5 * b) / (a + b));
    u -= step;
    if (Math.abs(step) < 1e-13) break;
  }
  return Math.min(60, Math.exp(u));
}

/** Centre of pressure ahead of the transom over mean wetted length: 0.75 - 1 / (5.21 Cv^2/lambda^2 + 2.39). */
export function pressureCentre(lambda: number, cv: number): number {
  return 0.75 - 1 / ((5.21 * cv * cv) / (lambda * lambda) + 2.39);
}

/** Mean speed of the water along the bottom over the boat's speed. */
export function bottomSpeedRatio(trim: number, lambda: number, deadrise: number): number {
  const dynamic = 0.012 * Math.sqrt(lambda) * trim ** 1.1;
  const corrected = Math.max(0, deadriseLift(dynamic, deadrise));
  return Math.sqrt(Math.max(0, 1 - corrected / (lambda * Math.cos(trim * DEG))));
}

export interface PlaningConditions {
  readonly weight: number;
  readonly beam: number;
  /** Deadrise [deg]. */
  readonly deadrise: number;
  readonly speed: number;
  readonly density: number;
  readonly kinematicViscosity: number;
  readonly gravity: number;
  /** Friction line; ITTC-57 unless another is given. */
  readonly friction?: (reynolds: number) => number;
  /** Roughness allowance on CF. */
  readonly allowance?: number;
}

export interface PlaningState {
  readonly trim: number;
  readonly cv: number;
  readonly cl: number;
  readonly cl0: number;
  readonly lambda: number;
  /** Friction along the bottom, and total drag. */
  readonly friction: number;
  readonly drag: number;
  /** Centre of pressure ahead of the transom. */
  readonly pressureCentre: number;
}

/** Drag at a given trim [deg] with the weight carried by the bottom. */
export function planingAt(c: PlaningConditions, trim: number): PlaningState {
  return planingWith(c, flatPlateLiftFor(liftCoefficient(c), c.deadrise), trim);
}

function liftCoefficient(c: PlaningConditions): number {
  return c.weight / (0.5 * c.density * c.speed ** 2 * c.beam ** 2);
}

/** The same with CL0 at hand: it does not depend on trim. */
function planingWith(c: PlaningConditions, cl0: number, trim: number): PlaningState {
  const cv = c.speed / Math.sqrt(c.gravity * c.beam);
  const cl = liftCoefficient(c);
  const lambda = wettedLengthFor(cl0, trim, cv);
  const ratio = bottomSpeedRatio(trim, lambda, c.deadrise);
  const v = c.speed * ratio;
  const line = c.friction ?? frictionCoefficientIttc57;
  const cf = line((v * lambda * c.beam) / c.kinematicViscosity) + (c.allowance ?? 0);
  const friction = (0.5 * c.density * v * v * lambda * c.beam ** 2 * cf) / Math.cos(c.deadrise * DEG);
  return {
    trim,
    cv,
    cl,
    cl0,
    lambda,
    friction,
    drag: c.weight * Math.tan(trim * DEG) + friction / Math.cos(trim * DEG),
    pressureCentre: pressureCentre(lambda, cv) * lambda * c.beam,
  };
}

/**
 * Trim [deg] at which the moments about the centre of gravity balance, thrust along a shaft (the paper's case).
 * @param lcg centre of gravity ahead of the transom, vcg above the keel, shaft angle [deg], f thrust line below the centre
 */
export function planingEquilibrium(
  c: PlaningConditions,
  lcg: number,
  vcg: number,
  shaft: number,
  f: number,
): PlaningState {
  const moment = (trim: number): number => {
    const s = planingAt(c, trim);
    const arm = lcg - s.pressureCentre;
    const a = vcg - 0.25 * c.beam * Math.tan(c.deadrise * DEG);
    const t = trim * DEG;
    return (
      c.weight * (((1 - Math.sin(t) * Math.sin(t + shaft * DEG)) * arm) / Math.cos(t) - f * Math.sin(t)) +
      s.friction * (a - f)
    );
  };
  let lo = 1;
  let hi = 8;
  const start = Math.sign(moment(lo));
  if (start === Math.sign(moment(hi))) throw new RangeError('no planing trim between 1 and 8 deg balances');
  for (let i = 0; i < 80; i++) {
    const mid = 0.5 * (lo + hi);
    if (Math.sign(moment(mid)) === start) lo = mid;
    else hi = mid;
  }
  return planingAt(c, 0.5 * (lo + hi));
}

/** Resistance of a round-bilge hull over a prismatic one of like deadrise when planing (judgement). */
export const ROUND_BILGE_FACTOR = 1.25;

/**
 * Least planing drag over trim with the mean wetted length no longer than `length` and the centre of pressure within
 * `reach` (ahead of the transom), which is where the crew can put the centre of gravity. Where no trim meets both the
 * one that misses least is taken.
 */
export function leastPlaningDrag(
  c: PlaningConditions,
  length: number,
  reach: readonly [number, number],
): PlaningState {
  let best: PlaningState | undefined;
  let bestScore = Number.POSITIVE_INFINITY;
  const score = (s: PlaningState): number => {
    const over = Math.max(0, s.lambda * c.beam - length) / length;
    const off = Math.max(0, reach[0] - s.pressureCentre, s.pressureCentre - reach[1]) / length;
    return s.drag / c.weight + 20 * (over + off);
  };
  const cl0 = flatPlateLiftFor(liftCoefficient(c), c.deadrise);
  const consider = (trim: number): void => {
    const s = planingWith(c, cl0, trim);
    const v = score(s);
    if (v < bestScore) {
      bestScore = v;
      best = s;
    }
  };
  for (let t = 1; t <= 14; t += 0.5) consider(t);
  let step = 0.5;
  for (let k = 0; k < 16; k++) {
    step *= 0.5;
    const at = best!.trim;
    consider(Math.max(0.5, at - step));
    consider(Math.min(15, at + step));
  }
  return best!;
}
