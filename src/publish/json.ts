import type { ForceBalance, SailingResult } from '../equilibrium/index.js';
import { degrees, toKnots } from '../units/index.js';
import { CAUTIONS, ERROR_BANDS, ERROR_BANDS_SOURCE, METHODS } from './cautions.js';
import { rounded } from './numbers.js';
import { type BoatFacts, figures, type PolarReport } from './report.js';
import type { SailReport } from './sail-report.js';

type Json = null | boolean | number | string | readonly Json[] | { readonly [key: string]: Json };

/** Text of a value: two blanks of indent, a line break at the end, keys in the order they were given. */
function text(value: Json): string {
  return `${JSON.stringify(value, null, 2)}\n`;
}

function state(r: SailingResult): Json {
  const f = figures(r);
  const head = { status: f.status, tws_kn: rounded(f.twsKn), twa_deg: rounded(f.twaDeg) };
  if (f.status === 'unbalanced') return { ...head, why: f.why, reason: f.reason };
  return {
    ...head,
    twa_from_heading_deg: rounded(f.twaHeadingDeg),
    boat_speed_kn: rounded(f.speedKn),
    vmg_kn: rounded(f.vmgKn),
    aws_kn: rounded(f.awsKn),
    awa_deg: rounded(f.awaDeg),
    heel_deg: rounded(f.heelDeg),
    leeway_deg: rounded(f.leewayDeg),
    rudder_deg: rounded(f.rudderDeg),
    ease: rounded(f.ease),
    crew_share: rounded(f.crewShare),
    crew_arm_m: rounded(f.crewArmM),
    board_down: rounded(f.boardDown),
    sails: f.sailSet,
    regime: f.regime,
    notes: f.notes,
    ...(r.status === 'balanced' && r.slowerSpeed !== undefined
      ? { slower_state_kn: rounded(toKnots(r.slowerSpeed)) }
      : {}),
  };
}

function boat(b: BoatFacts): Json {
  return {
    name: b.name,
    note: b.note,
    quantities: b.description.map((r) => ({
      section: r.section,
      quantity: r.quantity,
      value: typeof r.value === 'number' ? rounded(r.value) : r.value,
      unit: r.unit,
    })),
    estimates: b.estimates.map((e) => ({ key: e.key, value: e.value, rule: e.rule })),
    warnings: b.warnings.map((w) => ({
      method: w.method,
      parameter: w.parameter,
      value: rounded(w.value),
      range: [rounded(w.range[0]), rounded(w.range[1])],
      treatment: w.treatment,
    })),
  };
}

/** The complete results of a polar. Units stand in the keys; the same boat gives the same text. */
export function polarJson(report: PolarReport): string {
  const { polar } = report;
  return text({
    content: 'polar',
    version: 1,
    boat: boat(report.boat),
    wind_height_m: rounded(polar.windHeight),
    angles: 'true wind angle from the course; apparent wind angle from the heading',
    tws_kn: polar.tws.map((v) => rounded(toKnots(v))),
    twa_deg: polar.twa.map((v) => rounded(degrees(v))),
    winds: polar.results.map((row, i) => ({
      tws_kn: rounded(toKnots(polar.tws[i]!)),
      best_vmg_up: state(polar.bestUp[i]!),
      best_vmg_down: state(polar.bestDown[i]!),
      fastest: state(polar.fastest[i]!),
      states: row.map(state),
    })),
    error_bands: {
      source: ERROR_BANDS_SOURCE,
      of_boat_speed: ERROR_BANDS.map((b) => ({ where: b.where, band: b.band })),
    },
    methods: METHODS.map((m) => ({ part: m.part, method: m.method, source: m.source })),
    cautions: CAUTIONS,
  });
}

/** The boat's derived quantities, estimates and warnings. */
export function boatJson(facts: BoatFacts): string {
  return text({ content: 'boat', version: 1, boat: boat(facts), cautions: CAUTIONS });
}

/** One state with its forces and moments, or why there is none. */
export function balanceJson(
  facts: BoatFacts,
  result: SailingResult,
  balance?: ForceBalance,
  free?: SailingResult,
): string {
  return text({
    content: 'force balance',
    version: 1,
    boat: facts.name,
    state: state(result),
    ...(free && { free_state: state(free) }),
    ...(balance && {
      lead_m: rounded(balance.lines.lead),
      rows: balance.rows.map((r) => ({
        group: r.group,
        name: r.name,
        forward_N: rounded(r.forward),
        leeward_N: rounded(r.leeward),
        heeling_N_m: rounded(r.roll),
        yaw_to_windward_N_m: rounded(r.yaw),
      })),
      sum: {
        forward_N: rounded(balance.sum.forward, 3),
        leeward_N: rounded(balance.sum.leeward, 3),
        heeling_N_m: rounded(balance.sum.roll, 3),
        yaw_to_windward_N_m: rounded(balance.sum.yaw, 3),
      },
      facts: balance.facts.map((f) => ({ name: f.name, value: rounded(f.value), unit: f.unit })),
    }),
    cautions: CAUTIONS,
  });
}

/** Coefficients and loadings of every sail set. */
export function sailReportJson(report: SailReport): string {
  const list = (values: ArrayLike<number>, factor = 1): Json =>
    Array.from(values, (v) => rounded(v * factor));
  return text({
    boat: report.boat,
    sail_sets: report.sets.map((s) => ({
      name: s.name,
      area_m2: rounded(s.area),
      coefficients: s.rows.map((r) => ({
        awa_deg: rounded(degrees(r.awa)),
        lift: rounded(r.lift),
        drag: rounded(r.drag),
        drag_with_windage: rounded(r.dragWithWindage),
        drive: rounded(r.drive),
        side: rounded(r.side),
        centre_height_m: rounded(r.height),
        centre_aft_of_stem_m: rounded(0.5 * report.lwl - r.x),
      })),
      loadings: s.loadings.map((l) => ({
        awa_deg: rounded(l.awaDeg),
        moment_kept: l.kept,
        sails: l.sails.map((x) => ({
          sail: x.sail,
          height_m: list(x.z),
          circulation_m2_s: list(x.circulation),
          section_lift: list(x.cl),
          section_limit: list(x.clLimit),
          inflow_deg: list(x.inflow, 180 / Math.PI),
          trim_deg: list(x.trim, 180 / Math.PI),
        })),
      })),
    })),
  });
}
