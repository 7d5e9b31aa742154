import { assert, assertClose } from "../../assert.ts";
import { inversionCharge, inversionSlope } from "../../../lib/device/inversion.ts";
import { derivative } from "./_biases.ts";

const EPSILON = Number.EPSILON;

Deno.test("inversionCharge solves 2q + ln q = v to rounding from weak to strong inversion", () => {
  for (let exponent = -86; exponent <= 2.04; exponent += 0.0137) {
    const q = 10 ** exponent;
    const v = 2 * q + Math.log(q);
    // The rounding of v itself moves q by |dq/dv| eps |v|; on top, a few units in the last place.
    const conditioning = Math.abs(v) / (1 + 2 * q);
    assertClose(inversionCharge(v), q, {
      rtol: EPSILON * (4 + 2 * conditioning),
      atol: 0,
      what: `q at v = ${v}`,
    });
  }
});

Deno.test("inversionCharge is e^v far below threshold, without underflow to an error", () => {
  for (const v of [-200, -150, -60, -39]) {
    assertClose(inversionCharge(v), Math.exp(v), { rtol: 4 * EPSILON, atol: 0 });
  }
  assert(inversionCharge(-1000) === 0);
});

Deno.test("inversionCharge tends to (v - ln(v/2)) / 2 far above threshold", () => {
  for (const v of [1e4, 1e6]) {
    const q = inversionCharge(v);
    assertClose(2 * q + Math.log(q), v, { rtol: 4 * EPSILON, atol: 0 });
  }
});

Deno.test("inversionCharge has no step where one start takes over from another", () => {
  for (const joint of [-38, 0.3, 240]) {
    const below = joint - Math.abs(joint) * EPSILON;
    const q = inversionCharge(joint);
    const step = inversionSlope(q) * (joint - below);
    assertClose(q - inversionCharge(below), step, { rtol: 0, atol: 4 * EPSILON * q });
  }
});

Deno.test("inversionSlope is the derivative of inversionCharge", () => {
  for (let v = -40; v <= 200; v += 3.7) {
    const q = inversionCharge(v);
    assertClose(inversionSlope(q), derivative(inversionCharge, v, 0.02), { rtol: 1e-10, atol: 0 });
  }
});
