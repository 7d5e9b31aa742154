import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { coilFromFigures } from "../../../lib/device/inductor_from_figures.ts";

const figures = {
  inductance: 1e-9,
  quality: 12,
  frequency: 5e9,
  excitation: "differential",
} as const;

Deno.test("coilFromFigures has the figures it was given", () => {
  const coil = coilFromFigures({ ...figures, coupling: 0.6 });
  const rounding = { rtol: 1e-14, atol: 0 };
  assertClose(coil.quality(5e9), 12, rounding);
  assertClose(coil.inductance(5e9), 1e-9, rounding);
  // R (1 + Q^2) of the series form.
  const resistance = 2 * Math.PI * 5e9 * 1e-9 / 12;
  assertClose(coil.parallelResistance(5e9), resistance * (1 + 144), rounding);
  assertEquals(coil.parameters.coupling, 0.6);
  assertEquals(coil.selfResonance, undefined);
});

Deno.test("coilFromFigures keeps its series resistance at other frequencies", () => {
  assertClose(coilFromFigures(figures).quality(10e9), 24, { rtol: 1e-14, atol: 0 });
});

Deno.test("coilFromFigures refuses figures out of range", () => {
  assertThrows(
    () => coilFromFigures({ ...figures, quality: 0 }),
    RangeError,
    /quality factor must be > 0, got 0$/,
  );
  assertThrows(
    () => coilFromFigures({ ...figures, frequency: NaN }),
    RangeError,
    /frequency must be > 0 Hz, got NaN Hz$/,
  );
});
