import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { parseQuantity } from "../../lib/quantity/parse_quantity.ts";
import type { DeclaredField } from "../show/payload.ts";
import type { Declaration } from "./declaration.ts";
import { perhaps } from "./_nearest.ts";
import type { Problem } from "./problem.ts";
import { fieldPath, type RevisionField, type RevisionFile } from "./revision.ts";

/** A declared field with what the revision put into it. */
export interface FilledField extends DeclaredField {
  /** As the revision (or the lead) wrote it, "1.2 nH". */
  readonly text: string;
  /** Reason the revision gives for a choice. */
  readonly why?: string;
  /** Hand estimate the revision gives. */
  readonly estimate?: string;
}

/** A sheet with a revision put into it. */
export interface FilledSheet {
  /** Value by field name: SI, or a word; without the fields that have a problem. */
  readonly values: Readonly<Record<string, number | string>>;
  readonly filled: readonly FilledField[];
  /** Empty when every field could be filled. */
  readonly problems: readonly Problem[];
}

/** Digits that write back a fixed value as the lead wrote it: 0.9 and not 0.90000000000000002. */
const FIXED_DIGITS = 12;

/**
 * Puts a revision into one template's sheet. Fields that the sheet does not declare are left to
 * {@linkcode checkRevision}, since another template of the revision may declare them.
 */
export function fillSheet(declaration: Declaration, file: RevisionFile): FilledSheet {
  const values: [string, number | string][] = [];
  const filled: FilledField[] = [];
  const problems: Problem[] = [];
  for (const field of declaration.fields) {
    const { name } = field;
    const given = Object.hasOwn(file.revision.fields, name)
      ? file.revision.fields[name]
      : undefined;
    const outcome = field.kind === "fixed"
      ? fillFixed(field, { given, file, template: declaration.template })
      : fillChoice(field, { given, file, template: declaration.template });
    if ("problems" in outcome) problems.push(...outcome.problems);
    else {
      values.push([name, outcome.value]);
      filled.push(outcome.filled);
    }
  }
  return { values: Object.fromEntries(values), filled, problems };
}

type Outcome =
  | { readonly value: number | string; readonly filled: FilledField }
  | { readonly problems: readonly Problem[] };

interface Given {
  readonly given: RevisionField | undefined;
  readonly file: RevisionFile;
  readonly template: string;
}

function fillFixed(field: DeclaredField, { given, file, template }: Given): Outcome {
  const value = field.value!;
  const text = field.written ?? String(value);
  if (given === undefined) return { value, filled: { ...field, text } };
  return {
    problems: [
      file.problemAt(
        fieldPath(field.name),
        `${field.name}: fixed at ${text} by ${template} (${field.reason}); remove it from the revision`,
        "key",
      ),
    ],
  };
}

function fillChoice(field: DeclaredField, { given, file, template }: Given): Outcome {
  const { name } = field;
  if (given === undefined) {
    const example = field.unit === "word" ? field.options![0]! : exampleOf(field);
    return {
      problems: [
        file.problemAt(
          ["fields"],
          `missing choice ${name} (asked by ${template}: ${field.question}): ` +
            `write ${name}: { value: "${example}", reason: "..." }`,
          "key",
        ),
      ],
    };
  }
  const problems: Problem[] = [];
  const value = given.value === "" ? undefined : readValue(field, given.value, (message) => {
    problems.push(file.problemAt(fieldPath(name, "value"), `${name}: ${message}`));
  });
  if (given.reason === "") {
    problems.push(
      file.problemAt(fieldPath(name), `${name}: a choice needs a reason: add reason: "..."`, "key"),
    );
  }
  if (value === undefined || problems.length > 0) return { problems };
  return {
    value,
    filled: {
      ...field,
      text: given.value,
      why: given.reason,
      ...(given.estimate === undefined ? {} : { estimate: given.estimate }),
    },
  };
}

function readValue(
  field: DeclaredField,
  text: string,
  refuse: (message: string) => void,
): number | string | undefined {
  if (field.unit === "word") {
    if (field.options!.includes(text)) return text;
    refuse(
      `expected one of ${field.options!.join(", ")}, got "${text}"${perhaps(text, field.options!)}`,
    );
    return undefined;
  }
  try {
    const value = parseQuantity(text, field.unit);
    const { atLeast = -Infinity, atMost = Infinity } = field;
    if (value >= atLeast && value <= atMost) return value;
    refuse(`must be ${boundsText(field)}, got "${text}"`);
  } catch (error) {
    if (!(error instanceof Error)) throw error;
    refuse(error.message);
  }
  return undefined;
}

/** Bounds of a choice in words: `from 600 mV to 1.4 V`, `at least 2`; empty without bounds. */
export function boundsText({ unit, atLeast, atMost }: DeclaredField): string {
  const text = (bound: number) => formatQuantity(bound, unit, { digits: FIXED_DIGITS });
  if (atLeast !== undefined && atMost !== undefined) {
    return `from ${text(atLeast)} to ${text(atMost)}`;
  }
  if (atLeast !== undefined) return `at least ${text(atLeast)}`;
  if (atMost !== undefined) return `at most ${text(atMost)}`;
  return "";
}

function exampleOf({ unit, atLeast, atMost }: DeclaredField): string {
  return formatQuantity(atLeast ?? atMost ?? 1, unit, { digits: FIXED_DIGITS });
}
