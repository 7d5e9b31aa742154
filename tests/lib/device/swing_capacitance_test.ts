import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { swingCapacitance, waveformCapacitance } from "../../../lib/device/swing_capacitance.ts";

const ROUNDING = { rtol: 1e-13, atol: 0 };

Deno.test("swingCapacitance of a linear law is the value at the bias, at any swing", () => {
  for (const amplitude of [1e-6, 0.3, 5]) {
    const { effective, average } = swingCapacitance((v) => 3 + 0.4 * v, { bias: 0.7, amplitude });
    assertClose([effective, average], [3.28, 3.28], ROUNDING);
  }
});

Deno.test("swingCapacitance of a quadratic law is C0 (1 + a2 A^2/4), not the mean over time", () => {
  for (const amplitude of [0.1, 0.5, 2]) {
    const found = swingCapacitance((v) => 2 * (1 + 0.3 * v ** 2), { bias: 0, amplitude });
    assertClose(found.effective, 2 * (1 + 0.3 * amplitude ** 2 / 4), ROUNDING);
    assertClose(found.average, 2 * (1 + 0.3 * amplitude ** 2 / 2), ROUNDING);
  }
});

Deno.test("swingCapacitance goes to the small-signal value as the swing goes to zero", () => {
  const law = (v: number) => 1 + Math.exp(v);
  const still = swingCapacitance(law, { bias: 0.2, amplitude: 0 });
  assertEquals(still, {
    effective: law(0.2),
    average: law(0.2),
    smallSignal: law(0.2),
    error: 0,
  });
  // A law with curvature c at the bias differs by c A^2/8 to leading order.
  for (const amplitude of [1e-2, 1e-3]) {
    const { effective } = swingCapacitance(law, { bias: 0.2, amplitude });
    assertClose(effective - law(0.2), Math.exp(0.2) * amplitude ** 2 / 8, {
      rtol: 1e-4,
      atol: 1e-15,
    });
  }
});

Deno.test("swingCapacitance states an error that covers what a step leaves", () => {
  // C_eff of a unit step at x = Vth/A: 1/2 - (asin x + x sqrt(1 - x^2))/pi.
  const exact = 0.5 - (Math.asin(0.4) + 0.4 * Math.sqrt(1 - 0.16)) / Math.PI;
  const found = swingCapacitance((v) => v > 0.2 ? 1 : 0, { bias: 0, amplitude: 0.5 });
  assert(found.error > 0 && Math.abs(found.effective - exact) < 4 * found.error + 1e-5);
  const smooth = swingCapacitance(Math.exp, { bias: 0, amplitude: 0.5 });
  assert(smooth.error < 1e-13);
});

Deno.test("swingCapacitance refuses a swing that is no number", () => {
  assertThrows(
    () => swingCapacitance(() => 1, { bias: 0, amplitude: NaN }),
    RangeError,
    /bias and amplitude must be finite, got 0 V and NaN V/,
  );
});

/** Samples of q(v) = v + v^3/3 + v^2/5 under a waveform. */
function samples(waveform: (angle: number) => number, count: number) {
  const voltage = Float64Array.from({ length: count }, (_, k) => waveform(2 * Math.PI * k / count));
  return { voltage, charge: voltage.map((v) => v + v ** 3 / 3 + v * v / 5) };
}

Deno.test("waveformCapacitance of a sinusoid is swingCapacitance, from whatever phase it starts", () => {
  const bias = 0.3;
  const amplitude = 0.8;
  const { effective } = swingCapacitance((v) => 1 + v * v + 0.4 * v, { bias, amplitude });
  for (const phase of [0, 1, 2.5]) {
    const found = waveformCapacitance(
      samples((angle) => bias + amplitude * Math.cos(angle + phase), 32),
    );
    assertClose(found.effective, effective, ROUNDING);
    assertClose(found.quadrature, 0, { rtol: 0, atol: 1e-14 });
  }
});

Deno.test("waveformCapacitance takes unequal samples with their weights", () => {
  const waveform = (angle: number) => 0.6 * Math.cos(angle) + 0.2 * Math.cos(2 * angle + 0.4);
  const equal = waveformCapacitance(samples(waveform, 64));
  // Substitution phase = s + sin(2 pi s)/20, whose slope is the weight.
  const count = 256;
  const s = Array.from({ length: count }, (_, k) => k / count);
  const phases = s.map((p) => p + Math.sin(2 * Math.PI * p) / 20);
  const weights = s.map((p) => (1 + Math.PI * Math.cos(2 * Math.PI * p) / 10) / count);
  const voltage = phases.map((phase) => waveform(2 * Math.PI * phase));
  const charge = voltage.map((v) => v + v ** 3 / 3 + v * v / 5);
  const found = waveformCapacitance({ voltage, charge, phases, weights });
  assertClose(found.effective, equal.effective, { rtol: 1e-12, atol: 0 });
  assertClose(found.quadrature, equal.quadrature, { rtol: 1e-10, atol: 0 });
  assert(Math.abs(found.quadrature) > 1e-3);
});

Deno.test("waveformCapacitance shows a conductance as charge in quadrature", () => {
  // A conductance G beside C: q = C v + G integral of v dt, here with w = 1.
  const angles = Array.from({ length: 16 }, (_, k) => 2 * Math.PI * k / 16);
  const found = waveformCapacitance({
    voltage: angles.map(Math.cos),
    charge: angles.map((angle) => 3 * Math.cos(angle) + 0.5 * Math.sin(angle)),
  });
  assertClose([found.effective, found.quadrature], [3, -0.5], ROUNDING);
});

Deno.test("waveformCapacitance refuses arrays of different length and a voltage that stands still", () => {
  assertThrows(
    () => waveformCapacitance({ voltage: [1, 2, 3], charge: [1, 2] }),
    TypeError,
    /expected 3 samples of charge, got 2/,
  );
  assertThrows(
    () => waveformCapacitance({ voltage: [1, 1, 1], charge: [1, 2, 3] }),
    RangeError,
    /the voltage must have a fundamental/,
  );
});
