import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { simpsonOverOffsets } from "./_simpson.ts";
import {
  flickerCorner,
  floorCorner,
  type PowerLaw,
  powerLawArea,
  powerLawLevel,
  powerLawThrough,
} from "../../../lib/noise/power_law.ts";

const LAW = powerLawThrough({
  inverseCube: { offset: 1e5, level: -103 },
  inverseSquare: { offset: 1e6, level: -118 },
  inverse: { offset: 1e6, level: -150 },
  floor: { offset: 1e7, level: -160 },
});

Deno.test("powerLawThrough: each term by itself passes through its point", () => {
  const { inverseCube = 0, inverseSquare = 0, inverse = 0, floor = 0 } = LAW;
  assertClose(powerLawLevel({ inverseCube }, 1e5), -103, { rtol: 0, atol: 1e-10 });
  assertClose(powerLawLevel({ inverseSquare }, 1e6), -118, { rtol: 0, atol: 1e-10 });
  assertClose(powerLawLevel({ inverse }, 1e6), -150, { rtol: 0, atol: 1e-10 });
  assertClose(powerLawLevel({ floor }, 123), -160, { rtol: 0, atol: 1e-10 });
});

Deno.test("powerLawLevel: slopes of 30, 20, 10 and 0 dB per decade", () => {
  const slopeOf = (law: PowerLaw) => powerLawLevel(law, 1e5) - powerLawLevel(law, 1e4);
  assertClose(
    [
      { inverseCube: 1 },
      { inverseSquare: 1 },
      { inverse: 1 },
      { floor: 1 },
    ].map(slopeOf),
    [-30, -20, -10, 0],
    { rtol: 0, atol: 1e-10 },
  );
});

Deno.test("powerLawArea: closed form against dense Simpson, term by term and together", () => {
  const laws: PowerLaw[] = [LAW, { inverseCube: 2 }, { inverseSquare: 3 }, { inverse: 4 }, {
    floor: 5,
  }];
  for (const law of laws) {
    const limits = { from: 2e3, to: 3e7 };
    const expected = simpsonOverOffsets((f) => 10 ** (powerLawLevel(law, f) / 10), limits);
    assertClose(powerLawArea(law, limits), expected, { rtol: 1e-9, atol: 0 });
  }
});

Deno.test("powerLawArea: close limits keep their digits", () => {
  const area = powerLawArea({ inverseSquare: 1 }, { from: 1e6, to: 1e6 + 1 });
  assertClose(area, 1 / (1e6 * (1e6 + 1)), { rtol: 1e-14, atol: 0 });
});

Deno.test("flickerCorner, floorCorner: where two terms are equal", () => {
  const corner = flickerCorner(LAW)!;
  const { inverseCube = 0, inverseSquare = 0, floor = 0 } = LAW;
  assertClose(inverseCube / corner ** 3, inverseSquare / corner ** 2, { rtol: 1e-14, atol: 0 });
  const upper = floorCorner(LAW)!;
  assertClose(inverseSquare / upper ** 2, floor, { rtol: 1e-14, atol: 0 });
  assertEquals(flickerCorner({ inverseSquare }), undefined);
  assertEquals(floorCorner({ floor }), undefined);
});

Deno.test("power laws: no term, a negative term and bad offsets are refused", () => {
  assertThrows(() => powerLawLevel({}, 1e6), RangeError, /at least one coefficient/);
  assertThrows(() => powerLawLevel({ floor: -1e-16 }, 1e6), RangeError, /floor must be >= 0 1\/Hz/);
  assertThrows(() => powerLawLevel({ inverseCube: NaN }, 1e6), RangeError, /inverseCube/);
  assertThrows(() => powerLawLevel(LAW, 0), RangeError, /offset must be > 0 Hz/);
  assertThrows(() => powerLawArea(LAW, { from: 0, to: 1e6 }), RangeError, /limits/);
  assertThrows(
    () => powerLawThrough({ floor: { offset: -1, level: -150 } }),
    RangeError,
    /offset of floor/,
  );
});
