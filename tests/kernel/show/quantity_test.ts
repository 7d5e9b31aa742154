import { figure } from "../../../kernel/show/figure.ts";
import { quantity } from "../../../kernel/show/quantity.ts";
import { PAYLOAD_MIME } from "../../../kernel/show/payload.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";

Deno.test("quantity: reads as a person writes it, with a name if given", () => {
  assertEquals(String(quantity(1.2e-9, "H")), "1.2 nH");
  assertEquals(String(quantity(2.4e9, "Hz", { name: "Carrier", digits: 2 })), "Carrier: 2.4 GHz");
  assert(String(quantity(1, "V", { name: "<b>" }).bundle["text/html"]).includes("&lt;b&gt;"));
  assertThrows(() => quantity(NaN, "V"), RangeError, /finite/);
});

Deno.test("figure: hands its value to the report beside the text", () => {
  const { bundle } = figure("Oscillation frequency", 2.44e9, "Hz");
  assertEquals(bundle["text/plain"], "Oscillation frequency: 2.44 GHz");
  assertEquals(bundle[PAYLOAD_MIME], {
    kind: "figure",
    name: "Oscillation frequency",
    value: 2.44e9,
    unit: "Hz",
  });
  assertThrows(() => figure("x", Infinity, "V"), RangeError, /"x": value must be finite/);
});
