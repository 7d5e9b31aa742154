/** A small sweep of a real oscillator, solved once for all tests of a file; the sizes are invented. */
import {
  crossCoupledPair,
  type CrossCoupledPairDesign,
} from "../../../lib/circuit/cross_coupled_pair.ts";
import type { Condition } from "../../../lib/circuit/topology.ts";
import {
  type BiasPoint,
  type BiasSweep,
  biasSweep,
  type CornerBias,
  cornerBias,
  logarithmicCurrents,
} from "../../../lib/design/bias.ts";
import { illustrativeCard } from "../../lib/device/_card.ts";

export const OFFSET = 1e6;
export const PROPOSED = 4e-3;
export const card = illustrativeCard();
export const nominal: Condition = { corner: "typical", temperature: 300.15, supply: 1 };

export const design: CrossCoupledPairDesign = {
  tank: { inductance: 1.2e-9, quality: 12, qualityFrequency: 5e9, capacitance: 650e-15 },
  pair: { width: 40e-6, length: 60e-9 },
  tail: { width: 160e-6, length: 200e-9 },
  current: 2e-3,
  mirrorRatio: 8,
  loadCapacitance: 50e-15,
  tailCapacitance: 200e-15,
};

let solved: BiasSweep | undefined;

/** From far below the start of oscillation to far beyond the knee. */
export function sampleSweep(): BiasSweep {
  solved ??= biasSweep(crossCoupledPair, design, {
    card,
    condition: nominal,
    currents: logarithmicCurrents({ from: 0.1e-3, to: 20e-3, count: 10 }),
    offset: OFFSET,
  });
  return solved;
}

/** The proposed current in one condition. */
export function sampleCorner(condition: Condition): CornerBias {
  return cornerBias(crossCoupledPair, design, {
    card,
    condition,
    currents: [2e-3, 3e-3, 6e-3, 9e-3],
    offset: OFFSET,
    proposed: PROPOSED,
    kneeMultiple: 0.9,
  });
}

/** A point at which nothing could be computed. */
export function deadPoint(current: number): BiasPoint {
  return {
    current,
    startup: undefined,
    regime: "does not start",
    figures: undefined,
    orbit: undefined,
    oscillator: sampleSweep().points[0]!.oscillator,
    amplitudeExponent: undefined,
    noiseExponent: undefined,
    reason: "there is no operating point",
  };
}

/** A sweep of dead points. */
export function deadSweep(count: number): BiasSweep {
  return {
    condition: nominal,
    points: Array.from({ length: count }, (_, k) => deadPoint((k + 1) * 1e-3)),
    knee: undefined,
    quietest: undefined,
    kneeExponent: 0.5,
  };
}

/** Fails the reader, not the program, where a page shows a number that is none. */
export function pageOf(showable: { readonly bundle: Readonly<Record<string, unknown>> }): string {
  const text = `${showable.bundle["text/plain"]}\n${showable.bundle["text/html"]}`;
  const found = /\b(NaN|undefined|null|Infinity)\b/.exec(text);
  if (found !== null) throw new Error(`the page says ${found[0]}`);
  return text;
}
