import { requireFinite, requirePositive } from "./_require.ts";

/**
 * rms phase error of pure 1/f^2 noise behind a first-order loop over all offsets,
 * phi^2 = pi L1 f1^2 / fc with L1 in 1/Hz.
 *
 * @param level L1, half the one-sided spectral density of phase, free-running [dBc/Hz]
 * @returns rms phase error [rad]
 * @throws {RangeError} for an offset or bandwidth that is not positive
 */
export function firstOrderPhaseError(
  level: number,
  { offset, bandwidth }: {
    /** f1 at which the level holds [Hz]. */
    readonly offset: number;
    /** fc of the loop [Hz]. */
    readonly bandwidth: number;
  },
): number {
  const action = "compute the phase error behind a loop";
  requireFinite(action, { what: "level", value: level, unit: "dBc/Hz" });
  requirePositive(action, { what: "offset", value: offset, unit: "Hz" });
  requirePositive(action, { what: "bandwidth", value: bandwidth, unit: "Hz" });
  return Math.sqrt(Math.PI * 10 ** (level / 10) * offset ** 2 / bandwidth);
}
