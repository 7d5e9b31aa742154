/**
 * What a circuit is made of. Elements join named nodes; node `ground` is 0 V.
 *
 * A transistor reads four terminals of an array that has four; `!` says so to the compiler.
 *
 * @module
 */
import { BOLTZMANN } from "../quantity/constants.ts";
import { TRANSISTOR_VALUES } from "../device/transistor.ts";
import type { TransistorModel } from "../device/transistor_model.ts";

/** Name of the reference node. */
export const GROUND = "ground";

/** A resistor with thermal noise 4kT/R. */
export interface ResistorElement {
  readonly kind: "resistor";
  readonly name: string;
  readonly nodes: readonly [string, string];
  /** [ohm] */
  readonly resistance: number;
  /** Temperature of its noise [K]; 0 for a noiseless one. */
  readonly temperature: number;
}

/** A linear capacitor. */
export interface CapacitorElement {
  readonly kind: "capacitor";
  readonly name: string;
  readonly nodes: readonly [string, string];
  /** [F] */
  readonly capacitance: number;
}

/** One winding or several coupled ones, each with a series resistance. */
export interface InductorElement {
  readonly kind: "inductor";
  readonly name: string;
  readonly windings: readonly {
    readonly nodes: readonly [string, string];
    /** [H] */
    readonly inductance: number;
    /** [ohm]; may be zero. */
    readonly seriesResistance: number;
  }[];
  /** Coupling coefficient between any two windings [1], -1 to 1 exclusive; 0 for one winding. */
  readonly coupling: number;
  /** Temperature of the series resistances' noise [K]. */
  readonly temperature: number;
}

/** A programmed current from `nodes[0]` through the source into `nodes[1]`. */
export interface CurrentElement {
  readonly kind: "current";
  readonly name: string;
  readonly nodes: readonly [string, string];
  /** [A] */
  readonly current: number;
}

/** A node held at a potential: a supply or a control voltage. */
export interface PotentialElement {
  readonly kind: "potential";
  readonly name: string;
  readonly node: string;
  /** [V] */
  readonly potential: number;
}

/** A white or 1/f noise current between two terminals of a device. */
export interface DeviceNoise {
  readonly label: string;
  readonly color: "white" | "1/f";
  /** Terminals by index: the current flows into `into` and out of `out`. */
  readonly into: number;
  readonly out: number;
  /** Signed one-sided amplitude at terminal potentials `v` [A/sqrt(Hz)], at 1 Hz for 1/f. */
  readonly amplitude: (v: Float64Array) => number;
}

/** A device with k terminals whose currents and charges are functions of the terminal potentials. */
export interface DeviceElement {
  readonly kind: "device";
  readonly name: string;
  readonly nodes: readonly string[];
  /**
   * Currents into the terminals [A], shape (k,); dI/dv (k, k) [S]; charges [C] (k,); dQ/dv (k, k) [F], one
   * after the other in `out`, row-major.
   */
  readonly evaluate: (v: Float64Array, out: Float64Array) => void;
  readonly noise: readonly DeviceNoise[];
  /** The transistor, when it is one, for limits and operating points. */
  readonly transistor?: TransistorModel;
}

/** Anything a circuit is made of. */
export type CircuitElement =
  | ResistorElement
  | CapacitorElement
  | InductorElement
  | CurrentElement
  | PotentialElement
  | DeviceElement;

/**
 * Length of `out` of a device.
 *
 * @param terminals number of terminals k [1]
 */
export function deviceValues(terminals: number): number {
  return 2 * terminals * (1 + terminals);
}

/**
 * A transistor between drain, gate, source and bulk nodes, with thermal and flicker noise between
 * drain and source.
 */
export function transistorElement(
  name: string,
  transistor: TransistorModel,
  { drain, gate, source, bulk }: { drain: string; gate: string; source: string; bulk: string },
): DeviceElement {
  if (deviceValues(4) !== TRANSISTOR_VALUES) {
    throw new TypeError("Cannot join a transistor: its values do not have the layout of a device");
  }
  return {
    kind: "device",
    name,
    nodes: [drain, gate, source, bulk],
    transistor,
    evaluate: (v, out) => transistor.evaluate(v[0]!, v[1]!, v[2]!, v[3]!, out),
    noise: [
      {
        label: "channel thermal",
        color: "white",
        into: 0,
        out: 2,
        amplitude: (v) => transistor.channelNoise(v[0]!, v[1]!, v[2]!, v[3]!),
      },
      {
        label: "flicker",
        color: "1/f",
        into: 0,
        out: 2,
        amplitude: (v) => transistor.flickerNoise(v[0]!, v[1]!, v[2]!, v[3]!),
      },
    ],
  };
}

/**
 * One-sided thermal noise amplitude of a conductance, sqrt(4kT G).
 *
 * @param conductance [S]
 * @param temperature [K]
 * @returns [A/sqrt(Hz)]
 */
export function thermalAmplitude(conductance: number, temperature: number): number {
  return Math.sqrt(4 * BOLTZMANN * temperature * conductance);
}
