/**
 * What moves the phase noise: its derivative by each design parameter, and what a change would give,
 * each solved again.
 *
 * @module
 */
import type { BuiltOscillator, Condition, Topology } from "../circuit/topology.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import { findOrbit } from "../orbit/find_orbit.ts";
import { Orbit } from "../orbit/orbit.ts";
import { oscillation } from "./oscillation.ts";
import { type OperatingFigures, operatingFigures } from "./operating_figures.ts";
import { type Startup, startup } from "./startup.ts";

/** Relative step of a parameter for its derivative: its square and the orbits' tolerance over it balance. */
const DERIVATIVE_STEP = 0.002;
/** A suggestion changes a parameter by at most this factor. */
const LARGEST_CHANGE = 2;
/** Derivatives below this promise nothing [dB per e-fold]. */
const WORTHLESS = 0.05;

/** A parameter of a design that may be changed. */
export interface DesignParameter<Design> {
  readonly name: string;
  readonly unit: string;
  /** Present value, in SI. */
  read(design: Design): number;
  /** The design with another value. */
  write(design: Design, value: number): Design;
  /** Least value that the process or the plan allows, in SI. @default none */
  readonly atLeast?: number;
  /** Greatest value allowed, in SI. @default none */
  readonly atMost?: number;
}

/** Where and how noise is judged. */
export interface WhatIfOptions<Design> {
  readonly card: TechnologyCard;
  readonly condition: Condition;
  /** Offset of the phase noise [Hz]. */
  readonly offset: number;
  /**
   * The noise that is judged [dBc/Hz].
   * @default the white phase noise at the offset
   */
  readonly noise?: (oscillator: BuiltOscillator, orbit: Orbit) => number;
  readonly parameters: readonly DesignParameter<Design>[];
}

/** A design solved at one value of one parameter. */
export interface WhatIfPoint {
  readonly figures: OperatingFigures;
  /** The noise that is judged [dBc/Hz]. */
  readonly noise: number;
  /** Startup loop gain [1]. */
  readonly loopGain: number;
}

/** The derivative of the noise by one parameter. */
export interface NoiseDerivative {
  readonly name: string;
  readonly unit: string;
  readonly value: number;
  /** d L / d ln p [dB]; undefined where a neighbour has no orbit. */
  readonly noise: number | undefined;
  /** d ln A / d ln p [1]. */
  readonly amplitude: number | undefined;
  /** d ln P / d ln p [1]. */
  readonly power: number | undefined;
  /** d ln f / d ln p [1]. */
  readonly frequency: number | undefined;
}

/** A change that would lower the noise, re-evaluated. */
export interface Suggestion {
  readonly name: string;
  readonly unit: string;
  readonly from: number;
  readonly to: number;
  /** What the derivative promised, L after minus L before [dB]. */
  readonly promised: number;
  /** The design with the change, solved again; undefined where it has no orbit. */
  readonly after: WhatIfPoint | undefined;
}

/** Derivatives and suggestions around one design. */
export interface WhatIf {
  readonly now: WhatIfPoint;
  /** Largest effect first. */
  readonly derivatives: readonly NoiseDerivative[];
  /** Relative step with which the derivatives were taken [1]. */
  readonly step: number;
  readonly suggestions: readonly Suggestion[];
}

/**
 * Derivatives of phase noise, amplitude, power and frequency by each parameter, from orbits
 * solved again 0.2 % to either side, or to one where a limit is in the way, and for each parameter the change that would bring the asked
 * improvement, at most by a factor of two, solved again.
 *
 * @param improvement how much lower the noise should be [dB], above zero
 * @returns undefined where the design itself has no orbit
 * @throws RangeError for an improvement that is not positive
 */
export function whatIf<Design>(
  topology: Topology<Design>,
  design: Design,
  { improvement, ...options }: WhatIfOptions<Design> & { readonly improvement: number },
): WhatIf | undefined {
  if (!(improvement > 0)) {
    throw new RangeError(`Cannot ask what if: improvement must be > 0 dB, got ${improvement} dB`);
  }
  const solve = solver(topology, design, options);
  const now = solve(design);
  if (!now) return undefined;
  const derivatives = options.parameters.map((parameter): NoiseDerivative => {
    const value = parameter.read(design);
    const points = stencil(parameter, value).map(({ fold, weight }) => ({
      weight,
      point: fold === 0 ? now : solve(parameter.write(design, value * Math.exp(fold))),
    }));
    const slope = (read: (point: WhatIfPoint) => number): number | undefined => {
      if (points.length === 0) return undefined;
      let sum = 0;
      for (const { weight, point } of points) {
        if (!point) return undefined;
        sum += weight * read(point);
      }
      return sum;
    };
    return {
      name: parameter.name,
      unit: parameter.unit,
      value,
      noise: slope(({ noise }) => noise),
      amplitude: slope(({ figures }) => Math.log(figures.amplitude)),
      power: slope(({ figures }) => Math.log(figures.power)),
      frequency: slope(({ figures }) => Math.log(figures.frequency)),
    };
  });
  const suggestions = derivatives.flatMap(({ name, unit, value, noise }): Suggestion[] => {
    const parameter = options.parameters.find((own) => own.name === name);
    if (!parameter || noise === undefined || !(Math.abs(noise) > WORTHLESS)) return [];
    const limit = Math.log(LARGEST_CHANGE);
    const change = Math.min(limit, Math.max(-limit, -improvement / noise));
    const { atLeast = 0, atMost = Infinity } = parameter;
    const to = Math.min(atMost, Math.max(atLeast, value * Math.exp(change)));
    if (to === value) return [];
    return [{
      name,
      unit,
      from: value,
      to,
      promised: noise * Math.log(to / value),
      after: solve(parameter.write(design, to)),
    }];
  });
  const size = ({ noise }: NoiseDerivative) => Math.abs(noise ?? 0);
  const gain = ({ after }: Suggestion) => after ? after.noise : Infinity;
  return {
    now,
    step: DERIVATIVE_STEP,
    derivatives: derivatives.sort((a, b) => size(b) - size(a)),
    suggestions: suggestions.sort((a, b) => gain(a) - gain(b)),
  };
}

/**
 * Folds of a parameter, as logarithms, and the weights that make the derivative by the logarithm: central, or
 * to one side where a limit is in the way; both are good to the square of the step. Empty at zero.
 */
function stencil<Design>(
  { atLeast = 0, atMost = Infinity }: DesignParameter<Design>,
  value: number,
): { readonly fold: number; readonly weight: number }[] {
  if (!(value > 0)) return [];
  const h = DERIVATIVE_STEP;
  const [least, most] = [value * Math.exp(-h) >= atLeast, value * Math.exp(h) <= atMost];
  if (least && most) return [{ fold: h, weight: 0.5 / h }, { fold: -h, weight: -0.5 / h }];
  const side = most ? h : -h;
  return [
    { fold: 0, weight: -1.5 / side },
    { fold: side, weight: 2 / side },
    { fold: 2 * side, weight: -0.5 / side },
  ];
}

/** Solves variants of a design, each orbit continued from the design's own where that works. */
function solver<Design>(
  topology: Topology<Design>,
  design: Design,
  { card, condition, offset, noise }: WhatIfOptions<Design>,
): (variant: Design) => WhatIfPoint | undefined {
  const started = (oscillator: BuiltOscillator) => {
    const outcome = startup(oscillator);
    return outcome.status === "found" ? outcome : undefined;
  };
  const grown = (oscillator: BuiltOscillator, own: Startup) => {
    const outcome = oscillation(oscillator, { started: own });
    return outcome instanceof Orbit ? outcome : undefined;
  };
  const home = topology.build(design, { card, condition });
  const homeStart = started(home);
  const homeOrbit = homeStart && grown(home, homeStart);
  return (variant) => {
    const oscillator = topology.build(variant, { card, condition });
    const own = started(oscillator);
    if (!own) return undefined;
    const near = homeOrbit && findOrbit(oscillator.circuit.system, { start: homeOrbit });
    const orbit = near instanceof Orbit ? near : grown(oscillator, own);
    if (!orbit) return undefined;
    const figures = operatingFigures(oscillator, orbit, { supply: condition.supply, offset });
    return {
      figures,
      noise: noise ? noise(oscillator, orbit) : figures.phaseNoise,
      loopGain: own.loopGain,
    };
  };
}
