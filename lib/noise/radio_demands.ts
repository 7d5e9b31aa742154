import type { MaskPiece } from "./mask.ts";
import { adjacentRequirement, blockerRequirement } from "./requirement_blocker.ts";
import {
  jitterRequirement,
  phaseErrorFromModulation,
  phaseErrorRequirement,
} from "./requirement_phase_error.ts";
import { transmitNoiseRequirement } from "./requirement_transmit_noise.ts";

/** A channel's neighbour. */
export interface Neighbour {
  /** From the carrier [Hz]. */
  readonly offset: number;
  /** Carrier to interferer there, negative where the interferer is stronger [dB]. */
  readonly carrierToInterferer: number;
}

/** A radio's numbers, at its carrier. */
export interface RadioNumbers {
  /** [Hz] */
  readonly carrier: number;
  /** Channel [Hz]. */
  readonly bandwidth: number;
  /** Carrier to co-channel interferer, or signal to noise, at which the receiver still works [dB]. */
  readonly coChannel: number;
  /** Left to other impairments of the receiver and transmitter [dB]. */
  readonly impairments: number;
  /** Neighbours with rising offsets; each holds up to the next, the last up to the blocker. */
  readonly neighbours: readonly Neighbour[];
  /** Blocker from an offset on. */
  readonly blocker: {
    /** [Hz] */
    readonly offset: number;
    /** Wanted signal and blocker [dBm]. */
    readonly wanted: number;
    readonly level: number;
  };
  /** Noise that may be sent from an offset on. */
  readonly transmit: {
    /** [Hz] */
    readonly offset: number;
    /** Noise in a bandwidth, and the output [dBm]. */
    readonly noise: number;
    readonly output: number;
    /** [Hz] */
    readonly bandwidth: number;
  };
  /** Error vector magnitude, and how far the oscillator's part stays below it [dB]. */
  readonly modulation: { readonly accuracy: number; readonly below: number };
  /** Whole rms jitter of a clock at the carrier's frequency [s]. */
  readonly jitter: number;
  /** Bandwidth of the loop, taken as a first-order high-pass [Hz], and the oscillator's share of phi^2 [1]. */
  readonly loop: { readonly bandwidth: number; readonly share: number };
  /** Offset up to which the demands reach [Hz]. */
  readonly upTo: number;
}

/**
 * The demands on phase noise that a radio's numbers make, each with its origin: reciprocal mixing of
 * neighbours and of a blocker, noise sent, modulation accuracy and clock jitter.
 *
 * @returns pieces for `maskFrom`, at the carrier
 * @throws {RangeError} for numbers that the single requirements refuse, naming the demand
 */
export function radioDemands(radio: RadioNumbers): MaskPiece[] {
  const { carrier, bandwidth, coChannel, neighbours, blocker, transmit, loop, upTo } = radio;
  const margin = radio.impairments;
  const loopOf = (label: string) => ({ label, bandwidth: loop.bandwidth, share: loop.share });
  return [
    phaseErrorRequirement({
      ...loopOf("modulation accuracy"),
      phaseError: phaseErrorFromModulation(radio.modulation.accuracy, radio.modulation.below),
    }),
    jitterRequirement({
      ...loopOf("clock jitter"),
      jitter: radio.jitter,
      frequency: carrier,
    }),
    ...neighbours.map(({ offset, carrierToInterferer }, k) =>
      adjacentRequirement({
        label: `neighbour ${k + 1}`,
        offset,
        upTo: neighbours[k + 1]?.offset ?? blocker.offset,
        carrierToInterferer,
        coChannel,
        bandwidth,
        margin,
      })
    ),
    blockerRequirement({
      label: "blocker",
      offset: blocker.offset,
      upTo,
      wanted: blocker.wanted,
      blocker: blocker.level,
      signalToNoise: coChannel,
      bandwidth,
      margin,
    }),
    transmitNoiseRequirement({
      label: "transmitted noise",
      offset: transmit.offset,
      upTo,
      noise: transmit.noise,
      bandwidth: transmit.bandwidth,
      output: transmit.output,
      margin,
    }),
  ];
}
