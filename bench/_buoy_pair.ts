/** The pair that the benchmarks time: the shipped example, read from its own files. */
import { readCard } from "../kernel/sheet/card.ts";
import type { Condition } from "../lib/circuit/topology.ts";
import type { CrossCoupledPairDesign } from "../lib/circuit/cross_coupled_pair.ts";
import type { TechnologyCard } from "../lib/device/technology_card.ts";

const CARD = new URL("../notebooks/cards/illustrative_65nm.yaml", import.meta.url);

export const card: TechnologyCard = readCard(Deno.readTextFileSync(CARD), CARD.pathname);

export const condition: Condition = { corner: "typical", temperature: 300.15, supply: 0.8 };

export const design: CrossCoupledPairDesign = {
  tank: {
    inductance: 1.8e-9,
    quality: 13,
    qualityFrequency: 4.88e9,
    capacitance: 545e-15,
  },
  pair: { width: 30e-6, length: 60e-9 },
  tail: { width: 60e-6, length: 180e-9 },
  current: 2.1e-3,
  mirrorRatio: 4,
  loadCapacitance: 20e-15,
};
