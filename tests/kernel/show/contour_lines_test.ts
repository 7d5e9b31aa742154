import { contourLines, type SampledGrid } from "../../../kernel/show/_contour_lines.ts";
import { assert, assertClose, assertEquals } from "../../assert.ts";

function sample(f: (x: number, y: number) => number, count = 21): SampledGrid {
  const axis = Array.from({ length: count }, (_, k) => -1 + 2 * k / (count - 1));
  return { x: axis, y: axis, z: axis.map((y) => axis.map((x) => f(x, y))) };
}

Deno.test("contourLines: a linear function has one straight line, exactly where it belongs", () => {
  const lines = contourLines(sample((x, y) => 2 * x + y), 0.3);
  assertEquals(lines.length, 1);
  for (const [x, y] of lines[0]!) assertClose(2 * x + y, 0.3, { rtol: 0, atol: 1e-12 });
  assert(lines[0]!.length > 20);
});

Deno.test("contourLines: a circle closes and lies within the grid's error of its radius", () => {
  const [line, ...others] = contourLines(sample((x, y) => x * x + y * y, 61), 0.49);
  assertEquals(others.length, 0);
  assertEquals(line![0], line![line!.length - 1]);
  for (const [x, y] of line!) assertClose(Math.hypot(x, y), 0.7, { rtol: 0, atol: 1e-3 });
});

Deno.test("contourLines: stops beside a gap and is whole without it", () => {
  const slope = (x: number, y: number) => x > 0.35 && Math.abs(y) < 0.3 ? NaN : y + 0.01;
  const gap = contourLines(sample(slope), 0);
  const whole = contourLines(sample((_, y) => y + 0.01), 0);
  assertEquals([gap.length, whole.length], [1, 1]);
  const right = (line: readonly (readonly [number, number])[]) => Math.max(...line.map(([x]) => x));
  assertClose(right(whole[0]!), 1, { rtol: 0, atol: 1e-12 });
  // The cells that end at 0.3 are the last with all four corners.
  assertClose(right(gap[0]!), 0.3, { rtol: 0, atol: 1e-12 });
});

Deno.test("contourLines: a saddle keeps its two branches apart on either side of its level", () => {
  const grid = sample((x, y) => x * y, 2);
  // One cell whose mean is zero: above it the high corners are cut off, below it the low ones.
  for (const level of [0.2, -0.2]) {
    const lines = contourLines(grid, level);
    assertEquals(lines.length, 2);
    for (const line of lines) {
      assertEquals(line.length, 2);
      const [[ax, ay], [bx, by]] = [line[0]!, line[1]!];
      const [mx, my] = [(ax + bx) / 2, (ay + by) / 2];
      assert(Math.sign(mx * my) === Math.sign(level), `${mx}, ${my} at ${level}`);
    }
  }
});

Deno.test("contourLines: a level that is nowhere reached has no line", () => {
  assertEquals(contourLines(sample((x) => x), 5), []);
});
