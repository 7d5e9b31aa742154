import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import {
  accumulatedJitter,
  diffusionFromLevel,
  jitterFromPhaseError,
  periodJitter,
  phaseErrorFromJitter,
} from "../../../lib/noise/jitter.ts";
import { whitePhaseNoise } from "../../../lib/noise/phase_noise.ts";

Deno.test("jitterFromPhaseError, phaseErrorFromJitter: a full turn is a period, and back", () => {
  assertClose(jitterFromPhaseError(2 * Math.PI, 1e9), 1e-9, { rtol: 1e-15, atol: 0 });
  assertClose(phaseErrorFromJitter(jitterFromPhaseError(0.02, 5.5e9), 5.5e9), 0.02, {
    rtol: 1e-15,
    atol: 0,
  });
});

Deno.test("diffusionFromLevel: undoes the phase noise of a diffusion", () => {
  const place = { frequency: 2.4e9, offset: 3e6 };
  const level = whitePhaseNoise(4e-17, place);
  assertClose(diffusionFromLevel(level, place), 4e-17, { rtol: 1e-13, atol: 0 });
});

Deno.test("accumulatedJitter: grows with the square root of time, from the period jitter on", () => {
  const period = periodJitter(1e-16, 1e9);
  assertClose(accumulatedJitter(1e-16, 100e-9), 10 * period, { rtol: 1e-14, atol: 0 });
  assertEquals(accumulatedJitter(1e-16, 0), 0);
});

Deno.test("jitter: bad values are refused with their unit", () => {
  assertThrows(() => jitterFromPhaseError(-1, 1e9), RangeError, /phase error must be >= 0 rad/);
  assertThrows(() => jitterFromPhaseError(1, NaN), RangeError, /frequency must be > 0 Hz/);
  assertThrows(() => phaseErrorFromJitter(NaN, 1e9), RangeError, /jitter must be >= 0 s/);
  assertThrows(() => periodJitter(1e-16, 0), RangeError, /frequency/);
  assertThrows(() => accumulatedJitter(1e-16, -1), RangeError, /interval must be >= 0 s/);
  assertThrows(
    () => diffusionFromLevel(NaN, { frequency: 1e9, offset: 1e6 }),
    RangeError,
    /level must be a finite number of dBc\/Hz/,
  );
});
