import type { BuiltOscillator } from "../circuit/topology.ts";
import type { Equilibrium } from "../orbit/equilibrium.ts";
import { findOrbit, type FindOrbitOptions } from "../orbit/find_orbit.ts";
import { Orbit, type OrbitResult } from "../orbit/orbit.ts";
import { orbitFailure } from "../orbit/orbit_failure.ts";
import type { Startup } from "./startup.ts";

/** Most time steps spent on a kick: a motion that dies out shows it within a few hundred cycles. */
const KICK_STEPS = 20_000;
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
  const settings = {
    ...(tolerance === undefined ? {} : { tolerance }),
    ...(transientSteps === undefined ? {} : { transientSteps }),
  };
  if (started.starts || !kick) {
    const grown = findOrbit(system, { start: tankFirst(started), ...settings });
    const motion = grown instanceof Orbit ? grown : grown.orbit;
    const astray = motion !== undefined && !inTank(oscillator, motion);
    const final = grown instanceof Orbit || started.otherUnstable.length === 0;
    if (!kick) return astray ? otherMode(motion) : grown;
    if (!astray && final) return grown;
  }
  const { state: start, period } = kick;
  const kicked = findOrbit(system, { start, period, transientSteps: KICK_STEPS, ...settings });
  const orbit = kicked instanceof Orbit ? kicked : kicked.orbit;
  return orbit && !inTank(oscillator, orbit) ? otherMode(orbit) : kicked;
}

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

/** The equilibrium with the tank's pole in the first place, where the engine takes its direction from. */
function tankFirst({ equilibrium, growthRate, starts }: Startup): Equilibrium {
  const tank = equilibrium.poles.find(({ re, im }) => re === growthRate && im > 0);
  if (!tank || !starts) return equilibrium;
  return { ...equilibrium, poles: [tank, ...equilibrium.poles.filter((pole) => pole !== tank)] };
}
