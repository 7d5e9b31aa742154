import { parseQuantity } from "../../lib/quantity/parse_quantity.ts";
import { resolveUnit } from "../../lib/quantity/unit.ts";
import type { DeclaredField } from "../show/payload.ts";
import type { Field } from "./field.ts";
import { NAME } from "./revision.ts";

/** What a template asks for, as data: it travels from the kernel to the report. */
export interface Declaration {
  readonly template: string;
  readonly fields: readonly DeclaredField[];
}

/**
 * Turns the fields of a template's `sheet(...)` into data in SI units.
 *
 * @throws {TypeError} when a name, unit or question is not usable
 * @throws {RangeError} when bounds exclude everything
 * @throws {SyntaxError} when a bound or a fixed value cannot be read
 */
export function declarationOf(
  template: string,
  fields: Readonly<Record<string, Field>>,
): Declaration {
  if (!NAME.test(template)) {
    throw new TypeError(
      `Cannot declare a sheet: template must be a name such as bias_selection, got "${template}"`,
    );
  }
  return {
    template,
    fields: Object.entries(fields).map(([name, field]) => {
      try {
        return declaredField(name, field);
      } catch (error) {
        if (!(error instanceof Error)) throw error;
        error.message = `Cannot declare the field ${name} of ${template}: ${error.message}`;
        throw error;
      }
    }),
  };
}

function declaredField(name: string, field: Field): DeclaredField {
  const { unit, question } = field;
  if (!NAME.test(name)) {
    throw new TypeError(`its name must be lower case words joined by underscores, got "${name}"`);
  }
  if (!(question?.trim().length > 0)) throw new TypeError("question must be a text, got none");
  if (field.kind === "fixed") {
    if (!(field.reason?.trim().length > 0)) throw new TypeError("reason must be a text, got none");
    const value = unit === "word" ? field.value : parseQuantity(field.value, unit);
    const { reason } = field;
    return { name, kind: "fixed", unit, question, value, written: field.value, reason };
  }
  if (unit === "word") {
    if (!((field.options?.length ?? 0) > 0)) {
      throw new TypeError("options must name at least one word, got none");
    }
    return { name, kind: "choice", unit, question, options: field.options! };
  }
  const atLeast = field.atLeast === undefined ? undefined : parseQuantity(field.atLeast, unit);
  const atMost = field.atMost === undefined ? undefined : parseQuantity(field.atMost, unit);
  // Reading a unit the author misspelt fails here and not at the first revision.
  if (atLeast === undefined && atMost === undefined) resolveUnit(unit);
  if (atLeast !== undefined && atMost !== undefined && !(atLeast <= atMost)) {
    throw new RangeError(
      `atLeast must be <= atMost, got "${field.atLeast}" and "${field.atMost}"`,
    );
  }
  return {
    name,
    kind: "choice",
    unit,
    question,
    ...(atLeast === undefined ? {} : { atLeast }),
    ...(atMost === undefined ? {} : { atMost }),
  };
}
