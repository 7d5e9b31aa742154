/**
 * A template's sheet: its fields, the revision that fills it, and the technology card.
 *
 * @module
 */
export { blankRevision, type BlankRevisionOptions } from "./blank_revision.ts";
export { readCard } from "./card.ts";
export { checkRevision, unknownFields } from "./check_revision.ts";
export { type Declaration, declarationOf } from "./declaration.ts";
export {
  type Choice,
  choice,
  type Field,
  type FieldValues,
  type Fixed,
  fixed,
  type FixedOptions,
  type QuantityChoiceOptions,
  type WordChoiceOptions,
} from "./field.ts";
export { boundsText, type FilledField, type FilledSheet, fillSheet } from "./fill_sheet.ts";
export {
  DeclaredOnly,
  type DeclareOnlyHandover,
  HANDOVER,
  type Handover,
  type RevisionHandover,
} from "./handover.ts";
export { inOrder, InputError, type Problem, problemText } from "./problem.ts";
export { readInputs } from "./read_inputs.ts";
export {
  readRevision,
  type Revision,
  type RevisionField,
  type RevisionFile,
  type Waiver,
} from "./revision.ts";
export {
  type JsonSchema,
  type OpenChoice,
  openChoices,
  revisionSchema,
} from "./revision_schema.ts";
export { type Given, sheet, type SheetOptions } from "./sheet.ts";
