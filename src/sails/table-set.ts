import type { SailingFlow, WindProfile } from '../environment/index.js';
import { pchip } from '../numerics/index.js';
import { AERO, type SailSet, type WindageBody } from './types.js';
import { addWindageInto, flowAtInto } from './windage.js';

/** Coefficients of a whole sail set as measured or computed elsewhere, on its area, by apparent wind angle. */
export interface CoefficientTable {
  readonly name: string;
  /** Area [m2] the coefficients refer to. */
  readonly area: number;
  /** Apparent wind angles [rad], rising. */
  readonly awa: readonly number[];
  readonly lift: readonly number[];
  readonly drag: readonly number[];
  /** Height [m] of the centre of effort above the waterline at each angle, and its x. */
  readonly height: readonly number[];
  readonly x: number;
  /** Effective height [m] of the rig, which says how much of the drag is induced: CL^2 area / (pi height^2). */
  readonly effectiveHeight: number;
}

export interface TableSetSpec {
  readonly table: CoefficientTable;
  readonly windage: readonly WindageBody[];
  readonly wind: WindProfile;
  readonly airDensity: number;
}

/** Rounding of the eased share at full power. */
const ROUNDING = 0.02;
/** Least share of the drag that is taken to be induced, so that easing has a smooth optimum. */
const LEAST_INDUCED = 0.05;

/**
 * A sail set from a table of coefficients. The wind is that at the centre of effort; heel enters by the effective angle.
 * Easing takes lift off: with r of the lift kept, drag falls by (1 - r^2) of its induced part, and r is the best for the
 * price on heeling moment. The table is taken to include all that stands in the wind unless bodies are given.
 */
export function prepareTableSet(spec: TableSetSpec): SailSet {
  const { table: t, wind, airDensity: rho } = spec;
  const lift = pchip(t.awa, t.lift);
  const drag = pchip(t.awa, t.drag);
  const height = pchip(t.awa, t.height);
  const centreZ = t.height[0]!;
  const mean = { u: 0, v: 0 };

  /** Forces of the sails (no windage) into out; returns the heeling moment. */
  const sails = (flow: Readonly<SailingFlow>, heel: number, price: number, out: Float64Array): number => {
    // The centre of effort moves a little with the angle: looked up once at the wind of the first height.
    flowAtInto(wind, flow, heel, centreZ, mean);
    const z = height.value(
      Math.min(t.awa[t.awa.length - 1]!, Math.max(t.awa[0]!, Math.atan2(mean.v, mean.u))),
    );
    flowAtInto(wind, flow, heel, z, mean);
    const speed = Math.sqrt(mean.u * mean.u + mean.v * mean.v);
    const angle = Math.atan2(mean.v, mean.u);
    const at = Math.min(t.awa[t.awa.length - 1]!, Math.max(t.awa[0]!, Math.abs(angle)));
    const q = 0.5 * rho * speed * speed * t.area;
    const l = lift.value(at) * (angle < 0 ? -1 : 1);
    const d = drag.value(at);
    const inducedShare = Math.min(
      0.9,
      Math.max(LEAST_INDUCED, (l * l * t.area) / (Math.PI * t.effectiveHeight ** 2) / Math.max(1e-9, d)),
    );
    const induced = inducedShare * d;
    const sin = speed > 0 ? mean.v / speed : 0;
    const cos = speed > 0 ? mean.u / speed : 1;
    const gain = l * (sin - price * z * cos);
    const loss = 2 * induced * Math.max(0.1, cos + price * z * sin);
    const free = price === 0 ? 2 : Math.max(0, gain / loss);
    const gap = free - 1;
    const r = gap >= ROUNDING ? 1 : gap <= -ROUNDING ? free : free - (gap + ROUNDING) ** 2 / (4 * ROUNDING);
    const kept = r * l;
    const dragKept = d - induced * (1 - r * r);
    const x = q * (kept * sin - dragKept * cos);
    const y = q * (kept * cos + dragKept * sin);
    out[AERO.drive]! += x;
    out[AERO.side]! += y;
    out[AERO.heelMoment]! += y * z;
    out[AERO.sideX]! += y * t.x;
    out[AERO.driveZ]! += x * z;
    return y * z;
  };

  const scratch = new Float64Array(AERO.count);
  const evaluateInto = (
    flow: Readonly<SailingFlow>,
    heel: number,
    price: number,
    out: Float64Array,
  ): void => {
    out.fill(0);
    sails(flow, heel, price, out);
    addWindageInto(spec.windage, wind, rho, flow, heel, out);
  };
  return {
    spec: { ...spec, name: t.name, sails: [], boomLimit: 0, mastTop: 0 },
    name: t.name,
    area: t.area,
    centre: [t.x, centreZ],
    evaluateInto,
    nearInto: evaluateInto,
    fullMoment: (flow, heel) => {
      scratch.fill(0);
      return sails(flow, heel, 0, scratch);
    },
    loading: () => [],
  };
}
