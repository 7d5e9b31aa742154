/** Small circuits and values shared by the circuit tests. */
import type { CircuitElement, DeviceElement } from "../../../lib/circuit/element.ts";
import type { CrossCoupledPairDesign } from "../../../lib/circuit/cross_coupled_pair.ts";
import type { Condition } from "../../../lib/circuit/topology.ts";

/** Tank of 1 nH and 4 pF: 2.5 GHz; loss of 200 ohm. */
export const TANK = { inductance: 1e-9, capacitance: 4e-12, resistance: 200 } as const;

/** A one-port between two nodes that drives -current tanh(v / width), with white noise of its slope. */
export function tanhDriver(
  name: string,
  nodes: readonly [string, string],
  { current, width }: { current: number; width: number },
): DeviceElement {
  return {
    kind: "device",
    name,
    nodes,
    evaluate(v, out) {
      const u = (v[0]! - v[1]!) / width;
      const i = -current * Math.tanh(u);
      const g = -current / width / Math.cosh(u) ** 2;
      out.set([i, -i, g, -g, -g, g, 0, 0, 0, 0, 0, 0]);
    },
    noise: [
      {
        label: "driver",
        color: "white",
        into: 0,
        out: 1,
        amplitude: (v) => Math.sqrt(1.6e-20 * current / width) / Math.cosh((v[0]! - v[1]!) / width),
      },
    ],
  };
}

/** A capacitor whose charge saturates: q = capacitance width tanh(v / width) + floor v. */
export function saturatingCapacitor(
  name: string,
  nodes: readonly [string, string],
  { capacitance, floor, width }: { capacitance: number; floor: number; width: number },
): DeviceElement {
  return {
    kind: "device",
    name,
    nodes,
    evaluate(v, out) {
      const u = (v[0]! - v[1]!) / width;
      const q = capacitance * width * Math.tanh(u) + floor * width * u;
      const c = capacitance / Math.cosh(u) ** 2 + floor;
      out.set([0, 0, 0, 0, 0, 0, q, -q, c, -c, -c, c]);
    },
    noise: [],
  };
}

/** A tank at node a with a driver that starts with loop gain 3. */
export function tankElements({ temperature = 300 } = {}): CircuitElement[] {
  return [
    {
      kind: "inductor",
      name: "coil",
      windings: [{ nodes: ["a", "ground"], inductance: TANK.inductance, seriesResistance: 0 }],
      coupling: 0,
      temperature,
    },
    { kind: "capacitor", name: "C", nodes: ["a", "ground"], capacitance: TANK.capacitance },
    {
      kind: "resistor",
      name: "R",
      nodes: ["a", "ground"],
      resistance: TANK.resistance,
      temperature,
    },
    tanhDriver("driver", ["a", "ground"], { current: 3 / TANK.resistance, width: 1 }),
  ];
}

/** A pair at 2.4 GHz of a size that a 65 nm process of 1 V would take. */
export const PAIR_DESIGN: CrossCoupledPairDesign = {
  tank: { inductance: 1.2e-9, quality: 12, qualityFrequency: 2.4e9, capacitance: 3e-12 },
  pair: { width: 40e-6, length: 60e-9 },
  tail: { width: 120e-6, length: 240e-9 },
  current: 2e-3,
  mirrorRatio: 10,
  loadCapacitance: 50e-15,
  tailCapacitance: 200e-15,
  mirrorCapacitance: 2e-12,
};

export const NOMINAL: Condition = { corner: "typical", temperature: 300, supply: 1 };
