import { assertClose, assertEquals } from "../../assert.ts";
import { deviceValues, thermalAmplitude, transistorElement } from "../../../lib/circuit/element.ts";
import { Transistor } from "../../../lib/device/transistor.ts";
import { resolveTransistor } from "../../../lib/device/resolve_transistor.ts";
import { illustrativeCard } from "../device/_card.ts";

Deno.test("thermalAmplitude() is sqrt(4kT G): 50 ohm at 290 K have 17.9 pA/sqrt(Hz)", () => {
  // 4 k T / R with k = 1.380649e-23 J/K exactly (BIPM, SI brochure, 2019).
  assertClose(thermalAmplitude(1 / 50, 290), Math.sqrt(4 * 1.380649e-23 * 290 / 50), {
    rtol: 1e-14,
    atol: 0,
  });
  assertClose(thermalAmplitude(1 / 50, 290), 17.9e-12, { rtol: 0, atol: 0.05e-12 });
  assertEquals(thermalAmplitude(1, 0), 0);
});

Deno.test("transistorElement() hands on currents, charges and noise of its transistor", () => {
  const parameters = resolveTransistor(illustrativeCard(), {
    kind: "n",
    flavour: "regular",
    corner: "typical",
    temperature: 300,
  });
  const transistor = new Transistor(parameters, { width: 10e-6, length: 60e-9 });
  const element = transistorElement("M1", transistor, {
    drain: "d",
    gate: "g",
    source: "s",
    bulk: "b",
  });
  assertEquals(element.nodes, ["d", "g", "s", "b"]);
  const v = Float64Array.of(0.6, 0.7, 0.1, 0);
  const [found, expected] = [0, 1].map(() => new Float64Array(deviceValues(4)));
  element.evaluate(v, found!);
  transistor.evaluate(0.6, 0.7, 0.1, 0, expected!);
  assertEquals(found, expected);
  // Current and charge are conserved: each column and each row of both Jacobians sums to zero.
  const sum = (at: number, stride: number) =>
    [0, 1, 2, 3].reduce((total, k) => total + found![at + k * stride]!, 0);
  const largest = (from: number) => Math.max(...found!.subarray(from, from + 16).map(Math.abs));
  for (const [vector, matrix] of [[0, 4], [20, 24]] as const) {
    assertClose(sum(vector, 1), 0, {
      rtol: 0,
      atol: 1e-13 * Math.max(...found!.subarray(vector, vector + 4).map(Math.abs)),
    });
    for (let k = 0; k < 4; k++) {
      assertClose(sum(matrix + k, 4), 0, { rtol: 0, atol: 1e-12 * largest(matrix) });
      assertClose(sum(matrix + 4 * k, 1), 0, { rtol: 0, atol: 1e-12 * largest(matrix) });
    }
  }
  assertEquals(element.noise.map(({ color }) => color), ["white", "1/f"]);
  assertEquals(element.noise[0]!.amplitude(v), transistor.channelNoise(0.6, 0.7, 0.1, 0));
  assertEquals(element.noise[1]!.amplitude(v), transistor.flickerNoise(0.6, 0.7, 0.1, 0));
});
