import { assert, assertClose, assertThrows } from "../../assert.ts";
import { AccumulationVaractor } from "../../../lib/device/varactor_accumulation.ts";

const parameters = {
  maximumCapacitance: 3,
  minimumCapacitance: 1,
  centreVoltage: 0.1,
  transitionVoltage: 0.3,
  seriesResistance: 2,
};
const varactor = new AccumulationVaractor(parameters);
const out = new Float64Array(12);

function charge(v: number): number {
  varactor.evaluate(Float64Array.of(v, 0), out);
  return out[6]!;
}

Deno.test("AccumulationVaractor stores the integral of its capacitance, zero at zero volts", () => {
  assert(charge(0) === 0);
  // Gauss-Legendre with two points on 2000 pieces: error far below rounding of the sum.
  for (const to of [-2, -0.4, 0.1, 0.7, 3]) {
    const pieces = 2000;
    const h = to / pieces;
    let sum = 0;
    for (let k = 0; k < pieces; k++) {
      for (const node of [-1, 1]) {
        sum += h / 2 * varactor.capacitance(h * (k + 0.5 + node / Math.sqrt(12)));
      }
    }
    assertClose(charge(to), sum, { rtol: 1e-12, atol: 0 });
  }
});

Deno.test("AccumulationVaractor has its extremes far out and its mean at the centre", () => {
  const found = [-20, 0.1, 20].map((v) => varactor.capacitance(v));
  assertClose(found, [1, 2, 3], { rtol: 1e-14, atol: 0 });
  assertClose(charge(50) - charge(49), 3, { rtol: 1e-12, atol: 0 });
  assert(Number.isFinite(charge(1e4)) && Number.isFinite(charge(-1e4)));
});

Deno.test("AccumulationVaractor with equal extremes is a plain capacitor", () => {
  const plain = new AccumulationVaractor({ ...parameters, minimumCapacitance: 3 });
  plain.evaluate(Float64Array.of(0.7, 0.2), out);
  assertClose([out[6]!, out[8]!], [1.5, 3], { rtol: 1e-14, atol: 0 });
});

Deno.test("AccumulationVaractor refuses parameters outside their range", () => {
  const refused = (change: Partial<typeof parameters>, wording: RegExp) =>
    assertThrows(() => new AccumulationVaractor({ ...parameters, ...change }), RangeError, wording);
  refused({ minimumCapacitance: 0 }, /minimum capacitance must be > 0 F, got 0 F/);
  refused({ maximumCapacitance: 0.5 }, /maximum capacitance must be >= the minimum/);
  refused({ transitionVoltage: 0 }, /transition voltage must be > 0 V/);
  refused({ centreVoltage: NaN }, /centre voltage must be finite/);
  refused({ seriesResistance: -2 }, /series resistance must be >= 0 ohm/);
});
