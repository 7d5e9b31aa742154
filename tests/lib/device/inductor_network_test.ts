import { assertClose } from "../../assert.ts";
import {
  coilAdmittance,
  type CoilParameters,
  substrateAdmittance,
} from "../../../lib/device/inductor_network.ts";

const coil: CoilParameters = {
  inductance: 1.5e-9,
  seriesResistance: () => 1.2,
  parallelCapacitance: 6e-15,
  substrate: { oxideCapacitance: 50e-15, siliconResistance: 800, siliconCapacitance: 12e-15 },
};

Deno.test("substrateAdmittance is the silicon's at high frequency and the oxide's at low", () => {
  const substrate = coil.substrate!;
  const low = substrateAdmittance(substrate, 1e3);
  assertClose(low.im, 2 * Math.PI * 1e3 * 50e-15, { rtol: 1e-9, atol: 0 });
  // Far above: both capacitances in series.
  const high = substrateAdmittance(substrate, 1e15);
  assertClose(high.im, 2 * Math.PI * 1e15 * (50 * 12 / 62) * 1e-15, { rtol: 1e-6, atol: 0 });
});

Deno.test("substrateAdmittance is the parallel form of Yue and Wong", () => {
  // Rp and Cp as printed in IEEE J. Solid-State Circuits 33 (1998) 743 (from memory).
  const [ox, r, si, f] = [50e-15, 800, 12e-15, 5e9];
  const w = 2 * Math.PI * f;
  const rp = 1 / (w * w * ox * ox * r) + r * (ox + si) ** 2 / ox ** 2;
  const cp = ox * (1 + w * w * (ox + si) * si * r * r) / (1 + w * w * (ox + si) ** 2 * r * r);
  const { re, im } = substrateAdmittance(coil.substrate!, f);
  assertClose(re, 1 / rp, { rtol: 1e-13, atol: 0 });
  assertClose(im, w * cp, { rtol: 1e-13, atol: 0 });
});

Deno.test("coilAdmittance counts half the substrate when driven between the ends", () => {
  const f = 7e9;
  const { substrate: _, ...bare } = coil;
  const series = coilAdmittance(bare, f, { excitation: "differential" });
  const single = coilAdmittance(coil, f, { excitation: "single_ended" });
  const differential = coilAdmittance(coil, f, { excitation: "differential" });
  const rounding = { rtol: 1e-13, atol: 0 };
  assertClose(differential.re - series.re, (single.re - series.re) / 2, rounding);
  assertClose(differential.im - series.im, (single.im - series.im) / 2, rounding);
});
