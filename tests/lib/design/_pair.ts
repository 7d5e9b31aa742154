/** A cross-coupled pair on the illustrative card, and the simplest oscillators beside it. */
import {
  crossCoupledPair,
  type CrossCoupledPairDesign,
} from "../../../lib/circuit/cross_coupled_pair.ts";
import { assemble } from "../../../lib/circuit/circuit.ts";
import { GROUND } from "../../../lib/circuit/element.ts";
import type { BuiltOscillator, Condition } from "../../../lib/circuit/topology.ts";
import { type BiasSweep, biasSweep, logarithmicCurrents } from "../../../lib/design/bias.ts";
import { illustrativeCard } from "../device/_card.ts";

export const CARD = illustrativeCard();
export const NOMINAL: Condition = { corner: "typical", temperature: 300.15, supply: 1 };
export const OFFSET = 1e6;

/** 5 GHz, R = 565 ohm. */
export const DESIGN: CrossCoupledPairDesign = {
  tank: { inductance: 1.5e-9, quality: 12, qualityFrequency: 5e9, capacitance: 0.5e-12 },
  pair: { width: 20e-6, length: 60e-9 },
  tail: { width: 60e-6, length: 200e-9 },
  current: 2e-3,
  mirrorRatio: 4,
  loadCapacitance: 50e-15,
};

let kept: BiasSweep | undefined;

/** From no oscillation through the knee to far beyond; made once. */
export function fullSweep(): BiasSweep {
  kept ??= biasSweep(crossCoupledPair, DESIGN, {
    card: CARD,
    condition: NOMINAL,
    currents: logarithmicCurrents({ from: 0.2e-3, to: 10e-3, count: 24 }),
    offset: OFFSET,
  });
  return kept;
}

/** A parallel tank with an ideal pair: between the outputs the current -(gm/2) s tanh(v/s), s = 0.1 V. */
export function idealPair(
  { transconductance, resistance, inductance, capacitance }: {
    transconductance: number;
    resistance: number;
    inductance: number;
    capacitance: number;
  },
): BuiltOscillator {
  const soft = 0.1;
  const circuit = assemble([
    {
      kind: "inductor",
      name: "coil",
      windings: [
        { nodes: ["plus", GROUND], inductance: inductance / 2, seriesResistance: 0 },
        { nodes: [GROUND, "minus"], inductance: inductance / 2, seriesResistance: 0 },
      ],
      coupling: 0,
      temperature: 300,
    },
    { kind: "resistor", name: "loss", nodes: ["plus", "minus"], resistance, temperature: 300 },
    { kind: "capacitor", name: "plus", nodes: ["plus", GROUND], capacitance: 2 * capacitance },
    { kind: "capacitor", name: "minus", nodes: ["minus", GROUND], capacitance: 2 * capacitance },
    {
      kind: "device",
      name: "pair",
      nodes: ["plus", "minus"],
      evaluate(v, out) {
        const u = Math.tanh((v[0]! - v[1]!) / soft);
        const current = -transconductance / 2 * soft * u;
        const slope = -transconductance / 2 * (1 - u * u);
        out.fill(0);
        out.set([current, -current, slope, -slope, -slope, slope]);
      },
      noise: [],
    },
  ]);
  return {
    circuit,
    supplyNode: GROUND,
    tank: { plus: "plus", minus: "minus", inductance, conductance: () => 1 / resistance },
    supplyCurrent: () => 0,
    guess: circuit.stateAt({}),
    watched: [],
    patterns: [
      { name: "tank", weights: { plus: 1, minus: -1 } },
      { name: "common mode", weights: { plus: 1, minus: 1 } },
    ],
    parts: { tank: ["loss"], pair: ["pair"] },
  };
}
