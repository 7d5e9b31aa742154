import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { phaseNoiseLevel } from "../../../lib/noise/integrals.ts";
import { firstOrderLoop, typeTwoLoopOfMargin } from "../../../lib/noise/loop_view.ts";
import { balancedBandwidth } from "../../../lib/noise/loop_view_bandwidth.ts";
import { integrateLockedNoise } from "../../../lib/noise/loop_view_locked_noise.ts";
import { powerLawThrough } from "../../../lib/noise/power_law.ts";

const LIMITS = { from: 1e2, to: 1e9 };
const AMONG = { from: 1e4, to: 1e7 };

Deno.test("balancedBandwidth: white reference and 1/f^2 oscillator balance where they cross", () => {
  // First order: the total a pi / (2 fc) + b pi fc / 2 is least at fc = sqrt(a / b), which is the crossing.
  const oscillator = powerLawThrough({ inverseSquare: { offset: 1e6, level: -115 } });
  const reference = powerLawThrough({ floor: { offset: 1e6, level: -150 } });
  const { status, bandwidth, crossing, noise, evaluations } = balancedBandwidth(
    { oscillator, reference, multiplication: 100 },
    { ...LIMITS, loopOf: firstOrderLoop, among: AMONG },
  );
  // -110 dBc/Hz at the output meets -115 - 20 log(f / 1 MHz) at 10^-0.25 MHz.
  const expected = 1e6 * 10 ** -0.25;
  assertEquals(status, "found");
  assertClose(crossing!, expected, { rtol: 1e-4, atol: 0 });
  // The limits, 1e-3 of the bandwidth away from infinity, move the minimum a little.
  assertClose(bandwidth, expected, { rtol: 2e-3, atol: 0 });
  assertClose(noise.oscillatorShare, 0.5, { rtol: 0, atol: 2e-3 });
  assert(evaluations < 80, `${evaluations} integrals`);
});

Deno.test("balancedBandwidth: no bandwidth of a brute-force search is better by 1 %", () => {
  const oscillator = powerLawThrough({
    inverseCube: { offset: 1e5, level: -97 },
    inverseSquare: { offset: 1e6, level: -118 },
    floor: { offset: 1e6, level: -152 },
  });
  const reference = powerLawThrough({
    inverse: { offset: 1e4, level: -145 },
    floor: { offset: 1e4, level: -152 },
  });
  const sources = { oscillator, reference, multiplication: 61 };
  for (const margin of [40, 60, 75]) {
    const loopOf = (bandwidth: number) => typeTwoLoopOfMargin(bandwidth, margin);
    const limits = { from: 1e3, to: 1e8 };
    const { status, bandwidth, noise } = balancedBandwidth(sources, {
      ...limits,
      loopOf,
      among: AMONG,
    });
    assertEquals(status, "found");
    let least = Infinity;
    let at = 0;
    for (let i = 0; i <= 600; i++) {
      const tried = AMONG.from * 1000 ** (i / 600);
      const { total } = integrateLockedNoise(sources, { ...limits, loop: loopOf(tried) });
      if (total.phaseError < least) [least, at] = [total.phaseError, tried];
    }
    assert(noise.total.phaseError <= least * (1 + 1e-9));
    // The grid is 1.2 % apart; the phase error there differs by far less.
    assertClose(bandwidth, at, { rtol: 0.01, atol: 0 });
    assertClose(noise.total.phaseError, least, { rtol: 1e-4, atol: 0 });
  }
});

Deno.test("balancedBandwidth: says when the best lies at an end of the range", () => {
  const oscillator = powerLawThrough({ inverseSquare: { offset: 1e6, level: -115 } });
  const of = (level: number) =>
    balancedBandwidth({ oscillator, reference: { floor: 10 ** (level / 10) } }, {
      ...LIMITS,
      loopOf: firstOrderLoop,
      among: AMONG,
    });
  assertEquals(of(-160).status, "at the upper end");
  assertClose(of(-160).bandwidth, 1e7, { rtol: 1e-4, atol: 0 });
  const low = of(-60);
  assertEquals(low.status, "at the lower end");
  // -60 dBc/Hz meets the oscillator at 1.78 kHz, below the range of bandwidths.
  assertClose(phaseNoiseLevel(oscillator, low.crossing!), -60, { rtol: 0, atol: 1e-3 });
});

Deno.test("balancedBandwidth: two that do not cross, and refused limits", () => {
  const oscillator = { inverseSquare: 1 };
  const reference = { floor: 1e-30 };
  const options = { ...LIMITS, loopOf: firstOrderLoop, among: AMONG };
  assertEquals("crossing" in balancedBandwidth({ oscillator, reference }, options), false);
  assertThrows(
    () =>
      balancedBandwidth({ oscillator, reference }, { ...options, among: { from: 1e6, to: 1e5 } }),
    RangeError,
    /from 1000000 Hz to 100000 Hz/,
  );
  assertThrows(
    () => balancedBandwidth({ oscillator, reference }, { ...options, to: Infinity }),
    RangeError,
    /finite/,
  );
});
