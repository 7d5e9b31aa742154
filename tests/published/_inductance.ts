/** One oscillator on a trimmed tank, for the checks of inductance against noise. */
import type { TankDesign, Topology } from "../../lib/circuit/topology.ts";
import type { BiasPoint } from "../../lib/design/bias.ts";
import type { InductanceOptions } from "../../lib/design/inductance_check.ts";
import { type InductanceColumn, inductanceTrend } from "../../lib/design/inductance_map.ts";
import { ruleFamily } from "../../lib/design/inductor_family.ts";
import { assert } from "../assert.ts";
import { illustrativeCard } from "../lib/device/_card.ts";

export const CARD = illustrativeCard();
/** [Hz] */
export const OFFSET = 1e6;

/** The engine's point of a topology with a lossless capacitor trimmed to the frequency. */
export function solve<Design>(
  topology: Topology<Design>,
  { designWith, inductance, quality, frequency, supply, current }: {
    readonly designWith: (tank: TankDesign) => Design;
    readonly inductance: number;
    readonly quality: number;
    readonly frequency: number;
    readonly supply: number;
    readonly current: number;
  },
): BiasPoint {
  const options: InductanceOptions<Design> = {
    card: CARD,
    family: ruleFamily({
      quality,
      referenceInductance: inductance,
      smallest: inductance / 2,
      largest: inductance * 2,
    }),
    designWith,
    frequency,
    conditions: [{ corner: "typical", temperature: 300, supply }],
    loopGain: 2,
    capacitorQuality: 1e12,
    leastCapacitance: 0,
    resonanceRatio: 2,
    mostPower: 1,
  };
  const [found] = inductanceTrend(topology, [{ inductance } as InductanceColumn], {
    ...options,
    currentOf: () => current,
    amplitude: "computed",
    offset: OFFSET,
  });
  assert(found?.point.figures, found?.point.reason);
  return found.point;
}

/** White phase noise at {@linkcode OFFSET} [dBc/Hz]. */
export function noiseOf({ figures }: BiasPoint): number {
  return figures!.phaseNoise;
}
