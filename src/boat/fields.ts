import type { QuantityKind } from '../units/index.js';

/**
 * The small language in which the boat file is defined: each key with its kind, allowed range, what happens when it
 * is missing, a description and a hint. Reading, checking, the starter file and the JSON Schema all walk this tree.
 */
interface Common {
  readonly describe: string;
  /** Shown with an error at this key. */
  readonly hint?: string;
  /** `required`; or the rule by which a missing value is found, with its source; or nothing: simply absent. */
  readonly missing?: 'required' | { readonly rule: string };
  /** A required key may be left out when this key stands beside it. */
  readonly unless?: string;
}

export interface QuantityField extends Common {
  readonly type: 'quantity';
  readonly kind: QuantityKind;
  /** Allowed range in the unit a bare number of the kind is taken in. */
  readonly range: readonly [number, number];
}

export interface CountField extends Common {
  readonly type: 'count';
  readonly range: readonly [number, number];
}

export interface ChoiceField extends Common {
  readonly type: 'choice';
  readonly choices: readonly string[];
}

export interface YesNoField extends Common {
  readonly type: 'yes-no';
}

export interface TextField extends Common {
  readonly type: 'text';
  readonly longest: number;
}

/** Keys and values that differ from the file's own; read by `variants.ts`. */
export interface DifferencesField extends Common {
  readonly type: 'differences';
}

/** Fixed keys. */
export interface SectionField extends Common {
  readonly type: 'section';
  readonly keys: Readonly<Record<string, Field>>;
}

/** Free names, each with the same kind of entry. */
export interface NamedField extends Common {
  readonly type: 'named';
  readonly entry: Field;
  readonly count: readonly [number, number];
}

export interface ListField extends Common {
  readonly type: 'list';
  readonly entry: Field;
  readonly count: readonly [number, number];
}

export type Field =
  | QuantityField
  | CountField
  | ChoiceField
  | YesNoField
  | TextField
  | SectionField
  | NamedField
  | ListField
  | DifferencesField;

/** What reading a field yields: quantities in SI and rad. */
export type ValueOf<F> = F extends { type: 'quantity' | 'count' }
  ? number
  : F extends { type: 'choice'; choices: readonly (infer C)[] }
    ? C
    : F extends { type: 'yes-no' }
      ? boolean
      : F extends { type: 'text' }
        ? string
        : F extends { type: 'section'; keys: infer K }
          ? SectionValue<K>
          : F extends { type: 'named'; entry: infer E }
            ? Readonly<Record<string, ValueOf<E>>>
            : F extends { type: 'list'; entry: infer E }
              ? readonly ValueOf<E>[]
              : never;

type RequiredKeys<K> = {
  [P in keyof K]: K[P] extends { missing: 'required' } ? P : never;
}[keyof K];

type SectionValue<K> = { readonly [P in RequiredKeys<K>]: ValueOf<K[P]> } & {
  readonly [P in Exclude<keyof K, RequiredKeys<K>>]?: ValueOf<K[P]> | undefined;
};
