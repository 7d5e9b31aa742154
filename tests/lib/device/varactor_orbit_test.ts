import { assert, assertClose } from "../../assert.ts";
import { assemble } from "../../../lib/circuit/circuit.ts";
import type { DeviceElement } from "../../../lib/circuit/element.ts";
import { resolveTransistor } from "../../../lib/device/resolve_transistor.ts";
import {
  resolveAccumulationVaractor,
  resolveJunctionVaractor,
} from "../../../lib/device/resolve_varactor.ts";
import { swingCapacitance, waveformCapacitance } from "../../../lib/device/swing_capacitance.ts";
import { Transistor } from "../../../lib/device/transistor.ts";
import { type Varactor, varactorFigures } from "../../../lib/device/varactor.ts";
import { AccumulationVaractor } from "../../../lib/device/varactor_accumulation.ts";
import { InversionVaractor } from "../../../lib/device/varactor_inversion.ts";
import { JunctionVaractor } from "../../../lib/device/varactor_junction.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { inputSensitivity } from "../../../lib/orbit/input_sensitivity.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { tanhDriver } from "../circuit/_examples.ts";
import { illustrativeCard } from "./_card.ts";

const INDUCTANCE = 1e-9;
const FIXED = 0.4e-12;
const RESISTANCE = 400;
const card = illustrativeCard();
const typical = { corner: "typical", temperature: 300.15 } as const;

/** Varactors of a differential tank at a mean of 0.9 V, with what stands at the control node's side. */
const CASES: {
  name: string;
  varactor: Varactor;
  control: number;
  nodes: (side: string) => string[];
}[] = [
  {
    name: "accumulation",
    varactor: new AccumulationVaractor(
      resolveAccumulationVaractor(card, { width: 60e-6, length: 0.2e-6, ...typical }),
    ),
    control: 0.8,
    nodes: (side) => [side, "control"],
  },
  {
    name: "junction",
    varactor: new JunctionVaractor(resolveJunctionVaractor(card, { area: 200e-12, ...typical })),
    control: 1.6,
    nodes: (side) => [side, "control"],
  },
  {
    name: "inversion",
    varactor: new InversionVaractor(
      new Transistor(resolveTransistor(card, { kind: "n", ...typical }), {
        width: 60e-6,
        length: 0.2e-6,
      }),
    ),
    control: 0.5,
    nodes: (side) => [side, "control", "ground"],
  },
];

function element(name: string, varactor: Varactor, nodes: readonly string[]): DeviceElement {
  return {
    kind: "device",
    name,
    nodes,
    noise: varactor.noise,
    evaluate: (v, out) => varactor.evaluate(v, out),
  };
}

/** A driven tank whose losses lie across it, so that the varactors' charge is all that bends it. */
function tank({ varactor, control, nodes }: typeof CASES[number], controlAt = control) {
  const coil = (side: string) =>
    ({
      kind: "inductor",
      name: `coil ${side}`,
      windings: [{ nodes: ["mid", side], inductance: INDUCTANCE / 2, seriesResistance: 0 }],
      coupling: 0,
      temperature: 0,
    }) as const;
  const circuit = assemble([
    { kind: "potential", name: "mid", node: "mid", potential: 0.9 },
    { kind: "potential", name: "control", node: "control", potential: controlAt },
    coil("plus"),
    coil("minus"),
    { kind: "capacitor", name: "C", nodes: ["plus", "minus"], capacitance: FIXED },
    {
      kind: "resistor",
      name: "R",
      nodes: ["plus", "minus"],
      resistance: RESISTANCE,
      temperature: 300,
    },
    // Across each coil, so that the common mode is damped.
    ...["plus", "minus"].map((side) => ({
      kind: "resistor" as const,
      name: `damping ${side}`,
      nodes: ["mid", side] as const,
      resistance: 4000,
      temperature: 300,
    })),
    tanhDriver("driver", ["plus", "minus"], { current: 1.2e-3, width: 0.12 }),
    element("left", varactor, nodes("plus")),
    element("right", varactor, nodes("minus")),
  ]);
  const orbit = findOrbit(circuit.system, {
    start: circuit.stateAt({ plus: 1.1, minus: 0.7 }),
    tolerance: 1e-10,
  });
  assert(orbit instanceof Orbit, orbit instanceof Orbit ? "" : orbit.reason);
  return { circuit, orbit };
}

for (const each of CASES) {
  const { name, varactor, control, nodes } = each;

  Deno.test(`Varactor, ${name}, in a tank sets the frequency by its waveform's capacitance`, () => {
    const { circuit, orbit } = tank(each);
    const { count, states, times, weights } = orbit.quadrature;
    const n = circuit.system.dimension;
    const k = varactor.terminals.length;
    const v = new Float64Array(k);
    const out = new Float64Array(2 * k * (1 + k));
    const charge = (side: string, x: Float64Array) => {
      nodes(side).forEach((node, i) => v[i] = circuit.potential(node, x));
      varactor.evaluate(v, out);
      return out[k + k * k]!;
    };
    const voltage = new Float64Array(count);
    const total = new Float64Array(count);
    const driven = new Float64Array(count);
    for (let i = 0; i < count; i++) {
      const x = states.slice(i * n, (i + 1) * n);
      voltage[i] = circuit.voltage("plus", "minus", x);
      total[i] = FIXED * voltage[i]! + (charge("plus", x) - charge("minus", x)) / 2;
      driven[i] = -1.2e-3 * Math.tanh(voltage[i]! / 0.12);
    }
    const phases = times.map((t) => t / orbit.period);
    const parts = weights.map((weight) => weight / orbit.period);
    const seen = waveformCapacitance({ voltage, charge: total, phases, weights: parts });
    // The driver's own fundamental may stand off the voltage's: i/(jw) is a charge of its kind.
    const driver = waveformCapacitance({ voltage, charge: driven, phases, weights: parts });
    const w = 2 * Math.PI * orbit.frequency;
    const capacitance = seen.effective + driver.quadrature / w;
    // Kirchhoff's law of the fundamental, exact but for the orbit's own error.
    assertClose(w * w * INDUCTANCE * capacitance, 1, { rtol: 1e-7, atol: 0 });
    // The sinusoid's capacitance comes close: a tank of quality 8 leaves harmonics, and the sides cancel
    // the even ones.
    const { re, im } = orbit.phasor((x) => circuit.voltage("plus", "minus", x));
    const amplitude = Math.hypot(re, im) / 2;
    const side = swingCapacitance((by) => {
      const potentials = nodes("plus").map((node) =>
        node === "plus" ? 0.9 + by : node === "control" ? control : 0
      );
      return varactorFigures(varactor, { potentials, frequency: 1e9 }).capacitance;
    }, { bias: 0, amplitude });
    assertClose(FIXED + side.effective / 2, seen.effective, { rtol: 1e-2, atol: 0 });
  });

  Deno.test(`Varactor, ${name}, in a tank tunes as far as re-solved orbits say`, () => {
    const { orbit } = tank(each);
    const gain = inputSensitivity(orbit).find((input) => input.name === "control")!;
    const step = 2e-3;
    const [low, high] = [-step, step].map((by) => tank(each, control + by).orbit.period) as [
      number,
      number,
    ];
    const slope = (high - low) / (2 * step);
    // Central difference over 2 mV of laws whose curvature lives on some 100 mV.
    assertClose(gain.period, slope, { rtol: 1e-4, atol: 0 });
    assert(Math.abs(gain.frequency) > 1e8);
  });
}
