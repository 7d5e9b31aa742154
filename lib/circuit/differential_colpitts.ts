import type { TransistorSize } from "../device/transistor_parameters.ts";
import { buildDifferentialColpitts } from "./_differential_colpitts_parts.ts";
import { SIDE_LOOP_GAIN, sideAmplitude, sideLoopGain } from "./_colpitts_parts.ts";
import { differentialColpittsSchematic } from "./_differential_colpitts_schematic.ts";
import { demandPositive, mirroredSources, workshop } from "./_topology_parts.ts";
import { tankResistance } from "./tank_resistance.ts";
import type { Divider, TankDesign, Topology } from "./topology.ts";

/** Differential Colpitts oscillator with a tail for each side. */
export interface DifferentialColpittsDesign {
  /** `capacitance` is what lies beside the dividers, between the outputs [F], and may be zero. */
  readonly tank: TankDesign;
  /** Divider of each side. */
  readonly divider: Divider;
  /**
   * Whether the second capacitors are one of half the capacitance between the sources, which takes the
   * common mode's gain away, or one to ground on each side. @default true
   */
  readonly joined?: boolean;
  /** Size of each common-gate transistor. */
  readonly core: TransistorSize;
  /** Size of each tail transistor. */
  readonly tail: TransistorSize;
  /** Programmed current of both sides together [A]. */
  readonly current: number;
  /** Current of one tail over reference current; the mirror transistor is this much narrower [1]. */
  readonly mirrorRatio: number;
  /** Potential of the cores' gates: the lower, the further the outputs may swing [V]. @default the supply */
  readonly gateBias?: number;
  /** From the mirror's gate to ground [F]. @default 0 */
  readonly mirrorCapacitance?: number;
  /** Threshold option of all transistors. @default "regular" */
  readonly flavour?: string;
}

/**
 * Two common-gate Colpitts oscillators in opposite phase on one coil, each source with its own tail.
 * With a grounded second capacitor on each side the two also run in phase: the common mode is then a
 * second unstable pair of poles.
 *
 * States: two outputs, two sources, mirror gate, two halves of the coil.
 */
export const differentialColpitts: Topology<DifferentialColpittsDesign> = {
  name: "differential_colpitts",
  title: "Differential common-gate Colpitts oscillator, one tail for each source",
  build(design, { card, condition }) {
    const { current, mirrorRatio, tail } = design;
    demandPositive("build the differential Colpitts oscillator", {
      current: [current, "A"],
      "mirror ratio": [mirrorRatio, ""],
    });
    const shop = workshop(card, { condition, flavour: design.flavour });
    return buildDifferentialColpitts(shop, {
      design,
      foot: {
        elements: mirroredSources(shop, {
          kind: "n",
          size: tail,
          current: current / 2,
          mirrorRatio,
          outputs: [["tail plus", "source plus"], ["tail minus", "source minus"]],
        }),
        guess: {},
        patterns: [],
        parts: { tail: ["tail plus", "tail minus"] },
        watched: ["tail plus", "tail minus"],
      },
    });
  },
  withCurrent: (design, current) => ({ ...design, current }),
  schematic: (design) =>
    differentialColpittsSchematic({
      ...design,
      resistance: tankResistance(design.tank),
      mirrorWidth: design.tail.width / design.mirrorRatio,
      referenceCurrent: design.current / 2 / design.mirrorRatio,
    }),
  // Each side has half the current and half the resistance, and there are two of them.
  amplitude: (values) => sideAmplitude(values) / 2,
  amplitudeFormula: {
    name: "amplitude, short conduction",
    formula: "A = I R (1 - n)",
    source:
      "two sides of 2 (I/2) (R/2) (1 - n); Q. Huang, IEEE Trans. Circuits Syst. I 47 (2000) 965 " +
      "(from memory)",
    holds: "conduction short against the period, cores and tails in saturation throughout",
  },
  loopGain: (values) => sideLoopGain(values) / 2,
  loopGainFormula: { ...SIDE_LOOP_GAIN, formula: "a = g_{ms} n (1 - n) \\frac{R}{2}" },
};
