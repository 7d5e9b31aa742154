import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { coilFromNetwork } from "../../../lib/device/inductor_from_network.ts";
import { networkFromAdmittance } from "../../../lib/device/touchstone_network.ts";

const FREQUENCIES = Array.from({ length: 40 }, (_, k) => 0.5e9 * (k + 1));

function oneport(admittance: (f: number) => { re: number; im: number }) {
  return networkFromAdmittance({
    ports: 1,
    frequencies: FREQUENCIES,
    admittance: (f) => [admittance(f)],
    parameter: "Y",
  });
}

/** Series R and L. */
function bare(f: number) {
  const reactance = 2 * Math.PI * f * 1e-9;
  const size = 4 + reactance ** 2;
  return { re: 2 / size, im: -reactance / size };
}

Deno.test("coilFromNetwork gives the file's curves, inside its frequencies only", () => {
  const result = coilFromNetwork(oneport(bare), { excitation: "differential" });
  assert(result.status === "found");
  assertEquals(result.coil.origin, "file");
  assertClose(result.coil.quality(3.3e9), Math.PI * 3.3, { rtol: 1e-6, atol: 0 });
  assertThrows(
    () => result.coil.inductance(30e9),
    RangeError,
    /frequency must be from 500000000 Hz to 20000000000 Hz, got 30000000000 Hz$/,
  );
});

Deno.test("coilFromNetwork takes the coupling it is told", () => {
  const result = coilFromNetwork(oneport(bare), { excitation: "differential", coupling: 0.55 });
  assert(result.status === "found");
  assertEquals(result.coil.parameters.coupling, 0.55);
});

Deno.test("coilFromNetwork warns of a file that gains and of a fit that misses", () => {
  const gaining = coilFromNetwork(
    oneport((f) => f === 20e9 ? { re: -1e-4, im: bare(f).im } : bare(f)),
    { excitation: "differential" },
  );
  assert(gaining.status === "found");
  const [warning] = gaining.coil.warnings;
  assertEquals(warning?.quantity, "conductance");
  assert(warning?.text.startsWith("the file shows no loss at 20000000000 Hz"));
  // A second resonance, which the network does not have.
  const trap = (f: number) => {
    const w = 2 * Math.PI * f;
    return { re: 1e-3, im: 1 / (1 / (w * 200e-15) - w * 1e-9) };
  };
  const twofold = coilFromNetwork(
    oneport((f) => ({ re: bare(f).re + trap(f).re, im: bare(f).im + trap(f).im })),
    { excitation: "differential", to: 20e9 },
  );
  assert(twofold.status === "found");
  assertEquals(twofold.coil.warnings.map(({ quantity }) => quantity), [
    "residual of the lumped fit",
  ]);
});

Deno.test("coilFromNetwork gives the curves with the reason where nothing fits", () => {
  const result = coilFromNetwork(
    oneport((f) => ({ re: 1e-6, im: 2 * Math.PI * f * 1e-13 })),
    { excitation: "single_ended" },
  );
  assert(result.status === "no fit");
  assert(result.reason.startsWith("the coil is nowhere inductive"));
  assertEquals(result.curves.frequencies.length, FREQUENCIES.length);
});
