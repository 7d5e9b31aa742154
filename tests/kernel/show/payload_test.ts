import * as notebook from "../../../kernel/mod.ts";
import { PAYLOAD_MIME } from "../../../kernel/show/payload.ts";
import { assert, assertEquals } from "../../assert.ts";

Deno.test("PAYLOAD_MIME: is a vendor type with a version and JSON syntax (RFC 6838)", () => {
  assert(/^application\/vnd\.[a-z]+\.v\d+\+json$/.test(PAYLOAD_MIME));
});

Deno.test("tankwright/notebook: gives a cell everything that can be asked for or shown", () => {
  for (
    const name of [
      "chart",
      "choice",
      "figure",
      "fixed",
      "formula",
      "progress",
      "quantity",
      "seriesStyle",
      "shareChart",
      "sheet",
      "show",
      "stress",
      "sweepChart",
      "table",
      "verdict",
      "waveform",
    ]
  ) assertEquals(typeof notebook[name as keyof typeof notebook], "function", name);
});
