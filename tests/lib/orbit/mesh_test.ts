import { assert, assertClose, assertEquals } from "../../assert.ts";
import { moveToMesh, spreadMesh } from "../../../lib/orbit/mesh.ts";
import { gaussMethod } from "../../../lib/numeric/gauss.ts";
import type { Path } from "../../../lib/orbit/period_map.ts";

const even = (steps: number) => Float64Array.from({ length: steps + 1 }, (_, k) => k / steps);
const lengths = (mesh: Float64Array) =>
  Array.from({ length: mesh.length - 1 }, (_, k) => mesh[k + 1]! - mesh[k]!);

Deno.test("spreadMesh() is even where the error is even, and ordered from 0 to 1 always", () => {
  const same = spreadMesh(even(20), new Float64Array(20).fill(1e-6), { steps: 30, order: 7 });
  assertClose(lengths(same), new Array(30).fill(1 / 30), { rtol: 1e-12, atol: 0 });
  const none = spreadMesh(even(20), new Float64Array(20), { steps: 33, order: 7 });
  assertClose(lengths(none), new Array(33).fill(1 / 33), { rtol: 1e-12, atol: 0 });
  const error = Float64Array.from({ length: 40 }, (_, k) => 10 ** (-12 + 8 * Math.cos(k)));
  const mesh = spreadMesh(even(40), error, { steps: 57, order: 7 });
  assertEquals(mesh.length, 58);
  assertEquals([mesh[0], mesh[57]], [0, 1]);
  assert(lengths(mesh).every((length) => length > 0));
});

Deno.test("spreadMesh() puts steps where the error is, and grades them", () => {
  const error = new Float64Array(50).fill(1e-14);
  for (let k = 22; k < 26; k++) error[k] = 1e-4;
  const mesh = spreadMesh(even(50), error, { steps: 80, order: 7 });
  const inside = lengths(mesh).filter((_, k) => mesh[k]! > 0.44 && mesh[k]! < 0.52);
  const far = lengths(mesh).filter((_, k) => mesh[k]! < 0.2 || mesh[k]! > 0.8);
  assert(Math.max(...inside) < 0.4 * Math.min(...far));
  const all = lengths(mesh);
  all.forEach((length, k) => {
    const next = all[(k + 1) % all.length]!;
    // Graded around the period as well, where the even mesh jumps by seven orders in one step.
    assert(next / length < 3 && length / next < 3, `steps ${k}: ${length}, ${next}`);
  });
});

Deno.test("moveToMesh() reproduces a smooth path to the order of its polynomials", () => {
  const method = gaussMethod(3);
  const wave = (time: number) => [Math.cos(2 * Math.PI * time), Math.sin(4 * Math.PI * time)];
  const pathOn = (mesh: Float64Array): Path => {
    const steps = mesh.length - 1;
    const stages = new Float64Array(steps * 6);
    for (let step = 0; step < steps; step++) {
      for (let j = 0; j < 3; j++) {
        const time = mesh[step]! + method.nodes[j]! * (mesh[step + 1]! - mesh[step]!);
        stages.set(wave(time), (step * 3 + j) * 2);
      }
    }
    return { mesh, stages, charges: Float64Array.from([...mesh].flatMap(wave)), period: 3 };
  };
  const errors = [24, 48].map((steps) => {
    const from = pathOn(even(steps));
    const mesh = even(31).map((x) => x + 0.02 * Math.sin(2 * Math.PI * x));
    const moved = moveToMesh(from, mesh, { method, n: 2, r: 2 });
    const exact = pathOn(mesh);
    assertEquals(moved.period, 3);
    assertEquals(moved.charges.slice(-2), moved.charges.slice(0, 2));
    const worst = (a: Float64Array, b: Float64Array) =>
      a.reduce((largest, value, k) => Math.max(largest, Math.abs(value - b[k]!)), 0);
    return Math.max(worst(moved.stages, exact.stages), worst(moved.charges, exact.charges));
  });
  // Five points a stage, six a charge: at least the fifth order.
  assert(errors[0]! < 1e-3 && errors[1]! < errors[0]! / 20, `errors ${errors}`);
});
