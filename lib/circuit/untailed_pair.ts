import type { TransistorSize } from "../device/transistor_parameters.ts";
import { pairSchematic } from "./_cross_coupled_pair_schematic.ts";
import { buildPair, PAIR_LOOP_GAIN, pairLoopGain } from "./_pair_parts.ts";
import { demandPositive, workshop } from "./_topology_parts.ts";
import { GROUND } from "./element.ts";
import { tankResistance } from "./tank_resistance.ts";
import type { TankDesign, Topology } from "./topology.ts";

/** Cross-coupled pair without a tail: the supply biases it. */
export interface UntailedPairDesign {
  readonly tank: TankDesign;
  /** Size of each transistor of the pair. */
  readonly pair: TransistorSize;
  /** Programmed current: what both sides draw at rest [A]. Scales the width when it is changed. */
  readonly current: number;
  /** Load from each output to ground: buffer, wiring [F]. @default 0 */
  readonly loadCapacitance?: number;
  /** Threshold option of the transistors. @default "regular" */
  readonly flavour?: string;
}

/**
 * Cross-coupled N pair with its sources at ground: the largest swing for a supply, a current that
 * moves with supply, process and temperature, and devices that load the tank in triode.
 *
 * States: two outputs, two halves of the coil.
 */
export const untailedPair: Topology<UntailedPairDesign> = {
  name: "n_pair_no_tail",
  title: "Cross-coupled N pair without tail",
  build(design, { card, condition }) {
    const { pair, current } = design;
    demandPositive("build the pair", { current: [current, "A"] });
    return buildPair(workshop(card, { condition, flavour: design.flavour }), {
      kind: "n",
      size: pair,
      design,
      common: GROUND,
      foot: { elements: [], guess: {}, patterns: [], parts: {}, watched: [] },
    });
  },
  withCurrent: (design, current) => ({
    ...design,
    current,
    pair: { ...design.pair, width: design.pair.width * current / design.current },
  }),
  schematic: ({ tank, pair, loadCapacitance }) =>
    pairSchematic({
      inductance: tank.inductance,
      resistance: tankResistance(tank),
      tankCapacitance: tank.capacitance,
      pairWidth: pair.width,
      loadCapacitance,
      foot: { kind: "none" },
    }),
  amplitude({ supply }) {
    demandPositive("estimate the amplitude", { supply: [supply ?? NaN, "V"] });
    return 2 * (supply ?? NaN);
  },
  amplitudeFormula: {
    name: "amplitude, voltage-limited",
    formula: "A = 2 V_{DD}",
    source: "each output swings from ground to twice the supply (common practice)",
    holds: "the pair's conductance in triode is large against 1/R",
  },
  loopGain: pairLoopGain,
  loopGainFormula: PAIR_LOOP_GAIN,
};
