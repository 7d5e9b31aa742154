import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import type { DeclaredField } from "../show/payload.ts";
import type { Declaration } from "./declaration.ts";
import { boundsText } from "./fill_sheet.ts";
import { openChoices } from "./revision_schema.ts";

/** Options of {@linkcode blankRevision}. */
export interface BlankRevisionOptions {
  /** Name of the design. */
  readonly design: string;
  /** Letter or number of the revision. */
  readonly revision: string;
  /** Technology card, relative to the revision file. */
  readonly card: string;
  /** JSON Schema for editors, relative to the revision file. */
  readonly schema: string;
}

/**
 * The text of a revision in which every open choice is a commented line, under its question, unit and
 * bounds; what the lead has fixed is listed at the end.
 */
export function blankRevision(
  declarations: readonly Declaration[],
  { design, revision, card, schema }: BlankRevisionOptions,
): string {
  const choices = openChoices(declarations);
  const lines = [
    `# yaml-language-server: $schema=${schema}`,
    "# To fill in: author, review_date, and each choice below. Take the # away in front of a choice,",
    "# then write its value with its unit, and the reason. An estimate by hand is optional:",
    '#   supply_voltage: { value: "1.0 V", reason: "...", estimate: "..." }',
    "",
    `design: ${JSON.stringify(design)}`,
    `revision: ${revision}`,
    "author:",
    "review_date:  # as in 2026-11-16; waivers expire against it",
    `card: ${JSON.stringify(card)}`,
    `templates: [${declarations.map(({ template }) => template).join(", ")}]`,
    "",
    "fields:",
    ...choices.flatMap(({ field, templates }) => [
      `  # ${oneLine(field.question)}`,
      `  # ${askedFor(field)} (${templates.join(", ")})`,
      `  # ${field.name}: { value: "", reason: "" }`,
      "",
    ]),
    ...fixedLines(declarations),
    "# A verdict that the lead lets pass until a date:",
    "# waivers:",
    '#   - { template: "", verdict: "", reason: "", by: "", expires: 2027-01-31 }',
  ];
  return `${lines.join("\n")}\n`;
}

function askedFor(field: DeclaredField): string {
  if (field.unit === "word") return `one of ${field.options!.join(", ")}`;
  const unit = field.unit === "1" ? "a pure number" : field.unit;
  return [unit, boundsText(field)].filter((part) => part !== "").join(", ");
}

function fixedLines(declarations: readonly Declaration[]): readonly string[] {
  const lines = declarations.flatMap(({ template, fields }) =>
    fields.filter(({ kind }) => kind === "fixed").map(({ name, value, unit, reason }) => {
      const text = typeof value === "number" ? formatQuantity(value, unit, { digits: 12 }) : value;
      return `#   ${name}: ${text} (${template}: ${oneLine(reason ?? "")})`;
    })
  );
  return lines.length === 0
    ? []
    : ["# Fixed by the templates, not to be written here:", ...lines, ""];
}

function oneLine(text: string): string {
  return text.replaceAll(/\s+/g, " ").trim();
}
