/**
 * What the cross-coupled pairs of one kind of transistor share, whatever carries their current.
 *
 * An N pair hangs from the supply and stands on ground; a P pair is its mirror image, upside down.
 *
 * @module
 */
import type { TransistorSize } from "../device/transistor_parameters.ts";
import {
  capacitors,
  coreOf,
  currentLeaving,
  differentialTank,
  SUPPLY,
  tankLosses,
  tappedTank,
  watchedTransistors,
  type Workshop,
} from "./_topology_parts.ts";
import { assemble } from "./circuit.ts";
import { type CircuitElement, GROUND } from "./element.ts";
import { tankResistance } from "./tank_resistance.ts";
import type { BuiltOscillator, HandValue, ModePattern, TankDesign } from "./topology.ts";

/** The rails of a pair: where the coil's tap goes, and where sources and bulks lead. */
export function railsOf(kind: "n" | "p"): { readonly tap: string; readonly foot: string } {
  return kind === "n" ? { tap: SUPPLY, foot: GROUND } : { tap: GROUND, foot: SUPPLY };
}

/** The part of a design that all pairs have. */
export interface PairDesign {
  readonly tank: TankDesign;
  readonly loadCapacitance?: number;
}

/** What a pair's foot adds: everything between the common sources and the rail. */
export interface PairFoot {
  readonly elements: readonly CircuitElement[];
  /** Where to begin looking for the equilibrium, as potentials above an N pair's foot [V]. */
  readonly guess: Readonly<Record<string, number>>;
  readonly patterns: readonly ModePattern[];
  readonly parts: BuiltOscillator["parts"];
  /** Transistors among the elements to be watched. */
  readonly watched: readonly string[];
}

/** A pair with its tank on a foot; `common` is the node of its sources. */
export function buildPair(
  shop: Workshop,
  { kind, size, design, common, foot }: {
    readonly kind: "n" | "p";
    readonly size: TransistorSize;
    readonly design: PairDesign;
    readonly common: string;
    readonly foot: PairFoot;
  },
): BuiltOscillator {
  const { tank, loadCapacitance = 0 } = design;
  const { tap, foot: bulk } = railsOf(kind);
  const { supply } = shop.condition;
  const circuit = assemble([
    { kind: "potential", name: "supply", node: SUPPLY, potential: supply },
    ...tappedTank(tank, { tap, shop }),
    ...capacitors([
      ["load plus", ["plus", bulk], loadCapacitance],
      ["load minus", ["minus", bulk], loadCapacitance],
    ]),
    ...foot.elements.filter((element) => element.kind === "capacitor"),
    shop.transistor("pair plus", {
      kind,
      size,
      at: { drain: "plus", gate: "minus", source: common, bulk },
    }),
    shop.transistor("pair minus", {
      kind,
      size,
      at: { drain: "minus", gate: "plus", source: common, bulk },
    }),
    ...foot.elements.filter((element) => element.kind !== "capacitor"),
  ]);
  const upright = { plus: supply, minus: supply, ...foot.guess };
  const potentials = kind === "n" ? upright : Object.fromEntries(
    Object.entries(upright).map(([node, value]) => [node, supply - value]),
  );
  return {
    circuit,
    supplyNode: SUPPLY,
    tank: differentialTank({
      tank,
      resistance: tankResistance(tank) / shop.passives.metalResistance,
    }),
    supplyCurrent: currentLeaving(circuit, SUPPLY),
    guess: circuit.stateAt(potentials),
    core: coreOf(circuit, "pair plus", { of: "gm" }),
    watched: watchedTransistors(circuit, ["pair plus", "pair minus", ...foot.watched]),
    patterns: [
      { name: "tank", weights: { plus: 1, minus: -1 } },
      { name: "common mode", weights: { plus: 1, minus: 1 } },
      ...foot.patterns,
    ],
    parts: {
      tank: tankLosses(tank),
      pair: ["pair plus", "pair minus"],
      ...foot.parts,
    },
  };
}

/** (2/pi) I R. */
export function switchingAmplitude(
  { current, resistance }: { readonly current: number; readonly resistance: number },
): number {
  return 2 / Math.PI * current * resistance;
}

export const SWITCHING_AMPLITUDE: HandValue = {
  name: "amplitude, hard switching",
  formula: "A = \\frac{2}{\\pi} I R",
  source:
    "fundamental of a square wave of I/2; J. Rael, A. Abidi, Proc. CICC 2000, 569 (from memory)",
  holds: "the pair switches hard, the tail keeps its current, and its node has no capacitance",
};

/** gm R / 2. */
export function pairLoopGain(
  { transconductance, resistance }: {
    readonly transconductance: number;
    readonly resistance: number;
  },
): number {
  return transconductance * resistance / 2;
}

export const PAIR_LOOP_GAIN: HandValue = {
  name: "startup loop gain",
  formula: "a = \\frac{g_m R}{2}",
  source: "A. Hajimiri, T. Lee, IEEE J. Solid-State Circuits 34 (1999) 717 (from memory)",
  holds: "output conductance of the pair is small against 1/R",
};
