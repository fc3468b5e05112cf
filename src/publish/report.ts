import { type Boat, type DescriptionRow, describeBoat, type Estimate } from '../boat/index.js';
import {
  type ForceBalance,
  forceBalance,
  type SailingResult,
  type SailingState,
} from '../equilibrium/index.js';
import { type Polar, polarWarnings } from '../polar/index.js';
import { degrees, toKnots } from '../units/index.js';
import { type ResistanceReport, resistanceReport } from './resistance.js';
import { type RightingReport, rightingReport } from './righting.js';
import { type SailReport, sailReport } from './sail-report.js';

/** What is to be known of the boat in a report. Plain data. */
export interface BoatFacts {
  readonly name: string;
  readonly note: string;
  readonly description: readonly DescriptionRow[];
  readonly estimates: readonly Estimate[];
  readonly warnings: Boat['warnings'];
}

/** Everything a polar's files are written from. Plain data. */
export interface PolarReport {
  readonly boat: BoatFacts;
  readonly polar: Polar;
  readonly resistance: ResistanceReport;
  readonly righting: RightingReport;
  readonly sails: SailReport;
  /** Force balances of a few chosen states. */
  readonly balances: readonly ForceBalance[];
}

/** The boat's own part of a report. */
export function boatFacts(boat: Boat): BoatFacts {
  return {
    name: boat.spec.name,
    note: boat.spec.note,
    description: describeBoat(boat),
    estimates: boat.estimates,
    warnings: boat.warnings,
  };
}

/** States worth a look at their forces: best VMG both ways in the middle wind, to windward in the strongest that sails. */
function chosenStates(polar: Polar): SailingState[] {
  const balanced = (s: SailingResult | undefined): s is SailingState => s?.status === 'balanced';
  const middle = Math.floor((polar.tws.length - 1) / 2);
  const strongest = polar.bestUp.findLast(balanced);
  const chosen = [polar.bestUp[middle], polar.bestDown[middle], strongest].filter(balanced);
  return chosen.filter((s, i) => chosen.indexOf(s) === i);
}

/** A boat and its polar, ready to be published. */
export function polarReport(boat: Boat, polar: Polar): PolarReport {
  const facts = boatFacts(boat);
  const warnings = [...facts.warnings, ...polarWarnings(boat, polar)];
  return {
    boat: { ...facts, warnings },
    polar,
    resistance: resistanceReport(boat),
    righting: rightingReport(boat, polar),
    sails: sailReport(boat),
    balances: chosenStates(polar).map((s) => forceBalance(boat, s)),
  };
}

/** A balanced state in knots and degrees. */
export interface StateFigures {
  readonly status: 'balanced';
  readonly twsKn: number;
  readonly twaDeg: number;
  readonly twaHeadingDeg: number;
  readonly speedKn: number;
  readonly vmgKn: number;
  readonly awsKn: number;
  readonly awaDeg: number;
  readonly heelDeg: number;
  readonly leewayDeg: number;
  readonly rudderDeg: number;
  readonly ease: number;
  readonly crewShare: number;
  readonly crewArmM: number;
  /** Share of a board that is lowered; 1 for a fixed keel. */
  readonly boardDown: number;
  readonly sailSet: string;
  readonly regime: string;
  readonly notes: readonly string[];
}

/** A state that does not balance, in knots and degrees. */
export interface NoStateFigures {
  readonly status: 'unbalanced';
  readonly twsKn: number;
  readonly twaDeg: number;
  readonly why: string;
  readonly reason: string;
}

/** A result in the units of tables: kn, deg, m; shares from 0 to 1. */
export function figures(r: SailingResult): StateFigures | NoStateFigures {
  if (r.status === 'unbalanced')
    return {
      status: r.status,
      twsKn: toKnots(r.tws),
      twaDeg: degrees(r.twa),
      why: r.why,
      reason: r.reason,
    };
  return {
    status: r.status,
    twsKn: toKnots(r.tws),
    twaDeg: degrees(r.twa),
    twaHeadingDeg: degrees(r.twaHeading),
    speedKn: toKnots(r.speed),
    vmgKn: toKnots(r.vmg),
    awsKn: toKnots(r.aws),
    // A little beyond 180 where the wind comes over the other quarter on a run, rather than jumping to -180.
    awaDeg: degrees(r.awa),
    heelDeg: degrees(r.heel),
    leewayDeg: degrees(r.leeway),
    rudderDeg: degrees(r.rudder),
    ease: r.ease,
    crewShare: r.crewShare,
    crewArmM: r.crewArm,
    boardDown: r.boardDown,
    sailSet: r.sailSet,
    regime: r.regime,
    notes: r.notes,
  };
}
