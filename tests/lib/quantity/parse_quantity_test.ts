import fc from "fast-check";
import { ELEMENTARY_CHARGE } from "../../../lib/quantity/constants.ts";
import { formatQuantity } from "../../../lib/quantity/format_quantity.ts";
import { parseQuantity } from "../../../lib/quantity/parse_quantity.ts";
import { assertClose, assertEquals, assertThrows } from "../../assert.ts";

Deno.test("parseQuantity reads SI units with prefixes, correctly rounded", () => {
  const cases: [string, string, number][] = [
    ["1.2 nH", "H", 1.2e-9],
    ["1.2nH", "H", 1.2e-9],
    ["2.4 GHz", "Hz", 2.4e9],
    ["0.0024e12 Hz", "Hz", 2.4e9],
    [".5 V", "V", 0.5],
    ["+5 mA", "A", 5e-3],
    ["250 fF", "pF", 250e-15],
    ["60 MHz/V", "Hz/V", 60e6],
    ["0.35 um", "m", 0.35e-6],
    ["0.35 µm", "m", 0.35e-6],
    ["1.5 kΩ", "ohm", 1500],
    ["1.5 kohm", "ohm", 1500],
    ["20 min", "s", 1200],
  ];
  for (const [text, unit, value] of cases) assertEquals(parseQuantity(text, unit), value, text);
});

Deno.test("parseQuantity reads compound units", () => {
  const cases: [string, string, number][] = [
    ["12 fF/um^2", "F/m^2", 0.012],
    ["12 fF/µm²", "F/m^2", 0.012],
    ["12 mA/um", "A/m", 12e3],
    ["-1.5 mV/K", "V/K", -1.5e-3],
    ["-1.5 mV/°C", "V/K", -1.5e-3],
    ["200 pA/sqrt(Hz)", "A/sqrt(Hz)", 200e-12],
    ["200 pA/√Hz", "A/sqrt(Hz)", 200e-12],
    ["80 ppm/K", "1/K", 80e-6],
    ["0.1 /V", "1/V", 0.1],
    ["300 cm^2/(V s)", "m^2/(V s)", 0.03],
    ["5 ohm/sq", "ohm", 5],
    ["1 V/A", "ohm", 1],
  ];
  for (const [text, unit, value] of cases) assertEquals(parseQuantity(text, unit), value, text);
});

Deno.test("parseQuantity reads temperatures as absolute", () => {
  assertEquals(parseQuantity("125 °C", "K"), 398.15);
  assertClose(parseQuantity("-40 °C", "°C"), 233.15, { rtol: 2e-16, atol: 0 });
  assertEquals(parseQuantity("300 K", "°C"), 300);
});

Deno.test("parseQuantity reads pure numbers with and without per cent and parts per million", () => {
  assertEquals(parseQuantity("3.1", "1"), 3.1);
  assertEquals(parseQuantity("5 %", "1"), 0.05);
  assertEquals(parseQuantity("20 ppm", "1"), 20e-6);
  assertEquals(parseQuantity("20 ppm", "%"), 20e-6);
  assertEquals(Object.is(parseQuantity("-0 V", "V"), 0), true);
});

Deno.test("parseQuantity keeps decibel kinds apart", () => {
  assertEquals(parseQuantity("-112.5 dBc/Hz", "dBc/Hz"), -112.5);
  assertEquals(parseQuantity("−10 dBm", "dBm"), -10);
  assertEquals(parseQuantity("3 dB", "dB"), 3);
  const kinds = ["dB", "dBc", "dBm", "dBc/Hz", "dBm/Hz", "1", "W"];
  for (const written of kinds) {
    for (const asked of kinds) {
      if (written === asked) continue;
      assertThrows(() => parseQuantity(`3 ${written}`, asked), TypeError, /^expected a /);
    }
  }
});

Deno.test("parseQuantity takes the electronvolt from the elementary charge in force", () => {
  assertEquals(parseQuantity("1 eV", "J"), ELEMENTARY_CHARGE);
  assertClose(parseQuantity("2 meV", "J"), 2e-3 * ELEMENTARY_CHARGE, { rtol: 4e-16, atol: 0 });
});

Deno.test("parseQuantity says what was expected and what was found", () => {
  const cases: [
    string,
    string,
    typeof SyntaxError | typeof TypeError | typeof RangeError,
    RegExp,
  ][] = [
    ["1 mA", "V", TypeError, /^expected a voltage such as "1.0 V", got "1 mA" \(a current\)$/],
    ["1.0", "V", TypeError, /^expected a voltage such as "1.0 V", got "1.0" \(no unit\)$/],
    ["2.4 Ghz", "Hz", SyntaxError, /\(unknown unit "Ghz", perhaps "GHz"\)$/],
    ["1,5 V", "V", SyntaxError, /\(write the decimal mark as a point\)$/],
    ["1e999 V", "V", RangeError, /got "1e999 V" \(not finite\)$/],
    ["NaN V", "V", SyntaxError, /^expected a voltage such as "1.0 V", got "NaN V"$/],
    ["Infinity", "1", SyntaxError, /^expected a pure number such as "3.5", got "Infinity"$/],
    ["", "H", SyntaxError, /^expected an inductance such as "1.2 nH", got ""$/],
    ["V", "V", SyntaxError, /^expected a voltage/],
    ["1.2.3 V", "V", SyntaxError, /^expected a voltage/],
    ["1 V peak", "V", SyntaxError, /\(unknown unit "peak"\)$/],
    ["3 furlong", "m", SyntaxError, /\(unknown unit "furlong"\)$/],
    ["3 A (V", "V", SyntaxError, /unknown unit/],
    ["3 A (V", "V", SyntaxError, /unknown unit/],
    ["3 B", "bit", SyntaxError, /\(unknown unit "B"/],
  ];
  for (const [text, unit, kind, wording] of cases) {
    assertThrows(() => parseQuantity(text, unit), kind, wording);
  }
});

Deno.test("parseQuantity refuses a unit that the caller misspelt", () => {
  assertThrows(() => parseQuantity("1 V", "volt-ish"), SyntaxError, /unknown unit/);
});

Deno.test("parseQuantity reads back what formatQuantity writes, to the last bit", () => {
  const units = ["V", "A", "H", "F", "Hz", "ohm", "S", "s", "W", "m", "V/K", "Hz/V", "1", "K"];
  units.push("fF/um^2", "mA/um", "A/sqrt(Hz)", "dBc/Hz", "dB", "ppm", "%");
  const magnitude = fc.tuple(
    fc.double({ min: 1, max: 10, noNaN: true }),
    fc.integer({ min: -20, max: 14 }),
    fc.boolean(),
  ).map(([digits, exponent, negative]) => (negative ? -1 : 1) * Number(`${digits}e${exponent}`));
  fc.assert(
    fc.property(magnitude, fc.constantFrom(...units), (value, unit) => {
      const text = formatQuantity(value, unit, { digits: 17 });
      assertEquals(parseQuantity(text, unit), value, `${text} in ${unit}`);
    }),
    { numRuns: 500 },
  );
});

Deno.test("parseQuantity never returns a number that is not finite, whatever the text", () => {
  fc.assert(
    fc.property(fc.string(), fc.constantFrom("V", "1", "dBc/Hz", "K"), (text, unit) => {
      try {
        return Number.isFinite(parseQuantity(text, unit));
      } catch (error) {
        return error instanceof SyntaxError || error instanceof TypeError ||
          error instanceof RangeError;
      }
    }),
    { numRuns: 500 },
  );
});
