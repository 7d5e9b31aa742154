import type { CornerBias } from "../../lib/design/bias.ts";
import { conditionText } from "./condition_text.ts";
import type { Verdict } from "./payload.ts";
import type { PayloadShowable } from "./showable.ts";
import { verdict, type VerdictOptions } from "./verdict.ts";

/** What is held against a limit at every corner. */
export interface CornerVerdictOptions extends Omit<VerdictOptions, "note"> {
  /** Unit of the figure. */
  readonly unit: string;
  /** The figure of one corner; undefined where it could not be computed. */
  readonly of: (corner: CornerBias) => number | undefined;
}

/**
 * A verdict on the corner with the least margin; not run where one corner has no figure, with that
 * corner and the reason in the note.
 *
 * @param name name of the verdict
 * @param corners at least one
 */
export function cornerVerdict(
  name: string,
  corners: readonly CornerBias[],
  { unit, of, ...limit }: CornerVerdictOptions,
): PayloadShowable<{ readonly kind: "verdict" } & Verdict> {
  const candidates = corners.map((corner) => {
    const value = of(corner);
    const where = conditionText(corner.condition);
    if (value === undefined || !Number.isFinite(value)) {
      const reason = corner.proposed.reason ?? "the figure could not be computed";
      return verdict(name, null, unit, { ...limit, note: `${where}: ${reason}` });
    }
    return verdict(name, value, unit, { ...limit, note: where });
  });
  const margin = (candidate: (typeof candidates)[number]) => candidate.payload.margin ?? -Infinity;
  const [first, ...rest] = candidates;
  if (!first) throw new RangeError(`Cannot give the verdict "${name}": there are no corners`);
  return rest.reduce((worst, next) => margin(next) < margin(worst) ? next : worst, first);
}
