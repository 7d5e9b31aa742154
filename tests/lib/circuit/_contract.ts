/**
 * What every topology must keep, whatever its parts: one driver for all of them.
 */
import { Matrix, SingularValueDecomposition } from "ml-matrix";
import { assert, assertClose, assertEquals } from "../../assert.ts";
import { assemble, type Circuit } from "../../../lib/circuit/circuit.ts";
import type { CircuitElement } from "../../../lib/circuit/element.ts";
import type { BuiltOscillator, Topology } from "../../../lib/circuit/topology.ts";
import {
  type Equilibrium,
  findEquilibrium,
  type NoEquilibrium,
} from "../../../lib/orbit/equilibrium.ts";
import { inputSensitivity } from "../../../lib/orbit/input_sensitivity.ts";
import type { Orbit } from "../../../lib/orbit/orbit.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { phaseSensitivity } from "../../../lib/orbit/phase_sensitivity.ts";
import { illustrativeCard } from "../device/_card.ts";
import { derivative, seededUniform } from "../device/_biases.ts";
import { orbitOf } from "../orbit/_systems.ts";
import { currentFrom, meanPowers } from "./_power_balance.ts";
import { NOMINAL } from "./_examples.ts";

export interface ContractCase<Design> {
  readonly topology: Topology<Design>;
  readonly design: Design;
  /** Nodes that change places when the sides are swapped; none for a single-ended topology. */
  readonly sides: readonly (readonly [string, string])[];
  /**
   * Whether the equilibrium of this design is unstable; class C has a stable one and an orbit, which is
   * then reached from the topology's kick. @default true
   */
  readonly startsByItself?: boolean;
}

const RANDOM_STATES = 6;
const SEED = 20;

/** Registers the contract of one topology as tests. */
export function contract<Design>(
  { topology, design, sides, startsByItself = true }: ContractCase<Design>,
): void {
  const named = (what: string) => `${topology.name}: ${what}`;
  const built = () => topology.build(design, { card: illustrativeCard(), condition: NOMINAL });
  let tight: { oscillator: BuiltOscillator; orbit: Orbit } | undefined;
  /** The orbit at a tightened tolerance, solved once. */
  const solved = () => tight ??= solve(built());

  Deno.test(named("Jacobians are the derivatives of charges and currents"), () => {
    const { circuit: { system }, guess } = built();
    const n = system.dimension;
    const values = emptyValues(n);
    for (const x of randomStates(system.scale!, guess)) {
      for (let j = 0; j < n; j++) {
        const along = (read: "q" | "f", i: number) =>
          derivative(
            (value) => {
              const shifted = x.slice();
              shifted[j] = value;
              system.evaluate(shifted, values);
              return values[read][i]!;
            },
            x[j]!,
            0.02 * system.scale![j]!,
          );
        const slopes = (["q", "f"] as const).map((read) =>
          Float64Array.from({ length: n }, (_, i) => along(read, i))
        );
        system.evaluate(x, values);
        for (let i = 0; i < n; i++) {
          // Against the largest slope of the row, per typical size; 20 mV and 5 mV extrapolated twice.
          const row = (matrix: Float64Array) =>
            Math.max(
              ...matrix.subarray(i * n, (i + 1) * n).map((g, k) => Math.abs(g * system.scale![k]!)),
            ) / system.scale![j]!;
          const bound = (matrix: Float64Array) => ({ rtol: 0, atol: 1e-6 * row(matrix) + 1e-30 });
          const what = `by ${system.unknowns![j]} of row ${system.unknowns![i]}`;
          assertClose(values.C[i * n + j]!, slopes[0]![i]!, {
            ...bound(values.C),
            what: `dq ${what}`,
          });
          assertClose(values.G[i * n + j]!, slopes[1]![i]!, {
            ...bound(values.G),
            what: `df ${what}`,
          });
        }
      }
    }
  });

  Deno.test(named("inputs are the derivatives of charges and currents by what they set"), () => {
    const { circuit, guess } = built();
    const { system } = circuit;
    const n = system.dimension;
    const [dq, df] = [new Float64Array(n), new Float64Array(n)];
    const values = emptyValues(n);
    for (const x of randomStates(system.scale!, guess)) {
      system.inputs!.forEach(({ name }, k) => {
        system.evaluateInput!(k, x, { dq, df });
        const nominal = inputValue(circuit, name);
        const step = 0.01 * Math.max(Math.abs(nominal), 0.05 * (nominal === 0 ? 1 : 0));
        const along = (read: "q" | "f", i: number) =>
          derivative(
            (value) => {
              assemble(withInput(circuit, name, value)).system.evaluate(x, values);
              return values[read][i]!;
            },
            nominal,
            step,
          );
        const [largestCharge, largestCurrent] = [dq, df].map((v) => Math.max(...v.map(Math.abs)));
        // Charges and currents of the circuit are rounded to 1e-16 of themselves over the step.
        system.evaluate(x, values);
        const floor = (v: Float64Array) => 1e-14 * Math.max(...v.map(Math.abs)) / step;
        const [charge, current] = [floor(values.q), floor(values.f)];
        for (let i = 0; i < n; i++) {
          const what = `${name} into ${system.unknowns![i]}`;
          assertClose(dq[i]!, along("q", i), {
            rtol: 0,
            atol: 1e-7 * largestCharge! + charge,
            what,
          });
          assertClose(df[i]!, along("f", i), {
            rtol: 0,
            atol: 1e-7 * largestCurrent! + current,
            what,
          });
        }
      });
    }
  });

  Deno.test(
    named("starts as it should and has one unit multiplier, the others inside the circle"),
    () => {
      const { oscillator: { circuit }, orbit } = solved();
      const equilibrium = findEquilibrium(circuit.system, { guess: built().guess });
      assert(equilibrium.status === "found");
      assertEquals(equilibrium.poles[0]!.re > 0, startsByItself);
      if (startsByItself) assert(equilibrium.poles[0]!.im > 0);
      // As many multipliers as poles: the rank of C.
      assertEquals(orbit.multipliers.length, rankOfCharges(circuit, orbit.at(0)));
      assertEquals(orbit.multipliers.length, equilibrium.poles.length);
      const [first, ...others] = orbit.multipliers;
      assertClose([first!.re, first!.im], [1, 0], { rtol: 0, atol: 1e-8 });
      for (const { re, im } of others) assert(Math.hypot(re, im) < 1 - 1e-4);
    },
  );

  Deno.test(named("v1 . dq/dt is 1 at any time, within the estimate at default settings"), () => {
    const oscillator = built();
    const { system } = oscillator.circuit;
    const orbit = orbitOf(system, startOf(oscillator));
    const { at } = phaseSensitivity(orbit);
    const values = emptyValues(system.dimension);
    let worst = 0;
    for (let k = 0; k < 47; k++) {
      const time = (k + 0.31) * orbit.period / 47;
      system.evaluate(orbit.at(time), values);
      const product = at(time).reduce((sum, v, i) => sum - v * values.f[i]!, 0);
      worst = Math.max(worst, Math.abs(product - 1));
    }
    assert(orbit.estimate.period <= 1e-8 && orbit.estimate.sensitivity <= 1e-6);
    assert(worst <= orbit.estimate.sensitivity, `${worst} above ${orbit.estimate.sensitivity}`);
  });

  Deno.test(named("the supply delivers what the elements take, over a period"), () => {
    const { oscillator, orbit } = solved();
    const { delivered, taken } = meanPowers(oscillator, orbit);
    assertClose(delivered, taken, { rtol: 1e-9, atol: 0 });
  });

  Deno.test(named("the supply current is the sum of what leaves the supply node"), () => {
    const { circuit, guess, supplyNode, supplyCurrent } = built();
    for (const x of randomStates(circuit.system.scale!, guess)) {
      const { sum, size } = currentFrom(circuit, supplyNode, x);
      assertClose(supplyCurrent(x), sum, { rtol: 0, atol: 1e-13 * size });
    }
  });

  Deno.test(named("sources add up, are named once, and none is negative or infinite"), () => {
    const { oscillator: { circuit }, orbit } = solved();
    const { sources, total } = phaseDiffusion(orbit, circuit.sources);
    assert(sources.length > 0 && total > 0 && total < Infinity);
    const sum = sources.reduce((value, { diffusion }) => value + diffusion, 0);
    assertClose(sum, total, { rtol: 1e-12, atol: 0 });
    for (const { diffusion, mean, rms } of sources) {
      assert(diffusion >= 0 && Number.isFinite(mean) && Math.abs(mean) <= rms * (1 + 1e-12));
    }
    const names = sources.map(({ device, label }) => `${device}, ${label}`);
    assertEquals(new Set(names).size, names.length);
    const devices = new Set(circuit.elements.map(({ name }) => name));
    for (const { device } of sources) assert(devices.has(device), `no element "${device}"`);
  });

  Deno.test(named("inputs move the period as orbits solved again say"), () => {
    const { oscillator: { circuit }, orbit } = solved();
    for (const { name, period } of inputSensitivity(orbit)) {
      const nominal = inputValue(circuit, name);
      const periodAt = (value: number) =>
        orbitOf(assemble(withInput(circuit, name, value)).system, {
          start: orbit,
          tolerance: 1e-11,
        }).period;
      const central = (h: number) => (periodAt(nominal + h) - periodAt(nominal - h)) / (2 * h);
      const h = 4e-3 * Math.abs(nominal);
      const exact = (4 * central(h / 2) - central(h)) / 3;
      // Periods to 1e-11 over a change of 4e-3, and the fourth order left.
      const floor = 1e-11 * orbit.period / h;
      assertClose(period, exact, { rtol: 1e-6, atol: floor, what: name });
    }
  });

  if (sides.length > 0) {
    Deno.test(named("the two sides are alike: one is the other half a period later"), () => {
      const { oscillator: { circuit }, orbit } = solved();
      for (const [a, b] of sides) {
        for (const part of [0, 0.13, 0.37, 0.8]) {
          const here = circuit.potential(a, orbit.at(part * orbit.period));
          const there = circuit.potential(b, orbit.at((part + 0.5) * orbit.period));
          assertClose(here, there, { rtol: 0, atol: 1e-8 });
        }
      }
    });

    Deno.test(
      named("swapping the two sides of an uneven circuit leaves period and diffusion"),
      () => {
        const { circuit, guess, kick } = built();
        const uneven: CircuitElement[] = [...circuit.elements, {
          kind: "capacitor",
          name: "unevenness",
          nodes: [sides[0]![0], "ground"],
          capacitance: 30e-15,
        }];
        const results = [uneven, uneven.map((element) => swapped(element, sides))].map(
          (elements) => {
            const other = assemble(elements);
            const moved = (state: Float64Array) => stateFor(other, circuit, state);
            const from = startOf({
              ...built(),
              circuit: other,
              guess: moved(guess),
              ...(kick ? { kick: { ...kick, state: moved(kick.state) } } : {}),
            });
            const orbit = orbitOf(other.system, { ...from, tolerance: 1e-11 });
            return { period: orbit.period, total: phaseDiffusion(orbit, other.sources).total };
          },
        );
        assertClose(results[1]!.period, results[0]!.period, { rtol: 1e-10, atol: 0 });
        assertClose(results[1]!.total, results[0]!.total, { rtol: 1e-8, atol: 0 });
        assert(Math.abs(results[0]!.period / solved().orbit.period - 1) > 1e-4);
      },
    );
  }

  Deno.test(named("the schematic lies on its grid and every value has a unit"), () => {
    const { width, height, symbols, wires, joints } = topology.schematic(design);
    const inside = ([x, y]: readonly [number, number]) => {
      // Middles of symbols may lie between two grid points.
      assert(Number.isInteger(2 * x) && Number.isInteger(2 * y), `(${x}, ${y}) off the grid`);
      assert(x >= 0 && x <= width && y >= 0 && y <= height, `(${x}, ${y}) outside`);
    };
    symbols.forEach(({ at, value }) => {
      inside(at);
      if (value) assert(Number.isFinite(value.value) && value.unit.length > 0);
    });
    wires.forEach((wire) => {
      assert(wire.length >= 2);
      wire.forEach(inside);
    });
    joints.forEach(inside);
    assert(symbols.some(({ kind }) => kind === "supply"));
  });

  Deno.test(named("names in parts, watched voltages and patterns exist in the circuit"), () => {
    const { circuit, parts, watched, patterns, tank, supplyNode } = built();
    const devices = new Set(circuit.elements.map(({ name }) => name));
    for (const name of Object.values(parts).flat()) assert(devices.has(name), name);
    for (const { device, plus, minus } of watched) {
      assert(devices.has(device), device);
      circuit.indexOf(plus);
      circuit.indexOf(minus);
    }
    for (const { weights } of patterns) Object.keys(weights).forEach(circuit.indexOf);
    [tank.plus, tank.minus, supplyNode].forEach(circuit.indexOf);
  });
}

function emptyValues(n: number) {
  return {
    q: new Float64Array(n),
    f: new Float64Array(n),
    C: new Float64Array(n * n),
    G: new Float64Array(n * n),
  };
}

/** Rank of C by singular values, rows and columns scaled to about one. */
function rankOfCharges({ system }: Circuit, x: Float64Array): number {
  const n = system.dimension;
  const values = emptyValues(n);
  system.evaluate(x, values);
  const matrix = Matrix.from1DArray(n, n, values.C.map((c, k) => c * system.scale![k % n]!));
  for (let i = 0; i < n; i++) {
    const size = Math.max(...matrix.getRow(i).map(Math.abs));
    if (size > 0) matrix.mulRow(i, 1 / size);
  }
  const { diagonal } = new SingularValueDecomposition(matrix);
  return diagonal.filter((value) => value > 1e-9 * diagonal[0]!).length;
}

function randomStates(scale: Float64Array, around: Float64Array): Float64Array[] {
  const next = seededUniform(SEED);
  return Array.from(
    { length: RANDOM_STATES },
    () => around.map((value, j) => value + (next() - 0.5) * scale[j]!),
  );
}

/** Where the search for the orbit begins: the unstable equilibrium, or the kick where it is stable. */
function startOf(
  { circuit: { system }, guess, kick }: BuiltOscillator,
): { start: Equilibrium | NoEquilibrium | Float64Array; period?: number } {
  const equilibrium = findEquilibrium(system, { guess });
  if (equilibrium.status === "found" && !(equilibrium.poles[0]!.re > 0) && kick) {
    return { start: kick.state, period: kick.period };
  }
  return { start: equilibrium };
}

function solve(oscillator: BuiltOscillator): { oscillator: BuiltOscillator; orbit: Orbit } {
  const { system } = oscillator.circuit;
  return { oscillator, orbit: orbitOf(system, { ...startOf(oscillator), tolerance: 1e-11 }) };
}

function inputValue(circuit: Circuit, name: string): number {
  const element = circuit.elements.find((entry) => entry.name === name);
  if (element?.kind === "potential") return element.potential;
  if (element?.kind === "current") return element.current;
  throw new Error(`"${name}" is no input`);
}

function withInput(circuit: Circuit, name: string, value: number): CircuitElement[] {
  return circuit.elements.map((element) => {
    if (element.name !== name) return element;
    if (element.kind === "potential") return { ...element, potential: value };
    return element.kind === "current" ? { ...element, current: value } : element;
  });
}

function swapped(
  element: CircuitElement,
  sides: readonly (readonly [string, string])[],
): CircuitElement {
  const other = (node: string) => {
    const side = sides.find((pair) => pair.includes(node));
    return side ? (side[0] === node ? side[1] : side[0]) : node;
  };
  if (element.kind === "potential") return element;
  if (element.kind === "device") return { ...element, nodes: element.nodes.map(other) };
  if (element.kind === "inductor") {
    return {
      ...element,
      windings: element.windings.map((winding) => ({
        ...winding,
        nodes: [other(winding.nodes[0]), other(winding.nodes[1])] as const,
      })),
    };
  }
  return { ...element, nodes: [other(element.nodes[0]), other(element.nodes[1])] };
}

/** A state with the same node potentials in another assembly. */
function stateFor(circuit: Circuit, from: Circuit, state: Float64Array): Float64Array {
  const potentials: Record<string, number> = {};
  for (const name of from.system.unknowns!) {
    const node = /^potential of (.*)$/.exec(name)?.[1];
    if (node !== undefined) potentials[node] = from.potential(node, state);
  }
  return circuit.stateAt(potentials);
}
