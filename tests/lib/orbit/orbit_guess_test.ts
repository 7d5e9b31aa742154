import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { extrapolateOrbits } from "../../../lib/orbit/orbit_guess.ts";
import { orbitOf, vanDerPol } from "./_systems.ts";

/** Orbits at values of mu, each from the one before on one mesh. */
function branch(values: readonly number[]) {
  const { system, start } = vanDerPol(values[0]!);
  let orbit = orbitOf(system, { start, steps: 96 });
  return values.map((mu) => (orbit = orbitOf(vanDerPol(mu).system, { start: orbit, steps: 96 })));
}

Deno.test("extrapolateOrbits() gains an order with every orbit", () => {
  const values = [0.9, 1, 1.1, 1.2];
  const orbits = branch(values);
  const exact = orbitOf(vanDerPol(1.3).system, { start: orbits[3]!, steps: 96 });
  const errors = [1, 2, 3, 4].map((count) => {
    const guess = extrapolateOrbits(orbits.slice(-count), {
      values: values.slice(-count),
      wanted: 1.3,
    });
    assertEquals(guess.neighbour, orbits[3]!);
    return Math.abs(guess.path.period / exact.period - 1);
  });
  // A step of 0.1 against a scale of the order of one: each order gains several times.
  for (let k = 1; k < 4; k++) {
    assert(errors[k]! < errors[k - 1]! / 3, `errors ${errors.join(", ")}`);
  }
});

Deno.test("extrapolateOrbits() saves passes, and the transient altogether", () => {
  const values = [1, 1.03, 1.06];
  const orbits = branch(values);
  const { system } = vanDerPol(1.09);
  const guess = extrapolateOrbits(orbits, { values, wanted: 1.09 });
  const guided = orbitOf(system, { start: guess, steps: 96 });
  const plain = orbitOf(system, { start: orbits[2]!, steps: 96 });
  // The same mesh, hence the same discrete orbit; at default tolerance.
  assertClose(guided.period, plain.period, { rtol: 1e-8, atol: 0 });
  assert(guided.work.passes < plain.work.passes, `${guided.work.passes}, ${plain.work.passes}`);
  assertEquals(guided.work.transientSteps, 0);
});

Deno.test("extrapolateOrbits() leaves out orbits on another mesh", () => {
  const [first, second] = branch([1, 1.1]);
  const other = orbitOf(vanDerPol(0.9).system, { start: first!, steps: 64 });
  const with_ = extrapolateOrbits([other, first!, second!], { values: [0.9, 1, 1.1], wanted: 1.2 });
  const without = extrapolateOrbits([first!, second!], { values: [1, 1.1], wanted: 1.2 });
  assertEquals(with_.path, without.path);
});

Deno.test("extrapolateOrbits() refuses values that do not match the orbits", () => {
  const [orbit] = branch([1]);
  assertThrows(
    () => extrapolateOrbits([orbit!], { values: [1, 2], wanted: 3 }),
    TypeError,
    /^Cannot extrapolate orbits: .* found 1 orbits and 2 values$/,
  );
  assertThrows(() => extrapolateOrbits([], { values: [], wanted: 1 }), TypeError, /found 0 orbits/);
});
