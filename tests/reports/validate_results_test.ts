import { TemplateFailure } from "../../reports/exit_status.ts";
import { resultsOf, resultsText } from "../../reports/results.ts";
import type { ReportData } from "../../reports/report_data.ts";
import { validateResults } from "../../reports/validate_results.ts";
import { assertEquals, assertThrows } from "../assert.ts";

const DATA: ReportData = {
  design: "d",
  revision: "a",
  author: "x",
  reviewDate: "2026-11-16",
  card: { name: "c", note: "n" },
  waivers: [],
  sections: [{
    template: "swing",
    title: "Swing",
    cells: [],
    fields: [],
    verdicts: [{
      unit: "V",
      margin: 0.5,
      state: "met",
      limit: { atMost: 1 },
      value: 0.5,
      name: "v",
    }],
    figures: [{ unit: "V", value: 1, name: "f" }],
    stresses: [{ device: "M1", quantity: "q", value: 1, limit: 2, unit: "V", at: "fast" }],
  }],
  provenance: { version: "0.1.0", inputHash: "0".repeat(64), inputs: [], settings: [] },
};

Deno.test("resultsOf writes keys in one order, whatever the order they came in", () => {
  const [section] = DATA.sections;
  const { name, value, unit, limit, margin, state } = section!.verdicts[0]!;
  const reordered = {
    ...DATA,
    sections: [{ ...section!, verdicts: [{ name, value, unit, limit, margin, state }] }],
  };
  assertEquals(resultsText(resultsOf(reordered)), resultsText(resultsOf(DATA)));
});

Deno.test("validateResults takes good results and names what is wrong with others", () => {
  const results = resultsOf(DATA);
  validateResults(results);
  const spoilt = (change: (copy: typeof results) => unknown) => {
    const copy = structuredClone(results);
    change(copy);
    return () => validateResults(copy);
  };
  assertThrows(
    spoilt((copy) => Object.assign(copy.verdicts[0]!, { margin: "wide" })),
    TemplateFailure,
    /^swing\.ipynb: hands over the verdict "v", whose margin must be/,
  );
  assertThrows(
    spoilt((copy) => Object.assign(copy.figures[0]!, { colour: "red" })),
    TemplateFailure,
    /figure "f", whose content must NOT have additional properties$/,
  );
  assertThrows(
    spoilt((copy) => Object.assign(copy.stresses[0]!, { value: null })),
    TemplateFailure,
    /stress of "M1", whose value must be number$/,
  );
});
