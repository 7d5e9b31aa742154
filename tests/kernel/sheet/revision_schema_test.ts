import { Ajv } from "ajv";
import { parse } from "yaml";
import { blankRevision } from "../../../kernel/sheet/blank_revision.ts";
import { checkRevision } from "../../../kernel/sheet/check_revision.ts";
import { readRevision } from "../../../kernel/sheet/revision.ts";
import { revisionSchema } from "../../../kernel/sheet/revision_schema.ts";
import { assert, assertEquals } from "../../assert.ts";
import { FIRST, GOOD, SECOND } from "./_samples.ts";

const validate = new Ajv().compile(revisionSchema([FIRST, SECOND]));

Deno.test("revisionSchema takes a good revision", () => {
  assertEquals(validate(parse(GOOD)), true, JSON.stringify(validate.errors));
});

Deno.test("revisionSchema refuses unknown keys, unknown and missing fields, and fixed ones", () => {
  const bad = [
    GOOD.replace("author:", "auther:"),
    GOOD.replace("quality_factor:", "qualty_factor:"),
    GOOD.replace(/ {2}supply_voltage.*\n/, ""),
    GOOD.replace("fields:\n", 'fields:\n  knee_multiple: { value: "1", reason: "x" }\n'),
    GOOD.replace("nmos_pair", "other_pair"),
    GOOD.replace("second_sheet]", "third_sheet]"),
  ];
  for (const text of bad) assertEquals(validate(parse(text)), false, text);
});

const OPTIONS = {
  design: "Test",
  revision: "a",
  card: "card.yaml",
  schema: "revision.schema.json",
};

Deno.test("blankRevision is complete once its commented choices are filled in", () => {
  const blank = blankRevision([FIRST, SECOND], OPTIONS);
  assert(blank.startsWith("# yaml-language-server: $schema=revision.schema.json\n"));
  const filled = blank.replace("author:", "author: A. Tester").replace(
    "review_date:",
    "review_date: 2026-11-16",
  )
    .replaceAll(/^ {2}# (\w+: \{ value: "")/gm, "  $1")
    .replace(
      'supply_voltage: { value: "", reason: ""',
      'supply_voltage: { value: "1 V", reason: "a"',
    )
    .replace('topology: { value: "", reason: ""', 'topology: { value: "nmos_pair", reason: "b"')
    .replace(
      'quality_factor: { value: "", reason: ""',
      'quality_factor: { value: "10", reason: "c"',
    );
  assertEquals(checkRevision(readRevision(filled, "rev_a.yaml"), [FIRST, SECOND]), []);
});

Deno.test("blankRevision as written lists what is still to be filled in", () => {
  const file = readRevision(blankRevision([FIRST, SECOND], OPTIONS), "rev_a.yaml");
  const messages = checkRevision(file, [FIRST, SECOND]).map(({ message }) => message);
  for (
    const start of [
      "author is missing",
      "review_date is missing",
      "missing choice supply_voltage",
      "missing choice topology",
      "missing choice quality_factor",
    ]
  ) {
    assert(messages.some((message) => message.startsWith(start)), start);
  }
  assertEquals(messages.length, 5);
});

Deno.test("blankRevision gives question, unit and bounds above each choice, and what is fixed", () => {
  const blank = blankRevision([FIRST, SECOND], OPTIONS);
  assert(blank.includes(
    "  # Which supply feeds the tank?\n  # V, from 600 mV to 1.4 V (first_sheet, second_sheet)\n" +
      '  # supply_voltage: { value: "", reason: "" }\n',
  ));
  assert(blank.includes("  # one of nmos_pair, pmos_pair (first_sheet)\n"));
  assert(blank.includes("#   knee_multiple: 0.9 (first_sheet: house rule)\n"));
});
