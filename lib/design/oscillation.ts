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
/** Where on the orbit a single round is looked for. */
const PLACES = [0, 0.21, 0.37, 0.58, 0.83];
/** Two states closer than this part of the motion are the same. */
const SAME = 1e-4;

/** Options of {@linkcode oscillation}. */
export interface OscillationOptions extends Pick<FindOrbitOptions, "tolerance" | "transientSteps"> {
  /** Startup of the same oscillator. */
  readonly started: Startup;
}

/**
 * The orbit in the tank's own mode: grown from the equilibrium where the tank's poles are unstable, even
 * if other poles grow faster; else from the topology's kick, where it has one.
 *
 * @returns the orbit or a failure with its reason
 */
export function oscillation(
  { circuit, kick }: BuiltOscillator,
  { started, tolerance, transientSteps }: OscillationOptions,
): OrbitResult {
  const settings = {
    ...(tolerance === undefined ? {} : { tolerance }),
    ...(transientSteps === undefined ? {} : { transientSteps }),
  };
  const soft = started.starts || !kick;
  const found = findOrbit(
    circuit.system,
    soft
      ? { start: tankFirst(started), ...settings }
      : { start: kick.state, period: kick.period, transientSteps: KICK_STEPS, ...settings },
  );
  const rounds = found instanceof Orbit ? roundsOf(found) : 1;
  if (!(found instanceof Orbit) || rounds === 1) return found;
  // Two or more rounds close as well as one: the first return of a state on the orbit is one round, where
  // the motion is slow enough to be seen returning.
  for (const place of PLACES) {
    const single = findOrbit(circuit.system, {
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
  const range = Array.from({ length: n }, (_, j) => {
    let [low, high] = [Infinity, -Infinity];
    for (let k = 0; k < times.length; k++) {
      const value = states[k * n + j] ?? NaN;
      low = Math.min(low, value);
      high = Math.max(high, value);
    }
    return high - low;
  });
  const scale = orbit.system.scale ?? new Float64Array(n).fill(1);
  const largest = Math.max(...range.map((value, j) => value / (scale[j] ?? 1)));
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
