import type { Boat } from '../boat/index.js';
import {
  prepareSailSet,
  priceFor,
  type SailCoefficients,
  type SailLoading,
  type SailSet,
  sailCoefficients,
} from '../sails/index.js';
import { degrees, radians } from '../units/index.js';

/** Loading of a set in one wind, at full power and eased. */
export interface LoadingReport {
  readonly awaDeg: number;
  /** Share of the full heeling moment kept. */
  readonly kept: number;
  readonly sails: readonly SailLoading[];
}

/** What a rig designer asks of each sail set. */
export interface SailReport {
  readonly boat: string;
  /** Length of the waterline [m]: places are given aft of its fore end. */
  readonly lwl: number;
  readonly sets: readonly {
    readonly name: string;
    readonly area: number;
    readonly rows: readonly SailCoefficients[];
    readonly loadings: readonly LoadingReport[];
  }[];
}

const ANGLES = [20, 25, 30, 35, 40, 50, 60, 70, 80, 90, 100, 110, 120, 135, 150, 165, 180];
/** Sailing with the wind ahead of the beam: true wind [m/s], boat speed [m/s], angles [deg] from the course. */
const UPWIND = { tws: 6, speed: 2.7, twa: 42 } as const;
const REACH = { tws: 6, speed: 3, twa: 95 } as const;
const KEPT = [1, 0.75, 0.5] as const;

export function sailReport(boat: Boat, angles: readonly number[] = ANGLES.map(radians)): SailReport {
  return {
    boat: boat.spec.name,
    lwl: boat.spec.hull.dimensions.lwl,
    sets: boat.sailSets.map(drawn).map((set) => ({
      name: set.name,
      area: set.area,
      rows: sailCoefficients(set, angles),
      loadings: [UPWIND, REACH].flatMap((wind) => KEPT.map((kept) => loadingAt(set, wind, kept))),
    })),
  };
}

/** The same set with as many nodes as a drawing wants; one given by coefficients stays as it is. */
function drawn(set: SailSet): SailSet {
  return set.spec.sails.length > 0 ? prepareSailSet(set.spec, 24) : set;
}

function loadingAt(set: SailSet, wind: typeof UPWIND | typeof REACH, kept: number): LoadingReport {
  const flow = { tws: wind.tws, twa: radians(wind.twa), speed: wind.speed, leeway: 0 };
  const price = priceFor(set, flow, 0, kept);
  const awa = Math.atan2(wind.tws * Math.sin(flow.twa), wind.tws * Math.cos(flow.twa) + wind.speed);
  return { awaDeg: degrees(awa), kept, sails: set.loading(flow, 0, price) };
}
