/**
 * Systems with rows that hold no charge of their own, against the same systems with these rows eliminated
 * by hand.
 */
import { assert, assertClose, assertEquals } from "../../assert.ts";
import { assemble, type Circuit } from "../../../lib/circuit/circuit.ts";
import type { CircuitElement } from "../../../lib/circuit/element.ts";
import { findEquilibrium } from "../../../lib/orbit/equilibrium.ts";
import { inputSensitivity } from "../../../lib/orbit/input_sensitivity.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { phaseSensitivity } from "../../../lib/orbit/phase_sensitivity.ts";
import type { NoiseSource, OscillatorSystem } from "../../../lib/orbit/system.ts";
import { saturatingCapacitor, TANK, tankElements } from "../circuit/_examples.ts";
import { orbitOf } from "./_systems.ts";

const [UPPER, LOWER] = [3e3, 1e3];
const [BEFORE, AFTER] = [150, 90];
const SERIES = 0.8e-12;

/**
 * The tank with two branches at node a: a divider UPPER to b and LOWER to ground, b without any charge;
 * and BEFORE to c, a capacitor from c to d, AFTER to ground: c and d share one charge.
 */
function fullCircuit(): Circuit {
  const temperature = 300;
  const resistor = (name: string, nodes: readonly [string, string], resistance: number) =>
    ({ kind: "resistor", name, nodes, resistance, temperature }) satisfies CircuitElement;
  return assemble([
    ...tankElements(),
    resistor("upper", ["a", "b"], UPPER),
    resistor("lower", ["b", "ground"], LOWER),
    resistor("before", ["a", "c"], BEFORE),
    { kind: "capacitor", name: "series", nodes: ["c", "d"], capacitance: SERIES },
    resistor("after", ["d", "ground"], AFTER),
  ]);
}

/** The same with b, c and d eliminated: unknowns a, voltage of the series capacitor, coil current. */
function reducedSystem(): OscillatorSystem {
  const divider = 1 / (UPPER + LOWER);
  const branch = 1 / (BEFORE + AFTER);
  const full = fullCircuit();
  const coil = full.system.unknowns!.indexOf("current of coil");
  return {
    dimension: 3,
    scale: Float64Array.of(1, 1, full.system.scale![coil]!),
    evaluate([a, u, i], { q, f, C, G }) {
      const current = 3 / TANK.resistance * Math.tanh(a!);
      const slope = 3 / TANK.resistance / Math.cosh(a!) ** 2;
      const loss = 1 / TANK.resistance + divider + branch;
      q.set([TANK.capacitance * a!, SERIES * u!, TANK.inductance * i!]);
      f.set([loss * a! - branch * u! + i! - current, branch * (u! - a!), -a!]);
      C.set([TANK.capacitance, 0, 0, 0, SERIES, 0, 0, 0, TANK.inductance]);
      G.set([loss - slope, -branch, 1, -branch, branch, 0, -1, 0, 0]);
    },
  };
}

function source(label: string, vector: readonly number[]): NoiseSource {
  return { label, device: label, color: "white", inject: (_x, into) => into.set(vector) };
}

const TIGHT = { tolerance: 1e-12 };

Deno.test("algebraic rows: one multiplier is 1 and there are as many as charges", () => {
  const { system, stateAt } = fullCircuit();
  assertEquals(system.dimension, 5);
  const orbit = orbitOf(system, { start: stateAt({ a: 1 }), ...TIGHT });
  assertEquals(orbit.multipliers.length, 3);
  const [first, ...others] = orbit.multipliers;
  assertClose([first!.re, first!.im], [1, 0], { rtol: 0, atol: 1e-10 });
  for (const { re, im } of others) assert(Math.hypot(re, im) < 0.99);
});

Deno.test("algebraic rows: poles, orbit and sensitivity are those of the system without them", () => {
  const full = fullCircuit();
  const reduced = reducedSystem();
  const start = full.stateAt({ a: 1 });
  const [here, there] = [findEquilibrium(full.system), findEquilibrium(reduced)];
  assert(here.status === "found" && there.status === "found");
  here.poles.forEach(({ re, im }, k) => {
    const size = Math.hypot(re, im);
    assertClose([re, im], [there.poles[k]!.re, there.poles[k]!.im], {
      rtol: 0,
      atol: 1e-11 * size,
    });
  });
  const orbit = orbitOf(full.system, { start, ...TIGHT });
  const node = (name: string) => full.indexOf(name)!;
  const at = (x: Float64Array) =>
    Float64Array.of(
      x[node("a")]!,
      x[node("c")]! - x[node("d")]!,
      full.windingCurrent("coil", 0, x),
    );
  const other = orbitOf(reduced, { start: at(orbit.at(0)), ...TIGHT });
  // Both within the tolerance asked for, on meshes of their own.
  assertClose(orbit.period, other.period, { rtol: 1e-11, atol: 0 });
  orbit.exponents.forEach(({ re }, k) => {
    assertClose(re, other.exponents[k]!.re, { rtol: 1e-9, atol: 1e-10 / orbit.period });
  });
  const own = (x: Float64Array) => full.voltage("c", "d", x);
  assertClose(orbit.mean((x) => own(x) ** 2), other.mean((x) => x[1]! ** 2), {
    rtol: 1e-10,
    atol: 0,
  });
  // The rows of b, c, d obey Kirchhoff's law at mesh points and between.
  for (const part of [0, 0.123, 0.7]) {
    const x = orbit.at(part * orbit.period);
    assertClose(full.potential("b", x), full.potential("a", x) * LOWER / (UPPER + LOWER), {
      rtol: 1e-11,
      atol: 1e-12,
    });
    const current = (full.potential("a", x) - own(x)) / (BEFORE + AFTER);
    assertClose(full.potential("d", x), AFTER * current, { rtol: 1e-10, atol: 1e-12 });
  }
});

Deno.test("algebraic rows: noise into them acts as it does after elimination", () => {
  const full = fullCircuit();
  const reduced = reducedSystem();
  const orbit = orbitOf(full.system, { start: full.stateAt({ a: 1 }), ...TIGHT });
  const other = orbitOf(reduced, { start: Float64Array.of(1, 0, 0), ...TIGHT });
  const n = full.system.dimension;
  const rows = (entries: Readonly<Record<string, number>>) => {
    const vector = new Array<number>(n).fill(0);
    for (const [node, value] of Object.entries(entries)) vector[full.indexOf(node)!] = value;
    return vector;
  };
  const b = 1e-11;
  const share = LOWER / (UPPER + LOWER);
  const [x, y] = [BEFORE / (BEFORE + AFTER), AFTER / (BEFORE + AFTER)];
  // A current into b reaches a by the divider; one into c charges the capacitor by x and a by y; one into d
  // charges a by y and discharges the capacitor by y.
  const cases = [
    ["b", rows({ b }), [b * share, 0, 0]],
    ["c", rows({ c: b }), [b * y, b * x, 0]],
    ["d", rows({ d: b }), [b * y, -b * y, 0]],
    ["c to d", rows({ c: -b, d: b }), [0, -b, 0]],
    ["a and b", rows({ a: b, b: -b }), [b * (1 - share), 0, 0]],
  ] as const;
  const here = phaseDiffusion(orbit, cases.map(([name, vector]) => source(name, vector)));
  const there = phaseDiffusion(other, cases.map(([name, , vector]) => source(name, vector)));
  here.sources.forEach(({ label, diffusion, mean }, k) => {
    assertClose(diffusion, there.sources[k]!.diffusion, { rtol: 1e-10, atol: 0, what: label });
    assertClose(mean, 0, { rtol: 0, atol: 1e-9 * here.sources[k]!.rms });
  });
  // The circuit's own sources: every resistor by its amplitude, and the driver.
  const own = phaseDiffusion(orbit, full.sources);
  assertEquals(own.sources.map(({ device }) => device), [
    "R",
    "driver",
    "upper",
    "lower",
    "before",
    "after",
  ]);
  const amplitude = (resistance: number) => Math.sqrt(4 * 1.380649e-23 * 300 / resistance);
  const [upper, lower] = [amplitude(UPPER), amplitude(LOWER)];
  const [before, after] = [amplitude(BEFORE), amplitude(AFTER)];
  const by = phaseDiffusion(other, [
    source("upper", [upper * (1 - share), 0, 0]),
    source("lower", [lower * share, 0, 0]),
    source("before", [before * x, -before * x, 0]),
    source("after", [after * y, -after * y, 0]),
  ]);
  by.sources.forEach(({ label, diffusion }) => {
    const entry = own.sources.find(({ device }) => device === label)!;
    assertClose(entry.diffusion, diffusion, { rtol: 1e-10, atol: 0, what: label });
  });
});

Deno.test("algebraic rows: v1 . dq/dt is 1, the charges alone counting", () => {
  const { system, stateAt } = fullCircuit();
  const orbit = orbitOf(system, { start: stateAt({ a: 1 }) });
  const { at } = phaseSensitivity(orbit);
  const n = system.dimension;
  const values = {
    q: new Float64Array(n),
    f: new Float64Array(n),
    C: new Float64Array(n * n),
    G: new Float64Array(n * n),
  };
  let worst = 0;
  for (let k = 0; k < 61; k++) {
    const time = (k + 0.4) * orbit.period / 61;
    system.evaluate(orbit.at(time), values);
    // dq/dt = -f on every row; on the rows of b, c + d it is zero.
    const product = at(time).reduce((sum, v, i) => sum - v * values.f[i]!, 0);
    worst = Math.max(worst, Math.abs(product - 1));
  }
  assert(worst <= orbit.estimate.sensitivity, `${worst} above ${orbit.estimate.sensitivity}`);
  assert(worst < 1e-6);
});

Deno.test("algebraic rows: inputs through resistors and through capacitors move the period rightly", () => {
  const build = ({ control = 0.3, supply = 0.5, reference = 1e-3 } = {}) =>
    assemble([
      ...tankElements(),
      { kind: "potential", name: "control", node: "control", potential: control },
      { kind: "potential", name: "supply", node: "supply", potential: supply },
      saturatingCapacitor("varactor", ["a", "control"], {
        capacitance: 0.8e-12,
        floor: 0.1e-12,
        width: 0.7,
      }),
      // A linear capacitor to a supply: a steady shift of its charge and nothing more.
      { kind: "capacitor", name: "coupling", nodes: ["a", "supply"], capacitance: 0.3e-12 },
      // A divider from the supply biases a second varactor; its middle has no capacitor.
      { kind: "resistor", name: "top", nodes: ["supply", "b"], resistance: 2e3, temperature: 300 },
      { kind: "resistor", name: "bottom", nodes: ["b", "e"], resistance: 2e3, temperature: 300 },
      { kind: "resistor", name: "load", nodes: ["e", "ground"], resistance: 3e3, temperature: 300 },
      { kind: "current", name: "reference", nodes: ["ground", "b"], current: reference },
      saturatingCapacitor("second", ["a", "e"], {
        capacitance: 0.5e-12,
        floor: 0.1e-12,
        width: 0.7,
      }),
    ]);
  const nominal = build();
  const orbit = orbitOf(nominal.system, { start: nominal.stateAt({ a: 1, e: 0.5 }), ...TIGHT });
  assertEquals(orbit.multipliers.length, 3);
  const found = inputSensitivity(orbit);
  assertEquals(found.map(({ name }) => name), ["control", "supply", "reference"]);
  const difference = (change: (h: number) => Parameters<typeof build>[0], h: number) => {
    const period = (step: number) =>
      orbitOf(build(change(step)).system, { start: orbit, ...TIGHT }).period;
    const central = (step: number) => (period(step) - period(-step)) / (2 * step);
    return (4 * central(h / 2) - central(h)) / 3;
  };
  const exact = [
    difference((h) => ({ control: 0.3 + h }), 4e-3),
    difference((h) => ({ supply: 0.5 + h }), 4e-3),
    difference((h) => ({ reference: 1e-3 + h }), 4e-6),
  ];
  // Periods to 1e-12 over steps of 1e-3 of what moves them by parts in ten.
  assertClose(found.map(({ period }) => period), exact, { rtol: 1e-7, atol: 0 });
});

Deno.test("algebraic rows: a supply that only shifts charge does not move the period", () => {
  const circuit = assemble([
    ...tankElements(),
    { kind: "potential", name: "supply", node: "supply", potential: 0.5 },
    { kind: "capacitor", name: "coupling", nodes: ["a", "supply"], capacitance: 0.3e-12 },
  ]);
  const orbit = orbitOf(circuit.system, { start: circuit.stateAt({ a: 1 }), ...TIGHT });
  const [supply] = inputSensitivity(orbit);
  assertClose(supply!.period / orbit.period, 0, { rtol: 0, atol: 1e-11 });
});
