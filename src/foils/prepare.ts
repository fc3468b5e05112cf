import { type LiftSlope, weissinger } from '../lifting-line/index.js';
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

function planformOf(f: FoilSpec, span: number): LiftSlope {
  const taper = f.tipChord / f.rootChord;
  return weissinger({
    span,
    chordAt: (s) => f.rootChord * (1 + (taper - 1) * s),
    sweep: f.sweep,
    mirrored: !f.surfacePiercing,
  });
}

/** Hoist stations at which a board's lifting line is solved; between them a polynomial through all. */
const HOISTS = [0.25, 0.4375, 0.625, 0.8125, 1];

function lagrange(x: number, ys: readonly number[]): number {
  let s = 0;
  for (let i = 0; i < HOISTS.length; i++) {
    let l = ys[i]!;
    for (let j = 0; j < HOISTS.length; j++) {
      if (j !== i) l *= (x - HOISTS[j]!) / (HOISTS[i]! - HOISTS[j]!);
    }
    s += l;
  }
  return s;
}

/**
 * Keel and rudder with their lift, drag and moments. Lift slope, span efficiency and the height of the lift come from
 * the lifting line; the hull adds its share; induced drag is that of the whole lift on the keel's span, which is also
 * what the Delft effective-span regression says of a fin keel. Angles of attack are those of the flow square to the
 * heeled foil; drag acts along the course, the lift's horizontal part across it.
 */
export function prepareFoilSystem(spec: FoilSystemSpec): FoilSystem {
  const { keel, rudder, water, canoeDraft } = spec;
  for (const f of [keel, rudder]) {
    if (!(f.span > 0) || !(f.rootChord > 0) || !(f.tipChord > 0)) {
      throw new RangeError(`the ${f.kind} needs a span and chords above zero`);
    }
  }
  const keels = HOISTS.map((h) => {
    const tip = keel.rootChord + (keel.tipChord - keel.rootChord) * h;
    return planformOf({ ...keel, tipChord: tip }, keel.span * h);
  });
  const whole = keels[keels.length - 1]!;
  const rud = planformOf(rudder, rudder.span);
  const nu = water.kinematicViscosity;
  const rho = water.density;
  const keelForm = 2 * foilFormFactor(keel.thickness);
  const rudderForm = 2 * foilFormFactor(rudder.thickness);
  const rudderChord = rud.area / rudder.span;
  // A free rudder cutting the surface carries its lift at its own centre; the lifting line of a free foil is
  // symmetric about mid-span for a straight taper, so it is measured from the root all the same.
  const rudderDepth = -rudder.z + rud.centre * rudder.span;
  const rudderX = rudder.x - rud.centre * rudder.span * Math.tan(rudder.sweep);
  const slopes = keels.map((k) => k.slope);
  const areas = keels.map((k) => k.area);
  const efficiencies = keels.map((k) => k.efficiency);
  const centres = keels.map((k) => k.centre);
  const keelTan = Math.tan(keel.sweep);

  const evaluateInto = (
    speed: number,
    leeway: number,
    rudderAngle: number,
    heel: number,
    hoist: number,
    out: Float64Array,
  ): number => {
    let slope = whole.slope;
    let area = whole.area;
    let efficiency = whole.efficiency;
    let centre = whole.centre;
    let span = keel.span;
    if (hoist < 1) {
      slope = lagrange(hoist, slopes);
      area = lagrange(hoist, areas);
      efficiency = lagrange(hoist, efficiencies);
      centre = lagrange(hoist, centres);
      span = keel.span * hoist;
    }
    const q = 0.5 * rho * speed * speed;
    const cosHeel = Math.cos(heel);
    const loss = 1 - HEEL_LOSS * (Math.sqrt(heel * heel + HEEL_ROUNDING * HEEL_ROUNDING) - HEEL_ROUNDING);
    // Flow square to the heeled foil: sin of the angle of attack, along the chord cos(leeway).
    const alpha = Math.atan2(Math.sin(leeway) * cosHeel, Math.cos(leeway));
    const share = 1 + (HULL_LIFT * canoeDraft) / span;
    const keelCl = slope * loss * alpha;
    const keelOwn = q * area * keelCl;
    const keelLift = keelOwn * share;
    const hullLift = keelLift - keelOwn;

    const aspect = (2 * span * span) / area;
    const qr = q * RUDDER_INFLOW * RUDDER_INFLOW;
    const rudderAlpha = alpha - rudderDownwash(keelCl, aspect) + rudderAngle;
    const rudderCl = rud.slope * loss * rudderAlpha;
    const rudderLift = qr * rud.area * rudderCl;

    const keelDepth = -keel.z + centre * span;
    const keelX = keel.x - centre * span * keelTan;
    const hullDepth = 0.5 * canoeDraft;
    out[FOIL.keelLift] = keelLift;
    out[FOIL.rudderLift] = rudderLift;
    out[FOIL.lift] = keelLift + rudderLift;
    out[FOIL.rudderHeelMoment] = rudderLift * rudderDepth;
    out[FOIL.heelMoment] = keelOwn * keelDepth + hullLift * hullDepth + rudderLift * rudderDepth;
    out[FOIL.rudderYawMoment] = rudderLift * cosHeel * rudderX;
    // A slender body at an angle turns further across the flow, rho V^2 (sideways volume) alpha (Munk 1924): the bow of
    // a boat that makes leeway is pushed to windward.
    const turning = 2 * q * spec.sidewaysVolume * alpha;
    out[FOIL.yawMoment] = keelLift * cosHeel * keelX + rudderLift * cosHeel * rudderX + turning;
    const chord = area / span;
    const ki = q > 0 ? (keelLift * keelLift) / (2 * Math.PI * q * span * span * efficiency * loss) : 0;
    const ri = (qr * rud.area * rudderCl * rudderCl) / (Math.PI * rud.aspect * rud.efficiency * loss);
    const kp = q * area * keelForm * foilFriction((speed * chord) / nu);
    const rp = qr * rud.area * rudderForm * foilFriction((RUDDER_INFLOW * speed * rudderChord) / nu);
    out[FOIL.keelInduced] = ki;
    out[FOIL.keelProfile] = kp;
    out[FOIL.rudderInduced] = ri;
    out[FOIL.rudderProfile] = rp;
    out[FOIL.keelStall] = Math.abs(keelCl) / keel.clMax;
    out[FOIL.rudderStall] = Math.abs(rudderCl) / rudder.clMax;
    return ki + kp + ri + rp;
  };

  return {
    spec,
    keelSlope: whole.slope,
    rudderSlope: rud.slope,
    keelAspect: whole.aspect,
    rudderAspect: rud.aspect,
    keelArea: whole.area,
    rudderArea: rud.area,
    evaluateInto,
  };
}
