import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { ChargeCoordinates } from "../../../lib/orbit/charge_coordinates.ts";
import { assemble } from "../../../lib/circuit/circuit.ts";
import type { CircuitElement } from "../../../lib/circuit/element.ts";
import type { OscillatorSystem } from "../../../lib/orbit/system.ts";
import { tankElements } from "../circuit/_examples.ts";
import { vanDerPol } from "./_systems.ts";

const resistor = (name: string, nodes: readonly [string, string], resistance: number) =>
  ({ kind: "resistor", name, nodes, resistance, temperature: 300 }) satisfies CircuitElement;

/** A tank with a node b without charge and a capacitor floating between c and d. */
function mixed() {
  return assemble([
    ...tankElements(),
    resistor("upper", ["a", "b"], 3e3),
    resistor("lower", ["b", "ground"], 1e3),
    resistor("before", ["a", "c"], 150),
    { kind: "capacitor", name: "series", nodes: ["c", "d"], capacitance: 1e-12 },
    resistor("after", ["d", "ground"], 90),
  ]);
}

Deno.test("ChargeCoordinates tells rows with charge from rows without, and finds what cancels", () => {
  const { system, indexOf } = mixed();
  const coordinates = new ChargeCoordinates(system, new Float64Array(system.dimension));
  assertEquals(coordinates.n, 5);
  assertEquals(coordinates.r, 3);
  assertEquals(Array.from(coordinates.rows).toSorted(), [0, 1, 2, 3, 4]);
  const algebraic = Array.from(coordinates.rows.slice(3));
  assert(algebraic.includes(indexOf("b")!));
  const other = algebraic.find((row) => row !== indexOf("b"))!;
  assert(other === indexOf("c") || other === indexOf("d"));
  // The charges of c and d are opposite: the mix is -1 on the other of the two, and 0 elsewhere.
  const [k, partner] = [
    algebraic.indexOf(other),
    other === indexOf("c") ? indexOf("d")! : indexOf("c")!,
  ];
  for (let i = 0; i < 3; i++) {
    assertEquals(coordinates.mix[k * 3 + i], coordinates.rows[i] === partner ? -1 : 0);
    assertEquals(coordinates.mix[(1 - k) * 3 + i], 0);
  }
  // An ordinary differential equation has no algebraic rows.
  const plain = new ChargeCoordinates(vanDerPol(1).system, Float64Array.of(2, 0));
  assertEquals(Array.from(plain.rows), [0, 1]);
  assertEquals(plain.mix.length, 0);
});

Deno.test("ChargeCoordinates.stateOf() inverts the charges and solves the algebraic rows", () => {
  const { system, voltage, potential } = mixed();
  const coordinates = new ChargeCoordinates(system, new Float64Array(5));
  const { n, r, unknownScale } = coordinates;
  const [q, f] = [new Float64Array(r), new Float64Array(n)];
  const [C, G] = [new Float64Array(r * n), new Float64Array(n * n)];
  const charges = Float64Array.of(0.3, -0.2, 0.4);
  const x = new Float64Array(n);
  assert(coordinates.stateOf(charges, 0, x, 0));
  coordinates.evaluate(x, 0, q, 0, f, 0, C, 0, G, 0);
  assertClose(q, charges, { rtol: 0, atol: 1e-13 });
  assertClose(f.slice(r), [0, 0], { rtol: 0, atol: 1e-12 });
  const state = x.map((value, j) => value * unknownScale[j]!);
  assertClose(potential("b", state), potential("a", state) / 4, { rtol: 1e-12, atol: 0 });
  assertClose(
    potential("d", state),
    90 * (potential("a", state) - voltage("c", "d", state)) / 240,
    { rtol: 1e-11, atol: 0 },
  );
});

Deno.test("ChargeCoordinates.reducedFlow() is the flow of the charges and its derivative", () => {
  const { system } = mixed();
  const coordinates = new ChargeCoordinates(system, new Float64Array(5));
  const { n, r } = coordinates;
  const at = (charges: Float64Array) => {
    const x = new Float64Array(n);
    assert(coordinates.stateOf(charges, 0, x, 0));
    return { x, ...coordinates.reducedFlow(x) };
  };
  const charges = Float64Array.of(0.3, -0.2, 0.4);
  const { jacobian, response } = at(charges);
  for (let j = 0; j < r; j++) {
    const h = 1e-4;
    const [above, below] = [h, -h].map((step) =>
      at(charges.map((q, i) => q + (i === j ? step : 0)))
    );
    const size = Math.max(...jacobian.map(Math.abs));
    for (let i = 0; i < r; i++) {
      const slope = (above!.flow[i]! - below!.flow[i]!) / (2 * h);
      // Central differences: h^2 of the third derivative of a tanh.
      assertClose(jacobian[i * r + j]!, slope, { rtol: 0, atol: 1e-7 * size });
    }
    for (let k = 0; k < n; k++) {
      const slope = (above!.x[k]! - below!.x[k]!) / (2 * h);
      assertClose(response[k * r + j]!, slope, { rtol: 1e-7, atol: 1e-9 });
    }
  }
});

Deno.test("ChargeCoordinates of a neighbour takes over rows and scales", () => {
  const { system } = mixed();
  const first = new ChargeCoordinates(system, new Float64Array(5));
  const second = new ChargeCoordinates(mixed().system, first);
  assertEquals(second.rows, first.rows);
  assertEquals(second.rowScale, first.rowScale);
  assertEquals(second.mix, first.mix);
});

Deno.test("ChargeCoordinates refuses a system of higher index where it is looked at", () => {
  // Without its resistors, node b is determined by nothing.
  const system: OscillatorSystem = {
    dimension: 3,
    unknowns: ["potential of a", "current of coil", "potential of b"],
    evaluate(x, { q, f, C, G }) {
      q.set([x[0]!, x[1]!, 0]);
      f.set([x[1]!, -x[0]!, 0]);
      C.set([1, 0, 0, 0, 1, 0, 0, 0, 0]);
      G.set([0, 1, 0, -1, 0, 0, 0, 0, 0]);
    },
  };
  const coordinates = new ChargeCoordinates(system, new Float64Array(3));
  assertThrows(
    () => coordinates.reducedFlow(new Float64Array(3)),
    RangeError,
    /^Cannot describe an oscillator: neither charge nor current determines potential of b$/,
  );
});
