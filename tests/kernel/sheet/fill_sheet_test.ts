import { boundsText, fillSheet } from "../../../kernel/sheet/fill_sheet.ts";
import { problemText } from "../../../kernel/sheet/problem.ts";
import { readRevision } from "../../../kernel/sheet/revision.ts";
import { assertEquals } from "../../assert.ts";
import { FIRST, GOOD, SECOND } from "./_samples.ts";

function problemsOf(text: string): string[] {
  return fillSheet(FIRST, readRevision(text, "rev.yaml")).problems.map(problemText);
}

Deno.test("fillSheet gives values in SI, words as they are, and what was written", () => {
  const { values, filled, problems } = fillSheet(FIRST, readRevision(GOOD, "rev.yaml"));
  assertEquals(problems, []);
  assertEquals(values, { supply_voltage: 1, knee_multiple: 0.9, topology: "nmos_pair" });
  assertEquals(filled.map(({ name, text, why, estimate }) => ({ name, text, why, estimate })), [
    {
      name: "supply_voltage",
      text: "1.0 V",
      why: "the regulator gives it",
      estimate: "about 1 V",
    },
    { name: "knee_multiple", text: "0.9", why: undefined, estimate: undefined },
    { name: "topology", text: "nmos_pair", why: "fastest", estimate: undefined },
  ]);
  assertEquals(fillSheet(SECOND, readRevision(GOOD, "rev.yaml")).values, {
    supply_voltage: 1,
    quality_factor: 12.5,
  });
});

Deno.test("fillSheet refuses a wrong unit, a value out of bounds and an unknown word", () => {
  assertEquals(problemsOf(GOOD.replace('"1.0 V"', '"1 mA"')), [
    'rev.yaml:8:28: supply_voltage: expected a voltage such as "1.0 V", got "1 mA" (a current)',
  ]);
  assertEquals(problemsOf(GOOD.replace('"1.0 V"', "1.0")), [
    'rev.yaml:8:28: supply_voltage: expected a voltage such as "1.0 V", got "1.0" (no unit)',
  ]);
  assertEquals(problemsOf(GOOD.replace('"1.0 V"', '"1500 mV"')), [
    'rev.yaml:8:28: supply_voltage: must be from 600 mV to 1.4 V, got "1500 mV"',
  ]);
  assertEquals(problemsOf(GOOD.replace("value: nmos_pair", "value: nmos_pare")), [
    'rev.yaml:10:12: topology: expected one of nmos_pair, pmos_pair, got "nmos_pare", perhaps "nmos_pair"',
  ]);
});

Deno.test("fillSheet takes the bounds themselves", () => {
  assertEquals(problemsOf(GOOD.replace('"1.0 V"', '"0.6 V"')), []);
  assertEquals(problemsOf(GOOD.replace('"1.0 V"', '"1400 mV"')), []);
});

Deno.test("fillSheet refuses a change of a fixed field, and says who fixed it and why", () => {
  const text = GOOD.replace(
    "fields:\n",
    'fields:\n  knee_multiple: { value: "1.1", reason: "x" }\n',
  );
  assertEquals(problemsOf(text), [
    "rev.yaml:8:3: knee_multiple: fixed at 0.9 by first_sheet (house rule); remove it from the revision",
  ]);
});

Deno.test("fillSheet asks for a missing choice and for a missing reason", () => {
  assertEquals(problemsOf(GOOD.replace(/ {2}supply_voltage.*\n/, "")), [
    "rev.yaml:7:1: missing choice supply_voltage (asked by first_sheet: Which supply feeds the tank?): " +
    'write supply_voltage: { value: "600 mV", reason: "..." }',
  ]);
  assertEquals(problemsOf(GOOD.replace("    reason: fastest\n", "")), [
    'rev.yaml:9:3: topology: a choice needs a reason: add reason: "..."',
  ]);
});

Deno.test("fillSheet does not mistake an inherited property for a field", () => {
  const declaration = {
    template: "odd",
    fields: [{ name: "constructor", kind: "choice", unit: "1", question: "?" } as const],
  };
  const { problems } = fillSheet(declaration, readRevision(GOOD, "rev.yaml"));
  assertEquals(problems.length, 1);
});

Deno.test("boundsText writes both bounds, one, or none", () => {
  const field = { name: "a", kind: "choice", unit: "V", question: "?" } as const;
  assertEquals(boundsText({ ...field, atLeast: 0.6, atMost: 1.4 }), "from 600 mV to 1.4 V");
  assertEquals(boundsText({ ...field, atLeast: 0.6 }), "at least 600 mV");
  assertEquals(boundsText({ ...field, atMost: 1.4 }), "at most 1.4 V");
  assertEquals(boundsText(field), "");
});
