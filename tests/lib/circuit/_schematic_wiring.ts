/** Whether a drawn schematic joins what the circuit joins. */
import type { Schematic, SchematicSymbol } from "../../../lib/circuit/schematic.ts";
import type { Circuit } from "../../../lib/circuit/circuit.ts";
import { assert, assertEquals } from "../../assert.ts";

type Point = readonly [number, number];

/** Where the ends of a symbol lie before it is mirrored and turned, in the order of the element's nodes. */
function endsOf(kind: SchematicSymbol["kind"]): readonly Point[] {
  if (kind === "transistor n") return [[1, -1], [-1, 0], [1, 1]];
  if (kind === "transistor p") return [[1, 1], [-1, 0], [1, -1]];
  if (kind === "inductor") return [[0, -2], [0, 2]];
  if (["supply", "ground", "label"].includes(kind)) return [[0, 0]];
  return [[0, -1], [0, 1]];
}

function placed({ at, turn = 0, mirrored = false }: SchematicSymbol, [x, y]: Point): Point {
  let point: Point = [mirrored ? -x : x, y];
  for (let k = 0; k < turn; k++) point = [point[1], -point[0]];
  return [at[0] + point[0], at[1] + point[1]];
}

/**
 * Names of connected points: wires join where one ends on another, or at a joint; symbols' ends without
 * a wire join where they meet.
 */
function connections({ wires, joints }: Schematic): (point: Point) => string {
  const parent = wires.map((_, k) => k);
  const root = (k: number): number => parent[k] === k ? k : root(parent[k]!);
  const onWire = (k: number, [x, y]: Point) =>
    wires[k]!.slice(1).some(([bx, by], i) => {
      const [ax, ay] = wires[k]![i]!;
      return Math.abs((bx - ax) * (y - ay) - (by - ay) * (x - ax)) < 1e-9 &&
        (x - ax) * (x - bx) + (y - ay) * (y - by) <= 1e-9;
    });
  const touching = (point: Point) => wires.flatMap((_, k) => onWire(k, point) ? [k] : []);
  const ends = wires.flatMap((wire) => [wire[0]!, wire[wire.length - 1]!]);
  for (const point of [...joints, ...ends]) {
    const [first, ...rest] = touching(point);
    rest.forEach((k) => parent[root(k)] = root(first!));
  }
  return (point) => {
    const [first] = touching(point);
    return first === undefined ? `point ${point}` : `wire ${root(first)}`;
  };
}

/** Elements that stand for one drawn symbol under another name: the coil's halves, the tank's loss. */
export interface WiringOptions {
  /** Nodes of symbols whose name is no element's, in the order of the symbol's ends. */
  readonly nodesOf: Readonly<Record<string, readonly string[]>>;
  /** Elements that are not drawn. */
  readonly undrawn?: readonly string[];
}

/**
 * Asserts that ends on one wire belong to one node, ends of one node with the same name on wires that
 * have a supply, ground or label of that name or are one wire, and that every element is drawn.
 */
export function assertWiring(
  schematic: Schematic,
  circuit: Circuit,
  { nodesOf, undrawn = [] }: WiringOptions,
): void {
  const wireAt = connections(schematic);
  const nodeOfWire = new Map<string, string>();
  const named = new Set<string>();
  const wiresOfNode = new Map<string, Set<string>>();
  const join = (symbol: SchematicSymbol, end: Point, node: string) => {
    const wire = wireAt(placed(symbol, end));
    assertEquals(nodeOfWire.get(wire) ?? node, node, `${symbol.kind} "${symbol.name}"`);
    nodeOfWire.set(wire, node);
    wiresOfNode.set(node, (wiresOfNode.get(node) ?? new Set()).add(wire));
    return wire;
  };
  // What names nodes for certain comes first; then a two-pole shows which way round it is drawn.
  const rank = ({ kind, name }: SchematicSymbol) =>
    endsOf(kind).length === 1 ? 0 : endsOf(kind).length === 3 || nodesOf[name] ? 1 : 2;
  for (const symbol of [...schematic.symbols].sort((a, b) => rank(a) - rank(b))) {
    const ends = endsOf(symbol.kind);
    if (["supply", "ground", "label"].includes(symbol.kind)) {
      named.add(join(symbol, ends[0]!, symbol.kind === "ground" ? "ground" : symbol.name));
      continue;
    }
    if (symbol.name === "") continue;
    const element = circuit.elements.find(({ name }) => name === symbol.name);
    const given = nodesOf[symbol.name];
    if (given) {
      given.forEach((node, k) => join(symbol, ends[k]!, node));
    } else if (element?.kind === "device") {
      ends.forEach((end, k) => join(symbol, end, element.nodes[k]!));
    } else {
      const nodes = element?.kind === "inductor"
        ? element.windings[0]!.nodes
        : element && element.kind !== "potential"
        ? element.nodes
        : [];
      assert(nodes.length === 2, `"${symbol.name}" is no element of the circuit`);
      // A current has a direction; the other two-poles may be drawn either way round.
      const wires = ends.map((end) => wireAt(placed(symbol, end)));
      const clash = nodes.some((node, k) => (nodeOfWire.get(wires[k]!) ?? node) !== node);
      const turned = symbol.kind !== "current source" && clash;
      (turned ? [...nodes].reverse() : nodes).forEach((node, k) => join(symbol, ends[k]!, node));
    }
  }
  for (const [node, wires] of wiresOfNode) {
    const unnamed = [...wires].filter((wire) => !named.has(wire));
    assert(
      wires.size === 1 || unnamed.length === 0,
      `node ${node} is drawn at ${wires.size} places, not all of them named`,
    );
  }
  const drawn = new Set(schematic.symbols.map(({ name }) => name));
  for (const { name, kind } of circuit.elements) {
    const replaced = undrawn.includes(name);
    assert(kind === "potential" || replaced || drawn.has(name), `"${name}" is not drawn`);
  }
}
