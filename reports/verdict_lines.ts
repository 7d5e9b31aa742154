import { formatQuantity } from "../lib/quantity/format_quantity.ts";
import type { Verdict } from "../kernel/show/payload.ts";
import { differenceText, limitText } from "../kernel/show/verdict_text.ts";
import type { ReportSection } from "./report_data.ts";

const HEADER = ["template", "verdict", "value", "limit", "margin", "state", "note"] as const;

/** The verdict table as aligned plain text, one line per verdict under a header. */
export function verdictLines(sections: readonly ReportSection[]): readonly string[] {
  const rows = sections.flatMap(({ template, verdicts }) =>
    verdicts.map((verdict) => [template, ...cells(verdict)])
  );
  if (rows.length === 0) return ["The templates gave no verdict."];
  const table = [[...HEADER], ...rows];
  const widths = HEADER.map((_, k) => Math.max(...table.map((row) => width(row[k]!))));
  return table.map((row) =>
    row.map((cell, k) => cell + " ".repeat(widths[k]! - width(cell))).join("  ").trimEnd()
  );
}

function cells(verdict: Verdict): string[] {
  const { name, value, unit, margin, state, note } = verdict;
  return [
    name,
    value === null ? "-" : formatQuantity(value, unit),
    limitText(verdict),
    margin === null ? "-" : differenceText(margin, unit),
    state,
    note ?? "",
  ];
}

/** Characters a person sees, not UTF-16 units. */
function width(text: string): number {
  return [...text].length;
}
