import type { Verdict } from "../../kernel/show/payload.ts";
import type { ReportSection } from "../../reports/report_data.ts";
import { verdictLines } from "../../reports/verdict_lines.ts";
import { assert, assertEquals } from "../assert.ts";

const section = (template: string, verdicts: Verdict[]): ReportSection => ({
  template,
  title: template,
  cells: [],
  fields: [],
  verdicts,
  figures: [],
  stresses: [],
});

const met: Verdict = {
  name: "supply",
  value: 0.8,
  unit: "V",
  limit: { atMost: 1.2 },
  margin: 0.4,
  state: "met",
};

Deno.test("verdictLines aligns one line per verdict under a header", () => {
  const lost: Verdict = { ...met, name: "noise", value: null, margin: null, state: "not run" };
  const lines = verdictLines([section("bias", [met, lost])]);
  assertEquals(lines.length, 3);
  assertEquals(lines[0]?.split(/ {2,}/), [
    "template",
    "verdict",
    "value",
    "limit",
    "margin",
    "state",
    "note",
  ]);
  const column = lines[0]?.indexOf("state") ?? -1;
  assert(lines[1]?.slice(column).startsWith("met"));
  assert(lines[2]?.slice(column).startsWith("not run"));
  assert(lines.every((line) => line === line.trimEnd()));
});

Deno.test("verdictLines says so when there is no verdict", () => {
  assertEquals(verdictLines([section("bias", [])]), ["The templates gave no verdict."]);
});
