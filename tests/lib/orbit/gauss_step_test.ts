import { assert, assertClose } from "../../assert.ts";
import { ChargeCoordinates } from "../../../lib/orbit/charge_coordinates.ts";
import { GaussStepper } from "../../../lib/orbit/gauss_step.ts";
import { gaussMethod } from "../../../lib/numeric/gauss.ts";
import { odeSystem } from "../../../lib/orbit/ode_system.ts";
import { integrate } from "../../reference/integrate.ts";
import { vanDerPol } from "./_systems.ts";

/** Walks a number of equal steps and returns the end. */
function walk(
  { system, flow: _ }: ReturnType<typeof vanDerPol>,
  start: Float64Array,
  { stages, steps, duration }: { stages: number; steps: number; duration: number },
): Float64Array {
  const coordinates = new ChargeCoordinates(system, start);
  const stepper = new GaussStepper(coordinates, gaussMethod(stages));
  const y = start.slice();
  const h = duration / steps;
  for (let k = 0; k < steps; k++) {
    for (let i = 0; i < stages; i++) stepper.stages.set(y, i * y.length);
    assert(stepper.solve(y, { h, tolerance: 1e-13 }));
    stepper.advance(y, { h, end: y });
  }
  return y;
}

Deno.test("GaussStepper: the error of a motion falls at twice the number of stages", () => {
  const example = vanDerPol(1);
  const start = Float64Array.of(2, 0);
  const exact = integrate(example.flow, start, { duration: 4, tolerance: 1e-14 });
  for (const [stages, counts] of [[2, [48, 96]], [3, [32, 64]], [4, [24, 32]]] as const) {
    const errors = counts.map((steps) => {
      const end = walk(example, start, { stages, steps, duration: 4 });
      return Math.hypot(end[0]! - exact[0]!, end[1]! - exact[1]!);
    });
    const order = Math.log(errors[0]! / errors[1]!) / Math.log(counts[1]! / counts[0]!);
    assert(Math.abs(order - 2 * stages) < 0.2, `${stages} stages: order ${order}, ${errors}`);
  }
});

Deno.test("GaussStepper: a lossless linear tank keeps its energy for any step length", () => {
  // Gauss methods keep quadratic invariants: Hairer, Lubich, Wanner (2006), IV.2.
  const system = odeSystem({
    dimension: 2,
    flow: ([v, i], into) => into.set([-i!, v!]),
    jacobian: (_x, J) => J.set([0, -1, 1, 0]),
  });
  const example = { system, flow: () => {}, start: new Float64Array(2) };
  for (const stages of [1, 2, 3, 4]) {
    const end = walk(example, Float64Array.of(1, 0), { stages, steps: 400, duration: 900 });
    // Rounding of 400 steps.
    assertClose(Math.hypot(end[0]!, end[1]!), 1, { rtol: 1e-12, atol: 0 });
  }
});

Deno.test("GaussStepper.pullBack() is the transposed derivative of the step", () => {
  const { system } = vanDerPol(2);
  const start = Float64Array.of(1.2, -0.7);
  const coordinates = new ChargeCoordinates(system, start);
  const { rowScale, unknownScale } = coordinates;
  assertClose([...rowScale, ...unknownScale], [1, 1, 1, 1], { rtol: 1e-15, atol: 0 });
  const stepper = new GaussStepper(coordinates, gaussMethod(3));
  const h = 0.4;
  const step = (from: Float64Array) => {
    const y = from.slice();
    for (let i = 0; i < 3; i++) stepper.stages.set(from, 2 * i);
    assert(stepper.solve(y, { h, tolerance: 1e-12 }));
    stepper.advance(y, { h, end: y });
    return y;
  };
  const w = Float64Array.of(0.8, -1.3);
  const exact = [0, 1].map((j) => {
    const difference = (d: number) => {
      const [above, below] = [d, -d].map((s) => step(start.map((x, k) => x + (k === j ? s : 0))));
      return w.reduce((sum, v, i) => sum + v * (above![i]! - below![i]!), 0) / (2 * d);
    };
    return (4 * difference(1e-3) - difference(2e-3)) / 3;
  });
  step(start);
  const back = w.slice();
  assert(stepper.pullBack(back, { h }));
  // Differences to the fourth order of 1e-3, and 1e-15 of rounding over it.
  assertClose(back, exact, { rtol: 1e-10, atol: 1e-11 });
});

Deno.test("GaussStepper.solve() says when the equations have no solution near by", () => {
  const system = odeSystem({
    dimension: 2,
    flow: ([x], into) => into.set([Math.sqrt(-1 - x! * x!), 0]),
    jacobian: (_x, J) => J.set([0, 0, 0, 0]),
  });
  const start = Float64Array.of(0, 0);
  const stepper = new GaussStepper(new ChargeCoordinates(system, start), gaussMethod(2));
  assert(!stepper.solve(start.slice(), { h: 0.1, tolerance: 1e-10 }));
});
