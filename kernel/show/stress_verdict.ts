import type { Stress, Verdict } from "./payload.ts";
import type { PayloadShowable } from "./showable.ts";
import { verdict } from "./verdict.ts";

/** Options of {@linkcode stressVerdict}. */
export interface StressVerdictOptions {
  /** Part of the limit that should be left [1]; with less the verdict is thin. @default 0.05 */
  readonly reserve?: number;
  /** Why stresses are missing, when some are: the verdict is then not run. */
  readonly missing?: string | undefined;
}

/** Part of a limit that is left as a rule (common practice). */
const DEFAULT_RESERVE = 0.05;

/**
 * A verdict on the stress nearest to its limit.
 *
 * @param name name of the verdict
 * @param rows stresses with their limits, all in one unit
 * @throws {RangeError} when there are no rows and no reason is given
 */
export function stressVerdict(
  name: string,
  rows: readonly Stress[],
  { reserve = DEFAULT_RESERVE, missing }: StressVerdictOptions = {},
): PayloadShowable<{ readonly kind: "verdict" } & Verdict> {
  const [first, ...rest] = rows;
  if (!first) {
    if (missing === undefined) {
      throw new RangeError(`Cannot give the verdict "${name}": there are no stresses`);
    }
    return verdict(name, null, "V", { atMost: 0, note: missing });
  }
  const ratio = ({ value, limit }: Stress) => value / limit;
  const worst = rest.reduce((most, row) => ratio(row) > ratio(most) ? row : most, first);
  return verdict(name, missing === undefined ? worst.value : null, worst.unit, {
    atMost: worst.limit,
    thin: reserve * worst.limit,
    note: missing ?? `${worst.quantity} of ${worst.device} at ${worst.at}`,
  });
}
