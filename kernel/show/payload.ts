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
  readonly atLeast?: number;
  readonly atMost?: number;
}

/** One named figure held against a limit. */
export interface Verdict {
  readonly name: string;
  /** In `unit`; null when the figure could not be computed. */
  readonly value: number | null;
  /** Unit of `value`, `limit` and `margin`, as `formatQuantity` takes it (SI, dBc/Hz, ...). */
  readonly unit: string;
  readonly limit: Limit;
  /** Distance to the nearest limit in `unit`, positive inside; null when there is no value. */
  readonly margin: number | null;
  readonly state: VerdictState;
  /** Where the worst value was found ("slow, 125 °C, 0.95 V") or why it could not be computed. */
  readonly note?: string;
}

/** One named figure without a limit. */
export interface Figure {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
}

/** A worst-case stress against a limit of the technology card, for the caution section. */
export interface Stress {
  readonly device: string;
  /** What is stressed, in words: "gate to drain voltage, peak". */
  readonly quantity: string;
  readonly value: number;
  readonly limit: number;
  readonly unit: string;
  /** The condition at which the worst value occurs. */
  readonly at: string;
}

/** A field as a template declares it. */
export interface DeclaredField {
  readonly name: string;
  readonly kind: "fixed" | "choice";
  /** Unit of the value ("V", "H", "1" for a pure number, "word" for one of `options`). */
  readonly unit: string;
  /** What the person filling it in is asked; for a fixed field, what it sets. */
  readonly question: string;
  /** The lead's value of a fixed field: SI, or a word. */
  readonly value?: number | string;
  /** Why the lead fixed it so. */
  readonly reason?: string;
  /** Bounds of a choice, SI, inclusive. */
  readonly atLeast?: number;
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
