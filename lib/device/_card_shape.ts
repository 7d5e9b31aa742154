/**
 * The grammar in which the fields of a card are written down once: from it follow the TypeScript type,
 * the conversion of the data and the check against the schema file.
 *
 * @module
 */

/** A number written as a text with a unit. */
export interface QuantityField {
  readonly field: "quantity";
  /** Unit of the SI value, as the parser takes it. */
  readonly unit: string;
  /** Range the SI value must lie in. */
  readonly range: "any" | "positive" | "not negative";
}

/** A line of text. */
export interface TextField {
  readonly field: "text";
}

/** One word of a list. */
export interface WordField<W extends string = string> {
  readonly field: "word";
  readonly words: readonly W[];
}

/** A literal true or false. */
export interface FlagField {
  readonly field: "flag";
}

/** A list of groups of the same fields. */
export interface ListField<G extends Group = Group> {
  readonly field: "list";
  readonly of: G;
}

/** A group that a card may leave out. */
export interface OptionalGroup<G extends Group = Group> {
  readonly field: "optional";
  readonly of: G;
}

/** Named fields; names are in camelCase here and in snake_case in the file. */
export interface Group {
  readonly [name: string]: Shape;
}

/** Anything a field can be. */
export type Shape =
  | QuantityField
  | TextField
  | WordField
  | FlagField
  | ListField
  | OptionalGroup
  | Group;

/** The TypeScript type of the data that a shape describes. */
export type DataOf<S> = S extends QuantityField ? number
  : S extends TextField ? string
  : S extends WordField<infer W> ? W
  : S extends FlagField ? boolean
  : S extends ListField<infer G> ? readonly DataOf<G>[]
  : S extends OptionalGroup<infer G> ? DataOf<G> | undefined
  : { readonly [K in keyof S]: DataOf<S[K]> };

/** A quantity > 0. */
export function positive(unit: string): QuantityField {
  return { field: "quantity", unit, range: "positive" };
}

/** A quantity >= 0. */
export function notNegative(unit: string): QuantityField {
  return { field: "quantity", unit, range: "not negative" };
}

/** A quantity of either sign. */
export function signed(unit: string): QuantityField {
  return { field: "quantity", unit, range: "any" };
}

/** A line of text. */
export const text: TextField = { field: "text" };

/** True or false. */
export const flag: FlagField = { field: "flag" };

/** One of `words`. */
export function word<const W extends string>(...words: W[]): WordField<W> {
  return { field: "word", words };
}

/** A list of groups. */
export function list<const G extends Group>(of: G): ListField<G> {
  return { field: "list", of };
}

/** A group that may be left out. */
export function optional<const G extends Group>(of: G): OptionalGroup<G> {
  return { field: "optional", of };
}

/** True when a shape is a group and not a single field. */
export function isGroup(shape: Shape): shape is Group {
  return typeof (shape as { field?: unknown }).field !== "string";
}

/** The name of a field in the file: `slopeFactor` is written `slope_factor`. */
export function fileName(name: string): string {
  return name.replaceAll(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`);
}
