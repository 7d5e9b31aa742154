import { CARD_FIELDS } from "./_card_fields.ts";
import { type DataOf, fileName, type Group, isGroup, type QuantityField } from "./_card_shape.ts";
import type { Shape } from "./_card_shape.ts";

/** What the design needs to know about a process, in SI units. */
export type TechnologyCard = DataOf<typeof CARD_FIELDS>;

/** One transistor of a card: a kind (n or p) in a flavour. */
export type CardTransistor = TechnologyCard["transistors"][number];

/** A figure that must not be exceeded and where it comes from. */
export type CardLimit = TechnologyCard["limits"]["gateSourceVoltage"];

/**
 * Reads the text of one quantity.
 *
 * @param text number and unit
 * @param unit unit of the value asked for
 * @param path place of the field in the card, for a message
 * @returns value in SI
 */
export type ParseCardQuantity = (text: string, unit: string, path: string) => number;

/**
 * Turns the data of a card file into a card with SI numbers, and checks every field.
 *
 * Names in the file are in snake_case. Every quantity is a text with a unit.
 *
 * @param data what the file holds after YAML or JSON has been read
 * @param parse reads one quantity; what it throws is passed on as it is
 * @throws {TypeError} when a field is missing, unknown or of the wrong kind
 * @throws {RangeError} when a value is out of range, a corner order or a range is upside down, or a
 *   transistor appears twice
 */
export function technologyCardFrom(data: unknown, parse: ParseCardQuantity): TechnologyCard {
  const card = readGroup(data, CARD_FIELDS, { path: "", parse }) as unknown as TechnologyCard;
  for (const name of ["supply", "temperature"] as const) {
    const { lowest, nominal, highest } = card[name];
    if (!(lowest <= nominal && nominal <= highest)) {
      throw cardError(
        RangeError,
        name,
        "lowest <= nominal <= highest",
        `${lowest}, ${nominal}, ${highest}`,
      );
    }
  }
  const seen = new Set<string>();
  for (const [i, { kind, flavour, slopeFactor, junction }] of card.transistors.entries()) {
    const path = `transistors[${i}]`;
    if (seen.has(`${kind} ${flavour}`)) {
      throw cardError(RangeError, path, "each kind and flavour once", `${kind} ${flavour} again`);
    }
    seen.add(`${kind} ${flavour}`);
    if (!(slopeFactor >= 1)) {
      throw cardError(RangeError, `${path}.slope_factor`, "a number >= 1", `${slopeFactor}`);
    }
    if (!(junction.grading < 1)) {
      throw cardError(
        RangeError,
        `${path}.junction.grading`,
        "a number < 1",
        `${junction.grading}`,
      );
    }
  }
  checkCapacitors(card);
  return card;
}

function checkCapacitors({ varactors, capacitorBank }: TechnologyCard): void {
  const { junction, accumulation } = varactors ?? {};
  if (junction && !(junction.grading < 1)) {
    throw cardError(
      RangeError,
      "varactors.junction.grading",
      "a number < 1",
      `${junction.grading}`,
    );
  }
  if (accumulation) {
    const { minimumCapacitance: least, maximumCapacitance: most } = accumulation;
    if (!(least <= most)) {
      throw cardError(
        RangeError,
        "varactors.accumulation",
        "minimum_capacitance <= maximum_capacitance",
        `${least}, ${most}`,
      );
    }
  }
  if (capacitorBank && !(capacitorBank.plateFraction < 1)) {
    throw cardError(
      RangeError,
      "capacitor_bank.plate_fraction",
      "a number < 1",
      `${capacitorBank.plateFraction}`,
    );
  }
}

interface Place {
  readonly path: string;
  readonly parse: ParseCardQuantity;
}

function readGroup(data: unknown, group: Group, place: Place): Record<string, unknown> {
  if (typeof data !== "object" || data === null || Array.isArray(data)) {
    throw cardError(TypeError, place.path || "the card", "a set of named fields", describe(data));
  }
  const entries = data as Record<string, unknown>;
  const known = new Map(Object.keys(group).map((name) => [fileName(name), name]));
  for (const name of Object.keys(entries)) {
    if (known.has(name)) continue;
    throw cardError(
      TypeError,
      join(place.path, name),
      `one of ${[...known.keys()].join(", ")}`,
      `"${name}"`,
    );
  }
  const result: Record<string, unknown> = {};
  for (const [written, name] of known) {
    const path = join(place.path, written);
    const shape = group[name]!;
    if (!isGroup(shape) && shape.field === "optional" && !Object.hasOwn(entries, written)) {
      result[name] = undefined;
      continue;
    }
    if (!Object.hasOwn(entries, written)) {
      throw cardError(TypeError, path, "a value", "no such field");
    }
    result[name] = readShape(entries[written], shape, { ...place, path });
  }
  return result;
}

function readShape(data: unknown, shape: Shape, place: Place): unknown {
  if (isGroup(shape)) return readGroup(data, shape, place);
  switch (shape.field) {
    case "quantity":
      return readQuantity(data, shape, place);
    case "text":
      if (typeof data === "string" && data.trim() !== "") return data;
      throw cardError(TypeError, place.path, "a text", describe(data));
    case "flag":
      if (typeof data === "boolean") return data;
      throw cardError(TypeError, place.path, "true or false", describe(data));
    case "word":
      if (shape.words.some((known) => known === data)) return data;
      throw cardError(TypeError, place.path, `one of ${shape.words.join(", ")}`, describe(data));
    case "optional":
      return readGroup(data, shape.of, place);
    case "list":
      if (Array.isArray(data) && data.length > 0) {
        return data.map((item, i) =>
          readGroup(item, shape.of, { ...place, path: `${place.path}[${i}]` })
        );
      }
      throw cardError(TypeError, place.path, "a list with at least one entry", describe(data));
  }
}

function readQuantity(data: unknown, { unit, range }: QuantityField, place: Place): number {
  const { path, parse } = place;
  if (typeof data !== "string") {
    const wanted = unit === "1"
      ? `a number in quotes such as "1.2"`
      : `a text with a unit (${unit})`;
    throw cardError(TypeError, path, wanted, describe(data));
  }
  const value = parse(data, unit, path);
  if (range === "positive" && !(value > 0)) {
    throw cardError(RangeError, path, `a value > 0 ${unit}`, `"${data}"`);
  }
  if (range === "not negative" && !(value >= 0)) {
    throw cardError(RangeError, path, `a value >= 0 ${unit}`, `"${data}"`);
  }
  return value;
}

function cardError(
  kind: new (message: string) => Error,
  path: string,
  wanted: string,
  found: string,
): Error {
  return new kind(`Cannot read the technology card: ${path}: expected ${wanted}, got ${found}`);
}

function describe(data: unknown): string {
  if (data === null || data === undefined) return "nothing";
  if (Array.isArray(data)) return "a list";
  if (typeof data === "object") return "a set of fields";
  return typeof data === "string" ? `"${data}"` : String(data);
}

function join(path: string, name: string): string {
  return path === "" ? name : `${path}.${name}`;
}
