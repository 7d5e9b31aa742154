/** Ideal tanks around memoryless conductors, as circuits in SI units and as equations without units. */
import { assert } from "../assert.ts";
import { assemble, type Circuit } from "../../lib/circuit/circuit.ts";
import { type CircuitElement, GROUND, thermalAmplitude } from "../../lib/circuit/element.ts";
import { findOrbit, type FindOrbitOptions } from "../../lib/orbit/find_orbit.ts";
import { odeSystem } from "../../lib/orbit/ode_system.ts";
import { Orbit } from "../../lib/orbit/orbit.ts";
import type { NoiseSource, OscillatorSystem } from "../../lib/orbit/system.ts";

export const TEMPERATURE = 300;
/** Inductance of every tank in SI units [H]. */
export const INDUCTANCE = 2e-9;
const FREQUENCY = 2.4e9;
/** C = 1 / (w^2 L) [F] */
export const CAPACITANCE = 1 / ((2 * Math.PI * FREQUENCY) ** 2 * INDUCTANCE);
/** sqrt(L / C) [ohm] */
export const CHARACTERISTIC_RESISTANCE = Math.sqrt(INDUCTANCE / CAPACITANCE);
/** Load from each output of the pair to ground [F]. */
const LOAD_CAPACITANCE = CAPACITANCE / 9;
/** Voltage that is one unit of a conductor's argument [V]. */
export const CONDUCTOR_VOLTAGE = 0.1;

/** A current that rises nowhere: -shape(u), with the slope of `shape` nowhere negative. */
export interface Conductor {
  readonly shape: (u: number) => number;
  /** d(shape)/du, at least 0; 1 at u = 0 up to the shift. */
  readonly slope: (u: number) => number;
}

function conductor(shape: (u: number) => number, slope: (u: number) => number): Conductor {
  // No current at rest: the lossless coil holds the mean voltage at zero.
  const rest = shape(0);
  return { shape: (u) => shape(u) - rest, slope };
}

const sech2 = (u: number) => 1 / Math.cosh(u) ** 2;

/** Conductors with symmetric, lopsided and stepped curves. */
export const CONDUCTORS: Readonly<
  Record<"tanh" | "lopsided" | "algebraic" | "stepped", Conductor>
> = {
  tanh: conductor(Math.tanh, sech2),
  lopsided: conductor(
    (u) => Math.tanh(u + 0.6) / sech2(0.6),
    (u) => sech2(u + 0.6) / sech2(0.6),
  ),
  algebraic: conductor((u) => u / Math.sqrt(1 + u * u), (u) => (1 + u * u) ** -1.5),
  stepped: conductor(
    (u) => Math.tanh(u) + 0.7 * Math.tanh(2 * (u - 2.5)),
    (u) => sech2(u) + 1.4 * sech2(2 * (u - 2.5)),
  ),
};

/** Tank of quality Q with a conductor of current -(gain/Q) shape(v): v' = -i - (v - gain shape(v))/Q. */
export function conductorEquations(
  { shape, slope }: Conductor,
  { quality, gain, gamma }: { quality: number; gain: number; gamma: number },
): { system: OscillatorSystem; sources: NoiseSource[] } {
  const system = odeSystem({
    dimension: 2,
    flow: ([v, i], into) => {
      into[0] = -i! - (v! - gain * shape(v!)) / quality;
      into[1] = v!;
    },
    jacobian: ([v], J) => J.set([(gain * slope(v!) - 1) / quality, -1, 1, 0]),
  });
  const source = (device: string, amplitude: (v: number) => number): NoiseSource => ({
    label: "thermal",
    device,
    color: "white",
    inject([v], into) {
      into[0] = amplitude(v!);
      into[1] = 0;
    },
  });
  return {
    system,
    sources: [
      source("tank", () => Math.sqrt(1 / quality)),
      source("conductor", (v) => Math.sqrt(gamma * gain / quality * slope(v))),
    ],
  };
}

/** The same as a circuit in SI units, the conductor a device of two terminals. */
export function conductorCircuit(
  { shape, slope }: Conductor,
  { quality, gain, gamma }: { quality: number; gain: number; gamma: number },
): Circuit {
  const resistance = quality * CHARACTERISTIC_RESISTANCE;
  const conductance = gain / resistance;
  const argument = (v: Float64Array) => (v[0]! - v[1]!) / CONDUCTOR_VOLTAGE;
  return assemble([
    ...tankElements("out", { resistance }),
    {
      kind: "device",
      name: "conductor",
      nodes: ["out", GROUND],
      evaluate(v, out) {
        const current = -conductance * CONDUCTOR_VOLTAGE * shape(argument(v));
        const g = -conductance * slope(argument(v));
        out.fill(0);
        out.set([current, -current, g, -g, -g, g]);
      },
      noise: [{
        label: "thermal",
        color: "white",
        into: 0,
        out: 1,
        amplitude: (v) => thermalAmplitude(gamma * conductance * slope(argument(v)), TEMPERATURE),
      }],
    },
  ]);
}

/** A parallel tank from a node to ground. */
export function tankElements(
  node: string,
  { resistance }: { resistance: number },
): CircuitElement[] {
  return [
    {
      kind: "inductor",
      name: "coil",
      windings: [{ nodes: [node, GROUND], inductance: INDUCTANCE, seriesResistance: 0 }],
      coupling: 0,
      temperature: TEMPERATURE,
    },
    {
      kind: "resistor",
      name: "tank",
      nodes: [node, GROUND],
      resistance,
      temperature: TEMPERATURE,
    },
    { kind: "capacitor", name: "capacitor", nodes: [node, GROUND], capacitance: CAPACITANCE },
  ];
}

/**
 * Tank of differential resistance R with a quasi-static pair of tail current I: plus draws
 * I (1 - tanh(v/s)) / 2 and minus the rest, v the tank voltage. Loop gain a = I R / (2 s).
 */
export function tanhPairCircuit(
  { quality, loopGain }: { quality: number; loopGain: number },
): { circuit: Circuit; tailNoise: NoiseSource; tailCurrent: number; resistance: number } {
  const resistance = quality * CHARACTERISTIC_RESISTANCE;
  const tailCurrent = 2 * CONDUCTOR_VOLTAGE * loopGain / resistance;
  const coupling = 0.6;
  const half = INDUCTANCE / (2 * (1 + coupling));
  const circuit = assemble([
    { kind: "potential", name: "supply", node: "supply", potential: 1 },
    {
      kind: "inductor",
      name: "coil",
      windings: [
        { nodes: ["plus", "supply"], inductance: half, seriesResistance: 0 },
        { nodes: ["supply", "minus"], inductance: half, seriesResistance: 0 },
      ],
      coupling,
      temperature: TEMPERATURE,
    },
    ...(["plus", "minus"] as const).map((node): CircuitElement => ({
      kind: "resistor",
      name: `tank ${node}`,
      nodes: [node, "supply"],
      resistance: resistance / 2,
      temperature: TEMPERATURE,
    })),
    {
      kind: "capacitor",
      name: "capacitor",
      nodes: ["plus", "minus"],
      capacitance: CAPACITANCE - LOAD_CAPACITANCE / 2,
    },
    // Makes the common mode a state of its own, away from the carrier's harmonics.
    ...(["plus", "minus"] as const).map((node): CircuitElement => ({
      kind: "capacitor",
      name: `load ${node}`,
      nodes: [node, GROUND],
      capacitance: LOAD_CAPACITANCE,
    })),
    {
      kind: "device",
      name: "pair",
      nodes: ["plus", "minus", GROUND],
      evaluate(v, out) {
        const u = (v[0]! - v[1]!) / CONDUCTOR_VOLTAGE;
        const steered = Math.tanh(u);
        const g = tailCurrent / (2 * CONDUCTOR_VOLTAGE) * (1 - steered * steered);
        out.fill(0);
        out[0] = tailCurrent * (1 - steered) / 2;
        out[1] = tailCurrent * (1 + steered) / 2;
        out[2] = -tailCurrent;
        out.set([-g, g, 0, g, -g, 0], 3);
      },
      noise: [],
    },
  ]);
  const [plus, minus] = [circuit.indexOf("plus")!, circuit.indexOf("minus")!];
  return {
    circuit,
    tailCurrent,
    resistance,
    tailNoise: {
      label: "white, 1 A/sqrt(Hz)",
      device: "tail",
      color: "white",
      inject(x, into) {
        const steered = Math.tanh((x[plus]! - x[minus]!) / CONDUCTOR_VOLTAGE);
        into.fill(0);
        into[plus] = -(1 - steered) / 2;
        into[minus] = -(1 + steered) / 2;
      },
    },
  };
}

/** The orbit, or a failed assertion with the reason. */
export function orbitOf(system: OscillatorSystem, options: FindOrbitOptions): Orbit {
  const found = findOrbit(system, options);
  assert(found instanceof Orbit, found instanceof Orbit ? "" : `${found.status}: ${found.reason}`);
  return found;
}
