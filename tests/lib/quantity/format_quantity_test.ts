import fc from "fast-check";
import { formatQuantity } from "../../../lib/quantity/format_quantity.ts";
import { parseQuantity } from "../../../lib/quantity/parse_quantity.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";

Deno.test("formatQuantity writes engineering prefixes and at most four digits", () => {
  const cases: [number, string, string][] = [
    [1.2e-9, "H", "1.2 nH"],
    [4.8844e9, "Hz", "4.884 GHz"],
    [0.05, "V", "50 mV"],
    [999.96e6, "Hz", "1 GHz"],
    [1500, "ohm", "1.5 kohm"],
    [3.1, "1", "3.1"],
    [0, "V", "0 V"],
    [-0, "V", "0 V"],
    [-2.5e-3, "A", "-2.5 mA"],
    [6e7, "Hz/V", "60 MHz/V"],
    [200e-12, "A/sqrt(Hz)", "200 pA/sqrt(Hz)"],
    [1e-25, "F", "1e-25 F"],
    [1234567, "1", "1.235e6"],
    [0.00012, "1", "0.00012"],
    [1e-12, "m^2", "1e-12 m^2"],
  ];
  for (const [value, unit, text] of cases) assertEquals(formatQuantity(value, unit), text);
});

Deno.test("formatQuantity keeps a unit that already carries a prefix", () => {
  assertEquals(formatQuantity(12e3, "mA/um"), "12 mA/um");
  assertEquals(formatQuantity(0.01, "fF/um^2"), "10 fF/um^2");
  assertEquals(formatQuantity(80e-6, "ppm/K"), "80 ppm/K");
  assertEquals(formatQuantity(0.05, "%"), "5 %");
  assertEquals(formatQuantity(398.15, "°C"), "125 °C");
});

Deno.test("formatQuantity gives decibels one fixed decimal unless digits are asked for", () => {
  assertEquals(formatQuantity(-112.34, "dBc/Hz"), "-112.3 dBc/Hz");
  assertEquals(formatQuantity(-98.04, "dBc/Hz"), "-98.0 dBc/Hz");
  assertEquals(formatQuantity(-0.04, "dB"), "0.0 dB");
  assertEquals(formatQuantity(-112.345, "dBc/Hz", { digits: 6 }), "-112.345 dBc/Hz");
});

Deno.test("formatQuantity refuses what is not a finite number, and impossible digits", () => {
  for (const value of [NaN, Infinity, -Infinity]) {
    assertThrows(() => formatQuantity(value, "V"), RangeError, /value must be finite, got .* V$/);
  }
  for (const digits of [0, 18, 2.5, NaN]) {
    assertThrows(() => formatQuantity(1, "V", { digits }), RangeError, /digits must be 1 to 17/);
  }
  assertThrows(() => formatQuantity(1, "parsec"), SyntaxError, /unknown unit "parsec"/);
});

Deno.test("formatQuantity is off by half a unit of the last digit at most", () => {
  fc.assert(
    fc.property(
      fc.double({ min: 1e-17, max: 1e13, noNaN: true }),
      fc.integer({ min: 1, max: 12 }),
      (value, digits) => {
        const back = parseQuantity(formatQuantity(value, "V", { digits }), "V");
        // Half a unit of the last digit relative to the value is 0.5 x 10^(1 - digits) at most;
        // reading the two decimals adds a rounding each.
        assert(Math.abs(back - value) <= value * (0.5 * 10 ** (1 - digits) + 4e-16), String(value));
      },
    ),
  );
});
