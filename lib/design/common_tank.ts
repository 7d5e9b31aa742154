/**
 * A design of every topology on one coil, from a few shared sizes, for {@linkcode contender}. The rules are
 * common practice and say so; none is tuned to one topology's favour.
 *
 * @module
 */
import { classCPair } from "../circuit/class_c_pair.ts";
import { colpitts } from "../circuit/colpitts.ts";
import { complementaryPair } from "../circuit/complementary_pair.ts";
import { crossCoupledPair, crossCoupledPairP } from "../circuit/cross_coupled_pair.ts";
import { differentialColpitts } from "../circuit/differential_colpitts.ts";
import { resistorTailPair, tailResistanceFor } from "../circuit/resistor_tail_pair.ts";
import { steeredColpitts } from "../circuit/steered_colpitts.ts";
import type { TopologyName } from "../circuit/topologies.ts";
import type { Divider, Topology } from "../circuit/topology.ts";
import { untailedPair } from "../circuit/untailed_pair.ts";
import { resolveTransistor } from "../device/resolve_transistor.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import { Transistor } from "../device/transistor.ts";
import type { TransistorSize } from "../device/transistor_parameters.ts";
import { type CandidatePoint, type Contender, contender } from "./compare_topologies.ts";

/** Width of a Colpitts core over the pair's: its gain is divided by the tap (common practice: 2 to 4). */
const CORE_WIDTH = 3;
/** Width of a class-C pair over the pair's: it conducts a part of the period (common practice: 1.5 to 2). */
const CLASS_C_WIDTH = 1.5;
/** What a class-C tail is left at rest [V] (common practice: just in saturation). */
const CLASS_C_HEADROOM = 0.15;
/** Class-C coupling over the pair's gate capacitance, which it must be well above (common practice). */
const COUPLING_RATIO = 8;
const BIAS_RESISTANCE = 10e3;
const BIAS_FILTER = { resistance: 2e3, capacitance: 2e-12 };
/** Class-C tail capacitance over the coil's whole; more makes it squeg (common practice). */
const CLASS_C_TAIL = 1;
const BISECTIONS = 60;

/** What all candidates share. */
export interface CommonTank {
  readonly card: TechnologyCard;
  /** [V] */
  readonly supply: number;
  /** Between the ends of the coil [H]. */
  readonly inductance: number;
  /** Of the tank at `frequency` [1]. */
  readonly quality: number;
  /** [Hz] */
  readonly frequency: number;
  /** N transistor of a pair; the others follow from it. */
  readonly pair: TransistorSize;
  /** Tail transistor for the whole current. */
  readonly tail: TransistorSize;
  /** Tail current over reference current [1]. */
  readonly mirrorRatio: number;
  /** Fraction of the tank voltage at the source of a Colpitts oscillator [1]. */
  readonly tap: number;
  /** Load on each output [F]. @default 0 */
  readonly loadCapacitance?: number;
  /** From the tail node to its rail, where the topology has one [F]. @default 0 */
  readonly tailCapacitance?: number;
  /** From the mirror's gate to its rail [F]. @default 0 */
  readonly mirrorCapacitance?: number;
}

/**
 * One topology on the common tank. P transistors are wider by the ratio of the transconductance parameters;
 * a Colpitts core is three times as wide as a transistor of the pair and its divider is the tank's whole
 * capacitance; the pair without a tail is as wide as the current asks for, the tail resistor as large. The
 * class-C pair is half as wide again, its gates biased so that its tail is left 0.15 V, its tail capacitor as
 * large as the tank's. The single-ended Colpitts has the whole coil between its drain and the supply, and the
 * load on its drain.
 */
export function onCommonTank(name: TopologyName, common: CommonTank): Contender {
  const { pair, tail, mirrorRatio, loadCapacitance = 0 } = common;
  const { tailCapacitance = 0, mirrorCapacitance = 0 } = common;
  const loads = { loadCapacitance, tailCapacitance };
  const mirrored = { tail, mirrorRatio, mirrorCapacitance };
  const ratio = carrierRatio(common.card);
  const wider = (size: TransistorSize, factor: number) => ({
    ...size,
    width: size.width * factor,
  });
  const core = wider(pair, CORE_WIDTH);
  const candidate = <Design>(
    topology: Topology<Design>,
    designAt: (point: CandidatePoint) => Design,
  ) => contender({ topology, inductance: common.inductance, designAt });
  switch (name) {
    case "n_pair":
      return candidate(crossCoupledPair, ({ current, capacitance }) => ({
        tank: tankOf(common, capacitance),
        pair,
        ...mirrored,
        ...loads,
        current,
      }));
    case "p_pair":
      return candidate(crossCoupledPairP, ({ current, capacitance }) => ({
        tank: tankOf(common, capacitance),
        pair: wider(pair, ratio),
        ...mirrored,
        tail: wider(tail, ratio),
        ...loads,
        current,
      }));
    case "n_pair_resistor_tail":
      return candidate(resistorTailPair, ({ current, capacitance }) => ({
        tank: tankOf(common, capacitance),
        pair,
        tailResistance: tailResistanceFor(current, {
          card: common.card,
          pair,
          supply: common.supply,
        }),
        ...loads,
        current,
      }));
    case "n_pair_no_tail":
      return candidate(untailedPair, ({ current, capacitance }) => ({
        tank: tankOf(common, capacitance),
        pair: { ...pair, width: untailedWidth(current, common) },
        loadCapacitance,
        current,
      }));
    case "complementary_pair":
      return candidate(complementaryPair, ({ current, capacitance }) => ({
        tank: tankOf(common, capacitance),
        pair,
        pairP: wider(pair, ratio),
        ...mirrored,
        ...loads,
        current,
      }));
    case "class_c_pair": {
      const size = wider(pair, CLASS_C_WIDTH);
      return candidate(classCPair, ({ current, capacitance }) => ({
        tank: tankOf(common, capacitance),
        pair: size,
        ...mirrored,
        gateBias: classCBias(current, { ...common, pair: size }),
        biasResistance: BIAS_RESISTANCE,
        couplingCapacitance: COUPLING_RATIO * gateCapacitance(size, common.card),
        biasFilter: BIAS_FILTER,
        loadCapacitance,
        tailCapacitance: CLASS_C_TAIL * wholeCapacitance(common),
        current,
      }));
    }
    case "colpitts":
      return candidate(colpitts, ({ current, capacitance }) => ({
        tank: tankOf(common, loadCapacitance),
        divider: dividerOf(capacitance - loadCapacitance, { ...common, sides: 1 }),
        core,
        ...mirrored,
        current,
      }));
    case "differential_colpitts":
      return candidate(differentialColpitts, ({ current, capacitance }) => ({
        tank: tankOf(common, loadCapacitance / 2),
        divider: dividerOf(capacitance - loadCapacitance / 2, { ...common, sides: 2 }),
        core,
        ...mirrored,
        tail: wider(tail, 1 / 2),
        current,
      }));
    case "steered_colpitts":
      return candidate(steeredColpitts, ({ current, capacitance }) => ({
        tank: tankOf(common, loadCapacitance / 2),
        divider: dividerOf(capacitance - loadCapacitance / 2, { ...common, sides: 2 }),
        core,
        steering: pair,
        ...mirrored,
        tailCapacitance,
        current,
      }));
  }
}

function tankOf({ inductance, quality, frequency }: CommonTank, capacitance: number) {
  return { inductance, quality, qualityFrequency: frequency, capacitance };
}

function wholeCapacitance({ inductance, frequency }: CommonTank): number {
  return 1 / ((2 * Math.PI * frequency) ** 2 * inductance);
}

/** A divider with the capacitance across the coil, for each of one or two sides. */
function dividerOf(
  capacitance: number,
  { tap, sides }: { readonly tap: number; readonly sides: 1 | 2 },
): Divider {
  if (!(tap > 0 && tap < 1)) {
    throw new RangeError(`Cannot divide the tank: tap must lie between 0 and 1, got ${tap}`);
  }
  const series = sides * capacitance;
  return { first: series / (1 - tap), second: series / tap };
}

function carrierRatio(card: TechnologyCard): number {
  const [n, p] = (["n", "p"] as const).map((kind) =>
    resolveTransistor(card, { ...typical(card), kind }).transconductanceParameter
  );
  return n! / p!;
}

function typical(card: TechnologyCard) {
  return {
    flavour: "regular",
    corner: "typical" as const,
    temperature: card.temperature.nominal,
  };
}

function transistor(size: TransistorSize, card: TechnologyCard): Transistor {
  return new Transistor(resolveTransistor(card, { ...typical(card), kind: "n" }), size);
}

/** Width of each transistor of a pair without a tail that carries a current at rest [m]. */
function untailedWidth(current: number, { card, supply, pair }: CommonTank): number {
  const own = 2 * transistor(pair, card).operatingPoint(supply, supply, 0, 0).current;
  return pair.width * current / own;
}

/** Gate bias with which the pair carries a current at rest with its sources at the headroom [V]. */
function classCBias(current: number, { card, supply, pair }: CommonTank): number {
  const device = transistor(pair, card);
  const excess = (gate: number) =>
    2 * device.operatingPoint(supply, gate, CLASS_C_HEADROOM, 0).current - current;
  let [low, high] = [CLASS_C_HEADROOM, supply];
  if (!(excess(high) > 0)) return supply;
  for (let k = 0; k < BISECTIONS; k++) {
    const middle = (low + high) / 2;
    if (excess(middle) > 0) high = middle;
    else low = middle;
  }
  return high;
}

function gateCapacitance({ width, length }: TransistorSize, card: TechnologyCard): number {
  const { oxideCapacitance, overlapCapacitance } = resolveTransistor(card, {
    ...typical(card),
    kind: "n",
  });
  return width * length * oxideCapacitance + 2 * width * overlapCapacitance;
}
