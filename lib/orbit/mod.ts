/**
 * Any autonomous system: equilibrium, periodic orbit, exponents, phase sensitivity, diffusion.
 *
 * @module
 */
export type { NoiseSource, OscillatorSystem, SystemInput, SystemValues } from "./system.ts";
export { type OdeDescription, odeSystem } from "./ode_system.ts";
export {
  type Complex,
  type Equilibrium,
  type EquilibriumOptions,
  findEquilibrium,
  type NoEquilibrium,
  type Pole,
  polesAt,
} from "./equilibrium.ts";
export { findOrbit, type FindOrbitOptions } from "./find_orbit.ts";
export { extrapolateOrbits, type OrbitGuess } from "./orbit_guess.ts";
export {
  type Estimate,
  Orbit,
  type OrbitFailure,
  type OrbitResult,
  type OrbitSamples,
  type Quadrature,
  type Work,
} from "./orbit.ts";
export { type PhaseSensitivity, phaseSensitivity } from "./phase_sensitivity.ts";
export { type InputSensitivity, inputSensitivity } from "./input_sensitivity.ts";
export { type PhaseDiffusion, phaseDiffusion, type SourceDiffusion } from "./phase_diffusion.ts";
export {
  type ModulationTransfer,
  type OffsetTransfer,
  type PhaseTransfer,
  phaseTransfer,
  type PhaseTransferOptions,
  type SourceNoise,
} from "./phase_transfer.ts";
