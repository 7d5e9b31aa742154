/**
 * Derivative of the period with respect to the inputs of the system.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import type { Orbit } from "./orbit.ts";
import { phaseSensitivity } from "./phase_sensitivity.ts";

/** The period's derivative by one input. */
export interface InputSensitivity {
  readonly name: string;
  /** Unit of the input. */
  readonly unit: string;
  /** dT/dp [s per unit]. */
  readonly period: number;
  /** df/dp = -(dT/dp)/T^2 [Hz per unit]: tuning gain, supply pushing. */
  readonly frequency: number;
}

/**
 * dT/dp and df/dp for each input of the orbit's system, from the adjoint of the discrete period map:
 * no orbit is solved again.
 *
 * @returns one entry per input, in the system's order; empty for a system without inputs
 * @throws RangeError where an input puts charge into a row that cannot hold it
 */
export function inputSensitivity(orbit: Orbit): InputSensitivity[] {
  const { system } = orbit;
  const inputs = system.inputs ?? [];
  const evaluateInput = system.evaluateInput?.bind(system);
  if (inputs.length === 0 || !evaluateInput) return [];
  const { coordinates, adjoint } = orbit.discrete;
  const { n, r, rows, rowScale, mix } = coordinates;
  const { count, weights, states } = orbit.quadrature;
  const v = phaseSensitivity(orbit).quadrature;
  const dq = new Float64Array(n);
  const df = new Float64Array(n);
  return inputs.map(({ name, unit }, input) => {
    let period = 0;
    for (let k = 0; k < count; k++) {
      evaluateInput(input, states.subarray(k * n, (k + 1) * n), { dq, df });
      for (let i = 0; i < n; i++) period += weights[k]! * v[k * n + i]! * df[i]!;
      for (let i = 0; i < r; i++) {
        period += adjoint.stageWeights[k * r + i]! * rowScale[i]! * dq[rows[i]!]!;
      }
      for (let a = 0; a < n - r; a++) {
        let own = dq[rows[r + a]!]!;
        let size = Math.abs(own);
        for (let i = 0; i < r; i++) {
          const part = mix[a * r + i]! * dq[rows[i]!]!;
          own -= part;
          size += Math.abs(part);
        }
        if (Math.abs(own) > 1e-9 * size) {
          throw new RangeError(
            `Cannot find the sensitivity to ${name}: it puts charge into a row without a capacitor (${
              coordinates.unknownName(rows[r + a]!)
            })`,
          );
        }
      }
    }
    return { name, unit, period, frequency: -period / orbit.period ** 2 };
  });
}
