/** Currents and powers of a circuit, summed element by element without its equations. */
import { assertEquals } from "../../assert.ts";
import type { Circuit } from "../../../lib/circuit/circuit.ts";
import type { BuiltOscillator } from "../../../lib/circuit/topology.ts";
import type { Orbit } from "../../../lib/orbit/orbit.ts";

/** Conduction current that leaves a held node into the elements, and the sum of the sizes. */
export function currentFrom(
  circuit: Circuit,
  node: string,
  x: Float64Array,
): { sum: number; size: number } {
  let sum = 0;
  let size = 0;
  const add = (current: number) => {
    sum += current;
    size += Math.abs(current);
  };
  for (const element of circuit.elements) {
    if (element.kind === "resistor") {
      const [a, b] = element.nodes;
      const current = circuit.voltage(a, b, x) / element.resistance;
      if (a === node) add(current);
      if (b === node) add(-current);
    } else if (element.kind === "current") {
      if (element.nodes[0] === node) add(element.current);
      if (element.nodes[1] === node) add(-element.current);
    } else if (element.kind === "inductor") {
      element.windings.forEach(({ nodes }, k) => {
        const current = circuit.windingCurrent(element.name, k, x);
        if (nodes[0] === node) add(current);
        if (nodes[1] === node) add(-current);
      });
    } else if (element.kind === "device") {
      const currents = circuit.deviceCurrents(element.name, x);
      element.nodes.forEach((own, k) => {
        if (own === node) add(currents[k]!);
      });
    }
  }
  return { sum, size };
}

/** Mean power from all held nodes, and into all elements: conduction, and v . dQ/dt of the devices. */
export function meanPowers(
  { circuit, supplyNode, supplyCurrent }: BuiltOscillator,
  orbit: Orbit,
): { delivered: number; taken: number } {
  const { system } = circuit;
  const { coordinates } = orbit.discrete;
  const { r, n, unknownScale } = coordinates;
  let delivered = orbit.mean((x) => circuit.potential(supplyNode, x) * supplyCurrent(x));
  for (const element of circuit.elements) {
    if (element.kind !== "potential" || element.node === supplyNode) continue;
    delivered += element.potential *
      orbit.mean((x) => currentFrom(circuit, element.node, x).sum);
  }
  const rates = (x: Float64Array) => {
    const { flow, response } = coordinates.reducedFlow(x.map((v, j) => v / unknownScale[j]!));
    return Float64Array.from({ length: n }, (_, j) => {
      let rate = 0;
      for (let i = 0; i < r; i++) rate += response[j * r + i]! * flow[i]!;
      return rate * unknownScale[j]!;
    });
  };
  assertEquals(system.dimension, n);
  const taken = orbit.mean((x) => {
    const rate = rates(x);
    let power = 0;
    for (const element of circuit.elements) {
      switch (element.kind) {
        case "resistor":
          power += circuit.voltage(...element.nodes, x) ** 2 / element.resistance;
          break;
        case "current":
          power += circuit.voltage(...element.nodes, x) * element.current;
          break;
        case "inductor":
          element.windings.forEach(({ seriesResistance }, k) => {
            power += seriesResistance * circuit.windingCurrent(element.name, k, x) ** 2;
          });
          break;
        case "device": {
          const t = element.nodes.length;
          const v = Float64Array.from(element.nodes, (node) => circuit.potential(node, x));
          const out = new Float64Array(2 * t * (t + 1));
          element.evaluate(v, out);
          for (let k = 0; k < t; k++) {
            let current = out[k]!;
            for (let j = 0; j < t; j++) {
              const at = circuit.indexOf(element.nodes[j]!);
              if (at !== undefined) current += out[2 * t + t * t + k * t + j]! * rate[at]!;
            }
            power += v[k]! * current;
          }
        }
      }
    }
    return power;
  });
  return { delivered, taken };
}
