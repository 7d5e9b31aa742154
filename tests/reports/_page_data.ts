import { figure } from "../../kernel/show/figure.ts";
import { formula } from "../../kernel/show/formula.ts";
import { PROGRESS_MIME } from "../../kernel/show/progress.ts";
import type { Showable } from "../../kernel/show/showable.ts";
import { stress } from "../../kernel/show/stress.ts";
import { sweepChart } from "../../kernel/show/sweep_chart.ts";
import { table } from "../../kernel/show/table.ts";
import { verdict } from "../../kernel/show/verdict.ts";
import { PAYLOAD_MIME, type Verdict } from "../../kernel/show/payload.ts";
import type { CellOutput, ReportData } from "../../reports/report_data.ts";

/** A display as it arrives from a kernel: through JSON. */
export function displayed({ bundle }: Showable): CellOutput {
  return { type: "display", data: JSON.parse(JSON.stringify(bundle)) };
}

function bare({ payload: { kind: _, ...rest } }: ReturnType<typeof verdict>): Verdict {
  return rest;
}

const current = [1e-3, 2e-3, 4e-3];
const sweep = sweepChart({
  title: "Amplitude",
  description: "Invented",
  x: current,
  xLabel: "current",
  xUnit: "A",
  series: [{ name: "amplitude", y: [0.3, 0.6, 0.8], unit: "V" }],
});
const gain = verdict("Startup loop gain", 2.1, "1", { atLeast: 2, thin: 0.3, note: "slow <hot>" });
const peak = verdict("Gate to drain voltage", 1.31, "V", { atMost: 1.2 });
const overlap = verdict("Overlap", null, "%", { atLeast: 0.3, note: "one code only" });

/** A whole report with invented values: two templates, each state of a verdict, a waiver. */
export const PAGE_DATA: ReportData = {
  design: "Buoy <oscillator>",
  revision: "b",
  author: 'A. "Designer"',
  reviewDate: "2026-11-16",
  card: { name: "illustrative 65 nm", note: "Illustrative: invented values, not for design" },
  sections: [
    {
      template: "bias_selection",
      title: "Bias current",
      cells: [
        {
          id: "title",
          type: "markdown",
          source: "# Bias current\n\nThe swing is $A = I R$; see [the sweep](#The-sweep) and " +
            "[nothing](#nothing).\n\n<script>alert(1)</script>",
          outputs: [],
        },
        {
          id: "sheet",
          type: "code",
          source: 'const given = await sheet({ template: "bias_selection" });',
          outputs: [{
            type: "display",
            data: {
              "text/plain": "the sheet itself",
              [PAYLOAD_MIME]: { kind: "sheet", template: "bias_selection", fields: [] },
            },
          }],
        },
        {
          id: "sweep-text",
          type: "markdown",
          source: "# The sweep\n\n##### Far too deep\n\n## Next",
          outputs: [],
        },
        {
          id: "sweep",
          type: "code",
          source: "await show(sweep);",
          outputs: [
            { type: "display", data: { "text/plain": "Sweep: 3 of 3", [PROGRESS_MIME]: {} } },
            displayed(sweep),
            displayed(sweep),
            displayed(formula("A = I R")),
            displayed(
              table({ caption: "Corners", columns: [{ name: "c" }], rows: [], csv: "c.csv" }),
            ),
            displayed(gain),
            displayed(peak),
            displayed(figure("Frequency", 2.4e9, "Hz")),
            displayed(stress([])),
          ],
        },
      ],
      fields: [
        {
          name: "supply_voltage",
          kind: "choice",
          unit: "V",
          question: "Which supply?",
          atLeast: 0.6,
          atMost: 1.4,
          text: "1.0 V",
          why: "The only <clean> rail",
          estimate: "1 V",
        },
        {
          name: "topology",
          kind: "choice",
          unit: "word",
          question: "Which topology?",
          options: ["nmos_pair", "complementary_pair"],
          text: "nmos_pair",
        },
        {
          name: "knee_multiple",
          kind: "fixed",
          unit: "1",
          question: "Multiple of the knee",
          reason: "Holds at every corner",
          value: 0.9,
          text: "0.9",
        },
      ],
      verdicts: [
        bare(gain),
        bare(peak),
        { ...bare(verdict("Power", 3.4e-3, "W", { atMost: 3e-3 })), state: "waived" },
      ],
      figures: [{ name: "Frequency", value: 2.4e9, unit: "Hz" }],
      stresses: [
        {
          device: "M1",
          quantity: "gate to drain voltage, peak",
          value: 1.31,
          limit: 1.2,
          unit: "V",
          at: "fast",
        },
        {
          device: "M1",
          quantity: "gate to drain voltage, peak",
          value: 1.1,
          limit: 1.2,
          unit: "V",
          at: "typical",
        },
        {
          device: "coil",
          quantity: "current, rms",
          value: 0.04,
          limit: 0.06,
          unit: "A",
          at: "hot",
        },
      ],
    },
    {
      template: "waivers",
      title: "Tuning",
      cells: [{ id: "sheet", type: "code", source: "1", outputs: [displayed(overlap)] }],
      fields: [],
      verdicts: [bare(overlap)],
      figures: [],
      stresses: [],
    },
  ],
  waivers: [{
    template: "bias_selection",
    verdict: "Power",
    reason: "Test chip only",
    by: "L. Lead",
    expires: "2026-11-16",
  }],
  provenance: {
    version: "0.1.0",
    inputHash: "9f".repeat(32),
    inputs: [{ file: "rev_b.yaml", sha256: "ab".repeat(32) }],
    settings: [{ name: "Deno", value: "2.9.6" }],
  },
};
