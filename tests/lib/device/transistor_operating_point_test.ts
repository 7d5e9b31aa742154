import { assertEquals } from "../../assert.ts";
import { inversionName } from "../../../lib/device/transistor_operating_point.ts";

Deno.test("inversionName is moderate from 0.1 to 10", () => {
  assertEquals([0.09, 0.1, 1, 10, 11].map(inversionName), [
    "weak",
    "moderate",
    "moderate",
    "moderate",
    "strong",
  ]);
});
