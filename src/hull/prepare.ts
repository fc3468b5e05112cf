import { hermite, pchip, pchipSlopes, symmetricSpline } from '../numerics/index.js';
import { checkLoad } from './check-load.js';
import { DELFT_1998, type DelftHull, residuaryDelft1998 } from './delft-1998.js';
import { DELFT_2008, residuaryDelft2008 } from './delft-2008.js';
import { DELFT_HEEL, HEEL_BEAM_DRAFT_LIMIT, heelFactor, heelResiduary20 } from './delft-heel.js';
import { DELFT_KEEL, keelHeelCoefficient, keelResiduary } from './delft-keel.js';
import { formOf } from './form.js';
import { frictionCoefficient } from './friction.js';
import { floatAt, prepareLines, resampled, rightingArmOf, wettedArea } from './hydrostatics.js';
import { leastPlaningDrag, type PlaningState, ROUND_BILGE_FACTOR } from './savitsky.js';
import { transomResistance } from './transom.js';
import {
  HULL,
  type Hull,
  type HullForm,
  type HullLoad,
  type HullOptions,
  type Lines,
  type RangeWarning,
} from './types.js';

const DEG = Math.PI / 180;
/** Heel stations of the tables. */
const HEEL_STEP = 2.5 * DEG;
const HEEL_COUNT = 25;
/** Froude grid of the resistance tables; beyond its end forces go on along their tangent in V^2. */
const FN_STEP = 0.01;
const FN_COUNT = 261;
/** Share of Lwl that ITTC-57 takes as the length of friction for yachts (common practice with the Delft series). */
const FRICTION_LENGTH = 0.7;

function smoothstep(x: number): number {
  const t = Math.min(1, Math.max(0, x));
  return t * t * (3 - 2 * t);
}

/** Share of planing in the resistance of a hull that planes, over its Froude number on the cube root of volume. */
export function planingShare(froudeVolume: number): number {
  return smoothstep(froudeVolume - 1.5);
}

function rangeWarnings(form: HullForm, options: HullOptions, maxFn: boolean): RangeWarning[] {
  const out: RangeWarning[] = [];
  const is98 = options.residuary === 'delft-1998';
  const method = is98 ? 'Delft residuary resistance, 1998' : 'Delft residuary resistance, 2008';
  const say = (
    parameter: string,
    value: number,
    low: number,
    high: number,
    treatment: string,
    m = method,
  ): void => {
    if (!(value >= low && value <= high))
      out.push({ method: m, parameter, value, range: [low, high], treatment });
  };
  const used = 'computed outside its range';
  if (!options.measured) {
    say('Lwl/Bwl', form.lwl / form.bwl, is98 ? 2.76 : 2.73, 5, used);
    say('Bwl/Tc', form.bwl / form.canoeDraft, 2.46, is98 ? 19.32 : 19.38, used);
    say('Lwl/volume^(1/3)', form.lwl / Math.cbrt(form.volume), 4.34, 8.5, used);
    say('LCB aft of amidships [%]', 100 * (form.lcbFromForward / form.lwl - 0.5), 0, is98 ? 6 : 8.2, used);
    if (!is98) say('LCF aft of amidships [%]', 100 * (form.lcfFromForward / form.lwl - 0.5), 1.8, 9.5, used);
    say('Cp', form.cp, 0.52, 0.6, used);
    if (!is98) {
      say('Cm', form.cm, 0.65, 0.78, used);
      say('Aw/volume^(2/3)', form.waterplane / form.volume ** (2 / 3), 3.78, 12.67, used);
    }
    say(
      'Bwl/Tc',
      form.bwl / form.canoeDraft,
      2.46,
      HEEL_BEAM_DRAFT_LIMIT,
      `held at ${HEEL_BEAM_DRAFT_LIMIT}`,
      'Delft increase of residuary resistance with heel, 1998',
    );
    if (maxFn) {
      out.push({
        method,
        parameter: 'Froude number',
        value: FN_STEP * (FN_COUNT - 1),
        range: [is98 ? 0.1 : 0.15, 0.6],
        treatment: 'ratio held above 0.60; planing takes over where the hull planes',
      });
    }
  }
  return out;
}

/**
 * A hull floating at its load, with resistance and righting arm tabulated for quick and smooth evaluation.
 * Friction: ITTC-57 on 0.7 Lwl and the heeled wetted area, no form factor. Residuary: the Delft regression of the
 * floating hull, clipped at zero, monotone between rows, fading below the first; above Fn 0.60 held for a hull that
 * planes, rising on for one that does not. Planing: blend
 * to Savitsky's least drag by w = smoothstep((FnVol - 1.5) / 1.0), then the running maximum over speed.
 * @throws RangeError when the hull cannot carry the load, or a figure of the load or the options is out of range
 */
export function prepareHull(lines: Lines, load: HullLoad, options: HullOptions): Hull {
  checkLoad(load, options);
  const { water, gravity } = options;
  const p = prepareLines(resampled(lines));
  // A ballasted fin displaces water of its own: the canoe body floats the rest of the weight, whose centre lies where
  // taking away the fin's buoyancy leaves it.
  const keel = options.keel;
  const keelMass = keel ? Math.min(0.5 * load.mass, keel.volume * water.density) : 0;
  const body: HullLoad = {
    mass: load.mass - keelMass,
    x: (load.mass * load.x - keelMass * (keel?.x ?? load.x)) / (load.mass - keelMass),
    z: (load.mass * load.z + keelMass * (keel?.centreDepth ?? 0)) / (load.mass - keelMass),
  };
  const carried = body.mass / load.mass;
  const request = { volume: body.mass / water.density, x: body.x, z: body.z };
  const upright = floatAt(p, request, 0);
  const sheer = Math.min(
    ...p.lines.stations.map(
      (s) => s.z[s.z.length - 1]! - upright.flotation.height - s.x * Math.tan(upright.flotation.trim),
    ),
  );
  if (sheer < 0) throw new RangeError(`the hull floats with its sheer ${(-sheer).toFixed(2)} m under water`);

  const arms: number[] = [];
  const areas: number[] = [];
  let at = { height: upright.flotation.height, trim: upright.flotation.trim };
  for (let i = 0; i < HEEL_COUNT; i++) {
    const heel = i * HEEL_STEP;
    const f = floatAt(p, request, heel, at);
    at = { height: f.flotation.height, trim: f.flotation.trim };
    arms.push(carried * rightingArmOf(f.immersed, heel, body.z));
    areas.push(wettedArea(p, f.flotation));
  }
  const righting = symmetricSpline('odd', HEEL_STEP, arms);
  const wettedBy = symmetricSpline('even', HEEL_STEP, areas);
  const form = formOf(p, upright.flotation, upright.immersed, areas[0]!, body.z, carried);

  const delft: DelftHull = form;
  const weight = body.mass * gravity;
  const scale = Math.sqrt(gravity * form.lwl);
  const rr = (() => {
    const is98 = options.residuary === 'delft-1998';
    const fn: number[] = [...(is98 ? DELFT_1998.Fn : DELFT_2008.Fn)];
    const ratio = (is98 ? residuaryDelft1998(delft) : residuaryDelft2008(delft)).map((v) => Math.max(0, v));
    while (fn[fn.length - 1]! > 0.6 + 1e-9) {
      fn.pop();
      ratio.pop();
    }
    // A hull that does not plane goes on climbing its own wave: beyond the last row with the mean slope of the two
    // intervals before it (judgement). A hull that planes is taken over by the planing blend: its ratio is held.
    if (!options.planing) {
      const n = fn.length - 1;
      const slope = Math.max(0, (ratio[n]! - ratio[n - 2]!) / (fn[n]! - fn[n - 2]!));
      for (const beyond of [0.1, 0.4, 1, 2]) {
        fn.push(fn[n]! + beyond);
        ratio.push(ratio[n]! + beyond * slope);
      }
    }
    // Below the first row the waves fade faster than any table shows: the fourth power of Froude number (judgement).
    const f0 = fn[0]!;
    return pchip([0, 0.5 * f0, ...fn], [0, ratio[0]! * 0.5 ** 4, ...ratio]);
  })();
  const heel20 = pchip(
    [0, 0.2, ...DELFT_HEEL.Fn],
    [0, 0, ...heelResiduary20(delft).map((v) => Math.max(0, v))],
  );
  const keelWeight = keel ? keel.volume * water.density * gravity : 0;
  const keelUpright = keel
    ? pchip([0, 0.15, ...DELFT_KEEL.Fn], [0, 0, ...keelResiduary(delft, keel).map((v) => Math.max(0, v))])
    : undefined;
  const keelHeel = keel ? Math.max(0, keelHeelCoefficient(delft, keel.draft)) : 0;
  const measured = options.measured
    ? pchip([0, ...options.measured.speed], [0, ...options.measured.force])
    : undefined;

  // Parts over weight on the Froude grid.
  const friction = new Float64Array(FN_COUNT);
  const residuary = new Float64Array(FN_COUNT);
  const planing = new Float64Array(FN_COUNT);
  const heeling = new Float64Array(FN_COUNT);
  const keeling = new Float64Array(FN_COUNT);
  const transom = new Float64Array(FN_COUNT);
  // Share of friction that feels the heeled wetted area (none when planing), and Froude number squared, held at 0.6.
  const afloat = new Float64Array(FN_COUNT).fill(1);
  const square = Float64Array.from({ length: FN_COUNT }, (_, i) => Math.min(i * FN_STEP, 0.6) ** 2);
  const volumeScale = Math.sqrt(gravity * Math.cbrt(form.volume));
  const deadrise = Math.atan((4 * (1 - form.cm) * form.canoeDraft) / form.bwl) / DEG;
  const stern = p.x[0]!;
  const reach: readonly [number, number] = options.centreReach
    ? [options.centreReach[0] - stern, options.centreReach[1] - stern]
    : [load.x - stern, load.x - stern];
  let running = 0;
  const planingRange = planingRangeWatch();
  const roughness = options.roughness ?? 0;
  const lengthOverRoughness = (FRICTION_LENGTH * form.lwl) / roughness;
  for (let i = 0; i < FN_COUNT; i++) {
    const fn = i * FN_STEP;
    const v = fn * scale;
    const q = 0.5 * water.density * v * v;
    if (measured) {
      residuary[i] = measuredForce(measured, v) / weight;
    } else {
      const re = (v * FRICTION_LENGTH * form.lwl) / water.kinematicViscosity;
      friction[i] = (q * areas[0]! * frictionCoefficient(re, lengthOverRoughness)) / weight;
      residuary[i] = rr.value(fn);
      const displacement = friction[i]! + residuary[i]!;
      let total = displacement;
      let w = 0;
      if (options.planing) {
        w = planingShare(v / volumeScale);
        if (w > 0) {
          const s = leastPlaningDrag(
            {
              weight,
              beam: 0.9 * form.bwl,
              deadrise,
              speed: v,
              density: water.density,
              kinematicViscosity: water.kinematicViscosity,
              gravity,
              friction: (reynolds) =>
                frictionCoefficient(reynolds, (reynolds * water.kinematicViscosity) / (v * roughness)),
            },
            form.lwl,
            reach,
          );
          total = (1 - w) * displacement + (w * ROUND_BILGE_FACTOR * s.drag) / weight;
          planingRange.see(s);
        }
      }
      // A displacement hull's own curve may dip too where the table does: the running maximum holds for both.
      transom[i] =
        ((1 - w) * transomResistance(v, form.transom, form.bwl, form.cwp, water.density, gravity)) / weight;
      running = Math.max(running, total);
      planing[i] = running - displacement;
      heeling[i] = heel20.value(fn) * (1 - w);
      afloat[i] = 1 - w;
    }
    keeling[i] = keelUpright ? (keelUpright.value(fn) * keelWeight) / weight : 0;
  }
  const grid = Float64Array.from({ length: FN_COUNT }, (_, i) => i * FN_STEP);
  // The total is monotone; its parts are interpolated with the planing part as the rest, so that they add up to it.
  const totalUpright = friction.map((f, i) => f + residuary[i]! + planing[i]!);
  const slopes = {
    friction: pchipSlopes(grid, friction),
    residuary: pchipSlopes(grid, residuary),
    total: pchipSlopes(grid, totalUpright),
    heeling: pchipSlopes(grid, heeling),
    keeling: pchipSlopes(grid, keeling),
    afloat: pchipSlopes(grid, afloat),
    square: pchipSlopes(grid, square),
    transom: pchipSlopes(grid, transom),
  };
  const last = FN_COUNT - 1;
  const inverseStep = 1 / FN_STEP;
  const inverseWetted = 1 / areas[0]!;
  const rounding = 0.02;

  const resistanceInto = (speed: number, heel: number, out: Float64Array): number => {
    const fn = speed / scale;
    let i = Math.floor(fn * inverseStep);
    let t = fn * inverseStep - i;
    // Beyond the table along the tangent in Fn^2, so that value and slope go on without a step.
    let beyond = 0;
    if (i >= last) {
      beyond = (fn * fn - grid[last]! ** 2) / (2 * grid[last]!);
      i = last - 1;
      t = 1;
    } else if (i < 0) {
      i = 0;
      t = 0;
    }
    const plain = (y: Float64Array, d: Float64Array): number =>
      hermite(t, FN_STEP, y[i]!, y[i + 1]!, d[i]!, d[i + 1]!) + beyond * d[i + 1]!;
    const at = (y: Float64Array, d: Float64Array): number => weight * plain(y, d);
    const f = at(friction, slopes.friction);
    const r = at(residuary, slopes.residuary);
    const u = at(totalUpright, slopes.total);
    const smoothHeel = Math.sqrt(heel * heel + rounding * rounding) - rounding;
    out[HULL.friction] = f * (1 + plain(afloat, slopes.afloat) * (wettedBy.value(heel) * inverseWetted - 1));
    out[HULL.residuary] = r;
    out[HULL.planing] = u - f - r;
    out[HULL.transom] = at(transom, slopes.transom);
    out[HULL.heel] = at(heeling, slopes.heeling) * heelFactor(heel);
    out[HULL.keelResiduary] = at(keeling, slopes.keeling);
    out[HULL.keelHeel] = keelWeight * keelHeel * plain(square, slopes.square) * smoothHeel;
    return (
      out[HULL.friction]! +
      out[HULL.residuary]! +
      out[HULL.planing]! +
      out[HULL.heel]! +
      out[HULL.keelResiduary]! +
      out[HULL.keelHeel]! +
      out[HULL.transom]!
    );
  };

  return {
    form,
    canoe: body,
    warnings: [
      ...rangeWarnings(form, options, options.planing),
      ...(keel && keel.volume * water.density > keelMass
        ? [
            {
              method: 'buoyancy of the keel',
              parameter: 'share of the displacement',
              value: (keel.volume * water.density) / load.mass,
              range: [0, 0.5],
              treatment: 'held at half of the displacement',
            } as const,
          ]
        : []),
      ...planingRange.warnings(),
    ],
    heelMax: (HEEL_COUNT - 1) * HEEL_STEP,
    rightingArm: (heel) => righting.value(heel),
    wetted: (heel) => wettedBy.value(heel),
    resistanceInto,
  };
}

/**
 * Remembers how far planing states leave the range Savitsky 1964 gives for his formulas: trim 2 to 15 deg, mean wetted
 * length up to 4 beams, speed coefficient 0.6 to 13.
 */
function planingRangeWatch(): { see(s: PlaningState): void; warnings(): RangeWarning[] } {
  const watched = [
    { parameter: 'trim [deg]', low: 2, high: 15, of: (s: PlaningState) => s.trim },
    { parameter: 'wetted length/beam', low: 0, high: 4, of: (s: PlaningState) => s.lambda },
    { parameter: 'speed coefficient', low: 0.6, high: 13, of: (s: PlaningState) => s.cv },
  ].map((w) => ({ ...w, worst: 0, value: 0 }));
  return {
    see: (s) => {
      for (const w of watched) {
        const value = w.of(s);
        const off = Math.max(w.low - value, value - w.high);
        if (off > w.worst) {
          w.worst = off;
          w.value = value;
        }
      }
    },
    warnings: () =>
      watched
        .filter((w) => w.worst > 0)
        .map((w) => ({
          method: 'planing, Savitsky 1964',
          parameter: w.parameter,
          value: w.value,
          range: [w.low, w.high],
          treatment: 'computed outside its range at some planing speeds',
        })),
  };
}

/** A measured curve at a speed; beyond its last point in proportion to V^2. */
function measuredForce(curve: ReturnType<typeof pchip>, v: number): number {
  const n = curve.x.length - 1;
  const top = curve.x[n]!;
  return v <= top ? curve.value(v) : curve.y[n]! * (v / top) ** 2;
}
