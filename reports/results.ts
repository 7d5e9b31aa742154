import type { Figure, Stress, Verdict } from "../kernel/show/payload.ts";
import type { ReportData } from "./report_data.ts";

/** What `results.json` holds, as `results.schema.json` describes it. */
export interface Results {
  readonly tool: { readonly name: "tankwright"; readonly version: string };
  /** SHA-256 of version, revision, card and templates, hex; the page carries the same. */
  readonly inputHash: string;
  readonly design: string;
  readonly revision: string;
  readonly verdicts: readonly ({ readonly template: string } & Verdict)[];
  readonly figures: readonly ({ readonly template: string } & Figure)[];
  readonly stresses: readonly ({ readonly template: string } & Stress)[];
}

/** Picks the figures out of a report; key by key, so that the order of keys never varies. */
export function resultsOf(data: ReportData): Results {
  const { sections, provenance } = data;
  return {
    tool: { name: "tankwright", version: provenance.version },
    inputHash: provenance.inputHash,
    design: data.design,
    revision: data.revision,
    verdicts: sections.flatMap(({ template, verdicts }) =>
      verdicts.map(({ name, value, unit, limit: { atLeast, atMost }, margin, state, note }) => ({
        template,
        name,
        value,
        unit,
        limit: {
          ...(atLeast === undefined ? {} : { atLeast }),
          ...(atMost === undefined ? {} : { atMost }),
        },
        margin,
        state,
        ...(note === undefined ? {} : { note }),
      }))
    ),
    figures: sections.flatMap(({ template, figures }) =>
      figures.map(({ name, value, unit }) => ({ template, name, value, unit }))
    ),
    stresses: sections.flatMap(({ template, stresses }) =>
      stresses.map(({ device, quantity, value, limit, unit, at }) => ({
        template,
        device,
        quantity,
        value,
        limit,
        unit,
        at,
      }))
    ),
  };
}

/** The text of `results.json`. */
export function resultsText(results: Results): string {
  return `${JSON.stringify(results, undefined, 2)}\n`;
}
