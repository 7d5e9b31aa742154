import { assert, assertThrows } from "../../assert.ts";
import { assemble } from "../../../lib/circuit/circuit.ts";
import { type DeviceElement, GROUND } from "../../../lib/circuit/element.ts";
import { resolveTransistor } from "../../../lib/device/resolve_transistor.ts";
import { Transistor } from "../../../lib/device/transistor.ts";
import type { TransistorModel } from "../../../lib/device/transistor_model.ts";
import { TransistorTable } from "../../../lib/device/transistor_table.ts";
import { parseTransistorTable } from "../../../lib/device/transistor_table_csv.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { illustrativeCard } from "./_card.ts";
import { tableCsv } from "./_table_csv.ts";

const parameters = resolveTransistor(illustrativeCard(), {
  kind: "n",
  corner: "typical",
  temperature: 300,
});
const size = { width: 40e-6, length: 60e-9 };
const model = new Transistor(parameters, size);
const tail = new Transistor(parameters, { width: 120e-6, length: 240e-9 });

/** Where a transistor of the pair was, drain, gate, source, bulk. */
type Bias = [number, number, number, number];

function element(name: string, device: TransistorModel, nodes: readonly string[]): DeviceElement {
  return {
    kind: "device",
    name,
    nodes,
    evaluate: (v, out) => device.evaluate(v[0]!, v[1]!, v[2]!, v[3]!, out),
    noise: [{
      label: "channel thermal",
      color: "white",
      into: 0,
      out: 2,
      amplitude: (v) => device.channelNoise(v[0]!, v[1]!, v[2]!, v[3]!),
    }],
  };
}

/** A pair at 2.4 GHz on a 1 V supply with the tail's gate at a fixed potential. */
function pair(device: TransistorModel, { tolerance = 1e-8 } = {}) {
  const half = (name: string) =>
    ({
      kind: "inductor",
      name: `coil ${name}`,
      windings: [{ nodes: ["supply", name], inductance: 0.6e-9, seriesResistance: 0.75 }],
      coupling: 0,
      temperature: 300,
    }) as const;
  const circuit = assemble([
    { kind: "potential", name: "supply", node: "supply", potential: 1 },
    { kind: "potential", name: "bias", node: "bias", potential: 0.6 },
    half("plus"),
    half("minus"),
    { kind: "capacitor", name: "C", nodes: ["plus", "minus"], capacitance: 3.5e-12 },
    element("left", device, ["plus", "minus", "tail", GROUND]),
    element("right", device, ["minus", "plus", "tail", GROUND]),
    element("tail", tail, ["tail", "bias", GROUND, GROUND]),
  ]);
  const orbit = findOrbit(circuit.system, {
    start: circuit.stateAt({ plus: 1.4, minus: 0.6, tail: 0.3 }),
    period: 1 / 2.4e9,
    tolerance,
  });
  assert(orbit instanceof Orbit, orbit instanceof Orbit ? "" : orbit.reason);
  const { re, im } = orbit.phasor((x) => circuit.voltage("plus", "minus", x));
  const visited: Bias[] = [];
  const { count, states } = orbit.quadrature;
  for (let k = 0; k < count; k++) {
    const n = circuit.system.dimension;
    const x = states.slice(k * n, (k + 1) * n);
    const [plus, minus, source] = ["plus", "minus", "tail"].map((node) =>
      circuit.potential(node, x)
    );
    visited.push([plus!, minus!, source!, 0], [minus!, plus!, source!, 0]);
  }
  return {
    orbit,
    frequency: orbit.frequency,
    amplitude: Math.hypot(re, im),
    diffusion: phaseDiffusion(orbit, circuit.sources).total,
    visited,
  };
}

function table(points: number, { highest = 1.8 } = {}): TransistorTable {
  const csv = tableCsv(new Transistor(parameters, { ...size, bulkJunctions: false }), {
    vgs: [-0.4, 1.4, points],
    vds: [0, highest, points],
  });
  return new TransistorTable(parseTransistorTable(csv), {
    parameters,
    size,
    characterizedWidth: size.width,
  });
}

Deno.test("TransistorTable in a pair gives the model's orbit, the better the finer its grid", () => {
  const expected = pair(model);
  assert(expected.amplitude > 0.4);
  const errors = [19, 37].map((points) => {
    const device = table(points);
    const found = pair(device);
    assert(found.visited.every((bias) => device.withinRange(...bias)));
    return {
      frequency: Math.abs(found.frequency / expected.frequency - 1),
      amplitude: Math.abs(found.amplitude / expected.amplitude - 1),
      diffusion: Math.abs(found.diffusion / expected.diffusion - 1),
    };
  });
  const [coarse, fine] = errors as [typeof errors[0], typeof errors[0]];
  // Bounds two to four times what spacings of 100 and 50 mV leave.
  assert(coarse!.frequency < 5e-6 && fine!.frequency < 1e-7, JSON.stringify(errors));
  assert(coarse!.amplitude < 2e-4 && fine!.amplitude < 3e-5, JSON.stringify(errors));
  assert(coarse!.diffusion < 1e-2 && fine!.diffusion < 1e-3, JSON.stringify(errors));
  for (const figure of ["frequency", "amplitude", "diffusion"] as const) {
    assert(coarse![figure] > 4 * fine![figure], JSON.stringify(errors));
  }
});

Deno.test("TransistorTable that the orbit leaves is refused with the voltage and its range", () => {
  const small = table(19, { highest: 0.7 });
  const { visited } = pair(small);
  const outside = visited.filter((bias) => !small.withinRange(...bias));
  assert(outside.length > 0 && outside.length < visited.length);
  assertThrows(
    () => visited.forEach((bias) => small.demandWithinRange(...bias)),
    RangeError,
    /^Cannot use the transistor table at drain .* V: vds must lie between 0 V and 0\.7 V, got /,
  );
});
