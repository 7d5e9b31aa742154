import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { assemble } from "../../../lib/circuit/circuit.ts";
import type { CircuitElement } from "../../../lib/circuit/element.ts";
import { findEquilibrium } from "../../../lib/orbit/equilibrium.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { orbitOf, tanhOscillator, unitSource } from "../orbit/_systems.ts";
import { TANK, tankElements } from "./_examples.ts";

function valuesAt(system: ReturnType<typeof assemble>["system"], x: Float64Array) {
  const n = system.dimension;
  const values = {
    q: new Float64Array(n).fill(NaN),
    f: new Float64Array(n).fill(NaN),
    C: new Float64Array(n * n).fill(NaN),
    G: new Float64Array(n * n).fill(NaN),
  };
  system.evaluate(x, values);
  return values;
}

Deno.test("assemble(): Kirchhoff's laws of a small circuit written by hand", () => {
  const circuit = assemble([
    { kind: "potential", name: "supply", node: "top", potential: 1.5 },
    { kind: "resistor", name: "R", nodes: ["top", "a"], resistance: 500, temperature: 0 },
    { kind: "capacitor", name: "C1", nodes: ["a", "top"], capacitance: 2e-12 },
    { kind: "capacitor", name: "C2", nodes: ["a", "b"], capacitance: 1e-12 },
    { kind: "current", name: "bias", nodes: ["a", "b"], current: 1e-3 },
    {
      kind: "inductor",
      name: "pair",
      windings: [
        { nodes: ["a", "ground"], inductance: 4e-9, seriesResistance: 2 },
        { nodes: ["b", "ground"], inductance: 1e-9, seriesResistance: 3 },
      ],
      coupling: -0.5,
      temperature: 0,
    },
  ]);
  const names = [
    "potential of a",
    "potential of b",
    "current of pair 1",
    "current of pair 2",
  ];
  const { unknowns } = circuit.system;
  assertEquals(unknowns!.toSorted(), names.toSorted());
  // Where each unknown, and the row of the same number, stands.
  const order = names.map((name) => unknowns!.indexOf(name));
  const [a, b, i, j] = [0.7, -0.2, 3e-3, -5e-3];
  const x = new Float64Array(4);
  [a, b, i, j].forEach((value, k) => x[order[k]!] = value);
  const { q, f, C, G } = valuesAt(circuit.system, x);
  const vector = (from: Float64Array) => order.map((k) => from[k]!);
  const matrix = (from: Float64Array) => order.flatMap((k) => order.map((m) => from[4 * k + m]!));
  const mutual = -0.5 * Math.sqrt(4e-9 * 1e-9);
  const bound = { rtol: 1e-13, atol: 1e-27 };
  assertClose(vector(q), [
    2e-12 * (a - 1.5) + 1e-12 * (a - b),
    1e-12 * (b - a),
    4e-9 * i + mutual * j,
    mutual * i + 1e-9 * j,
  ], bound);
  assertClose(vector(f), [(a - 1.5) / 500 + 1e-3 + i, -1e-3 + j, 2 * i - a, 3 * j - b], {
    rtol: 1e-13,
    atol: 1e-18,
  });
  assertClose(
    matrix(C),
    [3e-12, -1e-12, 0, 0, -1e-12, 1e-12, 0, 0, 0, 0, 4e-9, mutual, 0, 0, mutual, 1e-9],
    bound,
  );
  assertClose(matrix(G), [2e-3, 0, 1, 0, 0, 0, 0, 1, -1, 0, 2, 0, 0, -1, 0, 3], {
    rtol: 1e-13,
    atol: 1e-20,
  });
  // No temperature, no noise.
  assertEquals(circuit.sources.length, 0);
});

Deno.test("assemble(): readings of nodes, windings and devices", () => {
  const circuit = assemble([
    ...tankElements(),
    { kind: "potential", name: "control", node: "control", potential: 0.4 },
    { kind: "resistor", name: "feed", nodes: ["control", "a"], resistance: 1e4, temperature: 300 },
  ]);
  const x = circuit.stateAt({ a: 0.3, control: 7, ground: 7 });
  const winding = circuit.system.unknowns!.indexOf("current of coil");
  x[winding] = 2e-3;
  // Held nodes keep their potential whatever a state says.
  assertEquals(circuit.potential("a", x), 0.3);
  assertEquals(circuit.potential("control", x), 0.4);
  assertEquals(circuit.potential("ground", x), 0);
  assertClose(circuit.voltage("control", "a", x), 0.1, { rtol: 1e-14, atol: 0 });
  assertEquals(circuit.indexOf("a"), circuit.system.unknowns!.indexOf("potential of a"));
  assertEquals(circuit.indexOf("control"), undefined);
  assertEquals(circuit.windingCurrent("coil", 0, x), 2e-3);
  assertClose(circuit.deviceCurrents("driver", x)[0]!, -0.015 * Math.tanh(0.3), {
    rtol: 1e-14,
    atol: 0,
  });
  assertThrows(
    () => circuit.potential("c", x),
    RangeError,
    /^Cannot read a potential: the node must be one of ground, control, a, got "c"$/,
  );
  assertThrows(() => circuit.windingCurrent("C", 0, x), RangeError, /there is no inductor "C"$/);
  assertThrows(() => circuit.deviceCurrents("R", x), RangeError, /there is no device "R"$/);
});

Deno.test("assemble(): a tank in SI units is the normalised tank, scaled", () => {
  const circuit = assemble(tankElements());
  const orbit = orbitOf(circuit.system, { start: circuit.stateAt({ a: 1 }), tolerance: 1e-12 });
  const angular = 1 / Math.sqrt(TANK.inductance * TANK.capacitance);
  const quality = TANK.resistance * Math.sqrt(TANK.capacitance / TANK.inductance);
  const { system, start } = tanhOscillator({ quality, gain: 3 });
  const plain = orbitOf(system, { start, tolerance: 1e-12 });
  assertClose(orbit.period * angular, plain.period, { rtol: 1e-11, atol: 0 });
  // Diffusion of the tank's noise: time in 1/w, charge in C times a volt, per 4kT/R one-sided.
  const { sources } = phaseDiffusion(orbit, circuit.sources);
  const { total } = phaseDiffusion(plain, [unitSource(0)]);
  const density = 4 * 1.380649e-23 * 300 / TANK.resistance;
  const scaled = total * density / 2 / TANK.capacitance ** 2 / angular ** 2;
  assertClose(sources[0]!.diffusion, scaled, { rtol: 1e-9, atol: 0 });
});

Deno.test("assemble(): the order of elements and the names of nodes do not matter", () => {
  const elements: CircuitElement[] = [
    ...tankElements(),
    { kind: "resistor", name: "up", nodes: ["a", "m"], resistance: 700, temperature: 300 },
    { kind: "capacitor", name: "mid", nodes: ["m", "ground"], capacitance: 0.7e-12 },
    { kind: "resistor", name: "down", nodes: ["m", "ground"], resistance: 900, temperature: 300 },
  ];
  const renamed: CircuitElement[] = elements.toReversed().map((element) =>
    element.kind === "inductor"
      ? {
        ...element,
        windings: element.windings.map((winding) => ({ ...winding, nodes: swap(winding.nodes) })),
      }
      : element.kind === "potential"
      ? element
      : { ...element, nodes: element.nodes.map(rename) } as CircuitElement
  );
  const results = [elements, renamed].map((list, k) => {
    const circuit = assemble(list);
    const orbit = orbitOf(circuit.system, {
      start: circuit.stateAt(k === 0 ? { a: 1 } : { z: 1 }),
      tolerance: 1e-12,
    });
    return { period: orbit.period, total: phaseDiffusion(orbit, circuit.sources).total };
  });
  assertClose(results[1]!.period, results[0]!.period, { rtol: 2e-12, atol: 0 });
  assertClose(results[1]!.total, results[0]!.total, { rtol: 1e-10, atol: 0 });
  function rename(node: string): string {
    return node === "a" ? "z" : node;
  }
  function swap(nodes: readonly [string, string]): readonly [string, string] {
    return [rename(nodes[1]), rename(nodes[0])];
  }
});

Deno.test("assemble(): the energy a resistor and a series resistance take is what the driver gives", () => {
  const elements = tankElements().map((element): CircuitElement =>
    element.kind === "inductor"
      ? { ...element, windings: element.windings.map((w) => ({ ...w, seriesResistance: 0.8 })) }
      : element
  );
  const circuit = assemble(elements);
  const orbit = orbitOf(circuit.system, { start: circuit.stateAt({ a: 1 }), tolerance: 1e-12 });
  const lost = orbit.mean((x) =>
    circuit.potential("a", x) ** 2 / TANK.resistance +
    0.8 * circuit.windingCurrent("coil", 0, x) ** 2
  );
  const given = -orbit.mean((x) =>
    circuit.potential("a", x) * circuit.deviceCurrents("driver", x)[0]!
  );
  assert(lost > 1e-4);
  assertClose(given, lost, { rtol: 1e-10, atol: 0 });
});

Deno.test("assemble(): a loop gain of 3 shows as poles of a tank with R/(-2) across it", () => {
  const circuit = assemble(tankElements());
  const found = findEquilibrium(circuit.system);
  assert(found.status === "found");
  const rate = 2 / TANK.resistance / (2 * TANK.capacitance);
  const square = 1 / (TANK.inductance * TANK.capacitance);
  assertClose(found.poles[0]!.re, rate, { rtol: 1e-11, atol: 0 });
  assertClose(found.poles[0]!.im, Math.sqrt(square - rate ** 2), { rtol: 1e-11, atol: 0 });
});
