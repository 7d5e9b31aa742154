import { type Payload, PAYLOAD_MIME } from "../../kernel/show/payload.ts";
import { collectPayloads } from "../../reports/collect_payloads.ts";
import { TemplateFailure } from "../../reports/exit_status.ts";
import { assertEquals, assertThrows } from "../assert.ts";

function display(payload: Payload | { readonly kind: string }) {
  return { type: "display", data: { "text/plain": "x", [PAYLOAD_MIME]: payload } } as const;
}

const FIGURE = { kind: "figure", name: "supply", value: 1, unit: "V" } as const;
const SHEET = { kind: "sheet", template: "swing", fields: [] } as const;

Deno.test("collectPayloads takes payloads from displays only, without their kind", () => {
  const stress = { device: "M1", quantity: "q", value: 1, limit: 2, unit: "V", at: "fast" };
  const collected = collectPayloads("swing", [
    { type: "stream", name: "stdout", text: JSON.stringify(FIGURE) },
    { type: "display", data: { "text/plain": "no payload" } },
    display(SHEET),
    display(FIGURE),
    display({ kind: "stress", rows: [stress] }),
    display({ kind: "stress", rows: [stress] }),
  ]);
  assertEquals(collected, {
    declaration: { template: "swing", fields: [] },
    verdicts: [],
    figures: [{ name: "supply", value: 1, unit: "V" }],
    stresses: [stress, stress],
  });
});

Deno.test("collectPayloads refuses what the report could not tell apart or does not know", () => {
  const cases: [ReturnType<typeof display>[], RegExp][] = [
    [[display(FIGURE), display(FIGURE)], /shows two figures named "supply"/],
    [[display(SHEET), display(SHEET)], /declares its sheet twice/],
    [[display({ ...SHEET, template: "other" })], /declared as "other"/],
    [[display({ kind: "picture" })], /unknown kind of payload "picture"/],
  ];
  for (const [outputs, wording] of cases) {
    assertThrows(() => collectPayloads("swing", outputs), TemplateFailure, wording);
  }
});
