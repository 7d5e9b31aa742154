import { fileURLToPath } from "node:url";
import { runNotebook } from "../../../kernel/run/run_notebook.ts";
import { choice, fixed } from "../../../kernel/sheet/field.ts";
import { HANDOVER } from "../../../kernel/sheet/handover.ts";
import { InputError } from "../../../kernel/sheet/problem.ts";
import { sheet } from "../../../kernel/sheet/sheet.ts";
import { PAYLOAD_MIME } from "../../../kernel/show/payload.ts";
import { assert, assertEquals, assertRejects } from "../../assert.ts";

const data = fileURLToPath(new URL("../../reports/data/", import.meta.url));
const example = `${data}example.yaml`;

Deno.test("sheet fills itself from its example when nothing was handed over", async () => {
  const given = await sheet({
    template: "swing",
    example,
    fields: {
      supply_voltage: choice("V", { question: "Which supply?" }),
      knee_multiple: fixed("1", "0.9", { question: "How far?", reason: "house rule" }),
      topology: choice("word", { question: "Which pair?", options: ["nmos_pair", "pmos_pair"] }),
    },
  });
  // The types are part of the check: a number and one of two words.
  const product: number = given.value.supply_voltage * given.value.knee_multiple;
  const word: "nmos_pair" | "pmos_pair" = given.value.topology;
  assertEquals([product, word], [0.9, "nmos_pair"]);
  assertEquals(given.revision.design, "Test oscillator");
  assertEquals(given.card.illustrative, true);
  assertEquals(given.fields.map(({ text }) => text), ["1.0 V", "0.9", "nmos_pair"]);
});

Deno.test("sheet refuses an example that cannot fill it, every problem with its place", async () => {
  await assertRejects(
    () =>
      sheet({
        template: "swing",
        example,
        fields: {
          supply_voltage: choice("A", { question: "Which current?" }),
          missing_one: choice("1", { question: "What is missing?" }),
        },
      }),
    InputError,
    /^.*example\.yaml:7:1: missing choice missing_one .*\n.*example\.yaml:8:28: supply_voltage: expected a current/,
  );
});

Deno.test("sheet finds a field that nothing asks for when its template stands alone", async () => {
  const globals = globalThis as { [HANDOVER]?: unknown };
  globals[HANDOVER] = {
    revisionText: (await Deno.readTextFile(example)).replace("[swing, quality]", "[swing]"),
    revisionFile: "rev.yaml",
    cardText: "",
    cardFile: "card.yaml",
  };
  try {
    const fields = { supply_voltage: choice("V", { question: "Which supply?" }) };
    await assertRejects(
      () => sheet({ template: "swing", example, fields }),
      InputError,
      /^rev\.yaml:9:3: unknown field quality_factor\nrev\.yaml:10:3: unknown field topology$/,
    );
  } finally {
    delete globals[HANDOVER];
  }
});

Deno.test("sheet shows the filled fields in the notebook, and declares itself to the report", async () => {
  const cells = await runNotebook(`${data}templates/swing.ipynb`, { cellTimeout: 30 });
  const outputs = cells.flatMap((cell) => cell.id === "sheet" ? cell.outputs : []);
  assertEquals(outputs.length, 1);
  const [output] = outputs;
  assert(output?.type === "display");
  const html = String(output.data["text/html"]);
  for (
    const part of [
      "Which supply feeds the tank?",
      "1.0 V",
      "the regulator gives it",
      "fixed: house rule",
    ]
  ) {
    assert(html.includes(part), part);
    assert(String(output.data["text/plain"]).includes(part), part);
  }
  const payload = output.data[PAYLOAD_MIME] as {
    kind: string;
    template: string;
    fields: unknown[];
  };
  assertEquals([payload.kind, payload.template, payload.fields.length], ["sheet", "swing", 2]);
});
