/**
 * The thermodynamic limit on the figure of merit.
 *
 * @module
 */
import { BOLTZMANN } from "../quantity/constants.ts";
import { requireFinite, requireNotNegative, requirePositive } from "./_require.ts";

/** What the ceiling of a figure of merit follows from. */
export interface CeilingValues {
  /** Quality factor of the loaded tank at the frequency of oscillation [1]. */
  readonly quality: number;
  /**
   * Power of the fundamental in the tank's loss over the power from the supply, 0 to 1 [1].
   * @default 1
   */
  readonly efficiency?: number;
  /**
   * Noise factor F, total phase diffusion over that of the tank's loss alone, at least 1 [1].
   * @default 1
   */
  readonly noiseFactor?: number;
  /** Of the tank's loss [K]. */
  readonly temperature: number;
  /**
   * How far the waveform may lie above the sinusoid's ceiling, from {@linkcode waveformAllowance} [1].
   * @default 0: a sinusoid
   */
  readonly distortion?: number;
}

/** One step from the limit of a lossless use of the supply down to a figure of merit. */
export interface CeilingLoss {
  /** What takes it away. */
  readonly name: "efficiency" | "noise factor" | "distortion" | "not accounted for";
  /** How much it takes away; negative where it adds [dB]. */
  readonly decibels: number;
}

/** The ceiling with the steps that lead to it. */
export interface Ceiling {
  /** 10 log(2e-3 / (k T)) + 20 log Q: efficiency and noise factor of one, a sinusoid [dBc/Hz]. */
  readonly limit: number;
  /** Highest possible figure of merit with the values given [dBc/Hz]; `limit` minus all losses. */
  readonly ceiling: number;
  /** Steps from `limit` to `ceiling`. */
  readonly losses: readonly CeilingLoss[];
  /** What the limit rests on, for print. */
  readonly assumptions: readonly string[];
}

/** A figure of merit held against its ceiling. */
export type CeilingJudgement =
  & Ceiling
  & {
    readonly figureOfMerit: number;
    /** Ceiling minus figure of merit, negative above it [dB]. */
    readonly margin: number;
    /** As in the ceiling, and what is left over: `limit` minus their sum is the figure of merit. */
    readonly losses: readonly CeilingLoss[];
  }
  & ({ readonly status: "below" } | {
    readonly status: "impossible";
    /** In words. */
    readonly reason: string;
  });

/** Excess that rounding explains [dB]. */
const ROUNDING = 1e-9;
/** The power a figure of merit is referred to [W]. */
const REFERENCE_POWER = 1e-3;

const ASSUMPTIONS: readonly string[] = [
  "the tank's loss acts as a parallel conductance with the noise of its own temperature",
  "the tank voltage is near-sinusoidal; harmonics enter by the distortion allowance",
  "the tank's mode leads: no other mode locked to it is larger, keeping energy of its own",
  "white noise, 1/f^2 region: L is half the one-sided spectral density of phase",
  "quality factor of the loaded tank at the frequency of oscillation",
  "power is the whole power from the supply",
];

/**
 * Highest figure of merit -L + 20 log(f0/f) - 10 log(P/1 mW) that thermodynamics allows,
 * 10 log(2e-3 / (k T)) + 20 log Q + 10 log(efficiency / F) + 10 log(1 + D).
 *
 * @returns the ceiling with its losses, which sum up exactly: `ceiling` is `limit` minus their sum
 * @throws {RangeError} for an efficiency outside 0 to 1, a noise factor below 1, or values not positive
 * @see P. Kinget, in Analog Circuit Design (1999) 353; M. Garampazzi, S. Dal Toso, A. Liscidini,
 *   D. Manstretta, P. Mendez, L. Romano, R. Castello, IEEE J. Solid-State Circuits 49 (2014) 635
 */
export function ceiling(
  { quality, efficiency = 1, noiseFactor = 1, temperature, distortion = 0 }: CeilingValues,
): Ceiling {
  const action = "compute the ceiling of the figure of merit";
  requirePositive(action, { what: "quality factor", value: quality, unit: "" });
  requirePositive(action, { what: "temperature", value: temperature, unit: "K" });
  requireNotNegative(action, { what: "distortion", value: distortion, unit: "" });
  if (!(efficiency > 0 && efficiency <= 1)) {
    throw new RangeError(
      `Cannot ${action}: efficiency must be above 0 and at most 1, got ${efficiency}`,
    );
  }
  if (!(noiseFactor >= 1 && noiseFactor < Infinity)) {
    throw new RangeError(
      `Cannot ${action}: noise factor must be >= 1 and finite, got ${noiseFactor}`,
    );
  }
  const limit = 10 * Math.log10(2 * REFERENCE_POWER / (BOLTZMANN * temperature)) +
    20 * Math.log10(quality);
  const losses: CeilingLoss[] = [
    { name: "efficiency", decibels: 0 - 10 * Math.log10(efficiency) },
    { name: "noise factor", decibels: 10 * Math.log10(noiseFactor) },
  ];
  if (distortion > 0) {
    losses.push({ name: "distortion", decibels: -10 * Math.log10(1 + distortion) });
  }
  return { limit, ceiling: limit - sumOf(losses), losses, assumptions: ASSUMPTIONS };
}

/**
 * Holds a figure of merit against its ceiling. Above it by more than rounding it is impossible: the power,
 * the quality factor, the efficiency or the noise is wrong.
 *
 * @param figureOfMerit computed or measured [dBc/Hz]
 * @throws {RangeError} for values that {@linkcode ceiling} refuses
 */
export function judgeFigureOfMerit(
  figureOfMerit: number,
  values: CeilingValues,
): CeilingJudgement {
  requireFinite("judge the figure of merit", {
    what: "figure of merit",
    value: figureOfMerit,
    unit: "dBc/Hz",
  });
  const top = ceiling(values);
  const margin = top.ceiling - figureOfMerit;
  const losses: CeilingLoss[] = [
    ...top.losses,
    { name: "not accounted for", decibels: margin },
  ];
  const judged = { ...top, figureOfMerit, margin, losses };
  if (margin >= -ROUNDING) return { ...judged, status: "below" };
  return {
    ...judged,
    status: "impossible",
    reason:
      `a figure of merit of ${figureOfMerit.toFixed(2)} dBc/Hz lies ${(-margin).toFixed(2)} dB ` +
      `above the thermodynamic limit of ${top.ceiling.toFixed(2)} dBc/Hz for a quality factor of ` +
      `${values.quality}, an efficiency of ${values.efficiency ?? 1} and a noise factor of ` +
      `${values.noiseFactor ?? 1}, and the waveform's distortion does not account for it`,
  };
}

function sumOf(losses: readonly CeilingLoss[]): number {
  return losses.reduce((sum, { decibels }) => sum + decibels, 0);
}
