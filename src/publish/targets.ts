import { apparentWind } from '../environment/index.js';
import type { SailingResult, SailingState } from '../equilibrium/index.js';
import type { Polar } from '../polar/index.js';

/** A share of the predicted speed, and what it stands for. */
export interface TargetShare {
  readonly what: string;
  readonly share: number;
}

/** One target: the state behind it, and what is left of it after derating. SI and rad. */
export interface Target {
  readonly state: SailingState;
  /** Boat speed to aim for, its VMG, and the apparent wind at that speed. */
  readonly speed: number;
  readonly vmg: number;
  readonly aws: number;
  readonly awa: number;
}

/** A target, or why there is none. */
export type TargetCell =
  | ({ readonly ok: true } & Target)
  | { readonly ok: false; readonly twa: number; readonly why: string; readonly reason: string };

export interface WindTargets {
  readonly tws: number;
  readonly up: TargetCell;
  readonly down: TargetCell;
  /** At the reaching angles of the card, in their order. */
  readonly reach: readonly TargetCell[];
}

/** Everything on a target card. Plain data. */
export interface TargetCard {
  readonly boatName: string;
  /** Height [m] at which the wind is quoted. */
  readonly windHeight: number;
  readonly reachAngles: readonly number[];
  readonly winds: readonly WindTargets[];
  /** What is taken off, and what is left of the predicted speed in all. */
  readonly shares: readonly TargetShare[];
  readonly share: number;
  /** A line of the coach's own. */
  readonly label: string;
}

export interface TargetChoice {
  /** True wind angles [rad] of the polar that are shown as reaches. */
  readonly reachAngles: readonly number[];
  readonly shares: readonly TargetShare[];
  readonly label: string;
}

/**
 * A target from a state. The boat is sailed as predicted and goes at a share of the predicted speed: angle from the
 * course, heel, leeway, ease and crew stay; VMG follows the speed, and the apparent wind is that of the lower speed.
 */
function target(r: SailingResult, share: number): TargetCell {
  if (r.status === 'unbalanced') return { ok: false, twa: r.twa, why: r.why, reason: r.reason };
  if (share === 1) return { ok: true, state: r, speed: r.speed, vmg: r.vmg, aws: r.aws, awa: r.awa };
  const speed = r.speed * share;
  const wind = apparentWind({ tws: r.tws, twa: r.twa, speed, leeway: r.leeway });
  // On a run the wind may come over the other quarter: the angle goes on beyond 180 deg, as in the state.
  const awa = wind.angle < 0 && r.awa > 0.5 * Math.PI ? wind.angle + 2 * Math.PI : wind.angle;
  return { ok: true, state: r, speed, vmg: r.vmg * share, aws: wind.speed, awa };
}

/**
 * Targets of a polar: best VMG up and down, and speeds at reaching angles.
 * @throws RangeError when a reaching angle is not on the polar's grid
 */
export function targetCard(polar: Polar, choice: TargetChoice): TargetCard {
  const columns = choice.reachAngles.map((a) => {
    const j = polar.twa.findIndex((b) => Math.abs(a - b) < 1e-9);
    if (j < 0) throw new RangeError(`the reaching angle ${a} rad is not on the polar's grid`);
    return j;
  });
  const share = choice.shares.reduce((s, d) => s * d.share, 1);
  return {
    boatName: polar.boatName,
    windHeight: polar.windHeight,
    reachAngles: choice.reachAngles,
    winds: polar.tws.map((tws, i) => ({
      tws,
      up: target(polar.bestUp[i]!, share),
      down: target(polar.bestDown[i]!, share),
      reach: columns.map((j) => target(polar.results[i]![j]!, share)),
    })),
    shares: choice.shares,
    share,
    label: choice.label,
  };
}

/**
 * The helper table for the water: look for the boat's speed in the column of the wind, and read the percent of target
 * at the left.
 */
export interface PercentTable {
  readonly course: 'up' | 'down';
  /** True wind speeds [m/s] that have a target. */
  readonly tws: readonly number[];
  readonly rows: readonly {
    readonly percent: number;
    /** Boat speeds [m/s], one for each wind. */
    readonly speeds: readonly number[];
  }[];
}

/** Percents in the helper table, high to low (judgement: slower is not trying, faster is another wind). */
export const PERCENTS: readonly number[] = Array.from({ length: 16 }, (_, i) => 110 - 2 * i);

export function percentTable(card: TargetCard, course: 'up' | 'down'): PercentTable {
  const aims = card.winds.flatMap((w) => {
    const t = w[course];
    return t.ok ? [{ tws: w.tws, speed: t.speed }] : [];
  });
  return {
    course,
    tws: aims.map((a) => a.tws),
    rows: PERCENTS.map((percent) => ({ percent, speeds: aims.map((a) => (percent / 100) * a.speed) })),
  };
}

/** A boat speed [m/s] in percent of every target of the card; undefined where there is no target. */
export interface PercentOf {
  readonly tws: number;
  readonly up: number | undefined;
  readonly down: number | undefined;
  readonly reach: readonly (number | undefined)[];
}

export function percentOf(card: TargetCard, speed: number): PercentOf[] {
  const of = (c: TargetCell): number | undefined =>
    c.ok && c.speed > 0 ? (100 * speed) / c.speed : undefined;
  return card.winds.map((w) => ({ tws: w.tws, up: of(w.up), down: of(w.down), reach: w.reach.map(of) }));
}
