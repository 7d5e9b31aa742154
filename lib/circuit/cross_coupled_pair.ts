import { resolvePassives } from "../device/resolve_passives.ts";
import { resolveTransistor } from "../device/resolve_transistor.ts";
import { Transistor } from "../device/transistor.ts";
import type { TransistorSize } from "../device/transistor_parameters.ts";
import { pairSchematic } from "./_cross_coupled_pair_schematic.ts";
import { assemble } from "./circuit.ts";
import { type CircuitElement, GROUND, transistorElement } from "./element.ts";
import type { BuiltOscillator, TankDesign, Topology } from "./topology.ts";

const DEFAULT_COUPLING = 0.6;

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
 * Cross-coupled N pair: coil with its centre tap at the supply, tail source from a transistor whose
 * gate is held by a diode-connected mirror carrying the reference current.
 *
 * States: two outputs, tail, mirror gate, two halves of the coil.
 */
export const crossCoupledPair: Topology<CrossCoupledPairDesign> = {
  name: "n_pair",
  title: "Cross-coupled N pair with mirrored tail transistor",
  build(design, { card, condition }): BuiltOscillator {
    const { tank, pair, tail, current, mirrorRatio } = design;
    if (!(current > 0)) {
      throw new RangeError(`Cannot build the pair: current must be > 0 A, got ${current} A`);
    }
    if (!(mirrorRatio > 0)) {
      throw new RangeError(`Cannot build the pair: mirror ratio must be > 0, got ${mirrorRatio}`);
    }
    const { corner, temperature, supply } = condition;
    const parameters = resolveTransistor(card, {
      kind: "n",
      flavour: design.flavour ?? "regular",
      corner,
      temperature,
    });
    const passives = resolvePassives(card, { corner, temperature });
    const coupling = tank.coupling ?? DEFAULT_COUPLING;
    const half = tank.inductance / (2 * (1 + coupling));
    const resistance = tankResistance(tank) / passives.metalResistance;
    const elements: CircuitElement[] = [
      { kind: "potential", name: "supply", node: "supply", potential: supply },
      {
        kind: "inductor",
        name: "coil",
        windings: [
          { nodes: ["plus", "supply"], inductance: half, seriesResistance: 0 },
          { nodes: ["supply", "minus"], inductance: half, seriesResistance: 0 },
        ],
        coupling,
        temperature,
      },
      ...(["plus", "minus"] as const).map((node): CircuitElement => ({
        kind: "resistor",
        name: `tank loss ${node}`,
        nodes: ["supply", node],
        resistance: resistance / 2,
        temperature,
      })),
      {
        kind: "capacitor",
        name: "tank capacitor",
        nodes: ["plus", "minus"],
        capacitance: tank.capacitance * passives.capacitor,
      },
      ...optionalCapacitors([
        ["load plus", "plus", design.loadCapacitance],
        ["load minus", "minus", design.loadCapacitance],
        ["tail capacitor", "tail", design.tailCapacitance],
        ["mirror capacitor", "mirror", design.mirrorCapacitance],
      ]),
      transistorElement("pair plus", new Transistor(parameters, pair), {
        drain: "plus",
        gate: "minus",
        source: "tail",
        bulk: GROUND,
      }),
      transistorElement("pair minus", new Transistor(parameters, pair), {
        drain: "minus",
        gate: "plus",
        source: "tail",
        bulk: GROUND,
      }),
      transistorElement("tail", new Transistor(parameters, tail), {
        drain: "tail",
        gate: "mirror",
        source: GROUND,
        bulk: GROUND,
      }),
      transistorElement(
        "mirror",
        new Transistor(parameters, { ...tail, width: tail.width / mirrorRatio }),
        { drain: "mirror", gate: "mirror", source: GROUND, bulk: GROUND },
      ),
      {
        kind: "current",
        name: "reference current",
        nodes: ["supply", "mirror"],
        current: current / mirrorRatio,
      },
    ];
    const circuit = assemble(elements);
    const conductance = 1 / resistance;
    return {
      circuit,
      supplyNode: "supply",
      tank: {
        plus: "plus",
        minus: "minus",
        inductance: tank.inductance,
        conductance: () => conductance,
      },
      supplyCurrent: (x) =>
        circuit.windingCurrent("coil", 1, x) - circuit.windingCurrent("coil", 0, x) +
        (2 * supply - circuit.potential("plus", x) - circuit.potential("minus", x)) * 2 /
          resistance +
        current / mirrorRatio,
      guess: circuit.stateAt({ plus: supply, minus: supply, tail: supply / 3, mirror: supply / 2 }),
      watched: watchedVoltages(),
      patterns: [
        { name: "tank", weights: { plus: 1, minus: -1 } },
        { name: "common mode", weights: { plus: 1, minus: 1 } },
        { name: "tail node", weights: { tail: 1 } },
        { name: "mirror node", weights: { mirror: 1 } },
      ],
      parts: {
        tank: ["tank loss plus", "tank loss minus"],
        pair: ["pair plus", "pair minus"],
        tail: ["tail"],
        mirror: ["mirror"],
      },
    };
  },
  withCurrent: (design, current) => ({ ...design, current }),
  schematic: ({ tank, pair, tail, current, mirrorRatio, ...capacitances }) =>
    pairSchematic({
      inductance: tank.inductance,
      resistance: tankResistance(tank),
      tankCapacitance: tank.capacitance,
      pairWidth: pair.width,
      tailWidth: tail.width,
      mirrorWidth: tail.width / mirrorRatio,
      referenceCurrent: current / mirrorRatio,
      loadCapacitance: capacitances.loadCapacitance,
      tailCapacitance: capacitances.tailCapacitance,
      mirrorCapacitance: capacitances.mirrorCapacitance,
    }),
  amplitude: ({ current, resistance }) => 2 / Math.PI * current * resistance,
  amplitudeFormula: {
    name: "amplitude, hard switching",
    formula: "A = \\frac{2}{\\pi} I R",
    source:
      "fundamental of a square wave of I/2; J. Rael, A. Abidi, Proc. CICC 2000, 569 (from memory)",
  },
  loopGain: ({ transconductance, resistance }) => transconductance * resistance / 2,
  loopGainFormula: {
    name: "startup loop gain",
    formula: "a = \\frac{g_m R}{2}",
    source: "A. Hajimiri, T. Lee, IEEE J. Solid-State Circuits 34 (1999) 717 (from memory)",
  },
};

/** Parallel loss resistance of a plain tank, Q w L at the frequency of its quality factor [ohm]. */
export function tankResistance({ inductance, quality, qualityFrequency }: TankDesign): number {
  return quality * 2 * Math.PI * qualityFrequency * inductance;
}

function optionalCapacitors(
  list: readonly (readonly [string, string, number | undefined])[],
): CircuitElement[] {
  return list.flatMap(([name, node, capacitance]): CircuitElement[] =>
    capacitance === undefined || capacitance === 0
      ? []
      : [{ kind: "capacitor", name, nodes: [node, GROUND], capacitance }]
  );
}

function watchedVoltages(): BuiltOscillator["watched"] {
  const of = (device: string, nodes: { drain: string; gate: string; source: string }) => [
    { device, quantity: "gate-source", plus: nodes.gate, minus: nodes.source } as const,
    { device, quantity: "gate-drain", plus: nodes.gate, minus: nodes.drain } as const,
    { device, quantity: "drain-source", plus: nodes.drain, minus: nodes.source } as const,
    { device, quantity: "drain-bulk", plus: nodes.drain, minus: GROUND } as const,
  ];
  return [
    ...of("pair plus", { drain: "plus", gate: "minus", source: "tail" }),
    ...of("pair minus", { drain: "minus", gate: "plus", source: "tail" }),
    ...of("tail", { drain: "tail", gate: "mirror", source: GROUND }),
  ];
}
