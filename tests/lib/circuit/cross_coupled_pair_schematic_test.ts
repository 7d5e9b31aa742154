import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import type { Schematic, SchematicSymbol } from "../../../lib/circuit/schematic.ts";
import { assert, assertEquals } from "../../assert.ts";
import { illustrativeCard } from "../device/_card.ts";

type Point = readonly [number, number];

const DESIGN = {
  tank: { inductance: 1.2e-9, quality: 12, qualityFrequency: 5e9, capacitance: 650e-15 },
  pair: { width: 40e-6, length: 60e-9 },
  tail: { width: 160e-6, length: 200e-9 },
  current: 2e-3,
  mirrorRatio: 8,
  loadCapacitance: 50e-15,
  tailCapacitance: 200e-15,
  mirrorCapacitance: 10e-12,
};

/** Where the ends of a symbol lie before it is mirrored and turned. */
function endsOf(kind: SchematicSymbol["kind"]): Record<string, Point> {
  if (kind === "transistor n") return { drain: [1, -1], gate: [-1, 0], source: [1, 1] };
  if (kind === "inductor") return { first: [0, -2], second: [0, 2] };
  if (["supply", "ground", "label"].includes(kind)) return { end: [0, 0] };
  return { first: [0, -1], second: [0, 1] };
}

function placed({ at, turn = 0, mirrored = false }: SchematicSymbol, [x, y]: Point): Point {
  let point: Point = [mirrored ? -x : x, y];
  for (let k = 0; k < turn; k++) point = [point[1], -point[0]];
  return [at[0] + point[0], at[1] + point[1]];
}

/** Names of connected points: wires join where one ends on another, or at a joint. */
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
    return first === undefined ? `nothing at ${point}` : `wire ${root(first)}`;
  };
}

Deno.test("crossCoupledPair: the schematic joins what the circuit joins", () => {
  const schematic = crossCoupledPair.schematic(DESIGN);
  const { circuit } = crossCoupledPair.build(DESIGN, {
    card: illustrativeCard(),
    condition: { corner: "typical", temperature: 300.15, supply: 1 },
  });
  const nameOf = connections(schematic);
  const nodeOfWire = new Map<string, string>();
  const pair = (symbol: SchematicSymbol, end: string, node: string) => {
    const wire = nameOf(placed(symbol, endsOf(symbol.kind)[end]!));
    assertEquals(nodeOfWire.get(wire) ?? node, node, `${symbol.name}, ${end}`);
    nodeOfWire.set(wire, node);
  };
  const named = (name: string) => schematic.symbols.find((symbol) => symbol.name === name)!;
  for (const symbol of schematic.symbols) {
    if (symbol.kind === "supply") pair(symbol, "end", "supply");
    if (symbol.kind === "label") pair(symbol, "end", symbol.name);
    if (symbol.kind !== "transistor n") continue;
    const element = circuit.elements.find(({ name }) => name === symbol.name);
    assert(element?.kind === "device", symbol.name);
    if (element?.kind !== "device") continue;
    const [drain, gate, source] = element.nodes;
    pair(symbol, "drain", drain!);
    pair(symbol, "gate", gate!);
    // Ground is drawn once for each place, so its wires have names of their own.
    if (source !== "ground") pair(symbol, "source", source!);
  }
  pair(named("coil, both halves"), "first", "plus");
  pair(named("coil, both halves"), "second", "supply");
  for (const name of ["tank loss", "tank capacitor"]) {
    pair(named(name), "first", "plus");
    pair(named(name), "second", "minus");
  }
  pair(named("reference current"), "first", "supply");
  pair(named("reference current"), "second", "mirror");
  pair(named("load plus"), "first", "plus");
  pair(named("load minus"), "first", "minus");
  pair(named("tail capacitor"), "first", "tail");
  pair(named("mirror capacitor"), "first", "mirror");
  assertEquals([...new Set(nodeOfWire.values())].sort(), [
    "minus",
    "mirror",
    "plus",
    "supply",
    "tail",
  ]);
  // One wire for each node, but for the supply, which is drawn at two places.
  assertEquals(nodeOfWire.size, 6);
});

Deno.test("crossCoupledPair: the schematic draws no capacitor of 0 F", () => {
  const bare = crossCoupledPair.schematic({
    ...DESIGN,
    loadCapacitance: 0,
    tailCapacitance: 0,
    mirrorCapacitance: 0,
  });
  assertEquals(bare.symbols.filter(({ kind }) => kind === "capacitor").map(({ name }) => name), [
    "tank capacitor",
  ]);
  assertEquals(bare.symbols.filter(({ kind }) => kind === "ground").length, 2);
});
