/**
 * Choosing the bias current: the sweep, its knee, and how a proposed current lies to it.
 *
 * @module
 */
import type { BuiltOscillator, Condition, Topology } from "../circuit/topology.ts";
import type { TechnologyCard } from "../device/technology_card.ts";
import { findOrbit } from "../orbit/find_orbit.ts";
import { extrapolateOrbits } from "../orbit/orbit_guess.ts";
import { Orbit } from "../orbit/orbit.ts";
import { type OperatingFigures, operatingFigures } from "./operating_figures.ts";
import { oscillation } from "./oscillation.ts";
import { KNEE_EXPONENT, kneeCurrent, localExponents, type Regime, regimeOf } from "./regime.ts";
import { type Startup, startup } from "./startup.ts";

/** Currents between two points of the sweep tried when one does not follow from the other. */
const INTERMEDIATE = 3;
/** Where in the sweep it begins: high enough to oscillate, below the deepest voltage limit. */
const BEGIN_AT = 0.6;
/** Orbits behind the present one that its guess is extrapolated from. */
const TRAIL = 4;
/** Orbits a slope needs; where fewer exist, two at currents this factor to either side join for the slope. */
const FEWEST_FOR_SLOPE = 3;
const ASIDE = 1.02;
/** Marks a point of the curve that is none of the sweep's. */
const ASIDE_INDEX = -1;
/** An amplitude below this part of its neighbour's is the equilibrium, not an orbit. */
const VANISHED = 0.02;

/** One point of a sweep of the programmed current. */
export interface BiasPoint {
  /** Programmed current [A]. */
  readonly current: number;
  readonly startup: Startup | undefined;
  readonly regime: Regime;
  /** Figures of the orbit; undefined where there is none. */
  readonly figures: OperatingFigures | undefined;
  readonly orbit: Orbit | undefined;
  readonly oscillator: BuiltOscillator;
  /** d ln A / d ln I [1]. */
  readonly amplitudeExponent: number | undefined;
  /** d ln c / d ln I of the white noise-to-carrier ratio [1]: -2 for noise falling as 1/I^2. */
  readonly noiseExponent: number | undefined;
  /** Why there is no orbit. */
  readonly reason?: string;
}

/** A sweep of the programmed current. */
export interface BiasSweep {
  readonly condition: Condition;
  readonly points: readonly BiasPoint[];
  /** Knee current [A]; undefined where the sweep does not reach it. */
  readonly knee: number | undefined;
  /** Programmed current of the lowest computed white noise [A]. */
  readonly quietest: number | undefined;
  readonly kneeExponent: number;
}

/** Options of {@linkcode biasSweep}. */
export interface BiasSweepOptions {
  readonly card: TechnologyCard;
  readonly condition: Condition;
  /** Programmed currents, increasing [A]. */
  readonly currents: readonly number[];
  /** Offset of the phase noise [Hz]. */
  readonly offset: number;
  /** d ln A / d ln I at the knee [1]. @default 0.5 */
  readonly kneeExponent?: number;
  /** Called after each point; a rejected promise or a thrown error ends the sweep. */
  readonly onPoint?: (done: number, total: number) => void;
}

/**
 * Currents spread evenly in their logarithm.
 *
 * @param from lowest [A]
 * @param to highest [A]
 * @param count number of points [1], at least 3
 * @throws RangeError for an empty or upside-down range
 */
export function logarithmicCurrents(
  { from, to, count }: { readonly from: number; readonly to: number; readonly count: number },
): number[] {
  if (!(from > 0 && to > from)) {
    throw new RangeError(
      `Cannot spread currents: from must be > 0 A and below to, got ${from} A to ${to} A`,
    );
  }
  if (!(Number.isInteger(count) && count >= 3)) {
    throw new RangeError(`Cannot spread currents: count must be an integer >= 3, got ${count}`);
  }
  return Array.from({ length: count }, (_, k) => from * (to / from) ** (k / (count - 1)));
}

interface Solved {
  readonly current: number;
  readonly oscillator: BuiltOscillator;
  readonly orbit: Orbit | undefined;
  readonly starts?: boolean;
  readonly reason?: string | undefined;
}

/**
 * Sweeps the programmed current: equilibrium, startup, orbit, amplitude and white noise of each point,
 * orbits continued from their neighbours in both directions.
 *
 * @throws RangeError for currents that are not positive and increasing
 */
export function biasSweep<Design>(
  topology: Topology<Design>,
  design: Design,
  options: BiasSweepOptions,
): BiasSweep {
  const { card, condition, currents, offset, kneeExponent = KNEE_EXPONENT, onPoint } = options;
  if (!currents.every((current, k) => current > (currents[k - 1] ?? 0))) {
    throw new RangeError(
      "Cannot sweep the bias current: currents must be > 0 A and increasing",
    );
  }
  const build = (current: number) =>
    topology.build(topology.withCurrent(design, current), { card, condition });
  const solved: (Solved | undefined)[] = currents.map(() => undefined);
  let done = 0;
  const keep = (index: number, point: Solved) => {
    solved[index] = point;
    onPoint?.(++done, currents.length);
  };
  const begin = firstOrbit(build, currents);
  for (const { index, point } of begin.tried) keep(index, point);
  if (begin.index !== undefined) {
    for (const direction of [1, -1]) {
      let trail = [solved[begin.index]].filter((point) => point?.orbit !== undefined);
      for (let k = begin.index + direction; k >= 0 && k < currents.length; k += direction) {
        const current = currents[k];
        if (current === undefined || solved[k] !== undefined) continue;
        const point = follow(build, trail as Solved[], current);
        keep(k, point);
        // Below a current at which the oscillation has died there is nothing to continue.
        if (!point.orbit && direction < 0) trail = [];
        else if (point.orbit) trail = [...trail, point].slice(-TRAIL);
      }
    }
  }
  const points = solved.filter((point) => point !== undefined);
  const figures = points.map(({ oscillator, orbit }) =>
    orbit ? operatingFigures(oscillator, orbit, { supply: condition.supply, offset }) : undefined
  );
  const alive = points.flatMap((point, k) => {
    const own = figures[k];
    return own ? [{ index: k, current: point.current, figures: own }] : [];
  });
  const first = alive[0] && points[alive[0].index];
  const aside = !first || alive.length >= FEWEST_FOR_SLOPE ? [] : [1 / ASIDE, ASIDE].flatMap(
    (factor) => {
      const current = first.current * factor;
      const { oscillator, orbit } = follow(build, [first], current);
      if (!orbit) return [];
      const own = operatingFigures(oscillator, orbit, { supply: condition.supply, offset });
      return [{ index: ASIDE_INDEX, current, figures: own }];
    },
  );
  const curve = [...alive, ...aside].sort((a, b) => a.current - b.current);
  const axis = curve.map(({ current }) => current);
  const amplitudeExponents = localExponents(axis, curve.map(({ figures }) => figures.amplitude));
  const ratio = curve.map(({ figures }) => figures.diffusion * figures.frequency ** 2);
  const noiseExponents = localExponents(axis, ratio);
  const quietest = curve.reduce<number | undefined>(
    (best, { index }, k) =>
      index !== ASIDE_INDEX && (ratio[k] ?? Infinity) < (ratio[best ?? -1] ?? Infinity) ? k : best,
    undefined,
  );
  return {
    condition,
    kneeExponent,
    knee: kneeCurrent(axis, amplitudeExponents, { kneeExponent }),
    quietest: quietest === undefined ? undefined : axis[quietest],
    points: points.map((point, k): BiasPoint => {
      const place = curve.findIndex(({ index }) => index === k);
      const started = startup(point.oscillator);
      const found = started.status === "found" ? started : undefined;
      const amplitudeExponent = place >= 0 ? amplitudeExponents[place] : undefined;
      return {
        current: point.current,
        oscillator: point.oscillator,
        orbit: point.orbit,
        figures: figures[k],
        startup: found,
        amplitudeExponent,
        noiseExponent: place >= 0 ? noiseExponents[place] : undefined,
        regime: regimeOf({
          starts: found?.starts ?? false,
          exponent: amplitudeExponent,
          kneeExponent,
        }),
        ...(point.reason ? { reason: point.reason } : {}),
      };
    }),
  };
}

/** The first current, searched from the beginning's place outwards, with an orbit from the equilibrium. */
function firstOrbit(
  build: (current: number) => BuiltOscillator,
  currents: readonly number[],
): { index: number | undefined; tried: { index: number; point: Solved }[] } {
  const middle = Math.floor(BEGIN_AT * currents.length);
  const order = currents.map((_, k) => k).sort((a, b) => {
    // Upwards first: with more current there is more gain.
    const distance = (k: number) => k >= middle ? k - middle : currents.length + middle - k;
    return distance(a) - distance(b);
  });
  const tried: { index: number; point: Solved }[] = [];
  for (const index of order) {
    const current = currents[index];
    if (current === undefined) continue;
    const point = fromEquilibrium(build(current), current);
    tried.push({ index, point });
    if (point.orbit) return { index, tried };
  }
  return { index: undefined, tried };
}

function fromEquilibrium(oscillator: BuiltOscillator, current: number): Solved {
  const started = startup(oscillator);
  if (started.status !== "found") {
    return { current, oscillator, orbit: undefined, reason: started.reason };
  }
  const { starts } = started;
  const result = oscillation(oscillator, { started });
  return result instanceof Orbit
    ? { current, oscillator, orbit: result, starts }
    : { current, oscillator, orbit: undefined, starts, reason: result.reason };
}

/**
 * The orbit at `wanted` from up to four neighbours, in shorter strides where one is too long and the
 * equilibrium is unstable; last, from the equilibrium.
 */
function follow(
  build: (current: number) => BuiltOscillator,
  trail: readonly Solved[],
  wanted: number,
): Solved {
  const oscillator = build(wanted);
  const last = trail[trail.length - 1];
  if (!last) return fromEquilibrium(oscillator, wanted);
  const stride = (near: readonly Solved[], current: number): Solved => {
    const own = current === wanted ? oscillator : build(current);
    const result = findOrbit(own.circuit.system, {
      start: extrapolateOrbits(near.map(({ orbit }) => orbit as Orbit), {
        values: near.map((point) => Math.log(point.current)),
        wanted: Math.log(current),
      }),
    });
    const found = { current, oscillator: own };
    if (!(result instanceof Orbit)) return { ...found, orbit: undefined, reason: result.reason };
    if (vanished(last, result, own)) {
      return { ...found, orbit: undefined, reason: "the amplitude falls to zero" };
    }
    return { ...found, orbit: result };
  };
  const direct = stride(trail, wanted);
  if (direct.orbit) return direct;
  const own = fromEquilibrium(oscillator, wanted);
  if (own.orbit || !own.starts) return own.orbit ? own : { ...direct, reason: own.reason };
  let near = trail;
  for (let k = 1; k <= INTERMEDIATE; k++) {
    const part = k / INTERMEDIATE;
    const point = stride(near, part < 1 ? last.current * (wanted / last.current) ** part : wanted);
    if (!point.orbit) return { ...direct, reason: point.reason };
    if (part === 1) return point;
    near = [...near, point].slice(-TRAIL);
  }
  return direct;
}

function vanished(before: Solved, orbit: Orbit, { circuit, tank }: BuiltOscillator): boolean {
  const size = (of: Orbit) => {
    const { re, im } = of.phasor((x) => circuit.voltage(tank.plus, tank.minus, x));
    return Math.hypot(re, im);
  };
  return !(size(orbit) > VANISHED * size(before.orbit as Orbit));
}

/** How a proposed current lies to the knee in one condition. */
export interface CornerBias {
  readonly condition: Condition;
  readonly knee: number | undefined;
  /** The lead's multiple of the knee current [A]. */
  readonly recommended: number | undefined;
  /** Proposed current over the knee current [1]. */
  readonly distance: number | undefined;
  /** The proposed point. */
  readonly proposed: BiasPoint;
}

/**
 * The conditions a bias is judged at: every corner at both ends of supply and temperature, and the
 * nominal one first.
 */
export function cornerConditions(
  card: TechnologyCard,
  { supply }: {
    /** Lowest, nominal and highest supply voltage [V]. */
    readonly supply: {
      readonly lowest: number;
      readonly nominal: number;
      readonly highest: number;
    };
  },
): [Condition, ...Condition[]] {
  const { lowest, nominal, highest } = card.temperature;
  const ends = (["slow", "typical", "fast"] as const).flatMap((corner) =>
    [lowest, highest].flatMap((temperature) =>
      [supply.lowest, supply.highest].map((volts): Condition => ({
        corner,
        temperature,
        supply: volts,
      }))
    )
  );
  return [{ corner: "typical", temperature: nominal, supply: supply.nominal }, ...ends];
}

/**
 * The proposed current in one condition: a sweep around it that contains it, the knee, the
 * recommended current and their distance.
 *
 * @param proposed programmed current [A]
 * @param kneeMultiple recommended current over knee current, the lead's [1]
 */
export function cornerBias<Design>(
  topology: Topology<Design>,
  design: Design,
  { proposed, kneeMultiple, ...options }: BiasSweepOptions & {
    readonly proposed: number;
    readonly kneeMultiple: number;
  },
): CornerBias {
  const currents = [
    ...options.currents.filter((current) => Math.abs(current / proposed - 1) > 1e-3),
    proposed,
  ].sort((a, b) => a - b);
  const sweep = biasSweep(topology, design, { ...options, currents });
  const point = sweep.points.find(({ current }) => current === proposed);
  if (!point) throw new RangeError(`Cannot judge the bias: the sweep lost ${proposed} A`);
  return {
    condition: options.condition,
    knee: sweep.knee,
    recommended: sweep.knee === undefined ? undefined : kneeMultiple * sweep.knee,
    distance: sweep.knee === undefined ? undefined : proposed / sweep.knee,
    proposed: point,
  };
}
