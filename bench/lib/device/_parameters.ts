import type { TransistorParameters } from "../../../lib/device/transistor_parameters.ts";

/** Invented n transistor of the size of a 65 nm-class process, at 300 K. */
export const benchParameters: TransistorParameters = {
  kind: "n",
  temperature: 300,
  minimumLength: 60e-9,
  threshold: 0.35,
  slopeFactor: 1.3,
  transconductanceParameter: 270e-6,
  oxideCapacitance: 16e-3,
  saturationVelocity: 0.9e5,
  outputConductanceLength: 5e-8,
  overlapCapacitance: 2.8e-10,
  junction: {
    diffusionLength: 0.18e-6,
    areaCapacitance: 1.1e-3,
    perimeterCapacitance: 1.2e-10,
    builtInPotential: 0.75,
    grading: 0.4,
    saturationCurrent: 0.5e-6,
    emission: 1,
  },
  flickerCoefficient: 4e-25,
  thresholdMismatch: 3e-9,
  gainMismatch: 8e-9,
};
