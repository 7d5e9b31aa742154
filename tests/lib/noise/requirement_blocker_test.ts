import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { adjacentRequirement, blockerRequirement } from "../../../lib/noise/requirement_blocker.ts";

const BLOCKER = {
  label: "blocker at 3 MHz",
  offset: 3e6,
  wanted: -99,
  blocker: -23,
  bandwidth: 200e3,
  signalToNoise: 9,
};

Deno.test("blockerRequirement: wanted over blocker, less the ratio needed and the bandwidth", () => {
  const { from, to, level, slope, origin } = blockerRequirement(BLOCKER);
  assertEquals([from, to, slope], [3e6, 3e6, 0]);
  assertClose(level, -99 + 23 - 9 - 10 * Math.log10(2e5), { rtol: 0, atol: 1e-12 });
  assertEquals(origin, {
    label: "blocker at 3 MHz",
    basis: "wanted -99 dBm, blocker -23 dBm, signal to noise 9 dB, bandwidth 200 kHz",
  });
});

Deno.test("blockerRequirement: a margin lowers the mask and is told, a range is kept", () => {
  const plain = blockerRequirement(BLOCKER);
  const piece = blockerRequirement({ ...BLOCKER, margin: 5, upTo: Infinity });
  assertClose(plain.level - piece.level, 5, { rtol: 0, atol: 1e-12 });
  assertEquals(piece.to, Infinity);
  assertEquals(piece.origin.basis.endsWith("bandwidth 200 kHz, margin 5 dB"), true);
});

Deno.test("adjacentRequirement: the co-channel ratio stands for the signal to noise", () => {
  const { level, origin } = adjacentRequirement({
    label: "3 MHz and above",
    offset: 3e6,
    carrierToInterferer: -27,
    coChannel: 21,
    bandwidth: 1e6,
  });
  assertClose(level, -108, { rtol: 0, atol: 1e-12 });
  assertEquals(origin.basis, "C/I -27 dB, co-channel C/I 21 dB, bandwidth 1 MHz");
});

Deno.test("blockerRequirement, adjacentRequirement: bad values are named", () => {
  const blocked = (change: Partial<typeof BLOCKER> & { upTo?: number; margin?: number }) => () =>
    blockerRequirement({ ...BLOCKER, ...change });
  assertThrows(
    blocked({ bandwidth: 0 }),
    RangeError,
    /"blocker at 3 MHz": bandwidth must be > 0 Hz/,
  );
  assertThrows(blocked({ blocker: NaN }), RangeError, /blocker must be a finite number of dBm/);
  assertThrows(blocked({ offset: -1 }), RangeError, /offset must be > 0 Hz/);
  assertThrows(blocked({ upTo: 1e6 }), RangeError, /hold to 3000000 Hz or above, got 1000000 Hz/);
  assertThrows(blocked({ margin: NaN }), RangeError, /margin/);
  const adjacent = {
    label: "near",
    offset: 1e6,
    carrierToInterferer: NaN,
    coChannel: 21,
    bandwidth: 1e6,
  };
  assertThrows(() => adjacentRequirement(adjacent), RangeError, /carrier to interferer/);
});
