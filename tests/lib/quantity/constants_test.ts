import {
  BOLTZMANN,
  ELEMENTARY_CHARGE,
  EPSILON_0,
  MU_0,
  PHYSICAL_CONSTANTS,
} from "../../../lib/quantity/constants.ts";
import { assertClose, assertEquals } from "../../assert.ts";

Deno.test("constants are those of CODATA 2022, exact where the SI fixes them", () => {
  // BIPM, The International System of Units, 9th edition, 2019, section 2.2: k and e are exact.
  // CODATA 2022 for epsilon_0, 8.854 187 8188(14) pF/m, and mu_0, 1.256 637 061 27(20) uN/A^2.
  const typed = [
    [BOLTZMANN, 1380649, 1e-29],
    [ELEMENTARY_CHARGE, 1602176634, 1e-28],
    [EPSILON_0, 88541878188, 1e-22],
    [MU_0, 125663706127, 1e-17],
  ] as const;
  for (const [value, integer, unit] of typed) {
    assertClose(value, integer * unit, { rtol: 4e-16, atol: 0 });
  }
  assertEquals(PHYSICAL_CONSTANTS.BOLTZMANN.uncertainty, 0);
  assertEquals(PHYSICAL_CONSTANTS.ELEMENTARY_CHARGE.exact, true);
  assertEquals(PHYSICAL_CONSTANTS.MU_0.exact, false);
});

Deno.test("constants: epsilon_0 mu_0 c^2 is 1 within the stated uncertainty", () => {
  // c = 299 792 458 m/s is exact (BIPM 2019); both uncertainties are 1.6e-10 relative.
  assertClose(EPSILON_0 * MU_0 * 299792458 ** 2, 1, { rtol: 0, atol: 3.2e-10 });
});

Deno.test("constants: the thermal voltage at 300 K is 25.852 mV", () => {
  // k T / q from the exact SI values (BIPM 2019), by long division: 25.851 999 786 mV.
  assertClose(BOLTZMANN * 300 / ELEMENTARY_CHARGE, 25.851999786e-3, { rtol: 1e-10, atol: 0 });
});
