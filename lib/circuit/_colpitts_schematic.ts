import type { TransistorSize } from "../device/transistor_parameters.ts";
import {
  groundedCapacitor,
  merged,
  type Piece,
  referencePiece,
  symbol,
  tailPiece,
} from "./_schematic_parts.ts";
import type { Schematic } from "./schematic.ts";
import type { Divider, TankDesign } from "./topology.ts";

/** Values written beside the symbols. */
export interface ColpittsSchematicValues {
  readonly tank: TankDesign;
  readonly divider: Divider;
  readonly core: TransistorSize;
  readonly tail: TransistorSize;
  /** [ohm] */
  readonly resistance: number;
  /** [m] */
  readonly mirrorWidth: number;
  /** [A] */
  readonly referenceCurrent: number;
  /** Drawn as a terminal of that name where it is given. */
  readonly gateBias?: number;
  readonly mirrorCapacitance?: number;
}

/** Column of the transistors, and of coil, loss and capacitors to its right. */
const CORE = 18;
const RIGHT = 22;
const FAR = 27;
/** Rows: the drain's wire, the core's gate, the source's wire, the tail's gate. */
const DRAIN = 7;
const GATE = 10;
const SOURCE = 13;
const TAIL = 15;

/** The schematic of the single-ended Colpitts oscillator. */
export function colpittsSchematic(values: ColpittsSchematicValues): Schematic {
  const { tank, divider, core, tail, resistance } = values;
  const beside: Piece = groundedCapacitor("tank capacitor", {
    from: [FAR, DRAIN],
    column: FAR,
    floor: DRAIN + 4,
    capacitance: tank.capacitance,
  });
  return {
    width: 33,
    height: TAIL + 5,
    ...merged([
      {
        symbols: [
          symbol("supply", "supply", { at: [CORE, 1], mirrored: true }),
          symbol("inductor", "coil", {
            at: [CORE, 4],
            mirrored: true,
            value: tank.inductance,
          }),
          symbol("resistor", "tank loss", { at: [RIGHT, 4], value: resistance }),
          symbol("label", "drain", { at: [FAR + 2, DRAIN] }),
          symbol("transistor n", "core", { at: [CORE - 1, GATE], value: core.width }),
          values.gateBias === undefined
            ? symbol("supply", "supply", { at: [CORE - 4, GATE - 2], mirrored: true })
            : symbol("label", "gate bias", { at: [CORE - 4, GATE - 2], mirrored: true }),
          symbol("capacitor", "first capacitor", { at: [RIGHT, GATE], value: divider.first }),
        ],
        wires: [
          [[CORE, 1], [CORE, 2]],
          [[CORE, 2], [RIGHT, 2], [RIGHT, 3]],
          [[RIGHT, 5], [RIGHT, GATE - 1]],
          [[CORE, 6], [CORE, GATE - 1]],
          [[CORE, DRAIN], [FAR + 2, DRAIN]],
          [[CORE - 2, GATE], [CORE - 4, GATE], [CORE - 4, GATE - 2]],
          [[CORE, GATE + 1], [CORE, SOURCE]],
          [[RIGHT, GATE + 1], [RIGHT, SOURCE], [CORE, SOURCE]],
        ],
        joints: [[CORE, 2], [CORE, DRAIN], [RIGHT, DRAIN], [CORE, SOURCE]],
      },
      beside,
      groundedCapacitor("second capacitor", {
        from: [RIGHT, SOURCE],
        column: RIGHT,
        floor: TAIL + 3,
        capacitance: divider.second,
      }),
      tailPiece("tail", { column: CORE, row: TAIL, from: SOURCE, width: tail.width }),
      referencePiece({
        row: TAIL,
        gateTo: CORE - 2,
        mirrorWidth: values.mirrorWidth,
        referenceCurrent: values.referenceCurrent,
        mirrorCapacitance: values.mirrorCapacitance,
      }),
    ]),
  };
}
