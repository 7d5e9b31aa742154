import {
  groundedCapacitor,
  loadPieces,
  merged,
  MIDDLE,
  MINUS,
  type Piece,
  PLUS,
  type Point,
  referencePiece,
  symbol,
  tailPiece,
  tappedTankPiece,
} from "./_schematic_parts.ts";
import type { Schematic } from "./schematic.ts";

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
  /** From each output to ground [F]. */
  readonly loadCapacitance: number | undefined;
  readonly foot: FootValues;
}

/** What stands below the pair. */
export type FootValues =
  | {
    readonly kind: "mirror";
    /** [m] */
    readonly tailWidth: number;
    /** [m] */
    readonly mirrorWidth: number;
    /** [A] */
    readonly referenceCurrent: number;
    /** From the tail transistor's drain to ground [F]. */
    readonly tailCapacitance: number | undefined;
    /** From the mirror's gate to ground [F]. */
    readonly mirrorCapacitance: number | undefined;
    /** Of the tail filter's coil; none without a filter [H]. */
    readonly filterInductance?: number;
    /** At the pair's sources [F]. */
    readonly filterCapacitance?: number | undefined;
  }
  | {
    readonly kind: "resistor";
    /** [ohm] */
    readonly tailResistance: number;
    /** [F] */
    readonly tailCapacitance: number | undefined;
  }
  | { readonly kind: "none" };

/** Row of the wire between the pair's sources. */
const SOURCES = 15;
/** Rows a tail filter pushes the tail down by. */
const FILTER_ROWS = 5;

/**
 * The schematic of the cross-coupled N pair: tank on top, pair below it, its foot at the bottom.
 * Capacitances of 0 F are not drawn.
 */
export function pairSchematic(values: PairSchematicValues): Schematic {
  const { foot, pairWidth, loadCapacitance } = values;
  const { floor, piece } = footPiece(foot);
  return {
    width: 31,
    height: floor + 2,
    ...merged([
      tappedTankPiece(values),
      loadPieces({ capacitance: loadCapacitance }),
      {
        symbols: [
          symbol("transistor n", "pair plus", {
            at: [PLUS + 1, 13],
            mirrored: true,
            value: pairWidth,
          }),
          symbol("transistor n", "pair minus", { at: [MINUS - 1, 13], value: pairWidth }),
        ],
        wires: [
          [[PLUS, 3], [PLUS, 12]],
          [[MINUS, 3], [MINUS, 12]],
          [[PLUS + 2, 13], [PLUS + 3, 13], [MINUS - 3, 10], [MINUS, 10]],
          [[MINUS - 2, 13], [MINUS - 3, 13], [PLUS + 3, 10], [PLUS, 10]],
          [[PLUS, 14], [PLUS, SOURCES], [MINUS, SOURCES], [MINUS, 14]],
        ],
        joints: [[PLUS, 10], [MINUS, 10], [MIDDLE, SOURCES]],
      },
      piece,
    ]),
  };
}

function footPiece(foot: FootValues): { floor: number; piece: Piece } {
  const common: Point = [MIDDLE, SOURCES];
  if (foot.kind === "none") {
    const floor = SOURCES + 1;
    return {
      floor,
      piece: {
        symbols: [symbol("ground", "", { at: [MIDDLE, floor] })],
        wires: [[common, [MIDDLE, floor]]],
        joints: [],
      },
    };
  }
  if (foot.kind === "resistor") {
    const floor = SOURCES + 5;
    return {
      floor,
      piece: merged([
        {
          symbols: [
            symbol("resistor", "tail", { at: [MIDDLE, SOURCES + 2], value: foot.tailResistance }),
            symbol("ground", "", { at: [MIDDLE, floor] }),
          ],
          wires: [
            [common, [MIDDLE, SOURCES + 1]],
            [[MIDDLE, SOURCES + 3], [MIDDLE, floor]],
          ],
        },
        groundedCapacitor("tail capacitor", {
          from: [MINUS, SOURCES],
          column: MINUS + 2,
          floor,
          capacitance: foot.tailCapacitance,
        }),
      ]),
    };
  }
  const { filterInductance } = foot;
  const row = SOURCES + 2 + (filterInductance === undefined ? 0 : FILTER_ROWS);
  const floor = row + 3;
  const tailNode: Point = filterInductance === undefined ? [MINUS, SOURCES] : [MIDDLE, row - 2];
  return {
    floor,
    piece: merged([
      tailPiece("tail", {
        column: MIDDLE,
        row,
        from: filterInductance === undefined ? SOURCES : row - 2,
        width: foot.tailWidth,
      }),
      referencePiece({ row, gateTo: MIDDLE - 2, ...foot }),
      groundedCapacitor("tail capacitor", {
        from: tailNode,
        column: MINUS + 2,
        floor,
        capacitance: foot.tailCapacitance,
      }),
      ...(filterInductance === undefined ? [] : [
        {
          symbols: [
            symbol("inductor", "tail filter coil", {
              at: [MIDDLE, SOURCES + 3],
              mirrored: true,
              value: filterInductance,
            }),
          ],
          wires: [[common, [MIDDLE, SOURCES + 1]]] as const,
        },
        groundedCapacitor("tail filter capacitor", {
          from: [MINUS, SOURCES],
          column: MINUS + 2,
          floor: SOURCES + 4,
          capacitance: foot.filterCapacitance,
        }),
      ]),
    ]),
  };
}
