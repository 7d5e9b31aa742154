/** One noise point and its mask, solved once for all tests of a file; the numbers are invented. */
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import { type NoisePoint, noisePoint } from "../../../lib/design/noise_point.ts";
import { type Mask, maskFrom } from "../../../lib/noise/mask.ts";
import type { MaskPiece } from "../../../lib/noise/mask.ts";
import { card, design, nominal } from "./_bias_samples.ts";

export const OFFSETS: readonly number[] = Array.from({ length: 21 }, (_, k) => 10 ** (4 + k / 5));
/** Floor of the buffer [dBc/Hz]. */
export const FLOOR = -150;

let solved: NoisePoint | undefined;

/** A pair with a regulator and a buffer. */
export function samplePoint(): NoisePoint {
  solved ??= noisePoint(crossCoupledPair, { ...design, current: 4e-3 }, {
    card,
    condition: nominal,
    offset: 1e6,
    offsets: OFFSETS,
    inputs: [{ input: "supply", label: "regulator", density: () => 20e-9 }],
    added: [{ label: "buffer", level: () => FLOOR }],
  });
  return solved;
}

/** The found part of the sample, which must be there. */
export function sampleFound(): NonNullable<NoisePoint["found"]> {
  const { found, reason } = samplePoint();
  if (!found) throw new Error(reason);
  return found;
}

export const DEMANDS: readonly MaskPiece[] = [
  {
    from: 1e5,
    to: 1e6,
    level: -80,
    slope: -20,
    origin: { label: "phase error", basis: "2 deg rms" },
  },
  {
    from: 1e6,
    to: 1e7,
    level: -104,
    slope: 0,
    origin: { label: "neighbour", basis: "C/I -20 dB" },
  },
  { from: 3e7, to: 3e7, level: -120, slope: 0, origin: { label: "spur", basis: "one offset" } },
];

export const MASK: Mask = maskFrom(DEMANDS, { frequency: 5e9 });
