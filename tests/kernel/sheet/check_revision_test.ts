import { checkRevision } from "../../../kernel/sheet/check_revision.ts";
import { choice, fixed } from "../../../kernel/sheet/field.ts";
import { declarationOf } from "../../../kernel/sheet/declaration.ts";
import { problemText } from "../../../kernel/sheet/problem.ts";
import { readRevision } from "../../../kernel/sheet/revision.ts";
import { assertEquals } from "../../assert.ts";
import { FIRST, GOOD, SECOND } from "./_samples.ts";

function problemsOf(text: string, declarations = [FIRST, SECOND]): string[] {
  return checkRevision(readRevision(text, "rev.yaml"), declarations).map(problemText);
}

Deno.test("checkRevision takes a revision that fills all its sheets", () => {
  assertEquals(problemsOf(GOOD), []);
});

Deno.test("checkRevision names the nearest known field for an unknown one", () => {
  assertEquals(problemsOf(GOOD.replace("quality_factor:", "qualty_factor:")), [
    "rev.yaml:7:1: missing choice quality_factor (asked by second_sheet: Which quality factor?): " +
    'write quality_factor: { value: "1", reason: "..." }',
    'rev.yaml:12:3: unknown field qualty_factor, perhaps "quality_factor"',
  ]);
});

Deno.test("checkRevision collects what is wrong with text, fields and waivers in one list", () => {
  const text = GOOD.replace("2026-11-16", "someday").replace('"1.0 V"', '"2 V"')
    .replace("template: first_sheet", "template: frist_sheet");
  assertEquals(problemsOf(text), [
    'rev.yaml:4:14: review_date: expected a date of the calendar such as 2026-11-16, got "someday"',
    'rev.yaml:8:28: supply_voltage: must be from 600 mV to 1.4 V, got "2 V"',
    'rev.yaml:8:28: supply_voltage: must be at most 1.2 V, got "2 V"',
    'rev.yaml:14:17: waivers: "frist_sheet" is not one of the templates, perhaps "first_sheet"',
  ]);
});

Deno.test("checkRevision says once that a choice of two templates is missing", () => {
  const problems = problemsOf(GOOD.replace(/ {2}supply_voltage.*\n/, ""), [
    FIRST,
    SECOND,
  ]).filter((text) => text.includes("supply_voltage"));
  assertEquals(problems.length, 1);
});

Deno.test("checkRevision refuses templates that declare one field differently", () => {
  const other = declarationOf("second_sheet", {
    supply_voltage: choice("A", { question: "?" }),
    knee_multiple: fixed("1", "0.8", { question: "?", reason: "?" }),
  });
  const found = problemsOf(GOOD, [FIRST, other]).filter((text) =>
    text.includes("cannot be in one")
  );
  assertEquals(found, [
    "rev.yaml:6:12: first_sheet declares supply_voltage as a choice [V], " +
    "second_sheet as a choice [A]; they cannot be in one revision",
    "rev.yaml:6:12: first_sheet declares knee_multiple as fixed at 0.9 [1], " +
    "second_sheet as fixed at 0.8 [1]; they cannot be in one revision",
  ]);
});
