/** Where the report process leaves what `sheet` takes instead of the example. */
export const HANDOVER: unique symbol = Symbol.for("tankwright.handover") as never;

/** A revision and its card as read by the report process. */
export interface RevisionHandover {
  readonly declareOnly?: false;
  readonly revisionText: string;
  /** As the person named it, for messages. */
  readonly revisionFile: string;
  readonly cardText: string;
  readonly cardFile: string;
}

/** Asks `sheet` to say what it declares and to stop there. */
export interface DeclareOnlyHandover {
  readonly declareOnly: true;
}

/** What the report process hands to a kernel before the first cell. */
export type Handover = RevisionHandover | DeclareOnlyHandover;

/** What was handed over to this kernel, if anything was. */
export function takenHandover(): Handover | undefined {
  return (globalThis as { [HANDOVER]?: Handover })[HANDOVER];
}

/** Stops a first cell whose sheet has been declared and is not to be filled. */
export class DeclaredOnly extends Error {
  override readonly name = "DeclaredOnly";

  constructor() {
    super("the sheet is declared; no revision was handed over to fill it");
  }
}
