import type { DeclaredField } from "../show/payload.ts";
import type { Declaration } from "./declaration.ts";
import { boundsText } from "./fill_sheet.ts";

/** A JSON Schema as data. */
export type JsonSchema = { readonly [key: string]: unknown };

const TEXT: JsonSchema = { type: "string", minLength: 1 };
const DATE: JsonSchema = { type: "string", pattern: "^\\d{4}-\\d{2}-\\d{2}$" };

/**
 * JSON Schema (draft 7, which editors know best) of the revisions of these templates. It helps while
 * typing; units and bounds are checked by `report`.
 */
export function revisionSchema(declarations: readonly Declaration[]): JsonSchema {
  const choices = openChoices(declarations);
  return {
    $schema: "http://json-schema.org/draft-07/schema#",
    title: "Tankwright revision",
    type: "object",
    additionalProperties: false,
    required: ["design", "revision", "author", "review_date", "card", "templates", "fields"],
    properties: {
      design: { ...TEXT, description: "Name of the design" },
      revision: {
        type: ["string", "integer"],
        description: "Letter or number of the revision",
      },
      author: { ...TEXT, description: "Who filled the sheet" },
      review_date: {
        ...DATE,
        description: "Day of the review, YYYY-MM-DD; waivers expire against it",
      },
      card: { ...TEXT, description: "Technology card, relative to this file" },
      templates: {
        type: "array",
        minItems: 1,
        uniqueItems: true,
        items: { enum: declarations.map(({ template }) => template) },
        description: "Templates to render, in order",
      },
      fields: {
        type: "object",
        additionalProperties: false,
        required: choices.map(({ field }) => field.name),
        properties: Object.fromEntries(
          choices.map(({ field, templates }) => [field.name, fieldSchema(field, templates)]),
        ),
      },
      waivers: { type: "array", items: WAIVER_SCHEMA },
    },
  };
}

const WAIVER_SCHEMA: JsonSchema = {
  type: "object",
  additionalProperties: false,
  required: ["template", "verdict", "reason", "by", "expires"],
  properties: { template: TEXT, verdict: TEXT, reason: TEXT, by: TEXT, expires: DATE },
};

function fieldSchema(field: DeclaredField, templates: readonly string[]): JsonSchema {
  const unit = field.unit === "1" || field.unit === "word" ? "" : `in ${field.unit}`;
  const asked = [unit, boundsText(field)].filter((part) => part !== "").join(", ");
  return {
    type: "object",
    additionalProperties: false,
    required: ["value", "reason"],
    description: `${field.question}${asked === "" ? "" : ` (${asked})`} [${templates.join(", ")}]`,
    properties: {
      value: field.unit === "word"
        ? { enum: field.options }
        : field.unit === "1"
        ? { type: ["string", "number"] }
        : TEXT,
      reason: TEXT,
      estimate: TEXT,
    },
  };
}

/** An open choice once, with every template that asks for it. */
export interface OpenChoice {
  readonly field: DeclaredField;
  readonly templates: readonly string[];
}

/** Choices of several templates by name, in order of declaration. */
export function openChoices(declarations: readonly Declaration[]): readonly OpenChoice[] {
  const found = new Map<string, { field: DeclaredField; templates: string[] }>();
  for (const { template, fields } of declarations) {
    for (const field of fields) {
      if (field.kind !== "choice") continue;
      const known = found.get(field.name);
      if (known === undefined) found.set(field.name, { field, templates: [template] });
      else known.templates.push(template);
    }
  }
  return [...found.values()];
}
