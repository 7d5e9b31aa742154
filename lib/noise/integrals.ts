/**
 * Phase error and jitter from phase noise between two offsets.
 *
 * @module
 */
import { jitterFromPhaseError } from "./jitter.ts";
import {
  curveArea,
  curveDensity,
  curveLevel,
  type OffsetRange,
  type PhaseNoiseCurve,
} from "./piecewise.ts";
import {
  checkPowerLaw,
  type PowerLaw,
  powerLawArea,
  powerLawDensity,
  powerLawLevel,
} from "./power_law.ts";

/** Phase noise as points or as a sum of powers. */
export type PhaseNoise = PhaseNoiseCurve | PowerLaw;

/** What phase noise amounts to between two offsets. */
export interface IntegratedPhaseNoise {
  /** Integral of L over the offset, one side of the carrier [1]. */
  readonly area: number;
  /** The same, 10 log(area) [dBc]. */
  readonly level: number;
  /** phi^2 = 2 area, both sides [rad^2]. */
  readonly variance: number;
  /** rms [rad] */
  readonly phaseError: number;
  /** rms, in degrees. */
  readonly phaseErrorDeg: number;
  /** rms time jitter phi / (2 pi f0); present where the carrier's frequency was given [s]. */
  readonly jitter?: number;
}

/** Options of {@linkcode integratePhaseNoise}. */
export interface IntegratePhaseNoiseOptions extends OffsetRange {
  /**
   * Carrier f0 [Hz].
   * @default none: no jitter in the result
   */
  readonly frequency?: number;
}

/**
 * Level of phase noise at an offset.
 *
 * @param offset f [Hz]
 * @returns L [dBc/Hz]
 * @throws {RangeError} for an offset that is not positive or beyond the points of a curve
 */
export function phaseNoiseLevel(noise: PhaseNoise, offset: number): number {
  return isCurve(noise) ? curveLevel(noise, offset) : powerLawLevel(noise, offset);
}

/**
 * rms phase error and jitter of a free-running oscillator between two offsets: phi^2 = 2 times the
 * integral of L, since L is half the one-sided spectral density of phase (IEEE Std 1139). In closed form
 * for either kind of phase noise.
 *
 * @throws {RangeError} for limits that are not 0 < from < to, or beyond the points of a curve
 */
export function integratePhaseNoise(
  noise: PhaseNoise,
  { from, to, frequency }: IntegratePhaseNoiseOptions,
): IntegratedPhaseNoise {
  const area = isCurve(noise) ? curveArea(noise, { from, to }) : powerLawArea(noise, { from, to });
  return phaseNoiseOfArea(area, frequency);
}

/**
 * The figures that follow from an area.
 *
 * @internal
 */
export function phaseNoiseOfArea(area: number, frequency?: number): IntegratedPhaseNoise {
  const variance = 2 * area;
  const phaseError = Math.sqrt(variance);
  return {
    area,
    level: 10 * Math.log10(area),
    variance,
    phaseError,
    phaseErrorDeg: phaseError * 180 / Math.PI,
    ...(frequency === undefined ? {} : { jitter: jitterFromPhaseError(phaseError, frequency) }),
  };
}

/**
 * Linear density of phase noise, checked once for many readings [1/Hz].
 *
 * @internal
 */
export function phaseNoiseDensity(noise: PhaseNoise): (offset: number) => number {
  if (isCurve(noise)) return curveDensity(noise);
  checkPowerLaw(noise);
  return (offset) => powerLawDensity(noise, offset);
}

/**
 * Whether phase noise is given as points.
 *
 * @internal
 */
export function isCurve(noise: PhaseNoise): noise is PhaseNoiseCurve {
  return Array.isArray(noise);
}
