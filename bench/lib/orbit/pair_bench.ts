/**
 * The engine's unit of work on a six-state pair: orbit, sensitivity and white noise of one bias point
 * continued from its neighbours, and a sweep of 60 points.
 */
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { findEquilibrium } from "../../../lib/orbit/equilibrium.ts";
import { findOrbit } from "../../../lib/orbit/find_orbit.ts";
import { Orbit } from "../../../lib/orbit/orbit.ts";
import { extrapolateOrbits } from "../../../lib/orbit/orbit_guess.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { card, condition, design } from "../../_buoy_pair.ts";

const POINTS = 60;
const LOWEST = 0.5e-3;
const HIGHEST = 6e-3;

function solve(current: number, trail: readonly { current: number; orbit: Orbit }[]): Orbit {
  const oscillator = crossCoupledPair.build({ ...design, current }, { card, condition });
  const { system, sources } = oscillator.circuit;
  const near = trail.slice(-4);
  const start = near.length > 0
    ? extrapolateOrbits(near.map(({ orbit }) => orbit), {
      values: near.map((point) => Math.log(point.current)),
      wanted: Math.log(current),
    })
    : findEquilibrium(system, { guess: oscillator.guess });
  const orbit = findOrbit(system, { start });
  if (!(orbit instanceof Orbit)) throw new RangeError(`No orbit at ${current} A: ${orbit.reason}`);
  phaseDiffusion(orbit, sources.filter(({ color }) => color === "white"));
  return orbit;
}

function sweep(points: number): { current: number; orbit: Orbit }[] {
  const trail: { current: number; orbit: Orbit }[] = [];
  for (let k = 0; k < points; k++) {
    const current = LOWEST * (HIGHEST / LOWEST) ** (k / (points - 1));
    trail.push({ current, orbit: solve(current, trail) });
  }
  return trail;
}

const neighbours = sweep(POINTS).slice(20, 24);
const next = (neighbours[3]?.current ?? NaN) ** 2 / (neighbours[2]?.current ?? NaN);

Deno.bench("one bias point from its neighbours: orbit, sensitivity, white noise", () => {
  solve(next, neighbours);
});

Deno.bench(`sweep of ${POINTS} bias points from the equilibrium`, () => {
  sweep(POINTS);
});

Deno.bench("first orbit from the equilibrium", () => {
  solve(design.current, []);
});
