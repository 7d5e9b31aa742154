import { readCard } from "../../../kernel/sheet/card.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";
import { InputError } from "../../../kernel/sheet/problem.ts";

const CARD = Deno.readTextFileSync(
  new URL("../../../notebooks/cards/illustrative_65nm.yaml", import.meta.url),
);

function lineOf(text: string, part: string): number {
  return text.slice(0, text.indexOf(part)).split("\n").length;
}

Deno.test("readCard reads the shipped card", () => {
  const card = readCard(CARD, "card.yaml");
  assertEquals(card.illustrative, true);
  assertEquals(card.supply.nominal, 1);
  assertEquals(card.temperature.highest, 398.15);
});

Deno.test("readCard names the nearest known key and the line of an unknown one", () => {
  const text = CARD.replace("minimum_length", "minimal_length");
  const place = `card.yaml:${lineOf(text, "minimal_length")}:`;
  assertThrows(
    () => readCard(text, "card.yaml"),
    InputError,
    new RegExp(
      `^${place}\\d+: transistors\\[0\\]: unknown key "minimal_length", perhaps "minimum_length"$`,
      "m",
    ),
  );
});

Deno.test("readCard finds every wrong quantity at once, each at its line", () => {
  const text = CARD.replace('nominal: "1.0 V"', 'nominal: "1.0 A"')
    .replace(/saturation_velocity: "[^"]*"/, 'saturation_velocity: "fast"');
  try {
    readCard(text, "card.yaml");
    assert(false, "expected an InputError");
  } catch (error) {
    assert(error instanceof InputError);
    assertEquals(error.problems.map(({ line }) => line), [
      lineOf(text, '"1.0 A"'),
      lineOf(text, '"fast"'),
    ]);
    assert(
      /^supply\.nominal: expected a voltage .* \(a current\)$/.test(error.problems[0]!.message),
    );
  }
});

Deno.test("readCard puts what contradicts itself at its field", () => {
  const text = CARD.replace(
    /supply: \{[^}]*\}/,
    'supply: { nominal: "2 V", lowest: "0.9 V", highest: "1 V" }',
  );
  assertThrows(
    () => readCard(text, "card.yaml"),
    InputError,
    new RegExp(
      `^card.yaml:${lineOf(text, '"2 V"')}:\\d+: supply: expected lowest <= nominal <= highest`,
    ),
  );
});

Deno.test("readCard refuses text that is not YAML, and an empty text", () => {
  assertThrows(() => readCard(CARD + "\n}", "card.yaml"), InputError, /cannot read as YAML/);
  assertThrows(
    () => readCard("", "card.yaml"),
    InputError,
    /^card\.yaml:1:1: expected named fields, got /,
  );
});
