/**
 * What a cell hands to the report beside its `text/plain`: data, never text to be scraped. One MIME
 * type carries every kind, told apart by `kind`.
 *
 * @module
 */

/** MIME type under which a {@linkcode Payload} travels in a display message. */
export const PAYLOAD_MIME = "application/vnd.tankwright.v1+json";

/** How a named figure stands against its limit. */
export type VerdictState = "met" | "thin" | "missed" | "waived" | "not run";

/** A bound on a figure, in the figure's unit; at least one side is given. */
export interface Limit {
  /** Lower limit, itself allowed. */
  readonly atLeast?: number;
  /** Upper limit, itself allowed. */
  readonly atMost?: number;
}

/** One named figure held against a limit. */
export interface Verdict {
  /** What is judged; unique in its template. */
  readonly name: string;
  /** In `unit`; null when the figure could not be computed. */
  readonly value: number | null;
  /** Unit of `value`, `limit` and `margin`, as `formatQuantity` takes it (SI, dBc/Hz, ...). */
  readonly unit: string;
  /** What the value is held against. */
  readonly limit: Limit;
  /** Distance to the nearest limit in `unit`, positive inside; null when there is no value. */
  readonly margin: number | null;
  /** The judgement. */
  readonly state: VerdictState;
  /** Where the worst value was found ("slow, 125 °C, 0.95 V") or why it could not be computed. */
  readonly note?: string;
}

/** One named figure without a limit. */
export interface Figure {
  /** What it is; unique in its template. */
  readonly name: string;
  /** In `unit`. */
  readonly value: number;
  /** As `formatQuantity` takes it. */
  readonly unit: string;
}

/** A worst-case stress against a limit of the technology card, for the caution section. */
export interface Stress {
  /** Name of the device or branch. */
  readonly device: string;
  /** What is stressed, in words: "gate to drain voltage, peak". */
  readonly quantity: string;
  /** Worst magnitude, in `unit`. */
  readonly value: number;
  /** The card's limit, in `unit`. */
  readonly limit: number;
  /** As `formatQuantity` takes it. */
  readonly unit: string;
  /** The condition at which the worst value occurs. */
  readonly at: string;
}

/** A field as a template declares it. */
export interface DeclaredField {
  /** Name in the revision file. */
  readonly name: string;
  /** Set by the lead, or open to whoever fills in the revision. */
  readonly kind: "fixed" | "choice";
  /** Unit of the value ("V", "H", "1" for a pure number, "word" for one of `options`). */
  readonly unit: string;
  /** What the person filling it in is asked; for a fixed field, what it sets. */
  readonly question: string;
  /** The lead's value of a fixed field: SI, or a word. */
  readonly value?: number | string;
  /** The lead's value as written, with unit. */
  readonly written?: string;
  /** Why the lead fixed it so. */
  readonly reason?: string;
  /** Bounds of a choice, SI, inclusive. */
  readonly atLeast?: number;
  /** Upper bound of a choice, SI, inclusive. */
  readonly atMost?: number;
  /** Allowed words of a choice of unit "word". */
  readonly options?: readonly string[];
}

/** Everything a cell can hand over. */
export type Payload =
  | { readonly kind: "sheet"; readonly template: string; readonly fields: readonly DeclaredField[] }
  | ({ readonly kind: "verdict" } & Verdict)
  | ({ readonly kind: "figure" } & Figure)
  | { readonly kind: "stress"; readonly rows: readonly Stress[] };
