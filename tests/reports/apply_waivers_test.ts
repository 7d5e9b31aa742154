import { readRevision } from "../../kernel/sheet/revision.ts";
import { InputError } from "../../kernel/sheet/problem.ts";
import type { VerdictState } from "../../kernel/show/payload.ts";
import { applyWaivers } from "../../reports/apply_waivers.ts";
import { assertEquals, assertThrows } from "../assert.ts";

function section(state: VerdictState, note?: string) {
  return {
    template: "swing",
    title: "Swing",
    cells: [],
    fields: [],
    figures: [],
    stresses: [],
    verdicts: [{
      name: "swing",
      value: state === "not run" ? null : 1,
      unit: "V",
      limit: { atMost: 1 },
      margin: null,
      state,
      ...(note === undefined ? {} : { note }),
    }],
  };
}

function revision(expires: string, verdict = "swing") {
  return readRevision(
    `design: d\nrevision: a\nauthor: x\nreview_date: 2026-11-16\ncard: c.yaml\ntemplates: [swing]\nfields: {}\n` +
      `waivers:\n  - { template: swing, verdict: ${verdict}, reason: r, by: lead, expires: ${expires} }\n`,
    "rev.yaml",
  );
}

function after(state: VerdictState, expires: string, note?: string) {
  const verdict = applyWaivers([section(state, note)], revision(expires))[0]!.verdicts[0]!;
  return [verdict.state, verdict.note];
}

Deno.test("applyWaivers lets a failed verdict pass up to the waiver's last day", () => {
  assertEquals(after("missed", "2026-11-16"), ["waived", undefined]);
  assertEquals(after("not run", "2027-01-01", "no orbit"), ["waived", "no orbit"]);
});

Deno.test("applyWaivers says that a waiver has ended, and keeps the state", () => {
  assertEquals(after("missed", "2026-11-15"), ["missed", "the waiver by lead ended on 2026-11-15"]);
  assertEquals(after("not run", "2025-12-31", "no orbit"), [
    "not run",
    "no orbit; the waiver by lead ended on 2025-12-31",
  ]);
});

Deno.test("applyWaivers leaves a verdict alone that is met or thin", () => {
  assertEquals(after("met", "2027-01-01"), ["met", undefined]);
  assertEquals(after("thin", "2020-01-01"), ["thin", undefined]);
});

Deno.test("applyWaivers refuses a waiver that names no verdict of its template", () => {
  assertThrows(
    () => applyWaivers([section("met")], revision("2027-01-01", "swings")),
    InputError,
    /^rev\.yaml:9:33: waivers: swing gives no verdict "swings", perhaps "swing"$/,
  );
});
