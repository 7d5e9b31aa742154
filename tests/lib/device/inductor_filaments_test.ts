import { assert, assertClose, assertThrows } from "../../assert.ts";
import { coilHalves } from "../../../lib/device/inductor_filaments.ts";
import { SPIRAL_SHAPES, type SpiralGeometry } from "../../../lib/device/inductor_geometry.ts";

const geometry: SpiralGeometry = {
  shape: "octagonal",
  turns: 2,
  width: 10e-6,
  spacing: 3e-6,
  outerDiameter: 200e-6,
};

Deno.test("coilHalves gives the ring of Maxwell for one thin circular turn", () => {
  // L = mu0 R (ln(8R/a) - 2 + 0) for a filament at distance a from itself; a tape of width w has
  // a = 0.22313 w (Grover, Inductance Calculations, 1946; from memory).
  const [radius, width] = [500e-6, 4e-6];
  const { differential } = coilHalves({
    ...geometry,
    shape: "circular",
    turns: 1,
    width,
    outerDiameter: 2 * radius + width,
  });
  const expected = 4 * Math.PI * 1e-7 * radius * (Math.log(8 * radius / (0.22313 * width)) - 2);
  // A polygon of 32 sides around the circle is 0.3 % longer.
  assertClose(differential, expected, { rtol: 0.006, atol: 0 });
});

Deno.test("coilHalves couples more with every turn, from next to nothing, in every shape", () => {
  for (const shape of SPIRAL_SHAPES) {
    const couplings = [1, 2, 4, 6].map((turns) =>
      coilHalves({ ...geometry, shape, turns }).coupling
    );
    // In one turn the halves repel across the opening what they share where they meet.
    assert(Math.abs(couplings[0]!) < 0.1, `${shape}: ${couplings}`);
    couplings.slice(1).forEach((coupling, k) =>
      assert(coupling > couplings[k]! && coupling < 1, `${shape}: ${couplings}`)
    );
  }
});

Deno.test("coilHalves has the inductances of its two modes in proportion", () => {
  const { half, mutual, coupling, differential, common } = coilHalves(geometry, {
    thickness: 3e-6,
  });
  const rounding = { rtol: 1e-14, atol: 0 };
  assertClose(differential, 2 * half * (1 + coupling), rounding);
  assertClose(common, half * (1 - coupling) / 2, rounding);
  assertClose(mutual, coupling * half, rounding);
});

Deno.test("coilHalves grows with the drawing and falls with the thickness of the trace", () => {
  const thin = coilHalves(geometry).half;
  const large = coilHalves({
    ...geometry,
    width: 30e-6,
    spacing: 9e-6,
    outerDiameter: 600e-6,
  });
  assertClose(large.half, 3 * thin, { rtol: 1e-12, atol: 0 });
  assert(coilHalves(geometry, { thickness: 4e-6 }).half < thin);
});

Deno.test("coilHalves refuses half a turn and a negative thickness", () => {
  assertThrows(
    () => coilHalves({ ...geometry, turns: 2.5 }),
    RangeError,
    /turns of a symmetric coil must be a whole number, got 2\.5$/,
  );
  assertThrows(
    () => coilHalves(geometry, { thickness: -1e-6 }),
    RangeError,
    /thickness must be >= 0 m, got -0\.000001 m$/,
  );
});
