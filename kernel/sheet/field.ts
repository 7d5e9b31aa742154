/** A field that the lead's template leaves open. */
export interface Choice<V extends number | string = number | string> {
  readonly kind: "choice";
  readonly unit: string;
  readonly question: string;
  readonly atLeast?: string;
  readonly atMost?: string;
  readonly options?: readonly string[];
  /** Type of the filled value; no value at run time. */
  readonly type?: V;
}

/** A field that the lead has fixed. */
export interface Fixed<V extends number | string = number | string> {
  readonly kind: "fixed";
  readonly unit: string;
  readonly value: string;
  readonly question: string;
  readonly reason: string;
  /** Type of the value; no value at run time. */
  readonly type?: V;
}

/** One field of a sheet. */
export type Field<V extends number | string = number | string> = Choice<V> | Fixed<V>;

/** The values of a set of fields: numbers in SI, words for fields of unit "word". */
export type FieldValues<F extends Readonly<Record<string, Field>>> = {
  readonly [K in keyof F]: F[K] extends Field<infer V> ? V : never;
};

/** Options of {@linkcode choice} for a quantity. */
export interface QuantityChoiceOptions {
  /** What the person filling it in is asked. */
  readonly question: string;
  /** Least value allowed, with unit. */
  readonly atLeast?: string;
  /** Greatest value allowed, with unit. */
  readonly atMost?: string;
}

/** Options of {@linkcode choice} for a word. */
export interface WordChoiceOptions<W extends string> {
  /** What the person filling it in is asked. */
  readonly question: string;
  /** The words to choose from. */
  readonly options: readonly W[];
}

/**
 * An open field: a quantity within bounds, or one of a few words. The revision gives value and reason.
 *
 * @param unit unit of the quantity (`"1"` for a pure number), or `"word"`
 */
export function choice<const W extends string>(
  unit: "word",
  options: WordChoiceOptions<W>,
): Choice<W>;
export function choice(unit: string, options: QuantityChoiceOptions): Choice<number>;
export function choice(
  unit: string,
  options: QuantityChoiceOptions | WordChoiceOptions<string>,
): Choice {
  return { kind: "choice", unit, ...options };
}

/** Options of {@linkcode fixed}. */
export interface FixedOptions {
  /** What the field sets. */
  readonly question: string;
  /** Why the lead fixed it so. */
  readonly reason: string;
}

/**
 * A field that a revision may not change.
 *
 * @param unit unit of the quantity (`"1"` for a pure number), or `"word"`
 * @param value the lead's value, with unit
 */
export function fixed<const W extends string>(
  unit: "word",
  value: W,
  options: FixedOptions,
): Fixed<W>;
export function fixed(unit: string, value: string, options: FixedOptions): Fixed<number>;
export function fixed(unit: string, value: string, options: FixedOptions): Fixed {
  return { kind: "fixed", unit, value, ...options };
}
