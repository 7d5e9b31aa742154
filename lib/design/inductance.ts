/**
 * The smallest inductance that still starts, over a family of inductors at a fixed frequency and a
 * programmed current.
 *
 * @module
 */
import type { Topology } from "../circuit/topology.ts";
import {
  type BindingLimit,
  brokenText,
  checkInductance,
  type InductanceCheck,
  type InductanceOptions,
  worstStart,
} from "./inductance_check.ts";
import { closeIn } from "./_close_in.ts";
import type { InductorFamily } from "./inductor_family.ts";

/** Inductances at which a family without gaps is looked at before a boundary is closed in on. */
const SCAN_POINTS = 13;
/** Relative step of the quality factor for the sensitivity of the answer. */
const QUALITY_STEP = 0.02;

/** The smallest inductance and what it rests on. */
export interface InductanceAnswer {
  readonly status: "found";
  readonly check: InductanceCheck;
  /** What keeps a smaller one from being used. */
  readonly binding: BindingLimit;
  /**
   * d ln L / d ln Q of the coil [1]: -1 when the parallel resistance alone decides; undefined where the
   * family's end or its steps decide.
   */
  readonly qualitySensitivity: number | undefined;
}

/** Why no inductance of the family does. */
export interface NoInductance {
  readonly status: "none";
  /** What would have to give way. */
  readonly binding: BindingLimit;
  /** In words. */
  readonly reason: string;
  /** The one that comes nearest to starting. */
  readonly check: InductanceCheck;
}

/**
 * The smallest inductance of the family whose startup loop gain at the worst condition reaches the one
 * asked for at a programmed current, within power, capacitance and self-resonance limits.
 *
 * A family without gaps is looked at in thirteen places before the boundary is closed in on to 1e-4, so a
 * loop gain that does not rise all the way with inductance does no harm. A larger coil has less
 * capacitance left and a lower self-resonance and draws no less, so one that breaks those limits where
 * it first starts has none above it.
 *
 * @param current programmed current [A]
 */
export function smallestInductance<Design>(
  topology: Topology<Design>,
  current: number,
  options: InductanceOptions<Design>,
): InductanceAnswer | NoInductance {
  const bound = smallestStarting(topology, current, options);
  const { inductance } = bound;
  const check = checkInductance(topology, { inductance, current }, options);
  if (check.broken.length > 0) {
    const [limit = "startup"] = check.broken.filter((name) => name !== "startup");
    const binding = bound.starts ? limit : bound.end;
    return { status: "none", binding, check, reason: brokenText(check, options) };
  }
  const moved = bound.atEdge || options.family.inductances
    ? []
    : [1 + QUALITY_STEP, 1 - QUALITY_STEP].map((factor) =>
      smallestStarting(topology, current, withQuality(options, factor))
    ).filter(({ starts, atEdge }) => starts && !atEdge);
  const [higher, lower] = moved;
  const span = Math.log((1 + QUALITY_STEP) / (1 - QUALITY_STEP));
  return {
    status: "found",
    check,
    binding: bound.atEdge ? "smallest of the family" : "startup",
    qualitySensitivity: higher && lower
      ? Math.log(higher.inductance / lower.inductance) / span
      : undefined,
  };
}

/**
 * The smallest of a list of inductances that keeps every limit, each tried in turn: what
 * {@linkcode smallestInductance} must agree with.
 *
 * @param current programmed current [A]
 * @returns undefined where none does
 */
export function smallestByTrial<Design>(
  topology: Topology<Design>,
  current: number,
  { inductances, ...options }: InductanceOptions<Design> & {
    /** To be tried, rising [H]. */
    readonly inductances: readonly number[];
  },
): InductanceCheck | undefined {
  for (const inductance of inductances) {
    const check = checkInductance(topology, { inductance, current }, options);
    if (check.broken.length === 0) return check;
  }
  return undefined;
}

function withQuality<Design>(
  options: InductanceOptions<Design>,
  factor: number,
): InductanceOptions<Design> {
  const { family } = options;
  const member = (inductance: number) => {
    const own = family.member(inductance);
    return { ...own, quality: own.quality * factor };
  };
  return { ...options, family: { ...family, member } };
}

interface Boundary {
  readonly inductance: number;
  readonly starts: boolean;
  /** Whether the smallest of the family starts. */
  readonly atEdge: boolean;
  /** What ends the family where none starts. */
  readonly end: "fixed capacitance" | "largest of the family";
}

/** The smallest inductance that starts, whatever the other limits, or the one nearest to it. */
function smallestStarting<Design>(
  topology: Topology<Design>,
  current: number,
  options: InductanceOptions<Design>,
): Boundary {
  const at = (inductance: number) => {
    const { worstLoopGain: gain, trimmed } = worstStart(
      topology,
      { inductance, current },
      options,
    );
    return { starts: gain >= options.loopGain, possible: trimmed.capacitanceLeft > 0, gain };
  };
  let best = { inductance: options.family.smallest, gain: -Infinity };
  let below: number | undefined;
  for (const inductance of scanned(options.family)) {
    const { starts, possible, gain } = at(inductance);
    if (gain > best.gain) best = { inductance, gain };
    const whole = { atEdge: below === undefined, end: "largest of the family" } as const;
    if (options.family.inductances && starts) return { inductance, starts, ...whole };
    if (starts && below === undefined) return { inductance, starts, ...whole };
    if (starts && below !== undefined) {
      const { high } = closeIn({ low: below, high: inductance }, (L) => at(L).starts);
      return { inductance: high, starts, ...whole };
    }
    if (!possible) {
      const end = "fixed capacitance" as const;
      if (below === undefined || options.family.inductances) {
        return { inductance: best.inductance, starts: false, atEdge: false, end };
      }
      // The last inductance with any capacitance left may be the first that starts.
      const { low: last } = closeIn({ low: below, high: inductance }, (L) => !at(L).possible);
      if (!at(last).starts) return { inductance: last, starts: false, atEdge: false, end };
      const { high } = closeIn({ low: below, high: last }, (L) => at(L).starts);
      return { inductance: high, starts: true, atEdge: false, end };
    }
    below = inductance;
  }
  const { inductance } = best;
  return { inductance, starts: false, atEdge: false, end: "largest of the family" };
}

function scanned({ smallest, largest, inductances }: InductorFamily): readonly number[] {
  return inductances ?? Array.from(
    { length: SCAN_POINTS },
    (_, k) =>
      k === SCAN_POINTS - 1 ? largest : smallest * (largest / smallest) ** (k / (SCAN_POINTS - 1)),
  );
}
