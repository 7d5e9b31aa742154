/** The junction against the textbook laws: S. M. Sze, Physics of Semiconductor Devices (from memory). */
import { assertClose } from "../assert.ts";
import { Junction } from "../../lib/device/junction.ts";

const out = new Float64Array(4);

Deno.test("Junction has C0 (1 + V_R/phi)^-m under reverse bias", () => {
  const table = [
    [0.35, [0.828077, 0.733039, 0.623458]],
    [0.5, [0.763763, 0.641689, 0.509175]],
  ] as const;
  for (const [grading, expected] of table) {
    const junction = new Junction({
      saturationCurrent: 0,
      emission: 1,
      temperature: 300,
      zeroBiasCapacitance: 1,
      builtInPotential: 0.7,
      grading,
    });
    const found = [0.5, 1, 2].map((reverse) => {
      junction.evaluate(-reverse, out);
      return out[3]!;
    });
    // Half the last printed digit.
    assertClose(found, expected, { rtol: 0, atol: 0.5e-6 });
  }
});

Deno.test("Junction multiplies its current by ten every U_T ln 10 = 59.5 mV at 300 K", () => {
  const junction = new Junction({
    saturationCurrent: 1e-16,
    emission: 1,
    temperature: 300,
    zeroBiasCapacitance: 0,
    builtInPotential: 0.7,
    grading: 0.5,
  });
  // U_T = 25.851999786 mV at 300 K from the exact constants (BIPM, SI brochure, 2019).
  for (let decade = 1; decade <= 14; decade++) {
    junction.evaluate(decade * 25.851999786e-3 * Math.LN10, out);
    assertClose(out[0]!, 1e-16 * (10 ** decade - 1), { rtol: 1e-8, atol: 0 });
  }
});
