import type { TransistorSize } from "../device/transistor_parameters.ts";
import { resolveTransistor } from "../device/resolve_transistor.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import { Transistor } from "../device/transistor.ts";
import { pairSchematic } from "./_cross_coupled_pair_schematic.ts";
import {
  buildPair,
  PAIR_LOOP_GAIN,
  pairLoopGain,
  SWITCHING_AMPLITUDE,
  switchingAmplitude,
} from "./_pair_parts.ts";
import { capacitors, demandPositive, workshop } from "./_topology_parts.ts";
import { GROUND } from "./element.ts";
import { tankResistance } from "./tank_resistance.ts";
import type { TankDesign, Topology } from "./topology.ts";

const BISECTIONS = 60;

/** Cross-coupled pair whose tail is a resistor. */
export interface ResistorTailPairDesign {
  readonly tank: TankDesign;
  /** Size of each transistor of the pair. */
  readonly pair: TransistorSize;
  /** Resistance of the tail [ohm]; see {@linkcode tailResistanceFor}. */
  readonly tailResistance: number;
  /** Programmed current: what the tail carries at rest [A]. Scales the resistance when it is changed. */
  readonly current: number;
  /** Load from each output to ground: buffer, wiring [F]. @default 0 */
  readonly loadCapacitance?: number;
  /** From the tail node to ground [F]. @default 0 */
  readonly tailCapacitance?: number;
  /** Threshold option of all transistors. @default "regular" */
  readonly flavour?: string;
}

/**
 * The tail resistance with which a pair at rest carries a current in the card's nominal condition.
 *
 * @param current both sides together [A]
 * @returns [ohm]
 * @throws RangeError where the supply leaves no voltage for the resistor
 */
export function tailResistanceFor(
  current: number,
  { card, pair, supply = card.supply.nominal, flavour = "regular" }: {
    readonly card: TechnologyCard;
    readonly pair: TransistorSize;
    /** [V] */
    readonly supply?: number;
    readonly flavour?: string;
  },
): number {
  demandPositive("size the tail resistor", { current: [current, "A"] });
  const device = new Transistor(
    resolveTransistor(card, {
      kind: "n",
      flavour,
      corner: "typical",
      temperature: card.temperature.nominal,
    }),
    pair,
  );
  const excess = (tail: number) =>
    2 * device.operatingPoint(supply, supply, tail, 0).current - current;
  let [low, high] = [0, supply];
  if (!(excess(low) > 0)) {
    throw new RangeError(
      `Cannot size the tail resistor: the pair must carry more than ${current} A with its sources at ground, got ${
        excess(0) + current
      } A`,
    );
  }
  for (let k = 0; k < BISECTIONS; k++) {
    const middle = (low + high) / 2;
    if (excess(middle) > 0) low = middle;
    else high = middle;
  }
  return low / current;
}

/**
 * Cross-coupled N pair with a resistor in place of the tail transistor: no flicker noise and no
 * headroom of a current source, but a current that moves with supply, temperature and swing.
 *
 * States: two outputs, tail, two halves of the coil.
 */
export const resistorTailPair: Topology<ResistorTailPairDesign> = {
  name: "n_pair_resistor_tail",
  title: "Cross-coupled N pair with tail resistor",
  build(design, { card, condition }) {
    const { pair, current, tailResistance } = design;
    demandPositive("build the pair", {
      current: [current, "A"],
      "tail resistance": [tailResistance, "ohm"],
    });
    const shop = workshop(card, { condition, flavour: design.flavour });
    return buildPair(shop, {
      kind: "n",
      size: pair,
      design,
      common: "tail",
      foot: {
        elements: [
          ...capacitors([["tail capacitor", ["tail", GROUND], design.tailCapacitance]]),
          {
            kind: "resistor",
            name: "tail",
            nodes: ["tail", GROUND],
            resistance: tailResistance * shop.passives.resistor,
            temperature: condition.temperature,
          },
        ],
        guess: { tail: condition.supply / 3 },
        patterns: [{ name: "tail node", weights: { tail: 1 } }],
        parts: { tail: ["tail"] },
        watched: [],
      },
    });
  },
  withCurrent: (design, current) => ({
    ...design,
    current,
    tailResistance: design.tailResistance * design.current / current,
  }),
  schematic: ({ tank, pair, tailResistance, loadCapacitance, tailCapacitance }) =>
    pairSchematic({
      inductance: tank.inductance,
      resistance: tankResistance(tank),
      tankCapacitance: tank.capacitance,
      pairWidth: pair.width,
      loadCapacitance,
      foot: { kind: "resistor", tailResistance, tailCapacitance },
    }),
  amplitude: switchingAmplitude,
  amplitudeFormula: {
    ...SWITCHING_AMPLITUDE,
    holds:
      "the pair switches hard and the tail node stands still, so that the current at rest remains",
  },
  loopGain: pairLoopGain,
  loopGainFormula: PAIR_LOOP_GAIN,
};
