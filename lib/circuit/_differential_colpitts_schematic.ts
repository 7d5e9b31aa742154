import type { TransistorSize } from "../device/transistor_parameters.ts";
import {
  bothSides,
  groundedCapacitor,
  loadPieces,
  merged,
  MIDDLE,
  MINUS,
  type Piece,
  PLUS,
  referencePiece,
  symbol,
  tailPiece,
  tappedTankPiece,
} from "./_schematic_parts.ts";
import type { Schematic } from "./schematic.ts";
import type { Divider, TankDesign } from "./topology.ts";

/** Values written beside the symbols. */
export interface DifferentialColpittsSchematicValues {
  readonly tank: TankDesign;
  readonly divider: Divider;
  readonly joined?: boolean;
  readonly core: TransistorSize;
  /** The steering pair; none with a tail for each side. */
  readonly steering?: TransistorSize;
  readonly tail: TransistorSize;
  /** [ohm] */
  readonly resistance: number;
  /** [m] */
  readonly mirrorWidth: number;
  /** [A] */
  readonly referenceCurrent: number;
  /** Drawn as a terminal of that name where it is given. */
  readonly gateBias?: number;
  readonly tailCapacitance?: number;
  readonly mirrorCapacitance?: number;
}

/** Rows: the cores' gates, the sources' terminals, the steering pair's gates. */
const GATES = 12;
const SOURCES = 15;
const STEERING = 18;
/** Columns of the first capacitors, outside the transistors, and of the second ones, further out. */
const FIRST = PLUS - 3;
const SECOND = PLUS - 5;

/** The schematic of the differential Colpitts oscillators. */
export function differentialColpittsSchematic(
  values: DifferentialColpittsSchematicValues,
): Schematic {
  const { tank, divider, joined = true, core, steering, tail } = values;
  const row = steering ? STEERING + 4 : SOURCES + 6;
  const side = merged([
    {
      symbols: [
        symbol("transistor n", "core plus", {
          at: [PLUS + 1, GATES],
          mirrored: true,
          value: core.width,
        }),
        symbol("capacitor", "first capacitor plus", {
          at: [FIRST, GATES],
          mirrored: true,
          value: divider.first,
        }),
      ],
      wires: [
        [[PLUS, 3], [PLUS, GATES - 1]],
        [[PLUS, GATES - 2], [FIRST, GATES - 2], [FIRST, GATES - 1]],
        [[FIRST, GATES + 1], [FIRST, SOURCES - 1], [PLUS, SOURCES - 1]],
        [[PLUS, GATES + 1], [PLUS, steering ? STEERING - 1 : SOURCES + 1]],
        [[PLUS + 2, GATES], [MIDDLE, GATES]],
      ],
      joints: [[PLUS, GATES - 2], [PLUS, SOURCES - 1]],
    },
    joined ? {} : {
      symbols: [
        symbol("capacitor", "second capacitor plus", {
          at: [SECOND, SOURCES + 1],
          mirrored: true,
          value: divider.second,
        }),
        symbol("ground", "", { at: [SECOND, SOURCES + 2] }),
      ],
      wires: [[[FIRST, SOURCES - 1], [SECOND, SOURCES - 1], [SECOND, SOURCES]]],
      joints: [[FIRST, SOURCES - 1]],
    },
    steering
      ? {
        symbols: [
          symbol("transistor n", "steering plus", {
            at: [PLUS + 1, STEERING],
            mirrored: true,
            value: steering.width,
          }),
          symbol("label", "minus", { at: [PLUS + 3, STEERING] }),
        ],
        wires: [
          [[PLUS + 2, STEERING], [PLUS + 3, STEERING]],
          [[PLUS, STEERING + 1], [PLUS, STEERING + 2], [MIDDLE, STEERING + 2]],
        ],
        joints: [],
      }
      : {},
  ]);
  const otherSide = (name: string) => name === "minus" ? "plus" : name.replace(/plus$/, "minus");
  return {
    width: 35,
    height: row + 5,
    ...merged([
      tappedTankPiece({ ...values, ...tank, tankCapacitance: tank.capacitance }),
      loadPieces({ capacitance: 0 }),
      bothSides(side, { about: MIDDLE, rename: otherSide }),
      {
        symbols: [
          values.gateBias === undefined
            ? symbol("supply", "supply", { at: [MIDDLE, GATES - 1] })
            : symbol("label", "gate bias", { at: [MIDDLE, GATES - 1] }),
        ],
        wires: [[[MIDDLE, GATES - 1], [MIDDLE, GATES]]],
        joints: [[MIDDLE, GATES]],
      },
      joined
        ? {
          symbols: [
            symbol("capacitor", "second capacitor", {
              at: [MIDDLE, SOURCES],
              turn: 1,
              value: divider.second / 2,
            }),
          ],
          wires: [[[PLUS, SOURCES], [MIDDLE - 1, SOURCES]], [[MIDDLE + 1, SOURCES], [
            MINUS,
            SOURCES,
          ]]],
          joints: [[PLUS, SOURCES], [MINUS, SOURCES]],
        }
        : {},
      tails({ row, steering: steering !== undefined, width: tail.width }),
      groundedCapacitor("tail capacitor", {
        from: [MIDDLE, STEERING + 2],
        column: MINUS + 2,
        floor: row + 3,
        capacitance: steering ? values.tailCapacitance : 0,
      }),
      referencePiece({
        row,
        gateTo: steering ? MIDDLE - 2 : PLUS - 2,
        mirrorWidth: values.mirrorWidth,
        referenceCurrent: values.referenceCurrent,
        mirrorCapacitance: values.mirrorCapacitance,
      }),
    ]),
  };
}

/** The steered tail in the middle, or one below each source with the gates in one row. */
function tails(
  { row, steering, width }: {
    readonly row: number;
    readonly steering: boolean;
    readonly width: number;
  },
): Piece {
  if (steering) {
    const one = tailPiece("tail", { column: MIDDLE, row, from: STEERING + 2, width });
    return merged([one, { joints: [[MIDDLE, STEERING + 2]] }]);
  }
  return merged([
    tailPiece("tail plus", { column: PLUS, row, from: SOURCES + 1, width }),
    tailPiece("tail minus", { column: MINUS, row, from: SOURCES + 1, width }),
    // The gate's wire passes under the first tail's channel side.
    {
      wires: [[[PLUS - 2, row], [PLUS - 2, row + 2], [MINUS - 2, row + 2], [MINUS - 2, row]]],
      joints: [[PLUS - 2, row]],
    },
  ]);
}
