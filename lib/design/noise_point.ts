/**
 * A design's noise in one condition: its orbit and the budget, or why there is none.
 *
 * @module
 */
import type { BuiltOscillator, Condition, Topology } from "../circuit/topology.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import { type NoiseBudget, noiseBudget, type NoiseBudgetOptions } from "../noise/budget.ts";
import type { CeilingValues } from "../noise/ceiling.ts";
import { waveformAllowance } from "../noise/ceiling_waveform_allowance.ts";
import type { PhaseNoiseCurve } from "../noise/piecewise.ts";
import { Orbit } from "../orbit/orbit.ts";
import { type OperatingFigures, operatingFigures } from "./operating_figures.ts";
import { oscillation } from "./oscillation.ts";
import { type Startup, startup } from "./startup.ts";

/** Harmonics of the tank voltage that its distortion counts. */
const HARMONICS = 9;

/** An oscillator's noise in one condition. */
export interface NoisePoint {
  readonly condition: Condition;
  readonly oscillator: BuiltOscillator;
  /** Present where there is an orbit. */
  readonly found?: {
    readonly startup: Startup;
    readonly orbit: Orbit;
    readonly figures: OperatingFigures;
    readonly budget: NoiseBudget;
    /** The budget's total as points. */
    readonly curve: PhaseNoiseCurve;
  };
  /** Why there is no orbit. */
  readonly reason?: string;
}

/** Options of {@linkcode noisePoint}. */
export interface NoisePointOptions extends NoiseBudgetOptions {
  readonly card: TechnologyCard;
  readonly condition: Condition;
  /** Offset of the white phase noise in the figures [Hz]. */
  readonly offset: number;
}

/**
 * Orbit, figures and noise budget of a design in one condition.
 *
 * @throws RangeError for what `noiseBudget` refuses
 */
export function noisePoint<Design>(
  topology: Topology<Design>,
  design: Design,
  { card, condition, offset, ...options }: NoisePointOptions,
): NoisePoint {
  const oscillator = topology.build(design, { card, condition });
  const started = startup(oscillator);
  if (started.status !== "found") return { condition, oscillator, reason: started.reason };
  const orbit = oscillation(oscillator, { started });
  if (!(orbit instanceof Orbit)) return { condition, oscillator, reason: orbit.reason };
  const budget = noiseBudget(oscillator, orbit, options);
  return {
    condition,
    oscillator,
    found: {
      startup: started,
      orbit,
      figures: operatingFigures(oscillator, orbit, { supply: condition.supply, offset }),
      budget,
      curve: budget.offsets.map((at, k) => ({ offset: at, level: budget.total[k] ?? NaN })),
    },
  };
}

/**
 * What the ceiling of a point's figure of merit follows from: quality factor of the loaded tank, efficiency
 * and noise factor as computed, and the allowance of its waveform; undefined without an orbit.
 *
 * A tank whose noise is not that of a parallel conductance alone, as in a Colpitts oscillator with a loaded
 * source, may have a noise factor that overstates the loss: hold the figure of merit against the ceiling
 * without it.
 */
export function ceilingValues(
  { condition, oscillator: { circuit, tank }, found }: NoisePoint,
): Required<CeilingValues> | undefined {
  if (!found) return undefined;
  const { orbit, figures: { amplitude, frequency, power, noiseFactor } } = found;
  const angular = 2 * Math.PI * frequency;
  const resistance = 1 / tank.conductance(angular);
  const harmonics = Array.from({ length: HARMONICS }, (_, k) => {
    const { re, im } = orbit.phasor((x) => circuit.voltage(tank.plus, tank.minus, x), {
      harmonic: k + 1,
    });
    return Math.hypot(re, im);
  });
  return {
    quality: resistance / (angular * tank.inductance),
    efficiency: amplitude ** 2 / (2 * resistance) / power,
    noiseFactor,
    temperature: condition.temperature,
    distortion: waveformAllowance(harmonics),
  };
}
