import { assembleBoat, type Boat, type BoatSpec } from '../../src/boat/index.js';
import type { FoilSpec } from '../../src/foils/index.js';

function foil(f: FoilSpec, s: number): FoilSpec {
  return {
    ...f,
    span: f.span * s,
    chords: f.chords.map((c) => c * s),
    twin: f.twin && { ...f.twin, offset: f.twin.offset * s },
    bulb: f.bulb && { length: f.bulb.length * s, diameter: f.bulb.diameter * s },
    x: f.x * s,
    z: f.z * s,
  };
}

/**
 * A Froude-scaled copy of a boat: lengths times s, masses times s^3, viscosities times s^1.5, roughness of the sea and
 * height of the wind times s. Speeds must then scale by root s and angles stay.
 */
export function froudeScaled(boat: Boat, s: number): Boat {
  const b = boat.spec;
  const d = b.hull.dimensions;
  const wind =
    b.wind.kind === 'log'
      ? { ...b.wind, referenceHeight: b.wind.referenceHeight * s, roughness: b.wind.roughness * s }
      : { ...b.wind, referenceHeight: b.wind.referenceHeight * s };
  const spec: BoatSpec = {
    ...b,
    water: { ...b.water, kinematicViscosity: b.water.kinematicViscosity * s ** 1.5 },
    air: { ...b.air, kinematicViscosity: b.air.kinematicViscosity * s ** 1.5 },
    wind,
    hull: {
      ...b.hull,
      loa: b.hull.loa * s,
      crewReach: [b.hull.crewReach[0] * s, b.hull.crewReach[1] * s],
      dimensions: {
        ...d,
        lwl: d.lwl * s,
        bwl: d.bwl * s,
        canoeDraft: d.canoeDraft * s,
        freeboard: d.freeboard * s,
        beamMax: d.beamMax * s,
      },
    },
    weights: b.weights.map((w) => ({ ...w, mass: w.mass * s ** 3, x: w.x * s, z: w.z * s })),
    crew: {
      ...b.crew,
      mass: b.crew.mass * s ** 3,
      x: b.crew.x * s,
      z: b.crew.z * s,
      armOut: b.crew.armOut * s,
      armLee: b.crew.armLee * s,
      dragArea: b.crew.dragArea * s * s,
    },
    keel: foil(b.keel, s),
    rudder: foil(b.rudder, s),
    keelVolume: b.keelVolume * s ** 3,
    rig: {
      ...b.rig,
      mastX: b.rig.mastX * s,
      mastTop: b.rig.mastTop * s,
      mastDiameter: b.rig.mastDiameter * s,
      riggingArea: b.rig.riggingArea * s * s,
      boomHeight: b.rig.boomHeight * s,
      boomLength: b.rig.boomLength * s,
      mizzen: b.rig.mizzen && {
        x: b.rig.mizzen.x * s,
        top: b.rig.mizzen.top * s,
        diameter: b.rig.mizzen.diameter * s,
      },
    },
    sails: b.sails.map((x) => ({
      ...x,
      z: x.z.map((v) => v * s),
      chord: x.chord.map((v) => v * s),
      xLead: x.xLead.map((v) => v * s),
    })),
    measuredRigs: b.measuredRigs.map((r) => ({
      ...r,
      area: r.area * s * s,
      x: r.x * s,
      height: r.height.map((h) => h * s),
      effectiveHeight: r.effectiveHeight * s,
    })),
  };
  return assembleBoat({ spec, estimates: [] });
}

/** The same boat with water, air and all masses c times as dense and heavy: nothing may change. */
export function densityScaled(boat: Boat, c: number): Boat {
  const b = boat.spec;
  return assembleBoat({
    spec: {
      ...b,
      water: { ...b.water, density: b.water.density * c },
      air: { ...b.air, density: b.air.density * c },
      weights: b.weights.map((w) => ({ ...w, mass: w.mass * c })),
      crew: { ...b.crew, mass: b.crew.mass * c },
    },
    estimates: [],
  });
}
