import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import {
  allowedSupplyNoise,
  densityAt,
  type DensityPoint,
  SIDEBAND_CONVENTION,
  supplyPhaseNoise,
} from "../../../lib/noise/supply_noise.ts";

const REGULATOR: readonly DensityPoint[] = [
  { frequency: 1e3, density: 400e-9 },
  { frequency: 1e5, density: 40e-9 },
  { frequency: 1e7, density: 40e-9 },
];

Deno.test("supplyPhaseNoise: half the density of phase (K v / f)^2, and the convention with it", () => {
  const { level, density, frequencyDensity, convention } = supplyPhaseNoise(
    { gain: 30e6, density: 10e-9 },
    1e6,
  );
  assertClose(10 ** (level / 10), (30e6 * 10e-9 / 1e6) ** 2 / 2, { rtol: 1e-12, atol: 0 });
  assertEquals(density, 10e-9);
  assertClose(frequencyDensity, 0.3, { rtol: 1e-14, atol: 0 });
  assertEquals(convention, SIDEBAND_CONVENTION);
});

Deno.test("supplyPhaseNoise: the sign of the gain does not matter, no gain makes no noise", () => {
  const at = (gain: number) => supplyPhaseNoise({ gain, density: REGULATOR }, 1e4).level;
  assertEquals(at(-30e6), at(30e6));
  assertEquals(at(0), -Infinity);
});

Deno.test("supplyPhaseNoise: a regulator's table gives 30 dB per decade where it falls with sqrt(f)", () => {
  const at = (offset: number) => supplyPhaseNoise({ gain: 1e6, density: REGULATOR }, offset).level;
  assertClose(at(1e3) - at(1e4), 30, { rtol: 0, atol: 1e-9 });
  assertClose(at(1e6) - at(1e7), 20, { rtol: 0, atol: 1e-9 });
});

Deno.test("densityAt: straight in log density over log f between the points of the table", () => {
  assertClose(densityAt(REGULATOR, 1e4), 400e-9 / Math.sqrt(10), { rtol: 1e-12, atol: 0 });
  assertEquals([1e3, 1e5, 1e7].map((f) => densityAt(REGULATOR, f)), [400e-9, 40e-9, 40e-9]);
  assertEquals(densityAt(5e-9, 123), 5e-9);
});

Deno.test("densityAt: outside the table, and faulty tables, are refused", () => {
  const at = (table: readonly DensityPoint[]) => () => densityAt(table, 2e3);
  assertThrows(at([]), TypeError, /at least 1 point/);
  assertThrows(at([...REGULATOR].reverse()), RangeError, /point 2 has 100000 Hz after 10000000 Hz/);
  assertThrows(
    at([{ frequency: 1e3, density: -1e-9 }]),
    RangeError,
    /density of point 1 must be > 0/,
  );
  assertThrows(at(REGULATOR.slice(1)), RangeError, /at 2000 Hz: the table runs from 100000 Hz/);
  assertThrows(() => densityAt(-1e-9, 1e3), RangeError, /density must be >= 0 V\/sqrt\(Hz\)/);
});

Deno.test("allowedSupplyNoise: undoes supplyPhaseNoise", () => {
  const density = allowedSupplyNoise(-125, { gain: -60e6, offset: 1e6 });
  assertClose(supplyPhaseNoise({ gain: -60e6, density }, 1e6).level, -125, {
    rtol: 0,
    atol: 1e-11,
  });
  assertThrows(() => allowedSupplyNoise(-125, { gain: 0, offset: 1e6 }), RangeError, /gain/);
});

Deno.test("supplyPhaseNoise: bad values are refused", () => {
  assertThrows(() => supplyPhaseNoise({ gain: NaN, density: 1e-9 }, 1e6), RangeError, /gain/);
  assertThrows(
    () => supplyPhaseNoise({ gain: 1e6, density: 1e-9 }, 0),
    RangeError,
    /offset must be > 0 Hz/,
  );
});
