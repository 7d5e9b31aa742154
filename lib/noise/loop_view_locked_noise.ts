/**
 * Phase noise at the output of a loop from the oscillator and the reference.
 *
 * @module
 */
import { integrateOffsets } from "./_offset_quadrature.ts";
import { requireLimits, requirePositive } from "./_require.ts";
import {
  type IntegratedPhaseNoise,
  isCurve,
  type PhaseNoise,
  phaseNoiseDensity,
  phaseNoiseOfArea,
} from "./integrals.ts";
import type { Loop } from "./loop_view.ts";
import type { OffsetRange } from "./piecewise.ts";

/** What is inside a loop. Levels are L, half the one-sided spectral density of phase. */
export interface LockedSources {
  /** Phase noise of the free-running oscillator, at the loop's output. */
  readonly oscillator: PhaseNoise;
  /**
   * Phase noise of the reference with all that adds to it in the loop.
   * @default none
   */
  readonly reference?: PhaseNoise;
  /**
   * Output frequency over the frequency at which `reference` is stated: its noise rises by 20 log of it.
   * @default 1: `reference` is referred to the output
   */
  readonly multiplication?: number;
}

/** Levels at one offset behind a loop [dBc/Hz]; `-Infinity` where nothing passes. */
export interface LockedLevels {
  /** What is left of the oscillator's. */
  readonly oscillator: number;
  /** What is left of the reference's; `-Infinity` without a reference. */
  readonly reference: number;
  /** Sum of both. */
  readonly total: number;
}

/** What is left of the noise of both behind a loop. */
export interface IntegratedLockedNoise {
  /** Of both. */
  readonly total: IntegratedPhaseNoise;
  /** Of the oscillator. */
  readonly oscillator: IntegratedPhaseNoise;
  /** Of the reference; absent without one. */
  readonly reference?: IntegratedPhaseNoise;
  /** Share of the oscillator in phi^2 [1]. */
  readonly oscillatorShare: number;
}

/** Options of {@linkcode integrateLockedNoise}. */
export interface IntegrateLockedNoiseOptions extends OffsetRange {
  /** Loop around the oscillator. */
  readonly loop: Loop;
  /**
   * Carrier f0 [Hz].
   * @default none: no jitter in the result
   */
  readonly frequency?: number;
}

/**
 * Levels at the output of a loop.
 *
 * @throws {RangeError} for an offset that is not positive or beyond the points of a curve
 */
export function lockedLevels(
  sources: LockedSources,
  { loop, offset }: {
    readonly loop: Loop;
    /** f [Hz] */
    readonly offset: number;
  },
): LockedLevels {
  requirePositive("compute locked phase noise", { what: "offset", value: offset, unit: "Hz" });
  const { oscillator, reference } = densitiesOf(sources, loop);
  const parts = [oscillator(offset), reference?.(offset) ?? 0] as const;
  return {
    oscillator: 10 * Math.log10(parts[0]),
    reference: 10 * Math.log10(parts[1]),
    total: 10 * Math.log10(parts[0] + parts[1]),
  };
}

/**
 * rms phase error and jitter at the output of a loop, phi^2 = 2 times the integral of
 * L_osc |1 - H|^2 + N^2 L_ref |H|^2, by quadrature to 1e-10.
 *
 * @throws {RangeError} for limits that are not 0 < from < to and finite, or beyond the points of a curve
 */
export function integrateLockedNoise(
  sources: LockedSources,
  { loop, from, to, frequency }: IntegrateLockedNoiseOptions,
): IntegratedLockedNoise {
  requireLimits("integrate locked phase noise", { from, to });
  const densities = densitiesOf(sources, loop);
  const areaOf = (density: (offset: number) => number, noise: PhaseNoise) =>
    integrateOffsets(density, {
      from,
      to,
      breaks: [...loop.corners, ...(isCurve(noise) ? noise.map(({ offset }) => offset) : [])],
    });
  const oscillator = areaOf(densities.oscillator, sources.oscillator);
  const reference = densities.reference && sources.reference
    ? areaOf(densities.reference, sources.reference)
    : undefined;
  const total = oscillator + (reference ?? 0);
  return {
    total: phaseNoiseOfArea(total, frequency),
    oscillator: phaseNoiseOfArea(oscillator, frequency),
    ...(reference === undefined ? {} : { reference: phaseNoiseOfArea(reference, frequency) }),
    oscillatorShare: oscillator / total,
  };
}

/** Linear densities of both behind the loop. */
function densitiesOf({ oscillator, reference, multiplication = 1 }: LockedSources, loop: Loop) {
  requirePositive("compute locked phase noise", {
    what: "multiplication",
    value: multiplication,
    unit: "",
  });
  const free = phaseNoiseDensity(oscillator);
  const source = reference && phaseNoiseDensity(reference);
  return {
    oscillator: (offset: number) => free(offset) * loop.oscillatorGain(offset),
    reference: source &&
      ((offset: number) => multiplication ** 2 * source(offset) * loop.referenceGain(offset)),
  };
}
