import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { coilCurves } from "../../../lib/device/inductor_curves.ts";
import { fitCoil } from "../../../lib/device/inductor_fit.ts";
import { coilAdmittance, type CoilParameters } from "../../../lib/device/inductor_network.ts";
import { networkFromAdmittance } from "../../../lib/device/touchstone_network.ts";

const KNOWN: CoilParameters = {
  inductance: 0.9e-9,
  seriesResistance: (f) => 0.6 + 1e-5 * Math.sqrt(f),
  parallelCapacitance: 20e-15,
  substrate: { oxideCapacitance: 80e-15, siliconResistance: 500, siliconCapacitance: 0 },
};

function curvesOf(
  admittance: (frequency: number) => { re: number; im: number },
  count = 100,
) {
  const network = networkFromAdmittance({
    ports: 1,
    frequencies: Array.from({ length: count }, (_, k) => 20e9 * (k + 1) / count),
    admittance: (f) => [admittance(f)],
    parameter: "Y",
  });
  return coilCurves(network, { excitation: "differential" });
}

const exact = (f: number) => coilAdmittance(KNOWN, f, { excitation: "differential" });

/** Uniform noise from -1 to 1 of a linear congruential generator. */
function noise(seed: number): () => number {
  let state = seed;
  return () => {
    state = (1103515245 * state + 12345) % 2 ** 31;
    return state / 2 ** 30 - 1;
  };
}

Deno.test("fitCoil says by its errors how well a noisy measurement fixes each element", () => {
  let inside = 0;
  let asked = 0;
  for (let seed = 1; seed <= 20; seed++) {
    const next = noise(seed);
    // 1 % peak on each part of the admittance: 0.58 % root mean square.
    const curves = curvesOf((f) => {
      const { re, im } = exact(f);
      const size = Math.hypot(re, im);
      return { re: re + 0.01 * size * next(), im: im + 0.01 * size * next() };
    });
    const fit = fitCoil(curves, { substrate: "with" });
    assert(fit.status === "found");
    // Two parts of 0.0058 make 0.0082; a hundred points tell it to a tenth.
    assertClose(fit.residual.rms, 0.0082, { rtol: 0.2, atol: 0 });
    assertClose(fit.parameters.inductance, 0.9e-9, { rtol: 0.01, atol: 0 });
    const error = Math.log(fit.parameters.inductance / 0.9e-9);
    asked++;
    if (Math.abs(error) < 2 * fit.uncertainty.inductance!) inside++;
  }
  // Two standard errors hold 95 % of the cases: of 20, fewer than 16 have a chance of 3e-3.
  assert(inside >= 16, `${inside} of ${asked}`);
});

Deno.test("fitCoil fits below the self-resonance, or the range it is given", () => {
  const curves = curvesOf((f) =>
    coilAdmittance({ ...KNOWN, parallelCapacitance: 150e-15 }, f, { excitation: "differential" })
  );
  const resonance = curves.selfResonance ?? NaN;
  const fit = fitCoil(curves);
  assert(fit.status === "found" && fit.range.highest <= resonance && resonance < 20e9);
  const narrow = fitCoil(curves, { from: 2e9, to: 6e9 });
  assert(narrow.status === "found");
  assertEquals([narrow.range.lowest, narrow.range.highest], [2e9, 6e9]);
  assertThrows(
    () => fitCoil(curves, { from: 2e9, to: 2.5e9 }),
    RangeError,
    /must have at least 7 frequencies from 2000000000 Hz to 2500000000 Hz, got 3$/,
  );
});

Deno.test("fitCoil leaves the substrate out where it is told to, and shows the larger residual", () => {
  const curves = curvesOf(exact);
  const without = fitCoil(curves, { substrate: "without" });
  const auto = fitCoil(curves);
  assert(without.status === "found" && auto.status === "found");
  assertEquals(without.parameters.substrate, undefined);
  assert(auto.parameters.substrate !== undefined);
  assert(without.residual.rms > 100 * auto.residual.rms);
  assert(without.residual.largest >= without.residual.rms);
});

Deno.test("fitCoil says when there is no coil in the file", () => {
  const capacitor = curvesOf((f) => ({ re: 1e-6, im: 2 * Math.PI * f * 1e-13 }));
  const fit = fitCoil(capacitor);
  assertEquals(fit.status, "no fit");
  assert(fit.status === "no fit");
  assertEquals(
    fit.reason,
    "the coil is nowhere inductive with a positive loss in the fitted range",
  );
});
