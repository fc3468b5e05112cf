/** What has to stand beside every prediction. */
export const CAUTIONS: readonly string[] = [
  'A predicted speed is no judgement of stability, strength or safety: it says nothing about whether a boat, a crew or a rig is fit to be out in that wind.',
  'Flat water is assumed, without waves, current, gusts or shallow water, and a crew that sails without mistakes.',
  'Local rules, the rules of the class or event and the advice of people licensed or qualified in naval architecture and seamanship come before anything printed here.',
];

/** How far an uncalibrated prediction can be trusted. */
export interface ErrorBand {
  readonly where: string;
  /** Share of boat speed, as text. */
  readonly band: string;
}

/**
 * Error bands of uncalibrated predictions of this kind: common practice, from published comparisons of predictions
 * with boats. They are not measured on the boat at hand.
 */
export const ERROR_BANDS: readonly ErrorBand[] = [
  { where: 'upwind', band: '6 %' },
  { where: 'reaching, not planing', band: '8 %' },
  { where: 'planing, or under spinnaker', band: '15 to 20 %' },
  { where: 'wind below 5 kn, any course', band: '15 %' },
];

export const ERROR_BANDS_SOURCE =
  'Common practice, from published comparisons of uncalibrated predictions with boats; not measured on this boat. ' +
  'Differences between two versions of one boat are surer than the speeds themselves.';

/** One published method the figures rest on. */
export interface Method {
  readonly part: string;
  readonly method: string;
  readonly source: string;
}

/** What is computed how, and where it is published. */
export const METHODS: readonly Method[] = [
  {
    part: 'wind',
    method: 'logarithmic or power-law profile over height; apparent wind in the plane square to the mast',
    source: 'Kerwin 1978 (from memory)',
  },
  {
    part: 'sails',
    method:
      'the loading over height of all sails together that gives most drive for each heeling moment, within what a sail section can carry; induced drag from the wake, with the sea surface as mirror',
    source: 'Munk 1921, Jones 1950; separated flow after Viterna and Corrigan 1981 (years from memory)',
  },
  {
    part: 'foils',
    method: 'lifting line on the planform with the hull as mirror; rudder in the downwash of keel or board',
    source:
      'Weissinger 1947; Whicker and Fehlner 1958 as a check; Keuning, Katgert and Vermeulen 2006; Hoerner 1965 for section drag (years from memory)',
  },
  {
    part: 'hull',
    method:
      'friction line on 0.7 of the waterline length; residuary resistance from regressions on tank tests; planing from a prismatic surface, blended in over speed',
    source: 'ITTC 1957; Delft Systematic Yacht Hull Series, 1998 and 2008; Savitsky 1964',
  },
  {
    part: 'equilibrium',
    method:
      'drive, side force, heeling and yawing moment balance; heel, easing of the sails and the crew are chosen for most speed by sequential quadratic programming; best VMG is a root on that solution',
    source: 'own work on textbook methods',
  },
];
