/**
 * From radio standards to masks, and the noise held against them.
 *
 * 3GPP TS 05.05 / 45.005 clause 5.1 (blocking of a mobile station, C/I 9 dB, reference sensitivity -102 dBm, wanted
 * signal 3 dB above it) and clause 4.3.3 (transmitted noise in the receive band, from memory); Bluetooth Core
 * Specification Vol 6 Part A section 4.2 (LE 1M) and Vol 2 Part A section 4.2 (basic rate) for the carrier to
 * interferer ratios. The levels follow from them by reciprocal mixing with the whole budget given to the local
 * oscillator (common practice).
 *
 * The worked designs are invented numbers with a hand calculation to 0.3 dB, and say so.
 */
import { assert, assertClose, assertEquals } from "../assert.ts";
import { firstOrderPhaseError } from "../../lib/noise/loop_view_closed_form.ts";
import { maskAt, maskFrom, mergeMasks, translateMask } from "../../lib/noise/mask.ts";
import { compareWithMask } from "../../lib/noise/mask_comparison.ts";
import { leesonPhaseNoise } from "../../lib/noise/phase_noise.ts";
import { sumLevels } from "../../lib/noise/piecewise.ts";
import { powerLawThrough } from "../../lib/noise/power_law.ts";
import { adjacentRequirement, blockerRequirement } from "../../lib/noise/requirement_blocker.ts";
import {
  phaseErrorFromModulation,
  phaseErrorRequirement,
} from "../../lib/noise/requirement_phase_error.ts";
import { transmitNoiseRequirement } from "../../lib/noise/requirement_transmit_noise.ts";
import { BOLTZMANN } from "../../lib/quantity/constants.ts";

/** Rounding of the hand calculations of the worked designs. */
const BY_HAND = { rtol: 0, atol: 0.3 };
const KT = BOLTZMANN * 300;

function whiteNoise(
  { resistance, amplitude, quality, noiseFactor, frequency }: {
    resistance: number;
    amplitude: number;
    quality: number;
    noiseFactor: number;
    frequency: number;
  },
  offset: number,
): number {
  return leesonPhaseNoise({
    thermalEnergy: KT,
    resistance,
    amplitude,
    quality,
    noiseFactor,
    frequency,
    offset,
  });
}

Deno.test("blockerRequirement: GSM 900 mobile station, 3GPP TS 45.005 clause 5.1", () => {
  const table = [[600e3, -43, -118.01], [1.6e6, -33, -128.01], [3e6, -23, -138.01]] as const;
  for (const [offset, blocker, expected] of table) {
    const { level } = blockerRequirement({
      label: "blocking",
      offset,
      wanted: -99,
      blocker,
      bandwidth: 200e3,
      signalToNoise: 9,
    });
    assertClose(level, expected, { rtol: 0, atol: 0.005 });
  }
});

Deno.test("adjacentRequirement: Bluetooth LE 1M and basic rate, Core Specification section 4.2", () => {
  const tables = [
    { coChannel: 21, rows: [[1e6, 15, -66], [2e6, -17, -98], [3e6, -27, -108]] },
    { coChannel: 11, rows: [[1e6, 0, -71], [2e6, -30, -101], [3e6, -40, -111]] },
  ] as const;
  for (const { coChannel, rows } of tables) {
    for (const [offset, carrierToInterferer, expected] of rows) {
      const { level } = adjacentRequirement({
        label: "interference",
        offset,
        carrierToInterferer,
        coChannel,
        bandwidth: 1e6,
      });
      assertClose(level, expected, { rtol: 0, atol: 1e-9 });
    }
  }
});

Deno.test("transmitNoiseRequirement: GSM 900, -79 dBm in 100 kHz at 33 dBm is -162 dBc/Hz", () => {
  // 3GPP TS 45.005 clause 4.3.3, from memory.
  const { level } = transmitNoiseRequirement({
    label: "receive band",
    offset: 20e6,
    noise: -79,
    bandwidth: 100e3,
    output: 33,
  });
  assertClose(level, -162, { rtol: 0, atol: 1e-9 });
});

Deno.test("masks: a short-range 2.4 GHz radio on an oscillator at twice the frequency", () => {
  // Invented design. Complementary pair, 2 nH, Q 12, 0.6 mA: R 736 ohm, 0.562 V, F 6.42 (2 with filtered tail).
  const radio = maskFrom([adjacentRequirement({
    label: "3 MHz and above",
    offset: 3e6,
    upTo: Infinity,
    carrierToInterferer: -27,
    coChannel: 21,
    bandwidth: 1e6,
  })], { frequency: 2.44e9 });
  const tank = { resistance: 736, amplitude: 0.562, quality: 12, frequency: 4.88e9 };
  const unfiltered = whiteNoise({ ...tank, noiseFactor: 6.42 }, 1e6);
  assertClose(unfiltered, -109.9, BY_HAND);
  assertClose(whiteNoise({ ...tank, noiseFactor: 2 }, 1e6), -115.0, BY_HAND);

  const oscillator = translateMask(radio, 4.88e9);
  const curve = powerLawThrough({ inverseSquare: { offset: 1e6, level: unfiltered } });
  const { worst } = compareWithMask(curve, oscillator);
  assertEquals(worst.offset, 3e6);
  // At 3 MHz behind the divider: -125.5 against -108.
  assertClose(worst.level - 20 * Math.log10(2), -125.5, BY_HAND);
  assertClose(worst.margin, 17.5, BY_HAND);
  // At the current where the loop gain is 2: 0.340 V, F 4.67.
  const least = whiteNoise({ ...tank, amplitude: 0.34, noiseFactor: 4.67 }, 3e6);
  assertClose(least - 20 * Math.log10(2), -122.5, BY_HAND);
});

Deno.test("masks: a 5.5 GHz radio with 256-QAM from its error vector magnitude", () => {
  // Invented design. Local oscillator 6 dB below -32 dB, half of phi^2 to the oscillator, loop of 200 kHz.
  const phaseError = phaseErrorFromModulation(-32, 6);
  assertClose(phaseError, 12.6e-3, { rtol: 0.02, atol: 0 });
  assertClose(phaseError * 180 / Math.PI, 0.72, { rtol: 0.02, atol: 0 });
  assertClose(phaseError ** 2 / 2, 7.92e-5, { rtol: 0.02, atol: 0 });
  const mask = maskFrom([
    phaseErrorRequirement({
      label: "256-QAM",
      phaseError,
      share: 0.5,
      bandwidth: 200e3,
    }),
  ], { frequency: 5.5e9 });
  assertClose(maskAt(mask, 1e6)!.level, -113.0, BY_HAND);

  // Single pair, 0.8 nH, Q 12, 3 mA: R 332 ohm, 0.634 V, F 3.99, or 2 with the tail filtered.
  const tank = { resistance: 332, amplitude: 0.634, quality: 12, frequency: 5.5e9 };
  const expected = [[3.99, -115.4, 0.385], [2, -118.4, 0.272]] as const;
  for (const [noiseFactor, level, degrees] of expected) {
    const computed = whiteNoise({ ...tank, noiseFactor }, 1e6);
    assertClose(computed, level, BY_HAND);
    const error = firstOrderPhaseError(computed, { offset: 1e6, bandwidth: 200e3 });
    assertClose(error * 180 / Math.PI, degrees, { rtol: 0.02, atol: 0 });
    if (noiseFactor === 3.99) {
      assertClose(error / (2 * Math.PI * 5.5e9), 194e-15, { rtol: 0.02, atol: 0 });
      const curve = powerLawThrough({ inverseSquare: { offset: 1e6, level: computed } });
      assertClose(compareWithMask(curve, mask).worst.margin, 2.4, BY_HAND);
    }
  }
  // At the knee, 8.05 mA and 1.7 V, and at the gate-drain limit, 6.25 mA and 1.32 V.
  const filtered = { ...tank, noiseFactor: 2 };
  assertClose(whiteNoise({ ...filtered, amplitude: 1.7 }, 1e6), -127.0, BY_HAND);
  assertClose(whiteNoise({ ...filtered, amplitude: 1.32 }, 1e6), -124.8, BY_HAND);
  // F = 2 + gm R / 4 with gm = 2 I / 0.25 V where the tail is not filtered.
  const tail = 2 * 6.25e-3 / 0.25 * 332 / 4;
  assertClose(
    whiteNoise({ ...tank, noiseFactor: 2 + tail, amplitude: 1.32 }, 1e6),
    -119.9,
    BY_HAND,
  );
});

Deno.test("masks: a cellular transmitter on an oscillator at four times the frequency", () => {
  // Invented design. Single pair, 0.6 nH, Q 14: R 193 ohm, F 2.5.
  const transmitter = maskFrom([transmitNoiseRequirement({
    label: "receive band",
    offset: 20e6,
    noise: -79,
    bandwidth: 100e3,
    output: 33,
  })], { frequency: 915e6 });
  const oscillator = translateMask(transmitter, 3.66e9);
  const limit = maskAt(oscillator, 20e6)!;
  assertClose(limit.level, -149.96, { rtol: 0, atol: 0.005 });
  assertEquals(limit.origin.label, "receive band");

  const tank = { resistance: 193, quality: 14, noiseFactor: 2.5, frequency: 3.66e9 };
  assertClose(whiteNoise({ ...tank, amplitude: 0.582 }, 20e6), -149.96, BY_HAND);
  const design = whiteNoise({ ...tank, amplitude: 1.164 }, 20e6);
  assertClose(design, -156.0, BY_HAND);

  const behind = design - 20 * Math.log10(4);
  assertClose(behind, -168.0, BY_HAND);
  const curveWithFloor = (floor: number) =>
    powerLawThrough({
      inverseSquare: { offset: 20e6, level: behind },
      floor: { offset: 20e6, level: floor },
    });
  assertClose(sumLevels([behind, -168]), -165.0, BY_HAND);
  assertClose(compareWithMask(curveWithFloor(-168), transmitter).worst.margin, 3, BY_HAND);
  const loud = compareWithMask(curveWithFloor(-163), transmitter).worst;
  assertClose(loud.level, -161.8, BY_HAND);
  assert(loud.margin < 0, `a floor of -163 dBc/Hz must break the mask, margin ${loud.margin} dB`);
});

Deno.test("masks: a 28 GHz oscillator whose capacitors set the quality", () => {
  // Invented design. 120 pH; quality 7.43 with the capacitors, 20 for the coil alone; 6 mA single pair, F 2.3.
  const reactance = 2 * Math.PI * 28e9 * 120e-12;
  const noiseOf = (quality: number) => {
    const resistance = quality * reactance;
    return whiteNoise({
      resistance,
      amplitude: 2 / Math.PI * 6e-3 * resistance,
      quality,
      noiseFactor: 2.3,
      frequency: 28e9,
    }, 1e6);
  };
  assertClose(noiseOf(7.43), -102.3, BY_HAND);
  assertClose(noiseOf(20), -115.2, BY_HAND);
});

Deno.test("mergeMasks: two radios on one oscillator, each part with its origin", () => {
  const gsm = maskFrom(
    ([[600e3, 1.6e6, -43], [1.6e6, 3e6, -33], [3e6, Infinity, -23]] as const).map((
      [offset, upTo, blocker],
    ) =>
      blockerRequirement({
        label: `GSM blocker of ${blocker} dBm`,
        offset,
        upTo,
        wanted: -99,
        blocker,
        bandwidth: 200e3,
        signalToNoise: 9,
      })
    ),
    { frequency: 0.9e9 },
  );
  const bluetooth = maskFrom([adjacentRequirement({
    label: "Bluetooth LE 1 MHz",
    offset: 1e6,
    upTo: 2e6,
    carrierToInterferer: 15,
    coChannel: 21,
    bandwidth: 1e6,
  })], { frequency: 2.44e9 });
  const both = mergeMasks([translateMask(gsm, 4.88e9), translateMask(bluetooth, 4.88e9)]);
  // Divided by 4.88 / 0.9 the GSM demand binds wherever there is one.
  assertEquals(maskAt(both, 1.2e6)?.origin.label, "GSM blocker of -43 dBm");
  assertClose(maskAt(both, 1.2e6)!.level, -118.01 + 20 * Math.log10(4.88 / 0.9), {
    rtol: 0,
    atol: 0.005,
  });
  assertEquals(maskAt(both, 5e6)?.origin.label, "GSM blocker of -23 dBm");
});
