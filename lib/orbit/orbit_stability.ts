/**
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import { orbitFailure } from "./orbit_failure.ts";
import type { Orbit, OrbitResult } from "./orbit.ts";

/** A second multiplier above 1 by more than this is unstable. */
const STABILITY_MARGIN = 1e-6;
/** Above this norm of the deflated monodromy's power the multipliers are computed. */
const STABILITY_DOUBT = 0.999;
const POWER_SQUARINGS = 10;

/**
 * Refuses an orbit whose second multiplier lies outside the unit circle.
 *
 * @internal
 */
export function stableOrbit(orbit: Orbit): OrbitResult {
  if (!(deflatedPowerNorm(orbit) > STABILITY_DOUBT)) return orbit;
  const moduli = orbit.multipliers.map(({ re, im }) => Math.hypot(re, im));
  // One multiplier is 1; take out the one nearest to it.
  const unit = moduli.reduce(
    (best, value, k) => Math.abs(value - 1) < Math.abs(moduli[best]! - 1) ? k : best,
    0,
  );
  const second = Math.max(...moduli.filter((_, k) => k !== unit));
  if (!(second > 1 + STABILITY_MARGIN)) return orbit;
  return orbitFailure(
    "unstable",
    `the orbit is unstable: a second multiplier has modulus ${second.toPrecision(6)}`,
    { work: orbit.work, orbit },
  );
}

/** The 1024th root of the norm of the 1024th power of the monodromy without its unit direction. */
function deflatedPowerNorm(orbit: Orbit): number {
  const { coordinates, map, adjoint, path } = orbit.discrete;
  const { r } = coordinates;
  const { flow } = coordinates.reducedFlow(orbit.discrete.nodes.states.slice(0, coordinates.n));
  let power = new Float64Array(r * r);
  let unit = 0;
  for (let i = 0; i < r; i++) unit += flow[i]! * adjoint.nodes[i]!;
  for (let i = 0; i < r; i++) {
    for (let j = 0; j < r; j++) {
      power[i * r + j] = map.monodromy[i * r + j]! - flow[i]! * adjoint.nodes[j]! / unit;
    }
  }
  let logNorm = 0;
  for (let k = 0; k < POWER_SQUARINGS; k++) {
    const next = new Float64Array(r * r);
    let norm = 0;
    for (let i = 0; i < r; i++) {
      for (let j = 0; j < r; j++) {
        let value = 0;
        for (let m = 0; m < r; m++) value += power[i * r + m]! * power[m * r + j]!;
        next[i * r + j] = value;
        norm = Math.max(norm, Math.abs(value));
      }
    }
    logNorm *= 2;
    if (!(norm > 0)) return 0;
    logNorm += Math.log(norm);
    power = next.map((value) => value / norm);
  }
  return path.period > 0 ? Math.exp(logNorm / 2 ** POWER_SQUARINGS) : 0;
}
