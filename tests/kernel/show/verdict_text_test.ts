import { differenceText, limitText, STATE_SYMBOLS } from "../../../kernel/show/verdict_text.ts";
import { assertEquals } from "../../assert.ts";

Deno.test("limitText: says either side, or both", () => {
  assertEquals(limitText({ limit: { atLeast: 2 }, unit: "1" }), "at least 2");
  assertEquals(limitText({ limit: { atMost: 3e-3 }, unit: "W" }), "at most 3 mW");
  assertEquals(limitText({ limit: { atLeast: 0.9, atMost: 1.1 }, unit: "V" }), "900 mV to 1.1 V");
});

Deno.test("differenceText: a span of degrees is in kelvin, a span of levels in decibels", () => {
  assertEquals(differenceText(5, "°C"), "5 K");
  assertEquals(differenceText(-1.5, "dBc/Hz"), "-1.5 dB");
  assertEquals(differenceText(-0.11, "V"), "-110 mV");
});

Deno.test("STATE_SYMBOLS: no two states share a symbol", () => {
  const symbols = Object.values(STATE_SYMBOLS);
  assertEquals(new Set(symbols).size, symbols.length);
});
