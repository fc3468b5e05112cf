import { type Blade, type BladeState, bladeAt, bulbFormFactor, bulbWetted, prepareBlade } from './blade.js';
import { rudderDownwash } from './downwash.js';
import { foilFormFactor, foilFriction } from './sections.js';
import { FOIL, type FoilSpec, type FoilSystem, type FoilSystemSpec } from './types.js';

/** The hull's share of side force over the keel's own: 1 + 1.8 Tc / span (Keuning, Katgert & Vermeulen 2006). */
const HULL_LIFT = 1.8;
/** Side force and effective span fall by this per rad of heel (the same source, and the Delft effective span). */
const HEEL_LOSS = 0.38;
/** Rounding [rad] of |heel| at upright. */
const HEEL_ROUNDING = 0.02;
/** Speed of the water at the rudder over the boat's, in the wake of hull and keel (the same source). */
const RUDDER_INFLOW = 0.9;
/** Least share of a blade whose lifting line is solved; with less in the water its forces fade (judgement). */
const LEAST_SHARE = 0.25;
/** Rounding of the limits on shares of a span. */
const SHARE_ROUNDING = 0.05;

/** Larger and smaller of two, the corner rounded by a parabola within the rounding: exact elsewhere, smooth in slope. */
function larger(a: number, b: number): number {
  const gap = Math.abs(a - b);
  const corner = gap < SHARE_ROUNDING ? (SHARE_ROUNDING - gap) ** 2 / (4 * SHARE_ROUNDING) : 0;
  return Math.max(a, b) + corner;
}

function smaller(a: number, b: number): number {
  return -larger(-a, -b);
}

/** Forces of one blade, filled per call. */
interface BladeForces {
  /** Lift coefficient on the blade's area, lift [N] square to the blade. */
  cl: number;
  lift: number;
  induced: number;
  profile: number;
}

/** A blade where it stands: side 0 on the centreline, 1 to leeward, -1 to windward. */
interface Placed {
  readonly side: number;
  readonly cant: number;
  readonly sinCant: number;
  readonly cosCant: number;
  readonly y: number;
}

function placesOf(f: FoilSpec): readonly Placed[] {
  const { twin } = f;
  if (twin === undefined) return [{ side: 0, cant: 0, sinCant: 0, cosCant: 1, y: 0 }];
  const sides = twin.lowered === 'both' ? [1, -1] : [1];
  return sides.map((side) => ({
    side,
    cant: twin.cant,
    sinCant: Math.sin(twin.cant),
    cosCant: Math.cos(twin.cant),
    y: side * twin.offset,
  }));
}

/**
 * Keel and rudder with their lift, drag and moments. Lift slope, span efficiency and the height of the lift come from
 * the lifting line; the hull adds its share; induced drag is that of the whole lift on the keel's span, which is also
 * what the Delft effective-span regression says of a fin keel. Angles of attack are those of the flow square to the
 * blade as it stands, heeled and canted; drag acts along the course, the lift's horizontal part across it. Twin blades
 * do not feel each other; the one to windward comes out of the water as the boat heels. The upward part of a canted
 * blade's lift is left out of the hull's flotation.
 */
export function prepareFoilSystem(spec: FoilSystemSpec): FoilSystem {
  const { keel, rudder, water, canoeDraft } = spec;
  const keelBlade = prepareBlade(keel);
  const rudderBlade = prepareBlade(rudder);
  const keelPlaces = placesOf(keel);
  const rudderPlaces = placesOf(rudder);
  const nu = water.kinematicViscosity;
  const rho = water.density;
  const keelForm = 2 * foilFormFactor(keel.thickness);
  const rudderForm = 2 * foilFormFactor(rudder.thickness);
  const keelTan = Math.tan(keelBlade.sweep);
  const rudderTan = Math.tan(rudderBlade.sweep);
  const bulbArea = keel.bulb === undefined ? 0 : bulbWetted(keel.bulb) * bulbFormFactor(keel.bulb);
  const bulbLength = keel.bulb?.length ?? 0;

  const state: BladeState = { slope: 0, area: 0, efficiency: 1, centre: 0 };
  const force: BladeForces = { cl: 0, lift: 0, induced: 0, profile: 0 };

  const heelLoss = (heel: number): number =>
    1 - HEEL_LOSS * (Math.sqrt(heel * heel + HEEL_ROUNDING * HEEL_ROUNDING) - HEEL_ROUNDING);

  /** Share of a blade under water when heeled; 1 on the centreline, whose own limits already count it. */
  const wetShare = (f: FoilSpec, b: Blade, p: Placed, heel: number, local: number): number => {
    if (p.side === 0) return 1;
    const root = f.z * Math.cos(heel) - p.y * Math.sin(heel);
    const span = b.span * Math.cos(local);
    const tip = root - span;
    return smaller(1, -tip / span);
  };

  /** One blade at an angle of attack in a stream of dynamic pressure q; returns its share in the water. */
  const bladeForces = (
    b: Blade,
    share: number,
    q: number,
    speed: number,
    alpha: number,
    loss: number,
    form: number,
    hull: number,
    piercing: boolean,
  ): void => {
    const down = share >= 1 ? 1 : larger(LEAST_SHARE, share);
    bladeAt(b, down, state);
    // Less than the least share in the water: forces fade with it.
    const fade = share >= 1 ? 1 : Math.min(1, Math.max(0, share / down));
    const span = b.span * down;
    force.cl = state.slope * loss * alpha;
    const own = q * state.area * force.cl * fade;
    force.lift = own * hull;
    const mirror = piercing ? 1 : 2;
    // The whole lift, the hull's share included, on the blade's span.
    force.induced =
      q > 0 ? (force.lift * force.lift) / (mirror * Math.PI * q * span * span * state.efficiency * loss) : 0;
    force.profile = q * state.area * fade * form * foilFriction((speed * state.area) / (span * nu));
  };

  const evaluateInto = (
    speed: number,
    leeway: number,
    rudderAngle: number,
    heel: number,
    hoist: number,
    out: Float64Array,
  ): number => {
    const q = 0.5 * rho * speed * speed;
    const cosHeel = Math.cos(heel);
    const sinLee = Math.sin(leeway);
    const cosLee = Math.cos(leeway);
    const hullAlpha = Math.atan2(sinLee * cosHeel, cosLee);
    const hullDepth = 0.5 * canoeDraft;
    let keelLift = 0;
    let ki = 0;
    let kp = 0;
    let keelHeel = 0;
    let keelYaw = 0;
    let stall = 0;
    let keelCl = 0;
    let aspect = 1;
    for (let i = 0; i < keelPlaces.length; i++) {
      const p = keelPlaces[i]!;
      const local = heel - p.side * p.cant;
      const loss = heelLoss(local);
      const alpha = p.side === 0 ? hullAlpha : Math.atan2(sinLee * Math.cos(local), cosLee);
      const wet = hoist * wetShare(keel, keelBlade, p, heel, local);
      const share = 1 + (HULL_LIFT * canoeDraft) / (keelBlade.span * hoist) / keelPlaces.length;
      bladeForces(keelBlade, wet, q, speed, alpha, loss, keelForm, share, false);
      const span = keelBlade.span * Math.max(wet, LEAST_SHARE);
      // Its horizontal part, as a force square to the centre plane.
      const lift = p.side === 0 ? force.lift : (force.lift * Math.cos(local)) / cosHeel;
      const own = force.lift / share;
      const reach = state.centre * span;
      const depth = -keel.z + keelBlade.span * (hoist - wet) * p.cosCant + reach;
      const lever = p.side === 0 ? depth : depth * p.cosCant + Math.abs(p.y) * p.sinCant;
      keelLift += lift;
      keelHeel += own * lever + (force.lift - own) * hullDepth;
      keelYaw +=
        lift * cosHeel * (keel.x - reach * keelTan) - (force.induced + force.profile) * p.y * cosHeel;
      ki += force.induced;
      kp += force.profile;
      stall = Math.max(stall, Math.abs(force.cl));
      // The rudder runs in the wake of the mean keel.
      keelCl += force.cl / keelPlaces.length;
      aspect = (2 * span * span) / state.area;
    }
    if (bulbArea > 0) kp += q * bulbArea * foilFriction((speed * bulbLength) / nu);

    const qr = q * RUDDER_INFLOW * RUDDER_INFLOW;
    const downwash = rudderDownwash(keelCl, aspect);
    let rudderLift = 0;
    let ri = 0;
    let rp = 0;
    let rudderHeel = 0;
    let rudderYaw = 0;
    let rudderCl = 0;
    for (let i = 0; i < rudderPlaces.length; i++) {
      const p = rudderPlaces[i]!;
      const local = heel - p.side * p.cant;
      const loss = heelLoss(local);
      const flow = p.side === 0 ? hullAlpha : Math.atan2(sinLee * Math.cos(local), cosLee);
      const wet = wetShare(rudder, rudderBlade, p, heel, local);
      const alpha = flow - downwash + rudderAngle;
      bladeForces(
        rudderBlade,
        wet,
        qr,
        RUDDER_INFLOW * speed,
        alpha,
        loss,
        rudderForm,
        1,
        rudder.surfacePiercing,
      );
      const span = rudderBlade.span * Math.max(wet, LEAST_SHARE);
      const lift = p.side === 0 ? force.lift : (force.lift * Math.cos(local)) / cosHeel;
      // Measured from the root, also for a free blade: the lifting line of a straight taper is symmetric there.
      const reach = state.centre * span;
      const depth = -rudder.z + rudderBlade.span * (1 - Math.min(1, wet)) * p.cosCant + reach;
      const lever = p.side === 0 ? depth : depth * p.cosCant + Math.abs(p.y) * p.sinCant;
      rudderLift += lift;
      rudderHeel += force.lift * lever;
      rudderYaw +=
        lift * cosHeel * (rudder.x - reach * rudderTan) - (force.induced + force.profile) * p.y * cosHeel;
      ri += force.induced;
      rp += force.profile;
      rudderCl = Math.max(rudderCl, Math.abs(force.cl));
    }

    // A slender body at an angle turns further across the flow, rho V^2 (sideways volume) alpha (Munk 1924): the bow of
    // a boat that makes leeway is pushed to windward.
    const turning = 2 * q * spec.sidewaysVolume * hullAlpha;
    out[FOIL.keelLift] = keelLift;
    out[FOIL.rudderLift] = rudderLift;
    out[FOIL.lift] = keelLift + rudderLift;
    out[FOIL.rudderHeelMoment] = rudderHeel;
    out[FOIL.heelMoment] = keelHeel + rudderHeel;
    out[FOIL.rudderYawMoment] = rudderYaw;
    out[FOIL.yawMoment] = keelYaw + rudderYaw + turning;
    out[FOIL.keelInduced] = ki;
    out[FOIL.keelProfile] = kp;
    out[FOIL.rudderInduced] = ri;
    out[FOIL.rudderProfile] = rp;
    out[FOIL.keelStall] = stall / keel.clMax;
    out[FOIL.rudderStall] = rudderCl / rudder.clMax;
    return ki + kp + ri + rp;
  };

  const whole = keelBlade.whole;

  return {
    spec,
    keelSlope: whole.slope,
    rudderSlope: rudderBlade.whole.slope,
    keelAspect: whole.aspect,
    rudderAspect: rudderBlade.whole.aspect,
    keelArea: whole.area * keelPlaces.length,
    rudderArea: rudderBlade.whole.area * rudderPlaces.length,
    evaluateInto,
  };
}
