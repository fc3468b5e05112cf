import type { SailingFlow } from '../environment/index.js';
import {
  createLoadingSolver,
  inducedInto,
  linearisedLoading,
  prepareLoading,
  solveLoading,
  wakeLine,
} from '../lifting-line/index.js';
import type { BoxQp } from '../numerics/index.js';
import {
  ATTACHED_COS,
  CARRIAGE,
  COST_CEILING,
  COST_FLOOR,
  FULL_NORMAL_FORCE,
  LUFFING_DRAG,
  type Ramp,
  SEPARATION_END,
  SEPARATION_START,
} from './section-limits.js';
import { profileAt, sailArea } from './shapes.js';
import { AERO, type SailLoading, type SailSet, type SailSetSpec } from './types.js';
import { addWindageInto, flowAtInto } from './windage.js';

/** Nodes per sail in the solver: drive and side force within 0.5 % of ten times as many (see the accuracy table). */
const NODES = 10;
/** The lift of a section acts this share of the chord behind the leading edge (cambered section at work; judgement). */
const LIFT_CHORD_SHARE = 0.35;
/** Lift coefficient of a cambered sail section with its chord along the flow (10 % camber; judgement). */
const CAMBER_LIFT = 0.6;
/** The separated normal force acts at this share (flat plate square to the flow: half). */
const NORMAL_CHORD_SHARE = 0.45;

function smoothstep(x: number, a: number, b: number): number {
  const t = Math.min(1, Math.max(0, (x - a) / (b - a)));
  return t * t * (3 - 2 * t);
}

/** Share that a ramp has reached at an angle; 0 without a ramp. */
function reached(r: Ramp | undefined, angle: number): number {
  return r === undefined ? 0 : r.share * smoothstep(angle, r.start, r.end);
}

/** max(x, m) with its corner rounded over m - h .. m + h: continuous in value and slope, exact outside. */
function roundedMax(x: number, m: number, h: number): number {
  if (x >= m + h) return x;
  if (x <= m - h) return m;
  const d = x - m + h;
  return m + (d * d) / (4 * h);
}

/**
 * Incidence a >= lowest that gives the separated sail the most of CN(a) (cos a P1 - sin a P2), with
 * CN = sin(pi/2 min(a / 42 deg, 1)): Newton on the slope of its logarithm inside a bracket.
 */
function bestIncidence(p1: number, p2: number, lowest: number): number {
  const psi = Math.atan2(p2, p1);
  // f = CN cos(a + psi): positive only where |a + psi| < 90 deg.
  if (psi <= -FULL_NORMAL_FORCE) return Math.max(-psi, lowest);
  const top = Math.min(FULL_NORMAL_FORCE, 0.5 * Math.PI - psi);
  if (top <= 0) return Math.max(0, lowest);
  const kappa = (0.5 * Math.PI) / FULL_NORMAL_FORCE;
  // Root of kappa cot(kappa a) - tan(a + psi), falling from +infinity to -infinity (or to 0 at the full angle).
  let lo = 0;
  let hi = top;
  let a = 0.6 * top;
  for (let i = 0; i < 60; i++) {
    const s = Math.sin(kappa * a);
    const t = Math.tan(a + psi);
    const f = (kappa * Math.cos(kappa * a)) / s - t;
    if (f > 0) lo = a;
    else hi = a;
    const slope = (-kappa * kappa) / (s * s) - 1 - t * t;
    let next = a - f / slope;
    if (!(next > lo && next < hi)) next = 0.5 * (lo + hi);
    if (Math.abs(next - a) < 1e-13) {
      a = next;
      break;
    }
    a = next;
  }
  return Math.max(a, lowest);
}

/**
 * A sail set prepared for many evaluations. The loading of all its sails is solved directly, at every state, as one
 * convex problem over the true wind profile (see lifting-line/loading.ts); heel enters by the effective angle
 * (Kerwin 1978). Off the wind the attached family is held at 76 deg and blends into the separated branch
 * (Viterna & Corrigan 1981 for the normal force) as the boom reaches its limit.
 * @param nodes of each sail's lifting line: more of them for drawings
 */
export function prepareSailSet(spec: SailSetSpec, nodes = NODES): SailSet {
  if (spec.sails.length === 0) throw new RangeError(`sail set "${spec.name}" has no sail`);
  const sails = spec.sails;
  const geometry = sails.map(sailArea);
  const area = geometry.reduce((s, g) => s + g.area, 0);
  const centreX = geometry.reduce((s, g) => s + g.area * g.x, 0) / area;
  const centreZ = geometry.reduce((s, g) => s + g.area * g.z, 0) / area;
  const problem = prepareLoading(
    sails.map((s) => ({
      line: wakeLine(s.z[0]!, s.z[s.z.length - 1]!, nodes),
      chordAt: (z: number) => profileAt(s.z, s.chord, z),
      k: s.section.k,
      cl0: s.section.cl0,
    })),
    true,
  );
  const { n, z, width, chord, first, speed, worth, cost, clMax } = problem;
  const sailOf = new Int32Array(n);
  const xLift = new Float64Array(n);
  const xNormal = new Float64Array(n);
  const chordWidth = new Float64Array(n);
  sails.forEach((s, b) => {
    // The nodes' areas are brought to the sail's own area, so that bluff forces act on all of it.
    let sum = 0;
    for (let i = first[b]!; i < first[b + 1]!; i++) sum += chord[i]! * width[i]!;
    const fill = geometry[b]!.area / sum;
    for (let i = first[b]!; i < first[b + 1]!; i++) {
      sailOf[i] = b;
      const lead = profileAt(s.z, s.xLead, z[i]!);
      xLift[i] = lead - LIFT_CHORD_SHARE * chord[i]!;
      xNormal[i] = lead - NORMAL_CHORD_SHARE * chord[i]!;
      chordWidth[i] = chord[i]! * width[i]! * fill;
    }
  });
  const priced = createLoadingSolver(problem);
  const full = createLoadingSolver(problem);
  const u = new Float64Array(n);
  const v = new Float64Array(n);
  const sinB = new Float64Array(n);
  const cosB = new Float64Array(n);
  const induced = new Float64Array(n);
  const angle = new Float64Array(sails.length);
  const blanket = new Float64Array(sails.length);
  const separated = new Float64Array(sails.length);
  const stands = new Float64Array(sails.length);
  const carriage = sails.map((s) => CARRIAGE[s.kind]);
  const blankets = sails.some((s) => s.kind === 'mainsail');
  const lowest = new Float64Array(sails.length);
  const scratch = new Float64Array(AERO.count);
  const rho = spec.airDensity;
  const { wind } = spec;
  const mean = { u: 0, v: 0 };

  const flowAt = (flow: Readonly<SailingFlow>, heel: number, height: number): void =>
    flowAtInto(wind, flow, heel, height, mean);

  const setFlow = (flow: Readonly<SailingFlow>, heel: number): void => {
    const cosHeel = Math.cos(heel);
    const a = flow.twa - flow.leeway;
    const [sinA, cosA] = [Math.sin(a), Math.cos(a)];
    const ahead = flow.speed * Math.cos(flow.leeway);
    const across = flow.speed * Math.sin(flow.leeway);
    for (let i = 0; i < n; i++) {
      const w = flow.tws * wind.factor(z[i]! * cosHeel);
      const ui = w * cosA + ahead;
      const vi = (w * sinA - across) * cosHeel;
      const s = Math.sqrt(ui * ui + vi * vi);
      u[i] = ui;
      v[i] = vi;
      speed[i] = s;
      const inverse = s > 0 ? 1 / s : 0;
      sinB[i] = vi * inverse;
      cosB[i] = s > 0 ? ui * inverse : 1;
    }
    for (let b = 0; b < sails.length; b++) {
      flowAt(flow, heel, geometry[b]!.z);
      angle[b] = Math.atan2(Math.max(0, mean.v), mean.u);
      const c = carriage[b]!;
      const a = angle[b]!;
      stands[b] = c.stands === undefined ? 1 : reached(c.stands, a);
      const covered = blankets ? reached(c.blanket, a) : 0;
      const wing = sails[b]!.gooseWinged ? reached(c.gooseWing, a) : 0;
      blanket[b] = 1 - covered * (1 - wing);
      const limit = sails[b]!.section.clMax * (1 - reached(c.fade, a)) * blanket[b]! * stands[b]!;
      for (let i = first[b]!; i < first[b + 1]!; i++) clMax[i] = limit;
      if (c.squared !== undefined) {
        lowest[b] = 0;
        separated[b] = reached(c.squared, a);
      } else {
        lowest[b] = roundedMax(a - Math.min(spec.boomLimit, c.trimLimit ?? spec.boomLimit), 0, 0.03);
        separated[b] = smoothstep(lowest[b]!, SEPARATION_START, SEPARATION_END);
      }
    }
  };

  const fillProblem = (price: number): void => {
    for (let i = 0; i < n; i++) {
      // The attached family, held at 76 deg.
      const c = roundedMax(cosB[i]!, ATTACHED_COS, 0.06);
      const s = sinB[i]! > 0 ? Math.sqrt(Math.max(0, 1 - c * c)) : sinB[i]!;
      worth[i] = s - price * z[i]! * c;
      cost[i] =
        roundedMax(c, COST_FLOOR, 0.1) - roundedMax(-price * z[i]! * Math.max(0, s), -COST_CEILING, 0.5);
    }
  };

  const solve = (price: number, solver: BoxQp): void => {
    fillProblem(price);
    solveLoading(problem, solver);
  };

  /** Heeling moment's share of the attached lift, without direction: how much load is kept. */
  const load = (g: Float64Array): number => {
    let s = 0;
    for (let i = 0; i < n; i++) s += width[i]! * speed[i]! * g[i]! * z[i]!;
    return s;
  };

  /** Sail forces (no windage) for a loading, added to out. */
  const addSails = (price: number, g: Float64Array, kept: number, out: Float64Array): void => {
    inducedInto(problem, g, induced);
    for (let b = 0; b < sails.length; b++) {
      const { section } = sails[b]!;
      const attached = 1 - separated[b]!;
      if (attached > 0) {
        for (let i = first[b]!; i < first[b + 1]!; i++) {
          const w = width[i]!;
          const s = speed[i]!;
          const gi = g[i]!;
          const lift = rho * w * s * gi;
          const c = chord[i]!;
          // Profile drag 1/2 rho s^2 c w (cd0 + k (cl - cl0)^2) with s cl = 2 G / c.
          const off = (2 * gi) / c - s * section.cl0;
          const profile =
            0.5 * rho * (section.cd0 * s * s * chordWidth[i]! * blanket[b]! + section.k * off * off * c * w);
          const slack = LUFFING_DRAG * ((1 - kept) * Math.max(0, cosB[i]!) + (1 - stands[b]!)) * blanket[b]!;
          const drag = profile + 0.5 * rho * (induced[i]! + slack * s * s * chordWidth[i]!);
          const x = attached * (lift * sinB[i]! - drag * cosB[i]!);
          const y = attached * (lift * cosB[i]! + drag * sinB[i]!);
          out[AERO.drive]! += x;
          out[AERO.side]! += y;
          out[AERO.heelMoment]! += y * z[i]!;
          out[AERO.sideX]! += y * xLift[i]!;
          out[AERO.driveZ]! += x * z[i]!;
        }
      }
      if (separated[b]! > 0) {
        let qs = 0;
        let qc = 0;
        let ms = 0;
        let mc = 0;
        for (let i = first[b]!; i < first[b + 1]!; i++) {
          const q = speed[i]! * chordWidth[i]!;
          qs += q * v[i]!;
          qc += q * u[i]!;
          ms += q * v[i]! * z[i]!;
          mc += q * u[i]! * z[i]!;
        }
        const a = bestIncidence(qs - price * mc, qc + price * ms, lowest[b]!);
        const normal =
          section.cd90 * (a >= FULL_NORMAL_FORCE ? 1 : Math.sin((0.5 * Math.PI * a) / FULL_NORMAL_FORCE));
        const f = 0.5 * rho * separated[b]! * blanket[b]! * stands[b]! * normal;
        const [cl, cd] = [f * Math.cos(a), f * Math.sin(a)];
        for (let i = first[b]!; i < first[b + 1]!; i++) {
          const q = speed[i]! * chordWidth[i]!;
          const x = q * (cl * v[i]! - cd * u[i]!);
          const y = q * (cl * u[i]! + cd * v[i]!);
          out[AERO.drive]! += x;
          out[AERO.side]! += y;
          out[AERO.heelMoment]! += y * z[i]!;
          out[AERO.sideX]! += y * xNormal[i]!;
          out[AERO.driveZ]! += x * z[i]!;
        }
      }
    }
  };

  const addWindage = (flow: Readonly<SailingFlow>, heel: number, out: Float64Array): void =>
    addWindageInto(spec.windage, wind, rho, flow, heel, out);

  /** Share of the full loading's moment that the priced loading keeps. */
  const shareOf = (part: number, whole: number): number => {
    // A sail that can carry nothing (wind from ahead) luffs wholly: a floor on the scale of its area.
    let scale = 0;
    for (let i = 0; i < n; i++) scale += width[i]! * speed[i]! * speed[i]! * chord[i]! * z[i]!;
    return whole > 0 ? Math.min(1, (part + 1e-6 * scale) / (whole + 1e-6 * scale)) : 1;
  };

  // At no price the priced loading is the full one, and its solver stands for both.
  let fullIsPriced = true;

  const evaluateInto = (
    flow: Readonly<SailingFlow>,
    heel: number,
    price: number,
    out: Float64Array,
  ): void => {
    out.fill(0);
    setFlow(flow, heel);
    let kept = 1;
    fullIsPriced = price === 0;
    if (!fullIsPriced) solve(0, full);
    solve(price, priced);
    if (!fullIsPriced) kept = shareOf(load(priced.x), load(full.x));
    addSails(price, priced.x, kept, out);
    addWindage(flow, heel, out);
  };

  const near = new Float64Array(n);
  const nearFull = new Float64Array(n);
  const work = new Float64Array(n);

  const nearInto = (flow: Readonly<SailingFlow>, heel: number, price: number, out: Float64Array): void => {
    out.fill(0);
    setFlow(flow, heel);
    let kept = 1;
    if (price !== 0) {
      fillProblem(0);
      linearisedLoading(problem, fullIsPriced ? priced : full, nearFull, work);
    }
    fillProblem(price);
    linearisedLoading(problem, priced, near, work);
    if (price !== 0) kept = shareOf(load(near), load(nearFull));
    addSails(price, near, kept, out);
    addWindage(flow, heel, out);
  };

  return {
    spec,
    name: spec.name,
    area,
    centre: [centreX, centreZ],
    evaluateInto,
    nearInto,
    fullMoment: (flow, heel) => {
      scratch.fill(0);
      setFlow(flow, heel);
      solve(0, full);
      addSails(0, full.x, 1, scratch);
      return scratch[AERO.heelMoment]!;
    },
    loading: (flow, heel, price): SailLoading[] => {
      setFlow(flow, heel);
      solve(price, priced);
      inducedInto(problem, priced.x, induced);
      return sails.map((s, b) => {
        const from = first[b]!;
        const to = first[b + 1]!;
        let drive = 0;
        let side = 0;
        let moment = 0;
        const cl = new Float64Array(to - from);
        const inflow = new Float64Array(to - from);
        const trim = new Float64Array(to - from);
        for (let i = from; i < to; i++) {
          const gi = priced.x[i]!;
          cl[i - from] = speed[i]! > 0 ? (2 * gi) / (speed[i]! * chord[i]!) : 0;
          inflow[i - from] = Math.atan2(v[i]!, u[i]!);
          // Downwash over speed is induced drag over lift at the node.
          const downwash = gi > 0 ? induced[i]! / (2 * width[i]! * speed[i]! * gi) : 0;
          trim[i - from] = inflow[i - from]! - downwash - (cl[i - from]! - CAMBER_LIFT) / (2 * Math.PI);
          const lift = rho * width[i]! * speed[i]! * gi;
          const drag = 0.5 * rho * induced[i]!;
          drive += lift * sinB[i]! - drag * cosB[i]!;
          const y = lift * cosB[i]! + drag * sinB[i]!;
          side += y;
          moment += y * z[i]!;
        }
        return {
          sail: s.name,
          z: z.slice(from, to),
          circulation: priced.x.slice(from, to),
          cl,
          inflow,
          trim,
          clLimit: clMax.slice(from, to),
          drive,
          side,
          centreHeight: side !== 0 ? moment / side : geometry[b]!.z,
        };
      });
    },
  };
}
