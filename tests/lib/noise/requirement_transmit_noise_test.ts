import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { transmitNoiseRequirement } from "../../../lib/noise/requirement_transmit_noise.ts";

const LIMIT = { label: "receive band", offset: 20e6, noise: -79, bandwidth: 100e3, output: 33 };

Deno.test("transmitNoiseRequirement: density of the noise against the output", () => {
  const { level, origin } = transmitNoiseRequirement({ ...LIMIT, upTo: 60e6 });
  assertClose(level, -162, { rtol: 0, atol: 1e-12 });
  assertEquals(origin.basis, "noise -79 dBm in 100 kHz, output 33 dBm");
  const density = transmitNoiseRequirement({ ...LIMIT, noise: -129, bandwidth: 1 });
  assertClose(density.level, -162, { rtol: 0, atol: 1e-12 });
});

Deno.test("transmitNoiseRequirement: bad values are named", () => {
  const limited = (change: Partial<typeof LIMIT>) => () =>
    transmitNoiseRequirement({ ...LIMIT, ...change });
  assertThrows(limited({ bandwidth: -1 }), RangeError, /"receive band": bandwidth must be > 0 Hz/);
  assertThrows(limited({ noise: Infinity }), RangeError, /noise must be a finite number of dBm/);
  assertThrows(limited({ output: NaN }), RangeError, /output/);
});
