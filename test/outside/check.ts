/**
 * One comparison with something outside this project. The same list feeds the test gate
 * (`outside.test.ts`) and the printed table (`npm run accuracy`).
 */
export interface OutsideCheck {
  /** Publication, data set, or "exact: ..." for a closed form; says "from memory" where the number was recalled. */
  readonly source: string;
  readonly quantity: string;
  /** Outermost acceptable error, in the unit of `errorUnit`. Just above what is reached, with its cause in `note`. */
  readonly tolerance: number;
  readonly errorUnit: string;
  readonly note?: string;
  /** A band nobody can be held to exactly is printed but does not fail the tests: say why in `note`. */
  readonly printOnly?: boolean;
  /** Print the name of every case beside the quantity. */
  readonly showCases?: boolean;
  readonly run: () => readonly OutsideCase[];
}

export interface OutsideCase {
  readonly name: string;
  readonly expected: number | readonly [number, number];
  readonly got: number;
  /** Absolute value of the error in `errorUnit`; for a band, the distance outside it (0 inside). */
  readonly error: number;
}

/** A case whose error is |got - expected|, in the unit of both. */
export function absolute(name: string, expected: number, got: number): OutsideCase {
  return { name, expected, got, error: Math.abs(got - expected) };
}

/** A case whose error is relative, as a fraction of the expected value. */
export function relative(name: string, expected: number, got: number): OutsideCase {
  return { name, expected, got, error: Math.abs(got / expected - 1) };
}

/** A case with a band: the error is the distance outside it. */
export function band(name: string, expected: readonly [number, number], got: number): OutsideCase {
  return { name, expected, got, error: Math.max(0, expected[0] - got, got - expected[1]) };
}
