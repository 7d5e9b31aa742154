import type { Schematic, SchematicSymbol } from "./schematic.ts";

type Point = readonly [number, number];

/** Values written beside the symbols. */
export interface PairSchematicValues {
  /** Differential inductance of the coil [H]. */
  readonly inductance: number;
  /** Parallel loss resistance of the tank [ohm]. */
  readonly resistance: number;
  /** Between the outputs [F]. */
  readonly tankCapacitance: number;
  /** Width of each transistor of the pair [m]. */
  readonly pairWidth: number;
  /** [m] */
  readonly tailWidth: number;
  /** [m] */
  readonly mirrorWidth: number;
  /** [A] */
  readonly referenceCurrent: number;
  /** From each output to ground [F]. */
  readonly loadCapacitance: number | undefined;
  /** From the tail node to ground [F]. */
  readonly tailCapacitance: number | undefined;
  /** From the mirror's gate to ground [F]. */
  readonly mirrorCapacitance: number | undefined;
}

/** Columns: the reference branch, the loads, the two outputs and the line of symmetry between them. */
const REFERENCE = 6;
const LOAD_PLUS = 10;
const PLUS = 13;
const MIDDLE = 18;
const MINUS = 23;
const LOAD_MINUS = 26;
/** Row of the ground symbols of the tail, its mirror and what hangs beside them. */
const FLOOR = 20;

/**
 * The schematic of the cross-coupled N pair: tank on top, pair below it, tail and mirror at the bottom.
 * Capacitances of 0 F are not drawn.
 *
 * A symbol's middle is its grid point; without a turn a capacitor, resistor or current source reaches
 * one grid unit up and down, an inductor two, and a transistor's gate lies one to the left, its drain
 * and source one to the right, one up and one down. A symmetric symbol is mirrored where its text
 * belongs on the left.
 */
export function pairSchematic(values: PairSchematicValues): Schematic {
  const branches = [
    tankBranch(values),
    loadBranch("plus", { output: PLUS, load: LOAD_PLUS, capacitance: values.loadCapacitance }),
    loadBranch("minus", { output: MINUS, load: LOAD_MINUS, capacitance: values.loadCapacitance }),
    groundedCapacitor("tail capacitor", {
      from: [MINUS, 15],
      column: MINUS + 2,
      capacitance: values.tailCapacitance,
    }),
    groundedCapacitor("mirror capacitor", {
      from: [LOAD_PLUS + 2, 17],
      column: LOAD_PLUS + 2,
      capacitance: values.mirrorCapacitance,
    }),
  ];
  const width = (value: number) => ({ value: { value, unit: "m" } });
  return {
    width: 31,
    height: 22,
    symbols: [
      ...branches.flatMap(({ symbols }) => symbols),
      {
        kind: "transistor n",
        name: "pair plus",
        at: [PLUS + 1, 13],
        mirrored: true,
        ...width(values.pairWidth),
      },
      { kind: "transistor n", name: "pair minus", at: [MINUS - 1, 13], ...width(values.pairWidth) },
      { kind: "transistor n", name: "tail", at: [MIDDLE - 1, 17], ...width(values.tailWidth) },
      {
        kind: "transistor n",
        name: "mirror",
        at: [REFERENCE + 1, 17],
        mirrored: true,
        ...width(values.mirrorWidth),
      },
      {
        kind: "current source",
        name: "reference current",
        at: [REFERENCE, 13],
        mirrored: true,
        value: { value: values.referenceCurrent, unit: "A" },
      },
      { kind: "supply", name: "supply", at: [REFERENCE, 11], mirrored: true },
      { kind: "ground", name: "", at: [MIDDLE, FLOOR] },
      { kind: "ground", name: "", at: [REFERENCE, FLOOR] },
    ],
    wires: [
      ...branches.flatMap(({ wires }) => wires),
      [[PLUS, 3], [PLUS, 12]],
      [[MINUS, 3], [MINUS, 12]],
      [[PLUS + 2, 13], [PLUS + 3, 13], [MINUS - 3, 10], [MINUS, 10]],
      [[MINUS - 2, 13], [MINUS - 3, 13], [PLUS + 3, 10], [PLUS, 10]],
      [[PLUS, 14], [PLUS, 15], [MINUS, 15], [MINUS, 14]],
      [[MIDDLE, 15], [MIDDLE, 16]],
      [[MIDDLE, 18], [MIDDLE, FLOOR]],
      [[REFERENCE, 11], [REFERENCE, 12]],
      [[REFERENCE, 14], [REFERENCE, 16]],
      [[REFERENCE, 18], [REFERENCE, FLOOR]],
      [[REFERENCE + 2, 17], [MIDDLE - 2, 17]],
      [[REFERENCE, 15], [LOAD_PLUS, 15], [LOAD_PLUS, 17]],
    ],
    joints: [
      ...branches.flatMap(({ joints }) => joints),
      [PLUS, 10],
      [MINUS, 10],
      [MIDDLE, 15],
      [REFERENCE, 15],
      [LOAD_PLUS, 17],
    ],
  };
}

/** A piece of the schematic. */
interface Branch {
  readonly symbols: readonly SchematicSymbol[];
  readonly wires: Schematic["wires"];
  readonly joints: readonly Point[];
}

function tankBranch({ inductance, resistance, tankCapacitance }: PairSchematicValues): Branch {
  return {
    symbols: [
      { kind: "supply", name: "supply", at: [MIDDLE, 1] },
      {
        kind: "inductor",
        name: "coil, both halves",
        at: [PLUS + 3, 3],
        turn: 1,
        value: { value: inductance, unit: "H" },
      },
      { kind: "inductor", name: "", at: [MINUS - 3, 3], turn: 1 },
      {
        kind: "resistor",
        name: "tank loss",
        at: [MIDDLE, 5],
        turn: 1,
        value: { value: resistance, unit: "ohm" },
      },
      {
        kind: "capacitor",
        name: "tank capacitor",
        at: [MIDDLE, 7],
        turn: 1,
        value: { value: tankCapacitance, unit: "F" },
      },
    ],
    wires: [
      [[MIDDLE, 1], [MIDDLE, 3]],
      [[PLUS, 3], [PLUS + 1, 3]],
      [[MINUS - 1, 3], [MINUS, 3]],
      ...[5, 7].flatMap((row): Point[][] => [
        [[PLUS, row], [MIDDLE - 1, row]],
        [[MIDDLE + 1, row], [MINUS, row]],
      ]),
    ],
    joints: [[MIDDLE, 3], ...[5, 7].flatMap((row): Point[] => [[PLUS, row], [MINUS, row]])],
  };
}

/** An output's terminal, with the load from it to ground. */
function loadBranch(
  side: "plus" | "minus",
  { output, load, capacitance = 0 }: {
    readonly output: number;
    readonly load: number;
    readonly capacitance: number | undefined;
  },
): Branch {
  const mirrored = side === "plus";
  const terminal: Point = [load + (mirrored ? -1 : 1), 8];
  const label: SchematicSymbol = { kind: "label", name: side, at: terminal, mirrored };
  const wires: Point[][] = [[[output, 8], terminal]];
  if (capacitance === 0) return { symbols: [label], wires, joints: [[output, 8]] };
  return {
    symbols: [
      label,
      {
        kind: "capacitor",
        name: `load ${side}`,
        at: [load, 10],
        mirrored,
        value: { value: capacitance, unit: "F" },
      },
      { kind: "ground", name: "", at: [load, 11] },
    ],
    wires: [...wires, [[load, 8], [load, 9]]],
    joints: [[output, 8], [load, 8]],
  };
}

/** A capacitor to ground in a column, from a point of a wire two rows above it. */
function groundedCapacitor(
  name: string,
  { from: [x, y], column, capacitance = 0 }: {
    readonly from: Point;
    readonly column: number;
    readonly capacitance: number | undefined;
  },
): Branch {
  if (capacitance === 0) return { symbols: [], wires: [], joints: [] };
  const middle: Point = [column, y + 2];
  const wire: Point[] = column === x ? [[x, y]] : [[x, y], [column, y]];
  return {
    symbols: [
      { kind: "capacitor", name, at: middle, value: { value: capacitance, unit: "F" } },
      { kind: "ground", name: "", at: [column, FLOOR] },
    ],
    wires: [[...wire, [column, y + 1]], [[column, y + 3], [column, FLOOR]]],
    joints: [[x, y]],
  };
}
