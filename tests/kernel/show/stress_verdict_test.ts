import type { Stress } from "../../../kernel/show/payload.ts";
import { stressVerdict } from "../../../kernel/show/stress_verdict.ts";
import { assertEquals, assertThrows } from "../../assert.ts";

const row = (device: string, value: number, limit: number): Stress => ({
  device,
  quantity: "drain to source voltage, peak",
  value,
  limit,
  unit: "V",
  at: "fast, -40 °C",
});

Deno.test("stressVerdict judges the stress nearest to its own limit", () => {
  const { payload } = stressVerdict("voltage", [row("a", 2, 3), row("b", 1.2, 1.3)]);
  assertEquals(payload.value, 1.2);
  assertEquals(payload.limit, { atMost: 1.3 });
  assertEquals(payload.state, "met");
  assertEquals(payload.note, "drain to source voltage, peak of b at fast, -40 °C");
});

Deno.test("stressVerdict is thin inside the reserve and missed beyond the limit", () => {
  assertEquals(stressVerdict("voltage", [row("a", 1.27, 1.3)]).payload.state, "thin");
  assertEquals(
    stressVerdict("voltage", [row("a", 1.27, 1.3)], { reserve: 0.01 }).payload.state,
    "met",
  );
  assertEquals(stressVerdict("voltage", [row("a", 1.31, 1.3)]).payload.state, "missed");
});

Deno.test("stressVerdict is not run where stresses are missing", () => {
  const { payload } = stressVerdict("voltage", [row("a", 1, 1.3)], { missing: "no orbit" });
  assertEquals([payload.state, payload.note], ["not run", "no orbit"]);
  const empty = stressVerdict("voltage", [], { missing: "no orbit" });
  assertEquals([empty.payload.state, empty.payload.value], ["not run", null]);
  assertThrows(() => stressVerdict("voltage", []), RangeError, /there are no stresses/);
});
