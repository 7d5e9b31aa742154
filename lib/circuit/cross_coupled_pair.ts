import type { TransistorSize } from "../device/transistor_parameters.ts";
import { pairSchematic } from "./_cross_coupled_pair_schematic.ts";
import {
  buildPair,
  PAIR_LOOP_GAIN,
  pairLoopGain,
  railsOf,
  SWITCHING_AMPLITUDE,
  switchingAmplitude,
} from "./_pair_parts.ts";
import { upsideDown } from "./_schematic_parts.ts";
import { capacitors, demandPositive, mirroredSources, workshop } from "./_topology_parts.ts";
import type { CircuitElement } from "./element.ts";
import { tankResistance } from "./tank_resistance.ts";
import type { ModePattern, TankDesign, Topology } from "./topology.ts";

/** Cross-coupled pair with a mirrored tail transistor. */
export interface CrossCoupledPairDesign {
  readonly tank: TankDesign;
  /** Size of each transistor of the pair. */
  readonly pair: TransistorSize;
  /** Size of the tail transistor. */
  readonly tail: TransistorSize;
  /** Programmed current: what the tail would carry as an ideal copy of the reference [A]. */
  readonly current: number;
  /** Tail current over reference current; the mirror transistor is this much narrower [1]. */
  readonly mirrorRatio: number;
  /** Load from each output to the tail's rail: buffer, wiring [F]. @default 0 */
  readonly loadCapacitance?: number;
  /** From the tail transistor's drain to its rail [F]. @default 0 */
  readonly tailCapacitance?: number;
  /** From the mirror's gate to its rail [F]. @default 0 */
  readonly mirrorCapacitance?: number;
  /** Between the pair's sources and the tail. @default none */
  readonly tailFilter?: TailFilter;
  /** Threshold option of all transistors. @default "regular" */
  readonly flavour?: string;
}

/**
 * A coil between the pair's sources and the tail transistor, resonant at twice the frequency with the
 * capacitance at the sources; `tailCapacitance` shorts the tail transistor's own noise.
 *
 * @see E. Hegazi, H. Sjoland, A. Abidi, IEEE J. Solid-State Circuits 36 (2001) 1921
 */
export interface TailFilter {
  /** [H] */
  readonly inductance: number;
  /** Of the coil at twice the frequency at which the tank's quality factor holds [1]. */
  readonly quality: number;
  /** From the pair's sources to the tail's rail, besides the devices' own [F]. @default 0 */
  readonly capacitance?: number;
}

/**
 * Cross-coupled N pair: coil with its centre tap at the supply, tail source from a transistor whose
 * gate is held by a diode-connected mirror carrying the reference current.
 *
 * States: two outputs, tail, mirror gate, two halves of the coil; with a tail filter its coil and the
 * common sources.
 */
export const crossCoupledPair: Topology<CrossCoupledPairDesign> = tailedPair("n", {
  name: "n_pair",
  title: "Cross-coupled N pair with mirrored tail transistor",
});

/** The mirror image of {@linkcode crossCoupledPair}: centre tap at ground, tail from the supply. */
export const crossCoupledPairP: Topology<CrossCoupledPairDesign> = tailedPair("p", {
  name: "p_pair",
  title: "Cross-coupled P pair with mirrored tail transistor",
});

function tailedPair(
  kind: "n" | "p",
  { name, title }: { readonly name: string; readonly title: string },
): Topology<CrossCoupledPairDesign> {
  const { foot: rail } = railsOf(kind);
  return {
    name,
    title,
    build(design, { card, condition }) {
      const { pair, tail, current, mirrorRatio, tailFilter: filter } = design;
      demandPositive("build the pair", {
        current: [current, "A"],
        "mirror ratio": [mirrorRatio, ""],
      });
      const shop = workshop(card, { condition, flavour: design.flavour });
      const common = filter ? "common" : "tail";
      const { supply } = condition;
      return buildPair(shop, {
        kind,
        size: pair,
        design,
        common,
        foot: {
          elements: [
            ...capacitors([
              ["tail capacitor", ["tail", rail], design.tailCapacitance],
              ["mirror capacitor", ["mirror", rail], design.mirrorCapacitance],
            ]),
            ...mirroredSources(shop, {
              kind,
              size: tail,
              current,
              mirrorRatio,
              outputs: [["tail", "tail"]],
            }),
            ...(filter ? filterElements(filter, { rail, design, shop }) : []),
          ],
          guess: {
            tail: supply / 3,
            mirror: supply / 2,
            ...(filter ? { common: supply / 3 } : {}),
          },
          patterns: [
            { name: "tail node", weights: { tail: 1 } },
            { name: "mirror node", weights: { mirror: 1 } },
            ...(filter ? [{ name: "tail filter", weights: { common: 1 } } as ModePattern] : []),
          ],
          parts: {
            tail: ["tail"],
            mirror: ["mirror"],
            ...(filter ? { "tail filter": ["tail filter coil"] } : {}),
          },
          watched: ["tail"],
        },
      });
    },
    withCurrent: (design, current) => ({ ...design, current }),
    schematic: ({ tank, pair, tail, current, mirrorRatio, tailFilter, ...capacitances }) => {
      const upright = pairSchematic({
        inductance: tank.inductance,
        resistance: tankResistance(tank),
        tankCapacitance: tank.capacitance,
        pairWidth: pair.width,
        loadCapacitance: capacitances.loadCapacitance,
        foot: {
          kind: "mirror",
          tailWidth: tail.width,
          mirrorWidth: tail.width / mirrorRatio,
          referenceCurrent: current / mirrorRatio,
          tailCapacitance: capacitances.tailCapacitance,
          mirrorCapacitance: capacitances.mirrorCapacitance,
          ...(tailFilter
            ? {
              filterInductance: tailFilter.inductance,
              filterCapacitance: tailFilter.capacitance,
            }
            : {}),
        },
      });
      return kind === "n" ? upright : upsideDown(upright);
    },
    amplitude: switchingAmplitude,
    amplitudeFormula: SWITCHING_AMPLITUDE,
    loopGain: pairLoopGain,
    loopGainFormula: PAIR_LOOP_GAIN,
  };
}

function filterElements(
  { inductance, quality, capacitance }: TailFilter,
  { rail, design, shop: { condition: { temperature }, passives } }: {
    readonly rail: string;
    readonly design: CrossCoupledPairDesign;
    readonly shop: ReturnType<typeof workshop>;
  },
): CircuitElement[] {
  demandPositive("build the tail filter", {
    inductance: [inductance, "H"],
    quality: [quality, ""],
  });
  const reactance = 2 * Math.PI * 2 * design.tank.qualityFrequency * inductance;
  return [
    ...capacitors([["tail filter capacitor", ["common", rail], capacitance]]),
    {
      kind: "inductor",
      name: "tail filter coil",
      windings: [{
        nodes: ["common", "tail"],
        inductance,
        seriesResistance: reactance / quality * passives.metalResistance,
      }],
      coupling: 0,
      temperature,
    },
  ];
}
