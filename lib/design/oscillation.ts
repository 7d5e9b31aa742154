import type { BuiltOscillator } from "../circuit/topology.ts";
import type { Equilibrium } from "../orbit/equilibrium.ts";
import { findOrbit, type FindOrbitOptions } from "../orbit/find_orbit.ts";
import type { OrbitResult } from "../orbit/orbit.ts";
import type { Startup } from "./startup.ts";

/** Most time steps spent on a kick: a motion that dies out shows it within a few hundred cycles. */
const KICK_STEPS = 20_000;

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
  const accuracy = tolerance === undefined ? {} : { tolerance };
  const steps = transientSteps === undefined ? {} : { transientSteps };
  if (started.starts || !kick) {
    const start = tankFirst(started);
    return findOrbit(circuit.system, { start, ...accuracy, ...steps });
  }
  const { state, period } = kick;
  return findOrbit(circuit.system, {
    start: state,
    period,
    transientSteps: KICK_STEPS,
    ...accuracy,
    ...steps,
  });
}

/** The equilibrium with the tank's pole in the first place, where the engine takes its direction from. */
function tankFirst({ equilibrium, growthRate, starts }: Startup): Equilibrium {
  const tank = equilibrium.poles.find(({ re, im }) => re === growthRate && im > 0);
  if (!tank || !starts) return equilibrium;
  return { ...equilibrium, poles: [tank, ...equilibrium.poles.filter((pole) => pole !== tank)] };
}
