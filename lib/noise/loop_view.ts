/**
 * A phase-locked loop around the oscillator, as far as its noise is concerned: what passes of the
 * oscillator's noise and of the reference's.
 *
 * @module
 */
import { formatQuantity } from "../quantity/format_quantity.ts";
import { requirePositive } from "./_require.ts";

/** How a loop passes phase noise. */
export interface Loop {
  /** In words, for a caption. */
  readonly description: string;
  /** Offset where the open loop's gain is one [Hz]. */
  readonly bandwidth: number;
  /** Offsets of the loop's corners, for integration [Hz]. */
  readonly corners: readonly number[];
  /** |1 - H|^2 at an offset [Hz]: what passes of the oscillator's phase noise, a high-pass [1]. */
  oscillatorGain(offset: number): number;
  /** |H|^2 at an offset [Hz]: what passes of the reference's, referred to the output, a low-pass [1]. */
  referenceGain(offset: number): number;
}

const ACTION = "describe the loop";
/** Degrees in a radian. */
const DEGREES = 180 / Math.PI;

/**
 * A first-order loop, H = fc / (j f + fc).
 *
 * @param bandwidth fc, where the open loop's gain is one [Hz]
 * @throws {RangeError} for a bandwidth that is not positive
 */
export function firstOrderLoop(bandwidth: number): Loop {
  requirePositive(ACTION, { what: "bandwidth", value: bandwidth, unit: "Hz" });
  return {
    description: `first-order loop, bandwidth ${formatQuantity(bandwidth, "Hz")}`,
    bandwidth,
    corners: [bandwidth],
    oscillatorGain: (offset) => 1 / (1 + (bandwidth / offset) ** 2),
    referenceGain: (offset) => 1 / (1 + (offset / bandwidth) ** 2),
  };
}

/**
 * A type-II second-order loop by its natural frequency and damping:
 * H = (fn^2 + 2 j zeta fn f) / (fn^2 - f^2 + 2 j zeta fn f), with a zero at fn / (2 zeta).
 *
 * Between the zero and the crossover a 1/f^2 oscillator contributes a flat level; below the zero it
 * falls with f^2.
 *
 * @param naturalFrequency fn [Hz]
 * @param damping zeta [1]
 * @throws {RangeError} for values that are not positive
 * @see F. Gardner, Phaselock Techniques, 3rd ed. (2005), ch. 2 (from memory)
 */
export function typeTwoLoop(naturalFrequency: number, damping: number): Loop {
  requirePositive(ACTION, { what: "natural frequency", value: naturalFrequency, unit: "Hz" });
  requirePositive(ACTION, { what: "damping", value: damping, unit: "" });
  // |open loop| = 1 at f = u fn, where u^4 = 1 + 4 zeta^2 u^2.
  const square = 2 * damping ** 2 + Math.sqrt(4 * damping ** 4 + 1);
  const bandwidth = naturalFrequency * Math.sqrt(square);
  const margin = Math.atan(2 * damping * Math.sqrt(square)) * DEGREES;
  const denominator = (x: number) => (1 - x * x) ** 2 + (2 * damping * x) ** 2;
  return {
    description: `type-II second-order loop, bandwidth ${formatQuantity(bandwidth, "Hz")}, phase ` +
      `margin ${formatQuantity(margin, "1")} degrees, natural frequency ` +
      `${formatQuantity(naturalFrequency, "Hz")}, damping ${formatQuantity(damping, "1")}`,
    bandwidth,
    corners: [naturalFrequency / (2 * damping), naturalFrequency, bandwidth],
    oscillatorGain: (offset) => {
      const x = offset / naturalFrequency;
      return x ** 4 / denominator(x);
    },
    referenceGain: (offset) => {
      const x = offset / naturalFrequency;
      return (1 + (2 * damping * x) ** 2) / denominator(x);
    },
  };
}

/**
 * The same loop by its bandwidth and phase margin: with t = tan(margin), fn = fc (1 + t^2)^(-1/4) and
 * zeta = t (1 + t^2)^(-1/4) / 2.
 *
 * @param bandwidth fc, where the open loop's gain is one [Hz]
 * @param phaseMarginDeg between 0 and 90 degrees [deg]
 * @throws {RangeError} for a bandwidth that is not positive or a margin outside that range
 */
export function typeTwoLoopOfMargin(bandwidth: number, phaseMarginDeg: number): Loop {
  requirePositive(ACTION, { what: "bandwidth", value: bandwidth, unit: "Hz" });
  if (!(phaseMarginDeg > 0 && phaseMarginDeg < 90)) {
    throw new RangeError(
      `Cannot ${ACTION}: the phase margin must be above 0 and below 90 degrees, got ` +
        `${phaseMarginDeg} degrees`,
    );
  }
  const tangent = Math.tan(phaseMarginDeg / DEGREES);
  const root = (1 + tangent ** 2) ** 0.25;
  return typeTwoLoop(bandwidth / root, tangent / (2 * root));
}
