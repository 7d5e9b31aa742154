import type { TechnologyCard } from "../../lib/device/technology_card.ts";
import { jupyter } from "../show/_jupyter.ts";
import { show } from "../show/show.ts";
import { type MimeBundle, PayloadShowable } from "../show/showable.ts";
import { table } from "../show/table.ts";
import { readCard } from "./card.ts";
import { unknownFields } from "./check_revision.ts";
import { type Declaration, declarationOf } from "./declaration.ts";
import type { Field, FieldValues } from "./field.ts";
import { type FilledField, fillSheet } from "./fill_sheet.ts";
import { DeclaredOnly, takenHandover } from "./handover.ts";
import { InputError } from "./problem.ts";
import { readInputs } from "./read_inputs.ts";
import { readRevision, type Revision } from "./revision.ts";

/** Options of {@linkcode sheet}. */
export interface SheetOptions<F extends Readonly<Record<string, Field>>> {
  /** The notebook's file name without `.ipynb`. */
  readonly template: string;
  /** Revision file that fills the sheet when the notebook runs by itself, relative to its folder. */
  readonly example: string;
  /** Fields by name, made by `choice` and `fixed`. */
  readonly fields: F;
}

/** A filled sheet, as a template's cells use it. */
export interface Given<F extends Readonly<Record<string, Field>>> {
  /** Values by field name: SI, or a word. */
  readonly value: FieldValues<F>;
  /** The fields with what was written for each, and why. */
  readonly fields: readonly FilledField[];
  readonly card: TechnologyCard;
  readonly revision: Revision;
}

/**
 * Declares what a template asks for and fills it: from the revision that the report process handed
 * over, else from the stated example. Shows the filled sheet, and tells the report what it declares.
 *
 * @throws {InputError} when the revision or its card cannot fill the sheet, one line per problem
 */
export async function sheet<F extends Readonly<Record<string, Field>>>(
  { template, example, fields }: SheetOptions<F>,
): Promise<Given<F>> {
  const declaration = declarationOf(template, fields);
  const handover = takenHandover();
  if (handover?.declareOnly) {
    await display(declaration, `sheet of ${template}`);
    throw new DeclaredOnly();
  }
  try {
    const inputs = handover ?? await readInputs(example);
    const file = readRevision(inputs.revisionText, inputs.revisionFile);
    const { values, filled, problems } = fillSheet(declaration, file);
    const { templates } = file.revision;
    // Another template of the revision may declare the fields that this one does not know.
    const alone = templates.length === 1 && templates[0] === template;
    const all = [
      ...file.problems,
      ...problems,
      ...(alone ? unknownFields(file, [declaration]) : []),
    ];
    if (all.length > 0) throw new InputError(all);
    const card = readCard(inputs.cardText, inputs.cardFile);
    await display(declaration, sheetTable(declaration, filled, file.revision));
    return { value: values as FieldValues<F>, fields: filled, card, revision: file.revision };
  } catch (error) {
    // The report checks the revision itself, against this declaration.
    if (error instanceof InputError) await display(declaration, `sheet of ${template}, not filled`);
    throw error;
  }
}

function sheetTable(
  { template }: Declaration,
  filled: readonly FilledField[],
  { design, revision }: Revision,
): MimeBundle {
  return table({
    caption: `Sheet of ${template}: ${design}, revision ${revision}`,
    columns: [{ name: "question" }, { name: "field" }, { name: "value" }, { name: "reason" }],
    rows: filled.map(({ name, kind, question, text, why, reason }) => [
      question,
      name,
      text,
      kind === "fixed" ? `fixed: ${reason}` : why ?? "",
    ]),
  }).bundle;
}

/** Sends the declaration, with what a person sees of it; outside the kernel shows nothing. */
async function display(declaration: Declaration, shown: string | MimeBundle): Promise<void> {
  if (jupyter() === undefined) return;
  const bundle = typeof shown === "string" ? { "text/plain": shown } : shown;
  await show(new PayloadShowable({ kind: "sheet", ...declaration }, bundle));
}
