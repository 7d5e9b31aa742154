import type { Figure, Stress, Verdict } from "../kernel/show/payload.ts";
import type { FilledField } from "../kernel/sheet/fill_sheet.ts";
import type { Waiver } from "../kernel/sheet/revision.ts";

export type { FilledField, Waiver };

/** One output of a cell as the page shows it: the MIME bundle of a display, a stream or an error. */
export type CellOutput =
  | { readonly type: "display"; readonly data: Readonly<Record<string, unknown>> }
  | { readonly type: "stream"; readonly name: "stdout" | "stderr"; readonly text: string }
  | {
    readonly type: "error";
    readonly name: string;
    readonly message: string;
    readonly line?: number;
  };

/** One cell of a template, as run. */
export interface ReportCell {
  readonly id: string;
  readonly type: "markdown" | "code";
  readonly source: string;
  readonly outputs: readonly CellOutput[];
}

/** One rendered template. */
export interface ReportSection {
  readonly template: string;
  /** The first heading of the notebook. */
  readonly title: string;
  readonly cells: readonly ReportCell[];
  readonly fields: readonly FilledField[];
  readonly verdicts: readonly Verdict[];
  readonly figures: readonly Figure[];
  readonly stresses: readonly Stress[];
}

/** Everything the page shows. Free of clock, paths and randomness: same input, same page. */
export interface ReportData {
  readonly design: string;
  readonly revision: string;
  readonly author: string;
  /** ISO date. */
  readonly reviewDate: string;
  readonly card: { readonly name: string; readonly note: string };
  readonly sections: readonly ReportSection[];
  readonly waivers: readonly Waiver[];
  readonly provenance: {
    /** Tankwright's version. */
    readonly version: string;
    /** SHA-256 of revision, card and templates, hex. */
    readonly inputHash: string;
    /** Name and hash of each input file. */
    readonly inputs: readonly { readonly file: string; readonly sha256: string }[];
    /** Versions of runtime and libraries, time limits. */
    readonly settings: readonly { readonly name: string; readonly value: string }[];
  };
}
