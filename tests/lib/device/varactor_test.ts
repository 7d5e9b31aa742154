import { assert, assertClose, assertThrows } from "../../assert.ts";
import { resolveTransistor } from "../../../lib/device/resolve_transistor.ts";
import { Transistor } from "../../../lib/device/transistor.ts";
import { type Varactor, varactorFigures } from "../../../lib/device/varactor.ts";
import { AccumulationVaractor } from "../../../lib/device/varactor_accumulation.ts";
import { InversionVaractor } from "../../../lib/device/varactor_inversion.ts";
import { JunctionVaractor } from "../../../lib/device/varactor_junction.ts";
import { derivative, seededUniform } from "./_biases.ts";
import { illustrativeCard } from "./_card.ts";

const parameters = resolveTransistor(illustrativeCard(), {
  kind: "n",
  corner: "typical",
  temperature: 300,
});

/** One of each, of about a hundred femtofarads. */
const VARACTORS: Record<string, Varactor> = {
  junction: new JunctionVaractor({
    saturationCurrent: 1e-17,
    emission: 1.05,
    temperature: 300,
    zeroBiasCapacitance: 120e-15,
    builtInPotential: 0.75,
    grading: 0.4,
    seriesResistance: 5,
  }),
  accumulation: new AccumulationVaractor({
    maximumCapacitance: 150e-15,
    minimumCapacitance: 50e-15,
    centreVoltage: -0.1,
    transitionVoltage: 0.3,
    seriesResistance: 3,
  }),
  inversion: new InversionVaractor(new Transistor(parameters, { width: 20e-6, length: 0.3e-6 }), {
    gateResistance: 2,
  }),
};

/**
 * What is left where a varactor's parts cancel: the tied ends of a channel of some 10 mS, each by rounding.
 */
const CANCELLED = { current: 1e-17, charge: 1e-27 };

function biases(varactor: Varactor): Float64Array[] {
  const uniform = seededUniform(7);
  return Array.from(
    { length: 60 },
    () => Float64Array.from(varactor.terminals, () => 2.4 * uniform() - 1.2),
  );
}

function values(varactor: Varactor, v: Float64Array): Float64Array {
  const k = varactor.terminals.length;
  // What is there before must not matter.
  const out = new Float64Array(2 * k * (1 + k)).fill(NaN);
  varactor.evaluate(v, out);
  return out;
}

for (const [name, varactor] of Object.entries(VARACTORS)) {
  const k = varactor.terminals.length;
  const halves = [0, k + k * k];

  Deno.test(`Varactor, ${name}, gives the derivatives of its own currents and charges`, () => {
    for (const v of biases(varactor)) {
      const out = values(varactor, v);
      for (const from of halves) {
        const size = Math.max(...out.subarray(from, from + k).map(Math.abs));
        for (let row = 0; row < k; row++) {
          for (let column = 0; column < k; column++) {
            const expected = derivative(
              (by) => {
                const moved = v.slice();
                moved[column]! += by;
                return values(varactor, moved)[from + row]!;
              },
              0,
              2e-3,
            );
            // h^6 of the extrapolation and the joint of the junction; rounding of the value over h.
            assertClose(out[from + k + k * row + column]!, expected, {
              rtol: 1e-6,
              atol: 1e-12 * size + CANCELLED[from === 0 ? "current" : "charge"],
              what: `${name} at ${v}`,
            });
          }
        }
      }
    }
  });

  Deno.test(`Varactor, ${name}, conserves charge and current and sees differences only`, () => {
    for (const v of biases(varactor)) {
      const out = values(varactor, v);
      for (const from of halves) {
        const part = out.subarray(from, from + k + k * k);
        const largest = Math.max(...part.subarray(0, k).map(Math.abs));
        const slope = Math.max(...part.subarray(k).map(Math.abs));
        const sum = (pick: (i: number) => number) =>
          Array.from({ length: k }, (_, i) => part[pick(i)]!).reduce((a, b) => a + b, 0);
        const left = CANCELLED[from === 0 ? "current" : "charge"];
        assert(Math.abs(sum((i) => i)) <= 1e-15 * largest + left);
        for (let i = 0; i < k; i++) {
          assert(Math.abs(sum((j) => k + k * i + j)) <= 1e-14 * slope + left);
          assert(Math.abs(sum((j) => k + k * j + i)) <= 1e-14 * slope + left);
        }
      }
      const raised = values(varactor, v.map((potential) => potential + 0.25));
      const most = (part: Float64Array) => Math.max(...part.map(Math.abs));
      for (const [from, length] of halves.flatMap((at) => [[at, k], [at + k, k * k]] as const)) {
        const [a, b] = [out, raised].map((each) => each.subarray(from, from + length));
        const left = CANCELLED[from < halves[1]! ? "current" : "charge"];
        assertClose(b!, a!, { rtol: 1e-9, atol: 1e-12 * most(a!) + left });
      }
    }
  });

  Deno.test(`Varactor, ${name}, has a capacitance above zero and a loss that is finite`, () => {
    for (const v of biases(varactor)) {
      const figures = varactorFigures(varactor, { potentials: v, frequency: 5e9 });
      assert(figures.capacitance > 0 && figures.quality > 0);
      assert(Number.isFinite(varactor.lossResistance(v)) && varactor.lossResistance(v) > 0);
    }
  });
}

Deno.test("varactorFigures gives 1/(w R C) without conduction, and less with", () => {
  const { junction, accumulation } = VARACTORS as { junction: Varactor; accumulation: Varactor };
  const w = 2 * Math.PI * 5e9;
  const read = varactorFigures(accumulation, { potentials: [0.4, 0], frequency: 5e9 });
  assertClose(read.quality, 1 / (w * 3 * read.capacitance), { rtol: 1e-13, atol: 0 });
  const reverse = varactorFigures(junction, { potentials: [-1, 0], frequency: 5e9 });
  assertClose(reverse.quality, 1 / (w * 5 * reverse.capacitance), { rtol: 1e-9, atol: 0 });
  const forward = varactorFigures(junction, { potentials: [0.75, 0], frequency: 5e9 });
  // Impedance with complex numbers written out: R + 1/(g + jb).
  const g = values(junction, Float64Array.of(0.75, 0))[2]!;
  const b = w * forward.capacitance;
  assertClose(forward.quality, b / (5 * (g * g + b * b) + g), { rtol: 1e-13, atol: 0 });
  assert(forward.quality < 0.9 / (w * 5 * forward.capacitance));
});

Deno.test("varactorFigures refuses a wrong number of potentials and a frequency of zero", () => {
  const { accumulation } = VARACTORS as { accumulation: Varactor };
  assertThrows(
    () => varactorFigures(accumulation, { potentials: [1], frequency: 1e9 }),
    TypeError,
    /expected 2 potentials \(gate, well\), got 1/,
  );
  assertThrows(
    () => varactorFigures(accumulation, { potentials: [1, 0], frequency: 0 }),
    RangeError,
    /frequency must be > 0 Hz/,
  );
});
