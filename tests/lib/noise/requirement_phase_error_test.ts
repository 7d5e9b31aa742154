import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { integratePhaseNoise } from "../../../lib/noise/integrals.ts";
import { firstOrderLoop } from "../../../lib/noise/loop_view.ts";
import { firstOrderPhaseError } from "../../../lib/noise/loop_view_closed_form.ts";
import { integrateLockedNoise } from "../../../lib/noise/loop_view_locked_noise.ts";
import type { MaskPiece } from "../../../lib/noise/mask.ts";
import {
  jitterRequirement,
  phaseErrorFromModulation,
  phaseErrorRequirement,
} from "../../../lib/noise/requirement_phase_error.ts";

/** The 1/f^2 noise that just meets a demand. */
function oscillatorOn({ from, level }: MaskPiece) {
  return { inverseSquare: 10 ** (level / 10) * from ** 2 };
}

Deno.test("phaseErrorRequirement: noise on the line uses the share of the phase error, any limits", () => {
  for (const limits of [{ from: 1e3, to: 1e8 }, { from: 5e4, to: 3e5 }, { from: 4e6, to: 9e6 }]) {
    const piece = phaseErrorRequirement({
      label: "phase error",
      phaseError: 0.02,
      share: 0.4,
      bandwidth: 2e5,
      ...limits,
    });
    const { total } = integrateLockedNoise({ oscillator: oscillatorOn(piece) }, {
      loop: firstOrderLoop(2e5),
      ...limits,
    });
    assertClose(total.variance, 0.4 * 0.02 ** 2, { rtol: 1e-9, atol: 0 });
  }
});

Deno.test("phaseErrorRequirement: without limits it undoes the closed form", () => {
  const piece = phaseErrorRequirement({ label: "phase error", phaseError: 0.01, bandwidth: 1e5 });
  const level = piece.level - 20 * Math.log10(1e6 / piece.from);
  assertClose(firstOrderPhaseError(level, { offset: 1e6, bandwidth: 1e5 }), 0.01, {
    rtol: 1e-12,
    atol: 0,
  });
  assertEquals([piece.from, piece.to, piece.slope], [1e5, 1e6, -20]);
  assertEquals(piece.origin.basis, "phase error 0.01 rad rms, loop bandwidth 100 kHz");
});

Deno.test("phaseErrorRequirement: free-running between limits", () => {
  const piece = phaseErrorRequirement({ label: "open", phaseError: 0.01, from: 1e4, to: 1e7 });
  const { phaseError } = integratePhaseNoise(oscillatorOn(piece), { from: 1e4, to: 1e7 });
  assertClose(phaseError, 0.01, { rtol: 1e-12, atol: 0 });
  assertEquals([piece.from, piece.to], [1e4, 1e7]);
});

Deno.test("phaseErrorRequirement: the line stays within the limits of the integral", () => {
  const drawn = (from: number, to: number) => {
    const piece = phaseErrorRequirement({
      label: "phase error",
      phaseError: 0.01,
      bandwidth: 1e5,
      from,
      to,
    });
    return [piece.from, piece.to];
  };
  assertEquals(drawn(0, 5e5), [5e4, 5e5]);
  assertEquals(drawn(3e5, Infinity), [3e5, 3e6]);
  assertEquals(drawn(2e4, 8e4), [2e4, 8e4]);
});

Deno.test("jitterRequirement: the phase error of the jitter at the clock", () => {
  const place = { label: "clock", bandwidth: 1e5, share: 0.5 };
  const jitter = jitterRequirement({ ...place, jitter: 1e-12, frequency: 1e9 });
  const phase = phaseErrorRequirement({ ...place, phaseError: 2 * Math.PI * 1e-3 });
  assertClose(jitter.level, phase.level, { rtol: 0, atol: 1e-12 });
  assertEquals(
    jitter.origin.basis,
    "jitter 1 ps rms at 1 GHz, share of the oscillator 50 %, loop bandwidth 100 kHz",
  );
});

Deno.test("phaseErrorFromModulation: decibels of the error vector", () => {
  assertClose(phaseErrorFromModulation(-40, 0), 0.01, { rtol: 1e-14, atol: 0 });
  assertClose(phaseErrorFromModulation(-30, 10), 0.01, { rtol: 1e-14, atol: 0 });
  assertThrows(() => phaseErrorFromModulation(0.02, 6), RangeError, /below 0 dB, got 0.02 dB/);
  assertThrows(() => phaseErrorFromModulation(-30, NaN), RangeError, /below/);
});

Deno.test("phase error demands: bad values are named", () => {
  const demand = { label: "phase error", phaseError: 0.01, bandwidth: 1e5 };
  const required =
    (change: Partial<typeof demand> & { share?: number; from?: number; to?: number }) => () =>
      phaseErrorRequirement({ ...demand, ...change });
  assertThrows(required({ phaseError: 0 }), RangeError, /phase error must be > 0 rad/);
  assertThrows(
    required({ share: 1.5 }),
    RangeError,
    /share must be above 0 and at most 1, got 1.5/,
  );
  assertThrows(required({ bandwidth: -1 }), RangeError, /loop bandwidth must be >= 0 Hz/);
  assertThrows(required({ from: 2e6, to: 1e6 }), RangeError, /from 2000000 Hz to 1000000 Hz/);
  assertThrows(required({ bandwidth: 0 }), RangeError, /without a loop both limits must be given/);
  assertThrows(
    () => jitterRequirement({ label: "clock", jitter: 0, frequency: 1e9 }),
    RangeError,
    /jitter must be > 0 s/,
  );
});
