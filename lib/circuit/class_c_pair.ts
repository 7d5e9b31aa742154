import type { TransistorSize } from "../device/transistor_parameters.ts";
import { classCSchematic } from "./_class_c_pair_schematic.ts";
import { PAIR_LOOP_GAIN, pairLoopGain } from "./_pair_parts.ts";
import {
  capacitors,
  coreOf,
  currentLeaving,
  demandPositive,
  differentialKick,
  differentialTank,
  mirroredSources,
  SUPPLY,
  tankLosses,
  tappedTank,
  watchedTransistors,
  workshop,
} from "./_topology_parts.ts";
import { assemble } from "./circuit.ts";
import { type CircuitElement, GROUND } from "./element.ts";
import { tankResistance } from "./tank_resistance.ts";
import type { TankDesign, Topology } from "./topology.ts";

/** Class-C biased pair. */
export interface ClassCPairDesign {
  readonly tank: TankDesign;
  /** Size of each transistor of the pair. */
  readonly pair: TransistorSize;
  /** Size of the tail transistor. */
  readonly tail: TransistorSize;
  /** Programmed current: what the tail would carry as an ideal copy of the reference [A]. */
  readonly current: number;
  /** Tail current over reference current; the mirror transistor is this much narrower [1]. */
  readonly mirrorRatio: number;
  /** Bias voltage of the pair's gates, below the supply so that the pair stays in saturation [V]. */
  readonly gateBias: number;
  /** From the filtered bias to each gate [ohm]. */
  readonly biasResistance: number;
  /** From each output to the other side's gate [F]. */
  readonly couplingCapacitance: number;
  /** Filter of the bias voltage: series resistance [ohm] and capacitance to ground [F]. */
  readonly biasFilter: { readonly resistance: number; readonly capacitance: number };
  /** From the tail node to ground: what makes the current pulses [F]. */
  readonly tailCapacitance: number;
  /** Load from each output to ground: buffer, wiring [F]. @default 0 */
  readonly loadCapacitance?: number;
  /** From the mirror's gate to ground [F]. @default 0 */
  readonly mirrorCapacitance?: number;
  /** Threshold option of all transistors. @default "regular" */
  readonly flavour?: string;
}

/**
 * Class-C biased N pair: gates coupled by capacitors and biased below the supply, a large capacitor at
 * the tail node, current in narrow pulses. Its equilibrium may be stable although an orbit exists, and
 * too large a tail capacitor makes the orbit itself unstable (squegging).
 *
 * States: two outputs, two gates, bias, tail, mirror gate, two halves of the coil.
 *
 * @see A. Mazzanti, P. Andreani, IEEE J. Solid-State Circuits 43 (2008) 2716
 */
export const classCPair: Topology<ClassCPairDesign> = {
  name: "class_c_pair",
  title: "Class-C biased cross-coupled N pair with mirrored tail transistor",
  build(design, { card, condition }) {
    const { tank, pair, tail, current, mirrorRatio, gateBias, biasFilter } = design;
    const { biasResistance, couplingCapacitance, tailCapacitance, loadCapacitance = 0 } = design;
    demandPositive("build the class-C pair", {
      current: [current, "A"],
      "mirror ratio": [mirrorRatio, ""],
      "gate bias": [gateBias, "V"],
      "bias resistance": [biasResistance, "ohm"],
      "resistance of the bias filter": [biasFilter.resistance, "ohm"],
      "coupling capacitance": [couplingCapacitance, "F"],
      "tail capacitance": [tailCapacitance, "F"],
    });
    const shop = workshop(card, { condition, flavour: design.flavour });
    const { supply, temperature } = condition;
    const resistor = (
      name: string,
      nodes: readonly [string, string],
      resistance: number,
    ): CircuitElement => ({
      kind: "resistor",
      name,
      nodes,
      resistance: resistance * shop.passives.resistor,
      temperature,
    });
    const circuit = assemble([
      { kind: "potential", name: "supply", node: SUPPLY, potential: supply },
      { kind: "potential", name: "gate bias", node: "gate bias", potential: gateBias },
      ...tappedTank(tank, { tap: SUPPLY, shop }),
      ...capacitors([
        ["load plus", ["plus", GROUND], loadCapacitance],
        ["load minus", ["minus", GROUND], loadCapacitance],
        ["tail capacitor", ["tail", GROUND], tailCapacitance],
        ["mirror capacitor", ["mirror", GROUND], design.mirrorCapacitance],
        ["bias capacitor", ["bias", GROUND], biasFilter.capacitance],
        ["block plus", ["minus", "gate plus"], couplingCapacitance],
        ["block minus", ["plus", "gate minus"], couplingCapacitance],
      ]),
      resistor("bias filter", ["gate bias", "bias"], biasFilter.resistance),
      resistor("bias plus", ["bias", "gate plus"], biasResistance),
      resistor("bias minus", ["bias", "gate minus"], biasResistance),
      ...(["plus", "minus"] as const).map((side) =>
        shop.transistor(`pair ${side}`, {
          kind: "n",
          size: pair,
          at: { drain: side, gate: `gate ${side}`, source: "tail", bulk: GROUND },
        })
      ),
      ...mirroredSources(shop, {
        kind: "n",
        size: tail,
        current,
        mirrorRatio,
        outputs: [["tail", "tail"]],
      }),
    ]);
    const potentials = {
      plus: supply,
      minus: supply,
      bias: gateBias,
      "gate plus": gateBias,
      "gate minus": gateBias,
      tail: gateBias / 3,
      mirror: supply / 2,
    };
    const resistance = tankResistance(tank) / shop.passives.metalResistance;
    const kick = differentialKick(circuit, {
      potentials,
      supply,
      inductance: tank.inductance,
      capacitance: tank.capacitance + loadCapacitance / 2,
    });
    // The gates have followed the outputs.
    for (const [side, sign] of [["plus", -1], ["minus", 1]] as const) {
      const at = circuit.indexOf(`gate ${side}`);
      const apart = circuit.voltage("plus", "minus", kick.state) / 2;
      if (at !== undefined) kick.state[at] = gateBias + sign * apart;
    }
    return {
      circuit,
      supplyNode: SUPPLY,
      tank: differentialTank({ tank, resistance }),
      supplyCurrent: currentLeaving(circuit, SUPPLY),
      guess: circuit.stateAt(potentials),
      kick,
      core: coreOf(circuit, "pair plus", { of: "gm" }),
      watched: watchedTransistors(circuit, ["pair plus", "pair minus", "tail"]),
      patterns: [
        { name: "tank", weights: { plus: 1, minus: -1 } },
        { name: "common mode", weights: { plus: 1, minus: 1 } },
        { name: "gate bias", weights: { "gate plus": 1, "gate minus": 1, bias: 1 } },
        { name: "gates apart", weights: { "gate plus": 1, "gate minus": -1 } },
        { name: "tail node", weights: { tail: 1 } },
        { name: "mirror node", weights: { mirror: 1 } },
      ],
      parts: {
        tank: tankLosses(tank),
        pair: ["pair plus", "pair minus"],
        tail: ["tail"],
        mirror: ["mirror"],
        bias: ["bias filter", "bias plus", "bias minus"],
      },
    };
  },
  withCurrent: (design, current) => ({ ...design, current }),
  schematic: (design) =>
    classCSchematic({
      ...design,
      resistance: tankResistance(design.tank),
      mirrorWidth: design.tail.width / design.mirrorRatio,
      referenceCurrent: design.current / design.mirrorRatio,
    }),
  amplitude: ({ current, resistance }) => current * resistance,
  amplitudeFormula: {
    name: "amplitude, narrow pulses",
    formula: "A = I R",
    source: "A. Mazzanti, P. Andreani, IEEE J. Solid-State Circuits 43 (2008) 2716 (from memory)",
    holds: "pulses short against the period, pair and tail in saturation throughout",
  },
  loopGain: pairLoopGain,
  loopGainFormula: {
    ...PAIR_LOOP_GAIN,
    holds: "the coupling capacitors are large against the gates', the bias resistors against R",
  },
};
