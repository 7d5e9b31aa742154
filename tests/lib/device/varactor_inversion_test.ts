import { assert, assertClose, assertThrows } from "../../assert.ts";
import { resolveTransistor } from "../../../lib/device/resolve_transistor.ts";
import { Transistor, TRANSISTOR_VALUES } from "../../../lib/device/transistor.ts";
import { varactorFigures } from "../../../lib/device/varactor.ts";
import { InversionVaractor } from "../../../lib/device/varactor_inversion.ts";
import { illustrativeCard } from "./_card.ts";

const parameters = resolveTransistor(illustrativeCard(), {
  kind: "n",
  corner: "typical",
  temperature: 300,
});
const size = { width: 20e-6, length: 0.5e-6, multiplier: 2 };
const transistor = new Transistor(parameters, size);
const varactor = new InversionVaractor(transistor);
const oxide = parameters.oxideCapacitance * size.width * size.length * size.multiplier;
const overlap = 2 * parameters.overlapCapacitance * size.width * size.multiplier;

function capacitance(gate: number, channel: number, bulk: number): number {
  return varactorFigures(varactor, { potentials: [gate, channel, bulk], frequency: 1e9 })
    .capacitance;
}

Deno.test("InversionVaractor holds the transistor's charges with drain and source together", () => {
  const [out, four] = [new Float64Array(24), new Float64Array(TRANSISTOR_VALUES)];
  varactor.evaluate(Float64Array.of(0.7, 0.1, -0.2), out);
  transistor.evaluate(0.1, 0.7, 0.1, -0.2, four);
  assertClose(
    out.subarray(12, 15),
    [four[21]!, four[20]! + four[22]!, four[23]!],
    { rtol: 1e-15, atol: 0 },
  );
  // Only the junctions' leakage flows, between channel and bulk.
  assert(out[0] === 0 && out[1] === -out[2]! && out[1]! > 0);
});

Deno.test("InversionVaractor steps from depletion to the oxide, where the bulk says", () => {
  // Strong inversion: C_ox and overlap, short of it by the thermal voltage over the overdrive.
  const full = capacitance(3.35, 0, 0) - overlap;
  assert(full < oxide && full > oxide * (1 - 2 * parameters.slopeFactor * 0.02585 / 3));
  // No channel: what the slope factor leaves of the oxide, (n - 1)/n.
  const empty = capacitance(-0.6, 0, 0) - overlap;
  assertClose(empty, oxide * (1 - 1 / parameters.slopeFactor), { rtol: 1e-8, atol: 0 });
  // A bulk 0.5 V lower moves the step up by (n - 1) 0.5 V.
  const middle = (bulk: number) => {
    let [low, high] = [-0.5, 1.5];
    for (let k = 0; k < 50; k++) {
      const gate = (low + high) / 2;
      if (capacitance(gate, 0, bulk) - overlap < (full + empty) / 2) low = gate;
      else high = gate;
    }
    return low;
  };
  assertClose(middle(-0.5) - middle(0), (parameters.slopeFactor - 1) * 0.5, {
    rtol: 1e-9,
    atol: 0,
  });
});

Deno.test("InversionVaractor loses in its channel what a uniform line fed from both ends does", () => {
  const bias = Float64Array.of(1.2, 0, 0);
  const point = transistor.operatingPoint(0, 1.2, 0, 0);
  const channel = point.gateSourceCapacitance + point.gateDrainCapacitance - overlap;
  const total = channel + overlap + point.gateBulkCapacitance;
  // A ladder of the channel's resistance and capacitance, solved by elimination from the middle, where
  // symmetry cuts it, to the end: conductances G/rung, susceptances w C/rungs.
  const w = 1e-3 * point.gds / channel;
  const rungs = 2000;
  let [re, im] = [0, 0];
  for (let k = 0; k < rungs / 2; k++) {
    im += w * channel / rungs;
    const r = 1 / (point.gds * rungs);
    // Y <- Y/(1 + r Y)
    const [a, b] = [1 + r * re, r * im];
    const square = a * a + b * b;
    [re, im] = [(re * a + im * b) / square, (im * a - re * b) / square];
  }
  const admittance = { re: 2 * re, im: 2 * im + w * (total - channel) };
  const resistance = admittance.re / (admittance.re ** 2 + admittance.im ** 2);
  // Rungs leave 1/rungs, the next order of the line (w C/G)^2 = 1e-6.
  assertClose(varactor.lossResistance(bias), resistance, { rtol: 2e-3, atol: 0 });
});

Deno.test("InversionVaractor keeps the gate's resistance and no other without a channel", () => {
  const withGate = new InversionVaractor(transistor, { gateResistance: 2 });
  assertClose(withGate.lossResistance(Float64Array.of(-1, 0, 0)), 2, { rtol: 1e-6, atol: 0 });
  assertClose(withGate.lossResistance(Float64Array.of(-30, 0, 0)), 2, { rtol: 1e-15, atol: 0 });
  assert(withGate.lossResistance(Float64Array.of(1, 0, 0)) > 2.01);
  assertThrows(
    () => new InversionVaractor(transistor, { gateResistance: -1 }),
    RangeError,
    /gate resistance must be >= 0 ohm, got -1 ohm/,
  );
});
