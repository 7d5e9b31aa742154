import type { TransistorSize } from "../device/transistor_parameters.ts";
import { complementarySchematic } from "./_complementary_pair_schematic.ts";
import {
  capacitors,
  currentLeaving,
  demandPositive,
  differentialTank,
  mirroredSources,
  operatingPointIn,
  SUPPLY,
  watchedTransistors,
  workshop,
} from "./_topology_parts.ts";
import { assemble } from "./circuit.ts";
import { GROUND } from "./element.ts";
import { tankResistance } from "./tank_resistance.ts";
import type { TankDesign, Topology } from "./topology.ts";

/** Complementary cross-coupled pair with a mirrored N tail. */
export interface ComplementaryPairDesign {
  /** The coil floats between the outputs; its coupling plays no part. */
  readonly tank: TankDesign;
  /** Size of each N transistor of the pair. */
  readonly pair: TransistorSize;
  /** Size of each P transistor of the pair. */
  readonly pairP: TransistorSize;
  /** Size of the tail transistor. */
  readonly tail: TransistorSize;
  /** Programmed current: what the tail would carry as an ideal copy of the reference [A]. */
  readonly current: number;
  /** Tail current over reference current; the mirror transistor is this much narrower [1]. */
  readonly mirrorRatio: number;
  /** Load from each output to ground: buffer, wiring [F]. @default 0 */
  readonly loadCapacitance?: number;
  /** From the tail node to ground [F]. @default 0 */
  readonly tailCapacitance?: number;
  /** From the mirror's gate to ground [F]. @default 0 */
  readonly mirrorCapacitance?: number;
  /** Threshold option of all transistors. @default "regular" */
  readonly flavour?: string;
}

/**
 * Complementary cross-coupled pair: an N pair on a mirrored tail, a P pair from the supply, the coil
 * between the outputs. The whole tail current turns over in the tank, twice that of a single pair.
 *
 * States: two outputs, tail, mirror gate, coil.
 */
export const complementaryPair: Topology<ComplementaryPairDesign> = {
  name: "complementary_pair",
  title: "Complementary cross-coupled pair with mirrored N tail",
  build(design, { card, condition }) {
    const { tank, pair, pairP, tail, current, mirrorRatio, loadCapacitance = 0 } = design;
    demandPositive("build the complementary pair", {
      current: [current, "A"],
      "mirror ratio": [mirrorRatio, ""],
    });
    const shop = workshop(card, { condition, flavour: design.flavour });
    const { supply, temperature } = condition;
    const resistance = tankResistance(tank) / shop.passives.metalResistance;
    const circuit = assemble([
      { kind: "potential", name: "supply", node: SUPPLY, potential: supply },
      {
        kind: "inductor",
        name: "coil",
        windings: [{
          nodes: ["plus", "minus"],
          inductance: tank.inductance,
          seriesResistance: 0,
        }],
        coupling: 0,
        temperature,
      },
      { kind: "resistor", name: "tank loss", nodes: ["plus", "minus"], resistance, temperature },
      ...capacitors([
        ["tank capacitor", ["plus", "minus"], tank.capacitance * shop.passives.capacitor],
        ["load plus", ["plus", GROUND], loadCapacitance],
        ["load minus", ["minus", GROUND], loadCapacitance],
        ["tail capacitor", ["tail", GROUND], design.tailCapacitance],
        ["mirror capacitor", ["mirror", GROUND], design.mirrorCapacitance],
      ]),
      ...([["plus", "minus"], ["minus", "plus"]] as const).flatMap(([drain, gate]) => [
        shop.transistor(`pair ${drain}`, {
          kind: "n",
          size: pair,
          at: { drain, gate, source: "tail", bulk: GROUND },
        }),
        shop.transistor(`upper pair ${drain}`, {
          kind: "p",
          size: pairP,
          at: { drain, gate, source: SUPPLY, bulk: SUPPLY },
        }),
      ]),
      ...mirroredSources(shop, {
        kind: "n",
        size: tail,
        current,
        mirrorRatio,
        outputs: [["tail", "tail"]],
      }),
    ]);
    const middle = supply / 2;
    const potentials = { plus: middle, minus: middle, tail: supply / 6, mirror: supply / 2 };
    return {
      circuit,
      supplyNode: SUPPLY,
      tank: differentialTank({ tank, resistance }),
      supplyCurrent: currentLeaving(circuit, SUPPLY),
      guess: circuit.stateAt(potentials),
      core: (state) => {
        const lower = operatingPointIn(circuit, "pair plus", state);
        const upper = operatingPointIn(circuit, "upper pair plus", state);
        const transconductance = lower.gm + upper.gm;
        return {
          transconductance,
          gamma: (lower.noiseConductance + upper.noiseConductance) / transconductance,
          outputConductance: lower.gds + upper.gds,
        };
      },
      watched: watchedTransistors(circuit, [
        "pair plus",
        "pair minus",
        "upper pair plus",
        "upper pair minus",
        "tail",
      ]),
      patterns: [
        { name: "tank", weights: { plus: 1, minus: -1 } },
        { name: "common mode", weights: { plus: 1, minus: 1 } },
        { name: "tail node", weights: { tail: 1 } },
        { name: "mirror node", weights: { mirror: 1 } },
      ],
      parts: {
        tank: ["tank loss"],
        pair: ["pair plus", "pair minus", "upper pair plus", "upper pair minus"],
        tail: ["tail"],
        mirror: ["mirror"],
      },
    };
  },
  withCurrent: (design, current) => ({ ...design, current }),
  schematic: (design) =>
    complementarySchematic({
      ...design,
      resistance: tankResistance(design.tank),
      mirrorWidth: design.tail.width / design.mirrorRatio,
      referenceCurrent: design.current / design.mirrorRatio,
    }),
  amplitude: ({ current, resistance }) => 4 / Math.PI * current * resistance,
  amplitudeFormula: {
    name: "amplitude, hard switching",
    formula: "A = \\frac{4}{\\pi} I R",
    source: "A. Hajimiri, T. Lee, IEEE J. Solid-State Circuits 34 (1999) 717 (from memory)",
    holds: "both pairs switch hard and the tail keeps its current: swing well below the supply",
  },
  loopGain: ({ transconductance, resistance }) => transconductance * resistance / 2,
  loopGainFormula: {
    name: "startup loop gain",
    formula: "a = \\frac{(g_{m,n} + g_{m,p}) R}{2}",
    source: "A. Hajimiri, T. Lee, IEEE J. Solid-State Circuits 34 (1999) 717 (from memory)",
    holds: "output conductance of both pairs is small against 1/R",
  },
};
