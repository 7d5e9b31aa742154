/** What is asked of the inductance of a 5 GHz pair on the illustrative card; the sizes are invented. */
import {
  crossCoupledPair,
  type CrossCoupledPairDesign,
} from "../../../lib/circuit/cross_coupled_pair.ts";
import { cornerConditions } from "../../../lib/design/bias.ts";
import type { InductanceOptions } from "../../../lib/design/inductance_check.ts";
import { ruleFamily } from "../../../lib/design/inductor_family.ts";
import type { CoilLayers } from "../../../lib/device/inductor_layers.ts";
import { illustrativeCard } from "../device/_card.ts";

export const FREQUENCY = 5e9;
export const CARD = illustrativeCard();
export const PAIR = crossCoupledPair;

/** A thick metal over a lossy substrate, invented. */
export const LAYERS: CoilLayers = {
  metal: { resistivity: 2e-8, temperatureCoefficient: 3.5e-3, referenceTemperature: 300 },
  metalThickness: 3.3e-6,
  bridgeOxide: 1e-6,
  substrateOxide: 5e-6,
  substrateCapacitance: 16e-6,
  substrateConductance: 2e3,
};

/** Q = 14 at every inductance from 0.4 nH to 5 nH, 20 GHz of self-resonance at 2 nH. */
export const RULE = ruleFamily({
  quality: 14,
  referenceInductance: 2e-9,
  selfResonance: 20e9,
  smallest: 0.4e-9,
  largest: 5e-9,
});

/** Everything but what a test changes. */
export function asked(
  changes: Partial<InductanceOptions<CrossCoupledPairDesign>> = {},
): InductanceOptions<CrossCoupledPairDesign> {
  return {
    card: CARD,
    family: RULE,
    designWith: (tank) => ({
      tank,
      pair: { width: 30e-6, length: 60e-9 },
      tail: { width: 80e-6, length: 180e-9 },
      current: 2e-3,
      mirrorRatio: 4,
      loadCapacitance: 20e-15,
    }),
    frequency: FREQUENCY,
    conditions: cornerConditions(CARD, {
      supply: { lowest: 0.85, nominal: 0.9, highest: 0.95 },
    }),
    loopGain: 2,
    capacitorQuality: 100,
    leastCapacitance: 150e-15,
    resonanceRatio: 2,
    mostPower: 3e-3,
    ...changes,
  };
}
