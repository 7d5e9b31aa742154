import type { Corner } from "../device/corner.ts";
import type { CoilModel } from "../device/inductor_model.ts";
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
  /**
   * The coil itself, with a centre tap, as lumped elements with losses of their own, at the nominal
   * temperature of the card: the metal grows hotter with the condition. The inductance and
   * the quality factor beside it then serve the hand formulas only; topologies whose coil has no tap
   * do not take one.
   */
  readonly coil?: CoilModel;
}

/** The capacitive divider of a Colpitts oscillator. */
export interface Divider {
  /** C1, from the drain to the source [F]. */
  readonly first: number;
  /** C2, from the source to ground [F]. */
  readonly second: number;
}

/** A hand formula in words and symbols. */
export interface HandValue {
  /** In words: "amplitude by (2/pi) I R". */
  readonly name: string;
  /** TeX of the formula. */
  readonly formula: string;
  readonly source: string;
  /** Where it holds, in words. */
  readonly holds?: string;
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
  /** Names of the devices by part: what makes up "tank", "pair" (the core), "tail", "mirror". */
  readonly parts: Readonly<Record<string, readonly string[]>>;
  /**
   * A state well away from the equilibrium, shape (n,), and about the period [s], for topologies that
   * may have an orbit although their equilibrium is stable.
   */
  readonly kick?: { readonly state: Float64Array; readonly period: number };
  /**
   * The transconductance that the hand formula of the loop gain counts, at an equilibrium.
   * @default the gate transconductance of the first device of the part "pair"
   */
  readonly core?: (state: Float64Array) => CoreValues;
  /** Fraction n of the tank voltage at a capacitive divider's tap, C1 / (C1 + C2) [1]. */
  readonly tap?: number;
}

/** What the devices that make the negative conductance are at an operating point. */
export interface CoreValues {
  /** What the loop gain counts: gm of one side, the sum of both kinds, or gms of a common gate [S]. */
  readonly transconductance: number;
  /** Thermal noise conductance over that transconductance [1]. */
  readonly gamma: number;
  /** Output conductance of the same devices, which loads the tank [S]. */
  readonly outputConductance: number;
}

/** What a hand formula of the amplitude takes. */
export interface AmplitudeValues {
  /** Programmed current, both sides together [A]. */
  readonly current: number;
  /** Parallel loss resistance between the output nodes [ohm]. */
  readonly resistance: number;
  /** Fraction at the divider's tap, where there is one [1]. */
  readonly tap?: number;
  /** Supply voltage, for formulas that are limited by it [V]. */
  readonly supply?: number;
}

/** What a hand formula of the startup loop gain takes. */
export interface LoopGainValues {
  /** {@linkcode CoreValues.transconductance} [S]. */
  readonly transconductance: number;
  /** Parallel loss resistance between the output nodes [ohm]. */
  readonly resistance: number;
  /** Fraction at the divider's tap, where there is one [1]. */
  readonly tap?: number;
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
  /** Amplitude by the hand formula [V]. */
  amplitude(values: AmplitudeValues): number;
  readonly amplitudeFormula: HandValue;
  /** Startup loop gain by the hand formula [1]. */
  loopGain(values: LoopGainValues): number;
  readonly loopGainFormula: HandValue;
}
