import { type CircuitElement, GROUND } from "./element.ts";

/**
 * Refuses values outside their range and circuits that have no defined answer.
 *
 * @throws RangeError with the element or the nodes at fault
 *
 * @internal
 */
export function refuseImpossible(elements: readonly CircuitElement[]): void {
  const names = new Set<string>();
  for (const element of elements) {
    if (names.has(element.name)) fail(`two elements are named "${element.name}"`);
    names.add(element.name);
    refuseValues(element);
  }
  refuseDoubleHold(elements);
  refuseIslands(elements);
  refuseInductorLoops(elements);
  refuseCutInductors(elements);
}

function fail(what: string): never {
  throw new RangeError(`Cannot assemble the circuit: ${what}`);
}

function refuseValues(element: CircuitElement): void {
  const positive = (value: number, what: string, unit: string) => {
    if (!(value > 0 && value < Infinity)) {
      fail(`the ${what} of ${element.name} must be > 0 ${unit}, got ${value} ${unit}`);
    }
  };
  switch (element.kind) {
    case "resistor":
      positive(element.resistance, "resistance", "ohm");
      break;
    case "capacitor":
      positive(element.capacitance, "capacitance", "F");
      break;
    case "inductor":
      for (const { inductance, seriesResistance } of element.windings) {
        positive(inductance, "inductance", "H");
        if (!(seriesResistance >= 0)) {
          fail(
            `the series resistance of ${element.name} must be >= 0 ohm, got ${seriesResistance} ohm`,
          );
        }
      }
      if (!(Math.abs(element.coupling) < 1)) {
        fail(`the coupling of ${element.name} must be below 1, got ${element.coupling}`);
      }
      break;
    case "current":
      if (!Number.isFinite(element.current)) {
        fail(`the current of ${element.name} must be finite, got ${element.current} A`);
      }
      break;
    case "potential":
      if (!Number.isFinite(element.potential)) {
        fail(`the potential of ${element.name} must be finite, got ${element.potential} V`);
      }
      break;
    case "device":
  }
}

function heldNodes(elements: readonly CircuitElement[]): Set<string> {
  const held = new Set([GROUND]);
  for (const element of elements) if (element.kind === "potential") held.add(element.node);
  return held;
}

function refuseDoubleHold(elements: readonly CircuitElement[]): void {
  const held = new Set([GROUND]);
  for (const element of elements) {
    if (element.kind !== "potential") continue;
    if (held.has(element.node)) fail(`node ${element.node} is held twice`);
    held.add(element.node);
  }
}

/** Groups of nodes joined by the given pairs. */
class Groups {
  readonly #parent = new Map<string, string>();
  root(node: string): string {
    let at = node;
    for (;;) {
      const parent = this.#parent.get(at) ?? at;
      if (parent === at) return at;
      at = parent;
    }
  }
  /** Joins two nodes; false when they were joined already. */
  join(a: string, b: string): boolean {
    const [ra, rb] = [this.root(a), this.root(b)];
    if (ra === rb) return false;
    this.#parent.set(ra, rb);
    return true;
  }
}

function pairsOf(element: CircuitElement): (readonly [string, string])[] {
  if (element.kind === "inductor") return element.windings.map(({ nodes }) => nodes);
  if (element.kind === "resistor" || element.kind === "capacitor" || element.kind === "current") {
    return [element.nodes];
  }
  if (element.kind === "device") {
    return element.nodes.slice(1).map((node) => [element.nodes[0]!, node] as const);
  }
  return [];
}

/** Every node needs a path for direct current to a held node: a capacitor or a current source is none. */
function refuseIslands(elements: readonly CircuitElement[]): void {
  const groups = new Groups();
  const held = [...heldNodes(elements)];
  for (const node of held) groups.join(node, GROUND);
  for (const element of elements) {
    if (element.kind === "capacitor" || element.kind === "current") continue;
    for (const [a, b] of pairsOf(element)) groups.join(a, b);
  }
  for (const element of elements) {
    for (const node of pairsOf(element).flat()) {
      if (groups.root(node) !== groups.root(GROUND)) {
        fail(
          `node ${node} has no path for direct current: only capacitors or current sources reach it`,
        );
      }
    }
  }
}

/** A loop of windings without resistance keeps any direct current for ever. */
function refuseInductorLoops(elements: readonly CircuitElement[]): void {
  const groups = new Groups();
  for (const node of heldNodes(elements)) groups.join(node, GROUND);
  for (const element of elements) {
    if (element.kind !== "inductor") continue;
    for (const { nodes, seriesResistance } of element.windings) {
      if (seriesResistance > 0) continue;
      if (!groups.join(nodes[0], nodes[1])) {
        fail(`${element.name} closes a loop of inductors without any resistance`);
      }
    }
  }
}

/** A node where only windings and current sources meet fixes a winding's current: no state is left. */
function refuseCutInductors(elements: readonly CircuitElement[]): void {
  const held = heldNodes(elements);
  const kinds = new Map<string, Set<string>>();
  for (const element of elements) {
    for (const node of pairsOf(element).flat()) {
      const set = kinds.get(node) ?? new Set();
      set.add(element.kind);
      kinds.set(node, set);
    }
  }
  for (const [node, set] of kinds) {
    if (held.has(node)) continue;
    if (
      set.has("inductor") && [...set].every((kind) => kind === "inductor" || kind === "current")
    ) {
      fail(
        `at node ${node} only inductors and current sources meet: a capacitor or a resistor is needed`,
      );
    }
  }
}
