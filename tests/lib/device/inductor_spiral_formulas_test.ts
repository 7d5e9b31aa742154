import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import type { SpiralGeometry } from "../../../lib/device/inductor_geometry.ts";
import {
  SPIRAL_FORMULAS,
  type SpiralFormula,
  spiralInductance,
} from "../../../lib/device/inductor_spiral_formulas.ts";

const geometry: SpiralGeometry = {
  shape: "octagonal",
  turns: 4,
  width: 8e-6,
  spacing: 2e-6,
  outerDiameter: 200e-6,
};

function scaled(factor: number): SpiralGeometry {
  return {
    ...geometry,
    width: factor * geometry.width,
    spacing: factor * geometry.spacing,
    outerDiameter: factor * geometry.outerDiameter,
  };
}

Deno.test("spiralInductance grows with the size of the drawing", () => {
  // Exactly so by Maxwell's equations and by two of the forms; the exponents of the fit add up to 1.008.
  const exponent: Record<SpiralFormula, number> = {
    modified_wheeler: 1,
    current_sheet: 1,
    monomial: -1.21 - 0.163 + 2.43 - 0.049,
  };
  for (const formula of SPIRAL_FORMULAS) {
    const one = spiralInductance(geometry, { formula }).inductance;
    const three = spiralInductance(scaled(3), { formula }).inductance;
    assertClose(three / one, 3 ** exponent[formula], { rtol: 1e-13, atol: 0, what: formula });
  }
});

Deno.test("spiralInductance uses the current sheet unless told otherwise", () => {
  const { formula, inductance, warnings } = spiralInductance(geometry);
  assertEquals(formula, "current_sheet");
  assertEquals(inductance, spiralInductance(geometry, { formula: "current_sheet" }).inductance);
  assertEquals(warnings, []);
});

Deno.test("spiralInductance warns of a fill ratio and a spacing outside the compared range", () => {
  const hollow = spiralInductance({ ...geometry, turns: 1, outerDiameter: 400e-6 });
  assertEquals(hollow.warnings.map(({ quantity }) => quantity), ["fill ratio"]);
  assertClose(hollow.warnings[0]!.value, 16 / 784, { rtol: 1e-12, atol: 0 });
  const wide = spiralInductance({ ...geometry, spacing: 30e-6, outerDiameter: 400e-6 });
  assertEquals(wide.warnings.map(({ quantity }) => quantity), ["spacing over width"]);
  assertEquals(
    wide.warnings[0]!.text,
    "spacing is 3.75 widths; above 3 the error may pass 8 %",
  );
});

Deno.test("spiralInductance refuses a circle in a formula without its coefficients", () => {
  assertThrows(
    () => spiralInductance({ ...geometry, shape: "circular" }, { formula: "monomial" }),
    TypeError,
    /a circular spiral needs the formula current_sheet, got monomial$/,
  );
  assertThrows(
    () => spiralInductance(geometry, { formula: "greenhouse" as "monomial" }),
    TypeError,
    /formula must be one of modified_wheeler, current_sheet, monomial, got greenhouse$/,
  );
});
