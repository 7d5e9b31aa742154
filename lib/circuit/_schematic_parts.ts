/**
 * Pieces that several schematics are drawn from.
 *
 * A symbol's middle is its grid point; without a turn a capacitor, resistor or current source reaches
 * one grid unit up and down, an inductor two, and a transistor's gate lies one to the left, its drain
 * and source one to the right, one up and one down (an N transistor's source below). A symmetric symbol
 * is mirrored where its text belongs on the left.
 *
 * @module
 */
import type { Schematic, SchematicSymbol, SymbolKind } from "./schematic.ts";

export type Point = readonly [number, number];

/** A piece of a schematic. */
export interface Piece {
  readonly symbols: readonly SchematicSymbol[];
  readonly wires: readonly (readonly Point[])[];
  readonly joints: readonly Point[];
}

/** Columns of the schematics with two sides, and the line of symmetry between them. */
export const REFERENCE = 6;
export const PLUS = 13;
export const MIDDLE = 18;
export const MINUS = 23;
/** Columns of the loads at the outputs. */
const LOAD_PLUS = 10;
const LOAD_MINUS = 26;

const UNITS: Partial<Record<SymbolKind, string>> = {
  inductor: "H",
  capacitor: "F",
  resistor: "ohm",
  "transistor n": "m",
  "transistor p": "m",
  "current source": "A",
};

/** A symbol with its value in the unit of its kind. */
export function symbol(
  kind: SymbolKind,
  name: string,
  { at, turn, mirrored, value }: {
    readonly at: Point;
    readonly turn?: 1;
    readonly mirrored?: boolean;
    readonly value?: number;
  },
): SchematicSymbol {
  const unit = UNITS[kind];
  return {
    kind,
    name,
    at,
    ...(turn ? { turn } : {}),
    ...(mirrored ? { mirrored } : {}),
    ...(value !== undefined && unit !== undefined ? { value: { value, unit } } : {}),
  };
}

/** Pieces as one. */
export function merged(pieces: readonly Partial<Piece>[]): Piece {
  return {
    symbols: pieces.flatMap(({ symbols = [] }) => symbols),
    wires: pieces.flatMap(({ wires = [] }) => wires),
    joints: pieces.flatMap(({ joints = [] }) => joints),
  };
}

/** A schematic turned upside down, N for P and ground for supply: the mirror image of a circuit. */
export function upsideDown({ width, height, symbols, wires, joints }: Schematic): Schematic {
  const turned = ([x, y]: Point): Point => [x, height - y];
  const kinds: Partial<Record<SymbolKind, SymbolKind>> = {
    "transistor n": "transistor p",
    "transistor p": "transistor n",
    supply: "ground",
    ground: "supply",
  };
  return {
    width,
    height,
    symbols: symbols.map((entry) => {
      const kind = kinds[entry.kind] ?? entry.kind;
      const name = kind === "supply" ? "supply" : kind === "ground" ? "" : entry.name;
      return { ...entry, kind, name, at: turned(entry.at) };
    }),
    wires: wires.map((wire) => wire.map(turned)),
    joints: joints.map(turned),
  };
}

/** A piece and its mirror image about a column; `rename` names the symbols of the image. */
export function bothSides(
  piece: Piece,
  { about, rename }: { readonly about: number; readonly rename: (name: string) => string },
): Piece {
  const over = ([x, y]: Point): Point => [2 * about - x, y];
  const image: Piece = {
    symbols: piece.symbols.map((entry) => ({
      ...entry,
      name: rename(entry.name),
      at: over(entry.at),
      mirrored: !(entry.mirrored ?? false),
    })),
    wires: piece.wires.map((wire) => wire.map(over)),
    joints: piece.joints.map(over),
  };
  return merged([piece, image]);
}

/** The centre-tapped tank of two sides, coil in row 3. */
export function tappedTankPiece(
  { inductance, resistance, tankCapacitance }: {
    readonly inductance: number;
    readonly resistance: number;
    readonly tankCapacitance: number;
  },
): Piece {
  const rows = tankCapacitance === 0 ? [5] : [5, 7];
  return {
    symbols: [
      symbol("supply", "supply", { at: [MIDDLE, 1] }),
      symbol("inductor", "coil, both halves", { at: [PLUS + 3, 3], turn: 1, value: inductance }),
      symbol("inductor", "", { at: [MINUS - 3, 3], turn: 1 }),
      ...parallelSymbols({ resistance, tankCapacitance, row: 5 }),
    ],
    wires: [
      [[MIDDLE, 1], [MIDDLE, 3]],
      [[PLUS, 3], [PLUS + 1, 3]],
      [[MINUS - 1, 3], [MINUS, 3]],
      ...rows.flatMap(acrossWires),
    ],
    joints: [[MIDDLE, 3], ...rows.flatMap(acrossJoints)],
  };
}

/** The tank's loss and capacitor between the outputs, in `row` and two rows below. */
export function parallelSymbols(
  { resistance, tankCapacitance, row }: {
    readonly resistance: number;
    readonly tankCapacitance: number;
    readonly row: number;
  },
): SchematicSymbol[] {
  return [
    symbol("resistor", "tank loss", { at: [MIDDLE, row], turn: 1, value: resistance }),
    ...(tankCapacitance === 0 ? [] : [
      symbol("capacitor", "tank capacitor", {
        at: [MIDDLE, row + 2],
        turn: 1,
        value: tankCapacitance,
      }),
    ]),
  ];
}

export function acrossWires(row: number): Point[][] {
  return [[[PLUS, row], [MIDDLE - 1, row]], [[MIDDLE + 1, row], [MINUS, row]]];
}

export function acrossJoints(row: number): Point[] {
  return [[PLUS, row], [MINUS, row]];
}

/** Both outputs' terminals in a row, each with the load from it to ground. */
export function loadPieces(
  { capacitance = 0, row = 8 }: { readonly capacitance: number | undefined; readonly row?: number },
): Piece {
  return merged((["plus", "minus"] as const).map((side): Piece => {
    const mirrored = side === "plus";
    const [output, load] = mirrored ? [PLUS, LOAD_PLUS] : [MINUS, LOAD_MINUS];
    const terminal: Point = [load + (mirrored ? -1 : 1), row];
    const label = symbol("label", side, { at: terminal, mirrored });
    const wires: Point[][] = [[[output, row], terminal]];
    if (capacitance === 0) return { symbols: [label], wires, joints: [[output, row]] };
    return {
      symbols: [
        label,
        symbol("capacitor", `load ${side}`, { at: [load, row + 2], mirrored, value: capacitance }),
        symbol("ground", "", { at: [load, row + 3] }),
      ],
      wires: [...wires, [[load, row], [load, row + 1]]],
      joints: [[output, row], [load, row]],
    };
  }));
}

/** A capacitor to ground in a column, from a point of a wire two rows above it. */
export function groundedCapacitor(
  name: string,
  { from: [x, y], column, floor, capacitance = 0 }: {
    readonly from: Point;
    readonly column: number;
    /** Row of the ground symbol. */
    readonly floor: number;
    readonly capacitance: number | undefined;
  },
): Piece {
  if (capacitance === 0) return merged([]);
  const wire: Point[] = column === x ? [[x, y]] : [[x, y], [column, y]];
  return {
    symbols: [
      symbol("capacitor", name, { at: [column, y + 2], value: capacitance }),
      symbol("ground", "", { at: [column, floor] }),
    ],
    wires: [[...wire, [column, y + 1]], [[column, y + 3], [column, floor]]],
    joints: [[x, y]],
  };
}

/**
 * The reference branch at column `REFERENCE`, with the mirror's gate led to the right in `row`, and the
 * capacitor at that gate.
 */
export function referencePiece(
  { row, gateTo, mirrorWidth, referenceCurrent, mirrorCapacitance }: {
    readonly row: number;
    /** Column at which the first tail's gate lies. */
    readonly gateTo: number;
    readonly mirrorWidth: number;
    readonly referenceCurrent: number;
    readonly mirrorCapacitance: number | undefined;
  },
): Piece {
  const floor = row + 3;
  return merged([
    {
      symbols: [
        symbol("supply", "supply", { at: [REFERENCE, row - 6], mirrored: true }),
        symbol("current source", "reference current", {
          at: [REFERENCE, row - 4],
          mirrored: true,
          value: referenceCurrent,
        }),
        symbol("transistor n", "mirror", {
          at: [REFERENCE + 1, row],
          mirrored: true,
          value: mirrorWidth,
        }),
        symbol("ground", "", { at: [REFERENCE, floor] }),
      ],
      wires: [
        [[REFERENCE, row - 6], [REFERENCE, row - 5]],
        [[REFERENCE, row - 3], [REFERENCE, row - 1]],
        [[REFERENCE, row + 1], [REFERENCE, floor]],
        [[REFERENCE + 2, row], [gateTo, row]],
        [[REFERENCE, row - 2], [REFERENCE + 4, row - 2], [REFERENCE + 4, row]],
      ],
      joints: [[REFERENCE, row - 2], [REFERENCE + 4, row]],
    },
    groundedCapacitor("mirror capacitor", {
      from: [REFERENCE + 4, row],
      column: REFERENCE + 4,
      floor,
      capacitance: mirrorCapacitance,
    }),
  ]);
}

/** A tail transistor from a drain point down to ground; its gate lies two to the left of the drain. */
export function tailPiece(
  name: string,
  { column, row, from, width }: {
    readonly column: number;
    readonly row: number;
    /** Row of the node its drain goes to. */
    readonly from: number;
    readonly width: number;
  },
): Piece {
  return {
    symbols: [
      symbol("transistor n", name, { at: [column - 1, row], value: width }),
      symbol("ground", "", { at: [column, row + 3] }),
    ],
    wires: [[[column, from], [column, row - 1]], [[column, row + 1], [column, row + 3]]],
    joints: [],
  };
}
