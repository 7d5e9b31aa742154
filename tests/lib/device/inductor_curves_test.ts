import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { coilCurves, interpolatedAdmittance } from "../../../lib/device/inductor_curves.ts";
import { networkFromAdmittance } from "../../../lib/device/touchstone_network.ts";

const FREQUENCIES = [0, 1e9, 2e9, 3e9, 4e9, 5e9];

/** Series branch of R and L, and an unequal capacitance at each end. */
function unequal(frequency: number) {
  const w = 2 * Math.PI * frequency;
  const size = 2 ** 2 + (w * 1e-9) ** 2;
  const [re, im] = [2 / size, -w * 1e-9 / size];
  return [
    { re, im: im + w * 30e-15 },
    { re: -re, im: -im },
    { re: -re, im: -im },
    { re, im: im + w * 50e-15 },
  ];
}

const network = networkFromAdmittance({
  ports: 2,
  frequencies: FREQUENCIES,
  admittance: unequal,
  parameter: "Y",
});

Deno.test("coilCurves drives a two-port between its ends or at one", () => {
  const differential = coilCurves(network, { excitation: "differential" });
  const single = coilCurves(network, { excitation: "single_ended" });
  differential.frequencies.forEach((frequency, k) => {
    const w = 2 * Math.PI * frequency;
    const series = unequal(frequency)[1]!;
    const bound = { rtol: 1e-12, atol: 0 };
    // At +V/2 and -V/2 each end's capacitance counts a quarter.
    assertClose(differential.susceptance[k]!, -series.im + w * 20e-15, bound);
    assertClose(single.susceptance[k]!, -series.im + w * 30e-15, bound);
    assertClose(differential.conductance[k]!, -series.re, bound);
    // Per end, both ends at one potential.
    assertClose(differential.toGround!.susceptance[k]!, w * 40e-15, bound);
    assertClose(single.toGround!.susceptance[k]!, w * 30e-15, bound);
  });
  assert(!differential.tapGrounded);
});

Deno.test("coilCurves leaves out 0 Hz and gives L, Q and R of the series form", () => {
  const one = networkFromAdmittance({
    ports: 1,
    frequencies: FREQUENCIES,
    admittance: (f) => {
      const { re, im } = unequal(f)[1]!;
      return [{ re: -re, im: -im }];
    },
  });
  const curves = coilCurves(one, { excitation: "differential" });
  assertEquals([...curves.frequencies], FREQUENCIES.slice(1));
  curves.frequencies.forEach((frequency, k) => {
    const bound = { rtol: 1e-12, atol: 0 };
    assertClose(curves.inductance[k]!, 1e-9, bound);
    assertClose(curves.seriesResistance[k]!, 2, bound);
    assertClose(curves.quality[k]!, Math.PI * frequency * 1e-9, bound);
  });
  assertEquals(curves.toGround, undefined);
  assertEquals(curves.selfResonance, undefined);
});

Deno.test("interpolatedAdmittance passes through the points and has the order of a cubic between", () => {
  const errorOf = (count: number) => {
    const frequencies = Float64Array.from(
      { length: count + 1 },
      (_, k) => 1e9 * (1 + 9 * k / count),
    );
    const drive = Array.from(frequencies, (f) => unequal(f)[0]!);
    const admittance = interpolatedAdmittance({
      frequencies,
      conductance: Float64Array.from(drive, ({ re }) => re),
      susceptance: Float64Array.from(drive, ({ im }) => im),
    });
    assertClose(admittance(frequencies[1]!).im, drive[1]!.im, { rtol: 1e-14, atol: 0 });
    let worst = 0;
    for (let f = 1.1e9; f < 10e9; f += 0.007e9) {
      const { re, im } = unequal(f)[0]!;
      const found = admittance(f);
      worst = Math.max(worst, Math.hypot(found.re - re, found.im - im) / Math.hypot(re, im));
    }
    return worst;
  };
  const [coarse, fine] = [errorOf(100), errorOf(200)];
  // Four points: an error of fourth order, 16 for each halving, met to a third of an order.
  assert(coarse / fine > 2 ** (4 - 1 / 3), `${coarse} to ${fine}`);
});

Deno.test("coilCurves refuses an unknown drive and a file of direct current only", () => {
  assertThrows(
    () => coilCurves(network, { excitation: "common" as "differential" }),
    TypeError,
    /excitation must be one of differential, single_ended, got common$/,
  );
  const direct = networkFromAdmittance({
    ports: 1,
    frequencies: [0],
    admittance: () => [{ re: 1, im: 0 }],
  });
  assertThrows(
    () => coilCurves(direct, { excitation: "differential" }),
    RangeError,
    /must have a frequency > 0 Hz, got none$/,
  );
});
