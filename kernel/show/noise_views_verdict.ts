import type { NoisePoint } from "../../lib/design/noise_point.ts";
import { conditionText } from "./condition_text.ts";
import type { Verdict } from "./payload.ts";
import type { PayloadShowable } from "./showable.ts";
import { verdict, type VerdictOptions } from "./verdict.ts";

/** What is held against a limit in every condition. */
export interface NoiseVerdictOptions extends Omit<VerdictOptions, "note"> {
  /** Unit of the figure. */
  readonly unit: string;
  /** The figure in one condition, and what else is to be said of it there. */
  readonly of: (
    found: NonNullable<NoisePoint["found"]>,
  ) => { readonly value: number | undefined; readonly note?: string };
}

/**
 * A verdict on the condition with the least margin; not run where one condition has no figure, with that
 * condition and the reason in the note.
 *
 * @param points at least one
 * @throws {RangeError} without a point
 */
export function noiseVerdict(
  name: string,
  points: readonly NoisePoint[],
  { unit, of, ...limit }: NoiseVerdictOptions,
): PayloadShowable<{ readonly kind: "verdict" } & Verdict> {
  const candidates = points.map(({ condition, found, reason = "there is no orbit" }) => {
    const where = conditionText(condition);
    const figure = found && of(found);
    const value = figure?.value ?? null;
    const more = found ? figure?.note : reason;
    const note = more === undefined ? where : `${where}: ${more}`;
    return verdict(name, value, unit, { ...limit, note });
  });
  const [first, ...rest] = candidates;
  if (!first) throw new RangeError(`Cannot give the verdict "${name}": there are no conditions`);
  const margin = (candidate: typeof first) => candidate.payload.margin ?? -Infinity;
  return rest.reduce((worst, next) => margin(next) < margin(worst) ? next : worst, first);
}
