import { resolveUnit } from "../../../lib/quantity/unit.ts";
import { assertClose, assertEquals, assertThrows } from "../../assert.ts";

Deno.test("resolveUnit gives equal dimensions to units of one kind only", () => {
  const same = [
    ["V", "mV"],
    ["ohm", "V/A"],
    ["S", "A/V"],
    ["W", "V A"],
    ["F", "C/V"],
    [
      "ohm",
      "1/S",
    ],
    ["H", "Wb/A"],
    ["A/sqrt(Hz)", "A s^0.5"],
    ["V/K", "V/°C"],
  ];
  for (const [a, b] of same) {
    assertEquals(resolveUnit(a!).dimension, resolveUnit(b!).dimension, `${a} and ${b}`);
  }
  const apart = ["V", "A", "Hz", "rad/s", "dB", "dBc", "dBm", "dBc/Hz", "1", "K", "m", "bit"];
  assertEquals(new Set(apart.map((unit) => resolveUnit(unit).dimension)).size, apart.length);
});

Deno.test("resolveUnit gives scales as powers of ten where they are", () => {
  assertEquals(resolveUnit("fF/um^2").scale, 1e-3);
  assertEquals(resolveUnit("mA/um").decimalExponent, 3);
  assertEquals(resolveUnit("deg").decimalExponent, undefined);
  assertClose(resolveUnit("deg").scale, Math.PI / 180, { rtol: 4e-16, atol: 0 });
  assertEquals(resolveUnit("°C").offset, 273.15);
  assertEquals(resolveUnit("V/°C").offset, 0);
});

Deno.test("resolveUnit divides by the next factor only", () => {
  assertEquals(resolveUnit("A/V/V").dimension, resolveUnit("A/V^2").dimension);
  assertEquals(resolveUnit("A/(V V)").dimension, resolveUnit("A/V^2").dimension);
  assertEquals(resolveUnit("A/V V").dimension, resolveUnit("A").dimension);
});

Deno.test("resolveUnit refuses what is not a unit", () => {
  for (const text of ["", "V/", "/V", "V)", "(V", "sqrt(", "V^", "3 V", "V-A", "pint", "ch"]) {
    assertThrows(() => resolveUnit(text), SyntaxError, /^unknown unit "/);
  }
});
