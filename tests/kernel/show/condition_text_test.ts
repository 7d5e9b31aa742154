import { conditionText } from "../../../kernel/show/condition_text.ts";
import { assertEquals } from "../../assert.ts";

Deno.test("conditionText: corner, temperature in degrees, supply in volts", () => {
  assertEquals(
    conditionText({ corner: "slow", temperature: 398.15, supply: 0.95 }),
    "slow, 125 °C, 0.95 V",
  );
  assertEquals(
    conditionText({ corner: "fast", temperature: 233.15, supply: 1.1 * 1.1 }),
    "fast, -40 °C, 1.21 V",
  );
});
