import { assemble, type Circuit } from "../../../lib/circuit/circuit.ts";
import { type CircuitElement, type DeviceElement, GROUND } from "../../../lib/circuit/element.ts";
import { varactorElements } from "../../../lib/circuit/varactor_elements.ts";
import { swingCapacitance } from "../../../lib/device/swing_capacitance.ts";
import { AccumulationVaractor } from "../../../lib/device/varactor_accumulation.ts";
import { findEquilibrium } from "../../../lib/orbit/equilibrium.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { inputSensitivity } from "../../../lib/orbit/input_sensitivity.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";

const INDUCTANCE = 1e-9;
/** Close coupling keeps the common mode far above the second harmonic. */
const COUPLING = 0.95;
const HALF = INDUCTANCE / (2 * (1 + COUPLING));
const FIXED = 0.4e-12;
const RESISTANCE = 600;
/** Two varactors back to back on a differential tank, so that the odd part of the law cancels. */
const varactor = new AccumulationVaractor({
  maximumCapacitance: 0.6e-12,
  minimumCapacitance: 0.2e-12,
  centreVoltage: 0,
  transitionVoltage: 0.4,
  seriesResistance: 0,
});

/** A saturating conductor i = -I tanh(v / Vs) between two nodes. */
function conductor(current: number, voltage: number): DeviceElement {
  return {
    kind: "device",
    name: "conductor",
    nodes: ["plus", "minus"],
    noise: [],
    evaluate(v, out) {
      const t = Math.tanh((v[0]! - v[1]!) / voltage);
      const slope = -current / voltage * (1 - t * t);
      out.fill(0);
      out.set([-current * t, current * t, slope, -slope, -slope, slope]);
    },
  };
}

function tuned(control: number): Circuit {
  const bias = Float64Array.of(0, control);
  const elements: CircuitElement[] = [
    { kind: "potential", name: "control", node: "control", potential: control },
    {
      kind: "inductor",
      name: "coil",
      windings: [
        { nodes: ["plus", GROUND], inductance: HALF, seriesResistance: 0 },
        { nodes: [GROUND, "minus"], inductance: HALF, seriesResistance: 0 },
      ],
      coupling: COUPLING,
      temperature: 0,
    },
    ...(["plus", "minus"] as const).flatMap((node): CircuitElement[] => [
      {
        kind: "resistor",
        name: `loss ${node}`,
        nodes: [node, GROUND],
        resistance: RESISTANCE / 2,
        temperature: 300,
      },
      ...varactorElements(`varactor ${node}`, varactor, {
        nodes: [node, "control"],
        bias,
        temperature: 300,
      }),
    ]),
    { kind: "capacitor", name: "fixed", nodes: ["plus", "minus"], capacitance: FIXED },
    conductor(1.5e-3, 0.4),
  ];
  return assemble(elements);
}

function orbitAt(control: number): { orbit: Orbit; circuit: Circuit } {
  const circuit = tuned(control);
  const orbit = findOrbit(circuit.system, { start: findEquilibrium(circuit.system) });
  assert(orbit instanceof Orbit, "no orbit");
  return { orbit, circuit };
}

Deno.test("varactorElements: the swing-averaged capacitance sets the frequency, not the small-signal one", () => {
  for (const control of [0.2, -0.15]) {
    const { orbit, circuit } = orbitAt(control);
    const swing = orbit.phasor((x) => circuit.voltage("plus", "minus", x));
    const { effective, smallSignal } = swingCapacitance(
      (v) => {
        const out = new Float64Array(12);
        varactor.evaluate(Float64Array.of(v, 0), out);
        return out[8]!;
      },
      { bias: -control, amplitude: Math.hypot(swing.re, swing.im) / 2 },
    );
    const frequency = (capacitance: number) =>
      1 / (2 * Math.PI * Math.sqrt(INDUCTANCE * (FIXED + capacitance / 2)));
    // E. Hegazi, A. Abidi (2003): good to half a per cent in a differential tank (check values 5.6.x);
    // the rest is the distortion of the tank voltage at Q of about 13.
    const off = Math.abs(orbit.frequency / frequency(effective) - 1);
    const offSmall = Math.abs(orbit.frequency / frequency(smallSignal) - 1);
    assert(off < 5e-3, `${off} off at ${control} V`);
    assert(off < offSmall / 3, `${off} against ${offSmall} with the small-signal value`);
  }
});

Deno.test("varactorElements: the tuning gain is the derivative of re-solved orbits", () => {
  const { orbit } = orbitAt(0.2);
  const gain = inputSensitivity(orbit).find(({ name }) => name === "control")!;
  const step = 1e-4;
  const above = orbitAt(0.2 + step).orbit.frequency;
  const below = orbitAt(0.2 - step).orbit.frequency;
  assertClose(gain.frequency, (above - below) / (2 * step), { rtol: 1e-4, atol: 0 });
});

Deno.test("varactorElements puts the loss in series with the first terminal, with its noise", () => {
  const lossy = new AccumulationVaractor({ ...varactor.parameters, seriesResistance: 5 });
  const place = { nodes: ["a", "b"], bias: Float64Array.of(0, 0), temperature: 300 };
  const [loss, device] = varactorElements("tuning", lossy, place);
  assert(loss?.kind === "resistor" && device?.kind === "device");
  assertEquals([loss.nodes, loss.resistance, loss.temperature], [["a", "tuning plate"], 5, 300]);
  assertEquals(device.nodes, ["tuning plate", "b"]);
  assertEquals(varactorElements("tuning", varactor, place).length, 1);
});

Deno.test("varactorElements refuses nodes that are not those of the terminals", () => {
  assertThrows(
    () =>
      varactorElements("x", varactor, { nodes: ["a"], bias: Float64Array.of(0), temperature: 300 }),
    RangeError,
    /Cannot join the varactor x: 2 nodes and potentials are needed, got 1 and 1/,
  );
});
