import type { Corner } from "../device/corner.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import type { Circuit } from "./circuit.ts";
import type { Schematic } from "./schematic.ts";

/** In what condition a design is looked at. */
export interface Condition {
  readonly corner: Corner;
  /** Junction temperature [K]. */
  readonly temperature: number;
  /** Supply voltage [V]. */
  readonly supply: number;
}

/** A plain differential tank: what is between the two output nodes besides the devices. */
export interface TankDesign {
  /** Differential inductance [H]. */
  readonly inductance: number;
  /** Quality factor of the tank at `qualityFrequency`, as a parallel loss [1]. */
  readonly quality: number;
  /** Frequency at which the quality factor holds [Hz]. */
  readonly qualityFrequency: number;
  /** Linear capacitance between the outputs [F]. */
  readonly capacitance: number;
  /** Coupling of the two halves of the coil [1]. @default 0.6 */
  readonly coupling?: number;
}

/** A hand formula's value, with its own test of validity. */
export interface HandValue {
  /** In words: "amplitude by (2/pi) I R". */
  readonly name: string;
  /** TeX of the formula. */
  readonly formula: string;
  readonly source: string;
}

/** A device voltage watched against the card's limits. */
export interface WatchedVoltage {
  readonly device: string;
  readonly quantity: "gate-source" | "gate-drain" | "drain-source" | "drain-bulk";
  readonly plus: string;
  readonly minus: string;
}

/** A named pattern of the unknowns, by which poles are told apart. */
export interface ModePattern {
  readonly name: string;
  /** Size of the pattern in a mode: weights on node potentials. */
  readonly weights: Readonly<Record<string, number>>;
}

/** A topology with its parameters filled in, at one condition. */
export interface BuiltOscillator {
  readonly circuit: Circuit;
  /** Name of the supply's node. */
  readonly supplyNode: string;
  /** Output nodes: the tank voltage is plus minus minus. */
  readonly tank: {
    readonly plus: string;
    readonly minus: string;
    /** Parallel loss conductance of the passive tank at an angular frequency [S]. */
    conductance(angularFrequency: number): number;
    /** Differential inductance [H]. */
    readonly inductance: number;
  };
  /** Total current drawn from the supply at a state [A]. */
  supplyCurrent(x: Float64Array): number;
  /** Where to begin looking for the equilibrium, shape (n,). */
  readonly guess: Float64Array;
  readonly watched: readonly WatchedVoltage[];
  readonly patterns: readonly ModePattern[];
  /** Names of the devices by part: what makes up "pair", "tail", "mirror". */
  readonly parts: Readonly<Record<string, readonly string[]>>;
}

/**
 * A topology: a function from a few design parameters to a circuit, with its schematic and the hand
 * formulas of its amplitude and startup.
 */
export interface Topology<Design> {
  /** One word, as revisions name it. */
  readonly name: string;
  readonly title: string;
  build(design: Design, options: { card: TechnologyCard; condition: Condition }): BuiltOscillator;
  /** Symbols, wires and values of the schematic. */
  schematic(design: Design): Schematic;
  /** The same design at another programmed current [A]. */
  withCurrent(design: Design, current: number): Design;
  /** Amplitude by the hand formula, current-limited [V], from programmed current and tank resistance. */
  amplitude(values: { current: number; resistance: number }): number;
  readonly amplitudeFormula: HandValue;
  /** Startup loop gain by the hand formula [1], from the pair's transconductance at the operating point. */
  loopGain(values: { transconductance: number; resistance: number }): number;
  readonly loopGainFormula: HandValue;
}
