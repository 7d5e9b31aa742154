/** A small map of a real oscillator, solved once for all tests of a file; the sizes are invented. */
import { logarithmicCurrents } from "../../../lib/design/bias.ts";
import { smallestInductance } from "../../../lib/design/inductance.ts";
import {
  familyLimits,
  type InductanceColumn,
  inductanceColumn,
  smallestOnKneeLine,
} from "../../../lib/design/inductance_map.ts";
import { asked, PAIR } from "../../lib/design/_inductance_samples.ts";

export const OFFSET = 1e6;
export const KNEE_MULTIPLE = 0.7;
export const PROPOSED = { current: 2.2e-3, inductance: 1.9e-9 };
export const OPTIONS = asked({
  conditions: asked().conditions.slice(0, 3) as never,
  resonanceRatio: 2.5,
});

let kept: InductanceColumn[] | undefined;

/** Six inductances from 0.7 nH to 4 nH over currents from no oscillation to far beyond the knee. */
export function sampleMap(): InductanceColumn[] {
  kept ??= Array.from({ length: 6 }, (_, k) => 0.7e-9 * (4 / 0.7) ** (k / 5)).flatMap(
    (inductance) =>
      inductanceColumn(PAIR, inductance, {
        ...OPTIONS,
        currents: logarithmicCurrents({ from: 0.2e-3, to: 9e-3, count: 14 }),
        offset: OFFSET,
      }) ?? [],
  );
  return kept;
}

export function sampleAnswers() {
  return {
    smallest: smallestInductance(PAIR, PROPOSED.current, OPTIONS),
    recommended: smallestOnKneeLine(PAIR, sampleMap(), {
      ...OPTIONS,
      kneeMultiple: KNEE_MULTIPLE,
    }),
    limits: familyLimits(PAIR, PROPOSED.current, OPTIONS),
  };
}
