import { assert, assertClose, assertThrows } from "../../assert.ts";
import { Junction } from "../../../lib/device/junction.ts";
import { JunctionVaractor } from "../../../lib/device/varactor_junction.ts";
import { BOLTZMANN, ELEMENTARY_CHARGE } from "../../../lib/quantity/constants.ts";

const parameters = {
  saturationCurrent: 1e-16,
  emission: 1,
  temperature: 300,
  zeroBiasCapacitance: 100e-15,
  builtInPotential: 0.7,
  grading: 0.5,
  seriesResistance: 4,
};

function noiseDensity(varactor: JunctionVaractor, v: number): number {
  return varactor.noise[0]!.amplitude(Float64Array.of(v, 0)) ** 2;
}

Deno.test("JunctionVaractor carries current and charge of its junction", () => {
  const varactor = new JunctionVaractor(parameters);
  const junction = new Junction(parameters);
  const [out, four] = [new Float64Array(12), new Float64Array(4)];
  for (const v of [-2, -0.3, 0, 0.4, 0.8]) {
    varactor.evaluate(Float64Array.of(0.1 + v, 0.1), out);
    junction.evaluate(0.1 + v - 0.1, four);
    assert(out[0] === four[0] && out[2] === four[1] && out[6] === four[2] && out[8] === four[3]);
  }
});

Deno.test("JunctionVaractor has shot noise 2q(I + 2 Is) and Nyquist's at zero volts", () => {
  const varactor = new JunctionVaractor(parameters);
  const thermal = BOLTZMANN * 300 / ELEMENTARY_CHARGE;
  for (const v of [-1, -0.05, 0.3, 0.6]) {
    const current = 1e-16 * (Math.exp(v / thermal) - 1);
    assertClose(noiseDensity(varactor, v), 2 * ELEMENTARY_CHARGE * (current + 2e-16), {
      rtol: 1e-12,
      atol: 0,
    });
  }
  const leaky = new JunctionVaractor({ ...parameters, emission: 1.8 });
  const out = new Float64Array(12);
  leaky.evaluate(new Float64Array(2), out);
  assertClose(noiseDensity(leaky, 0), 4 * BOLTZMANN * 300 * out[2]!, { rtol: 1e-14, atol: 0 });
});

Deno.test("JunctionVaractor refuses a resistance below zero and a grading of 1", () => {
  assertThrows(
    () => new JunctionVaractor({ ...parameters, seriesResistance: -1 }),
    RangeError,
    /series resistance must be >= 0 ohm, got -1 ohm/,
  );
  assertThrows(() => new JunctionVaractor({ ...parameters, grading: 1 }), RangeError, /grading/);
});
