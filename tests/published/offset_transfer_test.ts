/** Noise behind slow poles: the transfer at an offset against closed forms. */
import { assert, assertClose } from "../assert.ts";
import { assemble, type Circuit } from "../../lib/circuit/circuit.ts";
import { GROUND } from "../../lib/circuit/element.ts";
import { resistorPhaseNoise } from "../../lib/noise/supply_noise_resistor.ts";
import { supplyPhaseNoise } from "../../lib/noise/supply_noise.ts";
import { inputSensitivity } from "../../lib/orbit/input_sensitivity.ts";
import type { Orbit } from "../../lib/orbit/orbit.ts";
import { phaseDiffusion } from "../../lib/orbit/phase_diffusion.ts";
import { phaseTransfer } from "../../lib/orbit/phase_transfer.ts";
import {
  CAPACITANCE,
  CHARACTERISTIC_RESISTANCE,
  CONDUCTOR_VOLTAGE,
  INDUCTANCE,
  orbitOf,
} from "./_tank.ts";

const TEMPERATURE = 300;
const RESISTANCE = 10e3;
const FILTER = 10e-12;
/** Capacitance change per volt of control, relative; dT/dv is then about half of it. */
const CONTROL = 0.05;

/** A noiseless tank whose capacitance follows the control node, which a resistor and a capacitor filter. */
function controlled({ quality, gain, control }: {
  quality: number;
  gain: number;
  control: number;
}): Circuit {
  const resistance = quality * CHARACTERISTIC_RESISTANCE;
  const conductance = gain / resistance;
  return assemble([
    { kind: "potential", name: "control", node: "source", potential: control },
    {
      kind: "inductor",
      name: "coil",
      windings: [{ nodes: ["out", GROUND], inductance: INDUCTANCE, seriesResistance: 0 }],
      coupling: 0,
      temperature: 0,
    },
    { kind: "resistor", name: "tank", nodes: ["out", GROUND], resistance, temperature: 0 },
    {
      kind: "resistor",
      name: "feed",
      nodes: ["source", "control"],
      resistance: RESISTANCE,
      temperature: TEMPERATURE,
    },
    { kind: "capacitor", name: "filter", nodes: ["control", GROUND], capacitance: FILTER },
    {
      kind: "device",
      name: "conductor",
      nodes: ["out", GROUND],
      evaluate(v, out) {
        const u = (v[0]! - v[1]!) / CONDUCTOR_VOLTAGE;
        const g = -conductance / Math.cosh(u) ** 2;
        out.fill(0);
        out.set([-conductance * CONDUCTOR_VOLTAGE * Math.tanh(u), 0, g, -g, -g, g]);
        out[1] = -out[0]!;
      },
      noise: [],
    },
    {
      // Charge (C + C' v_control) v_out on the output alone: nothing comes back to the control node.
      kind: "device",
      name: "varactor",
      nodes: ["out", GROUND, "control"],
      evaluate(v, out) {
        const across = v[0]! - v[1]!;
        const own = CAPACITANCE * (1 + CONTROL * v[2]!);
        const by = CAPACITANCE * CONTROL * across;
        out.fill(0);
        out[12] = own * across;
        out[13] = -own * across;
        out.set([own, -own, by, -own, own, -by], 15);
      },
      noise: [],
    },
  ]);
}

function grown(circuit: Circuit): Orbit {
  return orbitOf(circuit.system, {
    start: circuit.stateAt({ out: 0.2, control: 0.5 }),
    period: 2 * Math.PI * Math.sqrt(INDUCTANCE * CAPACITANCE),
    tolerance: 1e-10,
  });
}

const VALUES = { quality: 10, gain: 2, control: 0.5 };

Deno.test("a control node behind 10 kohm and 10 pF: K^2 4kTR / (2 f^2 (1 + (f/fp)^2)) over six decades", () => {
  // White voltage noise of the resistor (H. Nyquist, Phys. Rev. 32 (1928) 110) through the pole at the node, then
  // through the tuning gain with L = S_phi / 2 (IEEE Std 1139).
  const circuit = controlled(VALUES);
  const orbit = grown(circuit);
  const [control] = inputSensitivity(orbit);
  const output = new Float64Array(circuit.system.dimension);
  output[circuit.indexOf("out")!] = 1;
  const transfer = phaseTransfer(orbit, { output });
  const [feed] = circuit.sources;
  assert(feed?.device === "feed" && circuit.sources.length === 1);
  const pole = 1 / (2 * Math.PI * RESISTANCE * FILTER);
  const excess = [1e2, 1e3, 1e4, 1e5, 1e6, pole, 1e7, 1e8].map((offset) => {
    const [own] = transfer.noise([feed], offset);
    const hand = resistorPhaseNoise({
      gain: control!.frequency,
      resistance: RESISTANCE,
      temperature: TEMPERATURE,
      capacitance: FILTER,
    }, offset).level;
    return 10 * Math.log10(own!.phase) - hand;
  });
  const figures = excess.map((value) => value.toExponential(1)).join(", ");
  // Found 2e-6 dB up to 1 MHz, 8e-5 dB at 10 MHz and 1e-3 dB at 100 MHz = f0 / 24, where the control is no longer
  // slow against the carrier.
  for (const value of excess.slice(0, -1)) {
    assertClose(value, 0, { rtol: 0, atol: 1e-4, what: figures });
  }
  assertClose(excess.at(-1)!, 0, { rtol: 0, atol: 0.02, what: figures });
  // The limit of small offset alone overstates it by 1.4 dB at 1 MHz and 22 dB at 20 MHz.
  const { total } = phaseDiffusion(orbit, [feed]);
  const over = [1e6, 20e6].map((offset) =>
    10 * Math.log10((orbit.frequency / offset) ** 2 * total) -
    10 * Math.log10(transfer.noise([feed], offset)[0]!.phase)
  );
  assertClose(over, [1.45, 22.0], { rtol: 0, atol: 0.06, what: "limit over transfer" });
});

Deno.test("a control input: df/dv of the adjoint is that of orbits solved again, and of the capacitance alone", () => {
  const orbit = grown(controlled(VALUES));
  const [control] = inputSensitivity(orbit);
  const step = 0.05;
  const at = (volts: number) =>
    grown(controlled({ ...VALUES, control: VALUES.control + volts })).frequency;
  const slope = (8 * (at(step) - at(-step)) - at(2 * step) + at(-2 * step)) / (12 * step);
  assertClose(control!.frequency, slope, { rtol: 1e-7, atol: 0 });
  // f ~ C^(-1/2): -f C' / (2 C), up to the harmonics' part of the frequency, which is 1e-3 here.
  const hand = -orbit.frequency * CONTROL / (2 * (1 + CONTROL * VALUES.control));
  assertClose(control!.frequency, hand, { rtol: 3e-3, atol: 0 });
});

Deno.test("10 kohm in front of a tuning gain of 60 MHz/V: -125.3 dBc/Hz at 1 MHz, sqrt(2) by the convention", () => {
  // Arithmetic at 300 K: 12.87 nV/sqrt(Hz), L = 20 log(K v / (sqrt(2) f)).
  const resistor = { gain: 60e6, resistance: 10e3, temperature: 300 };
  const { level, density, convention } = resistorPhaseNoise(resistor, 1e6);
  assertClose(level, -125.3, { rtol: 0, atol: 0.05 });
  assertClose(density, 12.87e-9, { rtol: 1e-3, atol: 0 });
  assert(/sqrt\(2\)/.test(convention) && /3\.01 dB/.test(convention));
  // A regulator's table: 100 nV/sqrt(Hz) at 10 kHz falling to 20 at 1 MHz; straight in log-log, 44.7 at 100 kHz.
  const table = [{ frequency: 1e4, density: 100e-9 }, { frequency: 1e6, density: 20e-9 }];
  const pushed = supplyPhaseNoise({ gain: -20e6, density: table }, 1e5);
  assertClose(pushed.level, 20 * Math.log10(20e6 * 44.7214e-9 / Math.SQRT2 / 1e5), {
    rtol: 0,
    atol: 1e-4,
  });
});
