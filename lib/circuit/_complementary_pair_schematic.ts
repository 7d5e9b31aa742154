import type { TransistorSize } from "../device/transistor_parameters.ts";
import {
  acrossJoints,
  acrossWires,
  groundedCapacitor,
  loadPieces,
  merged,
  MIDDLE,
  MINUS,
  parallelSymbols,
  PLUS,
  referencePiece,
  symbol,
  tailPiece,
} from "./_schematic_parts.ts";
import type { Schematic } from "./schematic.ts";
import type { TankDesign } from "./topology.ts";

/** Values written beside the symbols. */
export interface ComplementarySchematicValues {
  readonly tank: TankDesign;
  readonly pair: TransistorSize;
  readonly pairP: TransistorSize;
  readonly tail: TransistorSize;
  /** [ohm] */
  readonly resistance: number;
  /** [m] */
  readonly mirrorWidth: number;
  /** [A] */
  readonly referenceCurrent: number;
  readonly loadCapacitance?: number;
  readonly tailCapacitance?: number;
  readonly mirrorCapacitance?: number;
}

/** Rows: gates of the upper pair, the coil, gates of the lower pair, the tail's gate. */
const UPPER = 4;
const COIL = 9;
const LOWER = 20;
const TAIL = LOWER + 4;

/** The schematic of the complementary pair: P pair, tank, N pair, tail and mirror from top to bottom. */
export function complementarySchematic(values: ComplementarySchematicValues): Schematic {
  const { tank, pair, pairP, tail, resistance } = values;
  const rows = tank.capacitance === 0 ? [COIL + 2] : [COIL + 2, COIL + 4];
  return {
    width: 31,
    height: TAIL + 5,
    ...merged([
      {
        symbols: [
          symbol("supply", "supply", { at: [MIDDLE, UPPER - 3] }),
          symbol("transistor p", "upper pair plus", {
            at: [PLUS + 1, UPPER],
            mirrored: true,
            value: pairP.width,
          }),
          symbol("transistor p", "upper pair minus", {
            at: [MINUS - 1, UPPER],
            value: pairP.width,
          }),
          symbol("inductor", "coil", { at: [MIDDLE, COIL], turn: 1, value: tank.inductance }),
          ...parallelSymbols({ resistance, tankCapacitance: tank.capacitance, row: COIL + 2 }),
          symbol("transistor n", "pair plus", {
            at: [PLUS + 1, LOWER],
            mirrored: true,
            value: pair.width,
          }),
          symbol("transistor n", "pair minus", { at: [MINUS - 1, LOWER], value: pair.width }),
        ],
        wires: [
          [[MIDDLE, UPPER - 3], [MIDDLE, UPPER - 2]],
          [[PLUS, UPPER - 1], [PLUS, UPPER - 2], [MINUS, UPPER - 2], [MINUS, UPPER - 1]],
          [[PLUS, UPPER + 1], [PLUS, LOWER - 1]],
          [[MINUS, UPPER + 1], [MINUS, LOWER - 1]],
          [[PLUS + 2, UPPER], [PLUS + 3, UPPER], [MINUS - 3, UPPER + 3], [MINUS, UPPER + 3]],
          [[MINUS - 2, UPPER], [MINUS - 3, UPPER], [PLUS + 3, UPPER + 3], [PLUS, UPPER + 3]],
          [[PLUS, COIL], [MIDDLE - 2, COIL]],
          [[MIDDLE + 2, COIL], [MINUS, COIL]],
          ...rows.flatMap(acrossWires),
          [[PLUS + 2, LOWER], [PLUS + 3, LOWER], [MINUS - 3, LOWER - 3], [MINUS, LOWER - 3]],
          [[MINUS - 2, LOWER], [MINUS - 3, LOWER], [PLUS + 3, LOWER - 3], [PLUS, LOWER - 3]],
          [[PLUS, LOWER + 1], [PLUS, LOWER + 2], [MINUS, LOWER + 2], [MINUS, LOWER + 1]],
        ],
        joints: [
          [MIDDLE, UPPER - 2],
          ...[UPPER + 3, COIL, ...rows, LOWER - 3].flatMap(acrossJoints),
          [MIDDLE, LOWER + 2],
        ],
      },
      loadPieces({ capacitance: values.loadCapacitance, row: COIL + 6 }),
      tailPiece("tail", { column: MIDDLE, row: TAIL, from: LOWER + 2, width: tail.width }),
      referencePiece({
        row: TAIL,
        gateTo: MIDDLE - 2,
        mirrorWidth: values.mirrorWidth,
        referenceCurrent: values.referenceCurrent,
        mirrorCapacitance: values.mirrorCapacitance,
      }),
      groundedCapacitor("tail capacitor", {
        from: [MINUS, LOWER + 2],
        column: MINUS + 2,
        floor: TAIL + 3,
        capacitance: values.tailCapacitance,
      }),
    ]),
  };
}
