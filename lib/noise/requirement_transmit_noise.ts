import { formatQuantity } from "../quantity/format_quantity.ts";
import { requireFinite, requirePositive } from "./_require.ts";
import type { MaskPiece } from "./mask.ts";
import { type DemandPlace, flatDemand } from "./requirement_blocker.ts";

/** What {@linkcode transmitNoiseRequirement} needs. */
export interface TransmitNoise extends DemandPlace {
  /** Noise that may be sent within `bandwidth` at the offset [dBm]. */
  readonly noise: number;
  /** Bandwidth in which the noise is measured; 1 Hz for a density in dBm/Hz [Hz]. */
  readonly bandwidth: number;
  /** Power of the wanted signal at the output [dBm]. */
  readonly output: number;
}

/**
 * Phase noise that a limit on transmitted noise allows, L = noise - 10 log(bandwidth) - output - margin.
 *
 * @returns a flat piece of a mask [dBc/Hz], at the frequency of the output
 * @throws {RangeError} for a level that is not finite, or an offset or bandwidth that is not positive
 */
export function transmitNoiseRequirement(
  { noise, bandwidth, output, ...place }: TransmitNoise,
): MaskPiece {
  const action = `derive the demand "${place.label}"`;
  requireFinite(action, { what: "noise", value: noise, unit: "dBm" });
  requireFinite(action, { what: "output", value: output, unit: "dBm" });
  requirePositive(action, { what: "bandwidth", value: bandwidth, unit: "Hz" });
  return flatDemand(place, {
    level: noise - 10 * Math.log10(bandwidth) - output,
    basis: `noise ${noise} dBm in ${formatQuantity(bandwidth, "Hz")}, output ${output} dBm`,
  });
}
