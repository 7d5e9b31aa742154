import type { BuiltOscillator } from "../circuit/topology.ts";
import type { Equilibrium } from "../orbit/equilibrium.ts";
import { findOrbit, type FindOrbitOptions } from "../orbit/find_orbit.ts";
import { Orbit, type OrbitResult } from "../orbit/orbit.ts";
import { orbitFailure } from "../orbit/orbit_failure.ts";
import type { Startup } from "./startup.ts";

/** Most time steps spent on a kick: a motion that dies out shows it within a few hundred cycles. */
const KICK_STEPS = 20_000;
/** Most times a closed motion is suspected to run through its orbit. */
const MOST_ROUNDS = 8;
/** Two states closer than this part of the motion are the same. */
const SAME = 1e-4;
/** Where on the orbit a single round is looked for. */
const PLACES = [0, 0.21, 0.37, 0.58, 0.83];
/** Fundamental of the tank voltage over half an output's swing, below which the motion is in another mode. */
const IN_TANK = 0.1;

/** Options of {@linkcode oscillation}. */
export interface OscillationOptions extends Pick<FindOrbitOptions, "tolerance" | "transientSteps"> {
  /** Startup of the same oscillator. */
  readonly started: Startup;
}

/**
 * The orbit in the tank's own mode: grown from the equilibrium where the tank's poles are unstable, even
 * if other poles grow faster; else, or where that ends in another mode, from the topology's kick.
 *
 * @returns the orbit or a failure with its reason
 */
export function oscillation(
  oscillator: BuiltOscillator,
  { started, tolerance, transientSteps }: OscillationOptions,
): OrbitResult {
  const { circuit: { system }, kick } = oscillator;
  const settings: Settings = {
    ...(tolerance === undefined ? {} : { tolerance }),
    ...(transientSteps === undefined ? {} : { transientSteps }),
  };
  if (started.starts || !kick) {
    const grown = singleRound(
      findOrbit(system, { start: tankFirst(started), ...settings }),
      settings,
    );
    const elsewhere = (grown instanceof Orbit ? grown : grown.orbit) ?? undefined;
    if (!elsewhere || inTank(oscillator, elsewhere)) {
      if (grown instanceof Orbit || !kick || !started.otherUnstable.length) return grown;
    } else if (!kick) {
      return otherMode(elsewhere);
    }
  }
  const { state: start, period } = kick;
  const kicked = singleRound(
    findOrbit(system, { start, period, transientSteps: KICK_STEPS, ...settings }),
    settings,
  );
  const orbit = kicked instanceof Orbit ? kicked : kicked.orbit;
  return orbit && !inTank(oscillator, orbit) ? otherMode(orbit) : kicked;
}

type Settings = Pick<FindOrbitOptions, "tolerance" | "transientSteps">;

/** Whether an orbit moves the tank voltage at its own frequency. */
function inTank({ circuit, tank }: BuiltOscillator, orbit: Orbit): boolean {
  const { plus, minus } = tank;
  const { re, im } = orbit.phasor((x) => circuit.voltage(plus, minus, x));
  const { states } = orbit.samples;
  const n = orbit.system.dimension;
  let [low, high] = [Infinity, -Infinity];
  for (let at = 0; at < states.length; at += n) {
    const value = circuit.potential(plus, states.subarray(at, at + n));
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  return Math.hypot(re, im) > IN_TANK * (high - low) / 2;
}

function otherMode(orbit: Orbit): OrbitResult {
  return orbitFailure(
    "no convergence",
    `the motion ends in another mode than the tank's: an orbit at ${
      orbit.frequency.toPrecision(4)
    } Hz without tank voltage`,
    { work: orbit.work },
  );
}

/**
 * One round of an orbit that was found as several: two or more rounds close as well as one, and a first
 * return may be overlooked where the motion jumps within a time step.
 */
function singleRound(found: OrbitResult, settings: Settings): OrbitResult {
  const rounds = found instanceof Orbit ? roundsOf(found) : 1;
  if (!(found instanceof Orbit) || rounds === 1) return found;
  for (const place of PLACES) {
    const single = findOrbit(found.system, {
      start: found.at(place * found.period / rounds),
      period: found.period / rounds,
      ...settings,
    });
    if (!(single instanceof Orbit) || roundsOf(single) === 1) return single;
  }
  return orbitFailure(
    "no convergence",
    `the closed motion found runs through the orbit ${rounds} times, and a single round was not found`,
    { work: found.work },
  );
}

/** How many times a closed motion runs through the same states. */
function roundsOf(orbit: Orbit): number {
  const { times, states } = orbit.samples;
  const n = orbit.system.dimension;
  const scale = orbit.system.scale ?? new Float64Array(n).fill(1);
  let largest = 0;
  for (let j = 0; j < n; j++) {
    let [low, high] = [Infinity, -Infinity];
    for (let k = 0; k < times.length; k++) {
      const value = states[k * n + j] ?? NaN;
      low = Math.min(low, value);
      high = Math.max(high, value);
    }
    largest = Math.max(largest, (high - low) / (scale[j] ?? 1));
  }
  const first = orbit.at(0);
  for (let rounds = MOST_ROUNDS; rounds > 1; rounds--) {
    const later = orbit.at(orbit.period / rounds);
    const same = first.every((value, j) =>
      Math.abs(value - (later[j] ?? NaN)) / (scale[j] ?? 1) < SAME * largest
    );
    if (same) return rounds;
  }
  return 1;
}

/** The equilibrium with the tank's pole in the first place, where the engine takes its direction from. */
function tankFirst({ equilibrium, growthRate, starts }: Startup): Equilibrium {
  const tank = equilibrium.poles.find(({ re, im }) => re === growthRate && im > 0);
  if (!tank || !starts) return equilibrium;
  return { ...equilibrium, poles: [tank, ...equilibrium.poles.filter((pole) => pole !== tank)] };
}
