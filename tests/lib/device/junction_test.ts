import { assert, assertClose, assertThrows } from "../../assert.ts";
import { Junction, type JunctionParameters } from "../../../lib/device/junction.ts";
import { derivative, interpolationError } from "./_biases.ts";

const parameters: JunctionParameters = {
  saturationCurrent: 1e-17,
  emission: 1.1,
  temperature: 300,
  zeroBiasCapacitance: 5e-15,
  builtInPotential: 0.7,
  grading: 0.4,
};
const junction = new Junction(parameters);
const out = new Float64Array(4);

function value(k: number): (v: number) => number {
  return (v) => {
    junction.evaluate(v, out);
    return out[k]!;
  };
}

Deno.test("Junction gives the derivatives of its own current and charge", () => {
  for (let v = -3.07; v < 2; v += 0.083) {
    // Central differences over a joint see the jump of the third derivative: keep a step away.
    if (Math.abs(v - 0.35) < 0.01 || Math.abs(v - 0.995) < 0.01) continue;
    const current = derivative(value(0), v, 2e-3);
    const charge = derivative(value(2), v, 2e-3);
    junction.evaluate(v, out);
    // Far in reverse the conductance is below the rounding of the current over the step.
    assertClose(out[1]!, current, { rtol: 1e-8, atol: 1e-28 });
    assertClose(out[3]!, charge, { rtol: 1e-8, atol: 0 });
  }
});

Deno.test("Junction conducts nothing and stores nothing at zero volts", () => {
  junction.evaluate(0, out);
  assert(out[0] === 0 && out[2] === 0);
});

Deno.test("Junction is twice continuously differentiable across both continuations", () => {
  const thermal = 1.380649e-23 * 300 / 1.602176634e-19 * 1.1;
  const joints = [
    { at: 0.35, value: 2, slope: 3 },
    { at: 35 * thermal, value: 0, slope: 1 },
  ];
  for (const { at, value: k, slope } of joints) {
    const d = 1e-7;
    for (const entry of [k, slope]) {
      const f = value(entry);
      const left = (f(at - d) - f(at - 2 * d)) / d;
      const right = (f(at + 2 * d) - f(at + d)) / d;
      // A kink would show as a relative step of order one; 1e-4 is the curvature over 3e-7 V and rounding.
      assertClose(right, left, { rtol: 1e-4, atol: 0 });
      assertClose(f(at + d) - f(at - d), 2 * d * left, { rtol: 1e-4, atol: 0 });
    }
  }
});

Deno.test("Junction is analytic below the continuations, through zero volts", () => {
  assert(interpolationError(value(0), { width: 0.02, count: 14 }) < 1e-11);
  assert(interpolationError(value(2), { width: 0.02, count: 14 }) < 1e-11);
});

Deno.test("Junction stays finite and rising at any voltage a solver may try", () => {
  let last = -Infinity;
  for (let v = -20; v <= 20; v += 0.05) {
    junction.evaluate(v, out);
    assert(out.every(Number.isFinite));
    assert(out[0]! >= last && out[3]! > 0);
    last = out[0]!;
  }
});

Deno.test("Junction refuses parameters outside their range", () => {
  assertThrows(
    () => new Junction({ ...parameters, grading: 1 }),
    RangeError,
    /grading must lie between 0 and 1, got 1/,
  );
  assertThrows(
    () => new Junction({ ...parameters, temperature: NaN }),
    RangeError,
    /temperature must be > 0 K, got NaN K/,
  );
});
