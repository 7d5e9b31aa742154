/**
 * Elements joined at named nodes, assembled into one system `d/dt q(x) + f(x) = 0` with its inputs and
 * noise sources.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import type { NoiseSource, OscillatorSystem, SystemInput } from "../orbit/system.ts";
import {
  type CircuitElement,
  type DeviceElement,
  deviceValues,
  GROUND,
  type InductorElement,
  thermalAmplitude,
} from "./element.ts";
import { refuseImpossible } from "./_topology_faults.ts";

/** Potentials are of the order of a volt. */
const NODE_SCALE = 1;
/** Capacitance an inductor's current is scaled with where its nodes have none of their own [F]. */
const FALLBACK_CAPACITANCE = 1e-13;

/** A device with its terminals resolved: an unknown's index, or -1 - k for known potential k. */
interface PlacedDevice {
  readonly element: DeviceElement;
  readonly places: Int32Array;
  readonly v: Float64Array;
  readonly out: Float64Array;
}

/** Elements assembled into a system, and how to read its states. */
export interface Circuit {
  readonly system: OscillatorSystem;
  /** White and 1/f sources, one-sided signed amplitudes. */
  readonly sources: readonly NoiseSource[];
  readonly elements: readonly CircuitElement[];
  /** Index of an unknown node; undefined for ground and held nodes. */
  indexOf(node: string): number | undefined;
  /** Potential of any node at a state [V]. */
  potential(node: string, x: Float64Array): number;
  /** Potential difference of two nodes at a state [V]. */
  voltage(plus: string, minus: string, x: Float64Array): number;
  /** Current through winding `k` of an inductor at a state, from its first to its second node [A]. */
  windingCurrent(inductor: string, k: number, x: Float64Array): number;
  /** Currents into a device's terminals at a state, the conduction part, shape (terminals,) [A]. */
  deviceCurrents(device: string, x: Float64Array): Float64Array;
  /** A state with every unknown node at the given potential and no winding current. */
  stateAt(potentials: Readonly<Record<string, number>>): Float64Array;
}

/**
 * Assembles elements into a circuit.
 *
 * Unknowns are the winding currents, then the potentials of the nodes that nothing holds, each in order
 * of appearance. Held nodes are known potentials, not equations. Inputs are the held potentials and
 * the programmed currents, in order of appearance.
 *
 * @throws RangeError for element values outside their range and for circuits without a defined
 * answer: islands that touch the rest through capacitors only, loops of lossless inductors, a current
 * source in series with an inductor and no capacitor, couplings of 1 or more
 */
export function assemble(elements: readonly CircuitElement[]): Circuit {
  refuseImpossible(elements);
  const held = new Map<string, number>([[GROUND, 0]]);
  const heldPotentials = [0];
  for (const element of elements) {
    if (element.kind !== "potential") continue;
    held.set(element.node, heldPotentials.length);
    heldPotentials.push(element.potential);
  }
  const names: string[] = [];
  const firstWinding = new Map<string, number>();
  for (const element of elements) {
    if (element.kind !== "inductor") continue;
    firstWinding.set(element.name, names.length);
    element.windings.forEach((_, k) =>
      names.push(
        element.windings.length > 1
          ? `current of ${element.name} ${k + 1}`
          : `current of ${element.name}`,
      )
    );
  }
  const index = new Map<string, number>();
  const visit = (node: string) => {
    if (held.has(node) || index.has(node)) return;
    index.set(node, names.length);
    names.push(`potential of ${node}`);
  };
  for (const element of elements) {
    if (element.kind === "inductor") element.windings.forEach((w) => w.nodes.forEach(visit));
    else if (element.kind !== "potential") element.nodes.forEach(visit);
  }
  const n = names.length;
  const m = heldPotentials.length;
  const known = Float64Array.from(heldPotentials);
  // Linear part: q = C0 x + Ck u, f = G0 x + Gk u + programmed currents.
  const C0 = new Float64Array(n * n);
  const G0 = new Float64Array(n * n);
  const Ck = new Float64Array(n * m);
  const Gk = new Float64Array(n * m);
  const programmed = new Float64Array(n);
  const place = (node: string) => index.get(node) ?? -1 - held.get(node)!;
  const add = (own: Float64Array, other: Float64Array, row: number, column: number, g: number) => {
    if (row < 0) return;
    if (column >= 0) own[row * n + column]! += g;
    else other[row * m - 1 - column]! += g;
  };
  const stampPair = (
    own: Float64Array,
    other: Float64Array,
    nodes: readonly [string, string],
    g: number,
  ) => {
    const [a, b] = [place(nodes[0]), place(nodes[1])];
    add(own, other, a, a, g);
    add(own, other, a, b, -g);
    add(own, other, b, a, -g);
    add(own, other, b, b, g);
  };
  const devices: PlacedDevice[] = [];
  const inputs: (SystemInput & { heldAt?: number; into?: Float64Array })[] = [];
  const sources: NoiseSource[] = [];
  for (const element of elements) {
    switch (element.kind) {
      case "resistor": {
        const conductance = 1 / element.resistance;
        stampPair(G0, Gk, element.nodes, conductance);
        const amplitude = thermalAmplitude(conductance, element.temperature);
        if (amplitude > 0) {
          sources.push(pairSource("thermal", element.name, element.nodes.map(place), amplitude));
        }
        break;
      }
      case "capacitor":
        stampPair(C0, Ck, element.nodes, element.capacitance);
        break;
      case "inductor":
        stampInductor(element, firstWinding.get(element.name)!);
        break;
      case "current": {
        const into = new Float64Array(n);
        const [from, to] = element.nodes.map(place);
        if (from! >= 0) into[from!]! += 1;
        if (to! >= 0) into[to!]! -= 1;
        for (let i = 0; i < n; i++) programmed[i]! += into[i]! * element.current;
        inputs.push({ name: element.name, unit: "A", into });
        break;
      }
      case "potential":
        inputs.push({ name: element.name, unit: "V", heldAt: held.get(element.node)! });
        break;
      case "device": {
        const terminals = element.nodes.length;
        const device = {
          element,
          places: Int32Array.from(element.nodes, place),
          v: new Float64Array(terminals),
          out: new Float64Array(deviceValues(terminals)),
        };
        devices.push(device);
        for (const noise of element.noise) sources.push(deviceSource(device, noise));
      }
    }
  }

  function stampInductor(element: InductorElement, first: number): void {
    element.windings.forEach((winding, k) => {
      const row = first + k;
      const [a, b] = winding.nodes.map(place) as [number, number];
      // Flux row: d/dt (L i + M j) + R i - (va - vb) = 0; the current leaves a and enters b.
      add(G0, Gk, row, a, -1);
      add(G0, Gk, row, b, 1);
      add(G0, Gk, a, row, 1);
      add(G0, Gk, b, row, -1);
      G0[row * n + row]! += winding.seriesResistance;
      element.windings.forEach((other, j) => {
        C0[row * n + first + j]! += j === k
          ? winding.inductance
          : element.coupling * Math.sqrt(winding.inductance * other.inductance);
      });
      if (winding.seriesResistance > 0 && element.temperature > 0) {
        const volts = thermalAmplitude(winding.seriesResistance, element.temperature);
        sources.push({
          label: "series resistance",
          device: element.name,
          color: "white",
          inject(_x, into) {
            into.fill(0);
            into[row] = volts;
          },
        });
      }
    });
  }

  function readTerminals({ places, v }: PlacedDevice, x: Float64Array): void {
    for (let k = 0; k < v.length; k++) {
      const at = places[k]!;
      v[k] = at >= 0 ? x[at]! : known[-1 - at]!;
    }
  }

  function deviceSource(
    device: PlacedDevice,
    noise: DeviceElement["noise"][number],
  ): NoiseSource {
    return {
      label: noise.label,
      device: device.element.name,
      color: noise.color,
      inject(x, into) {
        readTerminals(device, x);
        const amplitude = noise.amplitude(device.v);
        into.fill(0);
        // A current into the device's terminal leaves the node.
        const at = device.places[noise.into]!;
        const back = device.places[noise.out]!;
        if (at >= 0) into[at]! -= amplitude;
        if (back >= 0) into[back]! += amplitude;
      },
    };
  }

  const evaluate: OscillatorSystem["evaluate"] = (x, { q, f, C, G }) => {
    C.set(C0);
    G.set(G0);
    for (let i = 0; i < n; i++) {
      let charge = 0;
      let current = programmed[i]!;
      for (let j = 0; j < n; j++) {
        charge += C0[i * n + j]! * x[j]!;
        current += G0[i * n + j]! * x[j]!;
      }
      for (let j = 1; j < m; j++) {
        charge += Ck[i * m + j]! * known[j]!;
        current += Gk[i * m + j]! * known[j]!;
      }
      q[i] = charge;
      f[i] = current;
    }
    for (const device of devices) {
      readTerminals(device, x);
      const { out, places } = device;
      device.element.evaluate(device.v, out);
      const t = places.length;
      const charges = t + t * t;
      for (let k = 0; k < t; k++) {
        const row = places[k]!;
        if (row < 0) continue;
        f[row]! += out[k]!;
        q[row]! += out[charges + k]!;
        for (let j = 0; j < t; j++) {
          const column = places[j]!;
          if (column < 0) continue;
          G[row * n + column]! += out[t + k * t + j]!;
          C[row * n + column]! += out[charges + t + k * t + j]!;
        }
      }
    }
  };

  const evaluateInput: NonNullable<OscillatorSystem["evaluateInput"]> = (k, x, { dq, df }) => {
    const { heldAt, into } = inputs[k]!;
    if (into) {
      dq.fill(0);
      df.set(into);
      return;
    }
    for (let i = 0; i < n; i++) {
      dq[i] = Ck[i * m + heldAt!]!;
      df[i] = Gk[i * m + heldAt!]!;
    }
    for (const device of devices) {
      const { out, places } = device;
      const t = places.length;
      const charges = t + t * t;
      if (!places.includes(-1 - heldAt!)) continue;
      readTerminals(device, x);
      device.element.evaluate(device.v, out);
      for (let j = 0; j < t; j++) {
        if (places[j] !== -1 - heldAt!) continue;
        for (let r = 0; r < t; r++) {
          const row = places[r]!;
          if (row < 0) continue;
          df[row]! += out[t + r * t + j]!;
          dq[row]! += out[charges + t + r * t + j]!;
        }
      }
    }
  };

  const scale = new Float64Array(n).fill(NODE_SCALE);
  const system: OscillatorSystem = {
    dimension: n,
    unknowns: names,
    scale,
    inputs: inputs.map(({ name, unit }) => ({ name, unit })),
    evaluate,
    evaluateInput,
  };
  scaleWindings();

  /** A winding's current is of the order of its nodes' swing over sqrt(L/C). */
  function scaleWindings(): void {
    const values = {
      q: new Float64Array(n),
      f: new Float64Array(n),
      C: new Float64Array(n * n),
      G: new Float64Array(n * n),
    };
    evaluate(new Float64Array(n), values);
    for (const element of elements) {
      if (element.kind !== "inductor") continue;
      const first = firstWinding.get(element.name)!;
      element.windings.forEach((winding, k) => {
        const capacitance = Math.max(
          FALLBACK_CAPACITANCE,
          ...winding.nodes.map((node) => {
            const at = place(node);
            return at >= 0 ? values.C[at * n + at]! : 0;
          }),
        );
        scale[first + k] = NODE_SCALE * Math.sqrt(capacitance / winding.inductance);
      });
    }
  }

  const requireNode = (node: string): number => {
    if (!index.has(node) && !held.has(node)) {
      throw new RangeError(
        `Cannot read a potential: the node must be one of ${
          [...held.keys(), ...index.keys()].join(", ")
        }, got "${node}"`,
      );
    }
    return place(node);
  };
  const potential = (node: string, x: Float64Array) => {
    const at = requireNode(node);
    return at >= 0 ? x[at]! : known[-1 - at]!;
  };
  return {
    system,
    sources,
    elements,
    indexOf: (node) => {
      const at = requireNode(node);
      return at >= 0 ? at : undefined;
    },
    potential,
    voltage: (plus, minus, x) => potential(plus, x) - potential(minus, x),
    windingCurrent(inductor, k, x) {
      const first = firstWinding.get(inductor);
      if (first === undefined) {
        throw new RangeError(`Cannot read a current: there is no inductor "${inductor}"`);
      }
      return x[first + k]!;
    },
    deviceCurrents(name, x) {
      const device = devices.find(({ element }) => element.name === name);
      if (!device) throw new RangeError(`Cannot read currents: there is no device "${name}"`);
      readTerminals(device, x);
      device.element.evaluate(device.v, device.out);
      return device.out.slice(0, device.places.length);
    },
    stateAt(potentials) {
      const x = new Float64Array(n);
      for (const [node, value] of Object.entries(potentials)) {
        const at = requireNode(node);
        if (at >= 0) x[at] = value;
      }
      return x;
    },
  };

  function pairSource(
    label: string,
    device: string,
    [a, b]: number[],
    amplitude: number,
  ): NoiseSource {
    return {
      label,
      device,
      color: "white",
      inject(_x, into) {
        into.fill(0);
        if (a! >= 0) into[a!]! -= amplitude;
        if (b! >= 0) into[b!]! += amplitude;
      },
    };
  }
}
