import type { TransistorSize } from "../device/transistor_parameters.ts";
import {
  demandDivider,
  heldGate,
  seriesCapacitance,
  SIDE_LOOP_GAIN,
  sideAmplitude,
  sideLoopGain,
  tapOf,
} from "./_colpitts_parts.ts";
import { colpittsSchematic } from "./_colpitts_schematic.ts";
import {
  capacitors,
  coreOf,
  currentLeaving,
  demandPositive,
  mirroredSources,
  SUPPLY,
  watchedTransistors,
  workshop,
} from "./_topology_parts.ts";
import { assemble } from "./circuit.ts";
import { GROUND } from "./element.ts";
import { tankResistance } from "./tank_resistance.ts";
import type { Divider, TankDesign, Topology } from "./topology.ts";

/** Part of the supply that a kick deflects the drain by. */
const KICK = 0.3;

/** Single-ended Colpitts oscillator. */
export interface ColpittsDesign {
  /**
   * Coil from the drain to the supply; `capacitance` is what lies beside the divider, from the drain to
   * ground [F], and may be zero. Coupling plays no part.
   */
  readonly tank: TankDesign;
  readonly divider: Divider;
  /** Size of the common-gate transistor. */
  readonly core: TransistorSize;
  /** Size of the tail transistor. */
  readonly tail: TransistorSize;
  /** Programmed current: what the tail would carry as an ideal copy of the reference [A]. */
  readonly current: number;
  /** Tail current over reference current; the mirror transistor is this much narrower [1]. */
  readonly mirrorRatio: number;
  /** Potential of the core's gate: the lower, the further its drain may swing [V]. @default the supply */
  readonly gateBias?: number;
  /** From the mirror's gate to ground [F]. @default 0 */
  readonly mirrorCapacitance?: number;
  /** Threshold option of all transistors. @default "regular" */
  readonly flavour?: string;
}

/**
 * Single-ended Colpitts oscillator: an N transistor with its gate held, coil at its drain, a capacitive
 * divider from drain over source to ground, a mirrored tail at the source.
 *
 * States: drain, source, mirror gate, coil.
 */
export const colpitts: Topology<ColpittsDesign> = {
  name: "colpitts",
  title: "Single-ended common-gate Colpitts oscillator with mirrored tail transistor",
  build(design, { card, condition }) {
    const { tank, divider, core, tail, current, mirrorRatio } = design;
    demandPositive("build the Colpitts oscillator", {
      current: [current, "A"],
      "mirror ratio": [mirrorRatio, ""],
    });
    demandDivider(divider);
    const shop = workshop(card, { condition, flavour: design.flavour });
    const { supply, temperature } = condition;
    const resistance = tankResistance(tank) / shop.passives.metalResistance;
    const factor = shop.passives.capacitor;
    const gate = heldGate(design.gateBias, { supply });
    const circuit = assemble([
      { kind: "potential", name: "supply", node: SUPPLY, potential: supply },
      ...gate.elements,
      {
        kind: "inductor",
        name: "coil",
        windings: [{
          nodes: ["drain", SUPPLY],
          inductance: tank.inductance,
          seriesResistance: 0,
        }],
        coupling: 0,
        temperature,
      },
      { kind: "resistor", name: "tank loss", nodes: [SUPPLY, "drain"], resistance, temperature },
      ...capacitors([
        ["tank capacitor", ["drain", GROUND], tank.capacitance * factor],
        ["first capacitor", ["drain", "source"], divider.first * factor],
        ["second capacitor", ["source", GROUND], divider.second * factor],
        ["mirror capacitor", ["mirror", GROUND], design.mirrorCapacitance],
      ]),
      shop.transistor("core", {
        kind: "n",
        size: core,
        at: { drain: "drain", gate: gate.node, source: "source", bulk: GROUND },
      }),
      ...mirroredSources(shop, {
        kind: "n",
        size: tail,
        current,
        mirrorRatio,
        outputs: [["tail", "source"]],
      }),
    ]);
    const tap = tapOf(divider);
    const potentials = { drain: supply, source: gate.potential / 3, mirror: supply / 2 };
    const capacitance = tank.capacitance + seriesCapacitance(divider);
    return {
      circuit,
      supplyNode: SUPPLY,
      tank: {
        plus: "drain",
        minus: SUPPLY,
        inductance: tank.inductance,
        conductance: () => 1 / resistance,
      },
      supplyCurrent: currentLeaving(circuit, SUPPLY),
      guess: circuit.stateAt(potentials),
      kick: {
        state: circuit.stateAt({
          ...potentials,
          drain: supply * (1 + KICK),
          source: gate.potential / 3 + KICK * supply * tap,
        }),
        period: 2 * Math.PI * Math.sqrt(tank.inductance * capacitance),
      },
      core: coreOf(circuit, "core", { of: "gms" }),
      tap,
      watched: watchedTransistors(circuit, ["core", "tail"]),
      patterns: [
        { name: "tank", weights: { drain: 1, source: tap } },
        { name: "source node", weights: { source: 1 } },
        { name: "mirror node", weights: { mirror: 1 } },
      ],
      parts: { tank: ["tank loss"], pair: ["core"], tail: ["tail"], mirror: ["mirror"] },
    };
  },
  withCurrent: (design, current) => ({ ...design, current }),
  schematic: (design) =>
    colpittsSchematic({
      ...design,
      resistance: tankResistance(design.tank),
      mirrorWidth: design.tail.width / design.mirrorRatio,
      referenceCurrent: design.current / design.mirrorRatio,
    }),
  amplitude: sideAmplitude,
  amplitudeFormula: {
    name: "amplitude, short conduction",
    formula: "A = 2 I R (1 - n)",
    source:
      "Q. Huang, IEEE Trans. Circuits Syst. I 47 (2000) 965; P. Andreani, X. Wang, L. Vandi, " +
      "A. Fard, IEEE J. Solid-State Circuits 40 (2005) 1107 (from memory)",
    holds: "conduction short against the period, core and tail in saturation throughout",
  },
  loopGain: sideLoopGain,
  loopGainFormula: SIDE_LOOP_GAIN,
};
