import type { TransistorSize } from "../device/transistor_parameters.ts";
import { buildDifferentialColpitts } from "./_differential_colpitts_parts.ts";
import { demandTap, SIDE_LOOP_GAIN, sideLoopGain } from "./_colpitts_parts.ts";
import { differentialColpittsSchematic } from "./_differential_colpitts_schematic.ts";
import { capacitors, demandPositive, mirroredSources, workshop } from "./_topology_parts.ts";
import { GROUND } from "./element.ts";
import { tankResistance } from "./tank_resistance.ts";
import type { Divider, TankDesign, Topology } from "./topology.ts";

/** Differential Colpitts oscillator with one tail steered between the sources. */
export interface SteeredColpittsDesign {
  /** `capacitance` is what lies beside the dividers, between the outputs [F], and may be zero. */
  readonly tank: TankDesign;
  /** Divider of each side. */
  readonly divider: Divider;
  /** Whether the second capacitors are one of half the capacitance between the sources. @default false */
  readonly joined?: boolean;
  /** Size of each common-gate transistor. */
  readonly core: TransistorSize;
  /** Size of each steering transistor. */
  readonly steering: TransistorSize;
  /** Size of the tail transistor. */
  readonly tail: TransistorSize;
  /** Programmed current: what the tail would carry as an ideal copy of the reference [A]. */
  readonly current: number;
  /** Tail current over reference current; the mirror transistor is this much narrower [1]. */
  readonly mirrorRatio: number;
  /** From the tail node to ground [F]. @default 0 */
  readonly tailCapacitance?: number;
  /** Potential of the cores' gates: the lower, the further the outputs may swing [V]. @default the supply */
  readonly gateBias?: number;
  /** From the mirror's gate to ground [F]. @default 0 */
  readonly mirrorCapacitance?: number;
  /** Threshold option of all transistors. @default "regular" */
  readonly flavour?: string;
}

/**
 * Differential Colpitts oscillator whose one tail current is steered to the side whose drain is low,
 * by a pair with its gates at the opposite outputs: no source draws current while its transistor is
 * off, and the steering adds gain.
 *
 * States: two outputs, two sources, tail, mirror gate, two halves of the coil.
 *
 * @see R. Aparicio, A. Hajimiri, IEEE J. Solid-State Circuits 37 (2002) 1728 (from memory)
 */
export const steeredColpitts: Topology<SteeredColpittsDesign> = {
  name: "steered_colpitts",
  title: "Differential common-gate Colpitts oscillator, one tail steered between the sources",
  build(design, { card, condition }) {
    const { current, mirrorRatio, steering, tail } = design;
    demandPositive("build the steered Colpitts oscillator", {
      current: [current, "A"],
      "mirror ratio": [mirrorRatio, ""],
    });
    const shop = workshop(card, { condition, flavour: design.flavour });
    const { supply } = condition;
    return buildDifferentialColpitts(shop, {
      design: { joined: false, ...design },
      foot: {
        elements: [
          ...capacitors([["tail capacitor", ["tail", GROUND], design.tailCapacitance]]),
          ...([["plus", "minus"], ["minus", "plus"]] as const).map(([side, gate]) =>
            shop.transistor(`steering ${side}`, {
              kind: "n",
              size: steering,
              at: { drain: `source ${side}`, gate, source: "tail", bulk: GROUND },
            })
          ),
          ...mirroredSources(shop, {
            kind: "n",
            size: tail,
            current,
            mirrorRatio,
            outputs: [["tail", "tail"]],
          }),
        ],
        guess: { tail: supply / 4 },
        patterns: [{ name: "tail node", weights: { tail: 1 } }],
        parts: { steering: ["steering plus", "steering minus"], tail: ["tail"] },
        watched: ["steering plus", "steering minus", "tail"],
      },
    });
  },
  withCurrent: (design, current) => ({ ...design, current }),
  schematic: (design) =>
    differentialColpittsSchematic({
      joined: false,
      ...design,
      resistance: tankResistance(design.tank),
      mirrorWidth: design.tail.width / design.mirrorRatio,
      referenceCurrent: design.current / design.mirrorRatio,
    }),
  amplitude({ current, resistance, tap }) {
    const n = demandTap(tap);
    return current * resistance * (1 - n + 2 / Math.PI * n);
  },
  amplitudeFormula: {
    name: "amplitude, short conduction and square steering",
    formula: "A = I R \\left(1 - n + \\frac{2}{\\pi} n\\right)",
    source:
      "derived: pulses of the core between drain and source, square wave of the tail at the source",
    holds: "conduction of the cores short against the period, square steering, tail in saturation",
  },
  loopGain: (values) => sideLoopGain(values) / 2,
  loopGainFormula: {
    ...SIDE_LOOP_GAIN,
    formula: "a = g_{ms} n (1 - n) \\frac{R}{2}",
    holds:
      "the steering pair adds n gm R / 2 in saturation and takes gds away in triode: compared only",
  },
};
