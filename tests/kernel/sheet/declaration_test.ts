import { declarationOf } from "../../../kernel/sheet/declaration.ts";
import { choice, type Field, fixed } from "../../../kernel/sheet/field.ts";
import type { FieldValues } from "../../../kernel/sheet/field.ts";
import { assertEquals, assertThrows } from "../../assert.ts";
import { FIRST } from "./_samples.ts";

Deno.test("declarationOf turns bounds and fixed values into SI", () => {
  assertEquals(FIRST.fields[0], {
    name: "supply_voltage",
    kind: "choice",
    unit: "V",
    question: "Which supply feeds the tank?",
    atLeast: 0.6,
    atMost: 1.4,
  });
  assertEquals(FIRST.fields[1]?.value, 0.9);
});

Deno.test("declarationOf tells the template's author what is wrong with a field", () => {
  const question = "?";
  const cases: [
    Record<string, Field>,
    typeof TypeError | typeof RangeError | typeof SyntaxError,
    RegExp,
  ][] = [
    [{ "Bad-Name": choice("V", { question }) }, TypeError, /lower case words/],
    [{ a: choice("V", { question: " " }) }, TypeError, /field a of t: question must be a text/],
    [{ a: choice("vlt", { question }) }, SyntaxError, /unknown unit "vlt"/],
    [{ a: choice("V", { question, atLeast: "1 A" }) }, TypeError, /expected a voltage/],
    [
      { a: choice("V", { question, atLeast: "2 V", atMost: "1 V" }) },
      RangeError,
      /atLeast must be/,
    ],
    [{ a: choice("word", { question, options: [] }) }, TypeError, /at least one word/],
    [{ a: fixed("V", "1 A", { question, reason: "r" }) }, TypeError, /expected a voltage/],
    [{ a: fixed("V", "1 V", { question, reason: "" }) }, TypeError, /reason must be a text/],
  ];
  for (const [fields, kind, wording] of cases) {
    assertThrows(() => declarationOf("t", fields), kind, wording);
  }
  assertThrows(() => declarationOf("Bias Selection", {}), TypeError, /template must be a name/);
});

Deno.test("choice and fixed give values their types", () => {
  const fields = {
    number: choice("V", { question: "?" }),
    word: choice("word", { question: "?", options: ["left", "right"] }),
    fixed_number: fixed("1", "2", { question: "?", reason: "?" }),
  };
  // The annotation is the check: it fails to compile when a type is lost.
  const values: FieldValues<typeof fields> = { number: 1, word: "left", fixed_number: 2 };
  const word: "left" | "right" = values.word;
  // @ts-expect-error a word that is no option
  const wrong: FieldValues<typeof fields> = { ...values, word: "up" };
  assertEquals([word, values.number + values.fixed_number, wrong.number], ["left", 3, 1]);
});
