import type { Fluid, WindProfile } from '../environment/index.js';
import type { FoilSpec, FoilSystem } from '../foils/index.js';
import type { Hull, Lines, MainDimensions, RangeWarning, ResiduaryMethod } from '../hull/index.js';
import type { CoefficientTable, SailSet, SailShape } from '../sails/index.js';

/** One part of the boat's weight, without the crew. */
export interface WeightItem {
  readonly name: string;
  readonly mass: number;
  readonly x: number;
  readonly z: number;
}

/** The crew as one body. Arms in m from the centreline, positive to windward. */
export interface CrewSpec {
  readonly count: number;
  readonly mass: number;
  readonly x: number;
  /** Height of the crew's centre above the waterline, sitting. */
  readonly z: number;
  /** Arm of the crew's common centre fully out, and its limit to leeward (negative). */
  readonly armOut: number;
  readonly armLee: number;
  readonly style: 'hiking' | 'trapeze' | 'rail';
  /** Drag area [m2] of the whole crew. */
  readonly dragArea: number;
}

/** Waves with a user's own added resistance, R = coefficient rho g Bwl^2/Lwl Hs^2, waves running with the wind. */
export interface WavesSpec {
  /** Significant height [m] in every wind; or the fetch [m] from which it grows with the wind. */
  readonly height?: number | undefined;
  readonly fetch?: number | undefined;
  /** Peak period [s] where it is given; otherwise that of the fetch. */
  readonly period?: number | undefined;
  /** By period [s] rising (one table without a period: for all): true wind angles [rad] rising, and coefficients. */
  readonly tables: readonly {
    readonly period?: number | undefined;
    readonly twa: readonly number[];
    readonly coefficient: readonly number[];
  }[];
}

/** Everything the boat file says, in SI and body axes, with estimates filled in. Plain data. */
export interface BoatSpec {
  readonly name: string;
  readonly note: string;
  readonly water: Fluid & { readonly name: string };
  readonly air: Fluid;
  readonly wind:
    | { readonly kind: 'log'; readonly referenceHeight: number; readonly roughness: number }
    | { readonly kind: 'power'; readonly referenceHeight: number; readonly exponent: number };
  readonly gravity: number;
  readonly hull: {
    readonly dimensions: MainDimensions;
    /** Lines as given; left out: generated from the dimensions. */
    readonly lines?: Lines | undefined;
    readonly loa: number;
    readonly planing: boolean;
    readonly residuary: ResiduaryMethod;
    /** Height [m] of sand roughness on the hull; 0 smooth. */
    readonly roughness: number;
    readonly measured?: { readonly speed: readonly number[]; readonly force: readonly number[] } | undefined;
    /** x reach of the crew's centre, aft-most and foremost. */
    readonly crewReach: readonly [number, number];
  };
  readonly weights: readonly WeightItem[];
  readonly crew: CrewSpec;
  readonly keel: FoilSpec;
  /** Volume of a ballasted fin with its bulb, 0 for a board. */
  readonly keelVolume: number;
  readonly boardRange: readonly [number, number];
  readonly rudder: FoilSpec;
  readonly rig: {
    readonly mastX: number;
    readonly mastTop: number;
    readonly mastDiameter: number;
    /** Total drag-relevant length * diameter [m2] of shrouds and stays. */
    readonly riggingArea: number;
    readonly boomLimit: number;
    readonly boomHeight: number;
    readonly boomLength: number;
    /** Drag coefficient of the bare mast section. */
    readonly mastDrag: number;
    readonly mizzen?: { readonly x: number; readonly top: number; readonly diameter: number } | undefined;
  };
  readonly sails: readonly SailShape[];
  readonly sailSets: readonly { readonly name: string; readonly sails: readonly string[] }[];
  /** Sail sets known by their coefficients. */
  readonly measuredRigs: readonly (CoefficientTable & { readonly windageIncluded: boolean })[];
  /** Left out: flat water. */
  readonly waves?: WavesSpec | undefined;
  readonly limits: {
    /** Largest heel [rad] the crew accept. */
    readonly heel: number;
    /** Largest rudder angle [rad]. */
    readonly rudder: number;
  };
}

/** A value that was not in the file. */
export interface Estimate {
  /** Key in the boat file, such as `hull.prismatic`. */
  readonly key: string;
  readonly value: string;
  readonly rule: string;
}

/** A boat assembled for computing. Immutable but for the sail sets' private workspaces. */
export interface Boat {
  readonly spec: BoatSpec;
  readonly lines: Lines;
  readonly hull: Hull;
  readonly foils: FoilSystem;
  readonly sailSets: readonly SailSet[];
  readonly wind: WindProfile;
  /** Mass with crew [kg]; its centre with the crew inboard. */
  readonly mass: number;
  readonly centre: { readonly x: number; readonly z: number };
  readonly estimates: readonly Estimate[];
  readonly warnings: readonly RangeWarning[];
}
