import type { TransistorSize } from "../device/transistor_parameters.ts";
import {
  groundedCapacitor,
  loadPieces,
  merged,
  MIDDLE,
  MINUS,
  PLUS,
  referencePiece,
  symbol,
  tailPiece,
  tappedTankPiece,
} from "./_schematic_parts.ts";
import type { Schematic } from "./schematic.ts";
import type { TankDesign } from "./topology.ts";

/** Values written beside the symbols. */
export interface ClassCSchematicValues {
  readonly tank: TankDesign;
  readonly pair: TransistorSize;
  readonly tail: TransistorSize;
  /** [ohm] */
  readonly resistance: number;
  /** [m] */
  readonly mirrorWidth: number;
  /** [A] */
  readonly referenceCurrent: number;
  readonly biasResistance: number;
  readonly couplingCapacitance: number;
  readonly biasFilter: { readonly resistance: number; readonly capacitance: number };
  readonly tailCapacitance: number;
  readonly loadCapacitance?: number;
  readonly mirrorCapacitance?: number;
}

/** Rows: the outputs' terminals, where the cross wires leave, the gates, the sources, the tail's gate. */
const TERMINALS = 9;
const CROSS = 12;
const GATES = 17;
const SOURCES = GATES + 9;
const TAIL = SOURCES + 3;
/** Column of the filtered bias. */
const BIAS = 30;

/** The schematic of the class-C pair: the cross wires pass capacitors, the gates rest on a filtered bias. */
export function classCSchematic(values: ClassCSchematicValues): Schematic {
  const { tank, pair, tail, biasFilter } = values;
  return {
    width: 36,
    height: TAIL + 5,
    ...merged([
      tappedTankPiece({ ...values, ...tank, tankCapacitance: tank.capacitance }),
      loadPieces({ capacitance: values.loadCapacitance, row: TERMINALS }),
      {
        symbols: [
          symbol("transistor n", "pair plus", {
            at: [PLUS + 1, GATES],
            mirrored: true,
            value: pair.width,
          }),
          symbol("transistor n", "pair minus", { at: [MINUS - 1, GATES], value: pair.width }),
          symbol("capacitor", "block plus", {
            at: [PLUS + 3, GATES - 2],
            mirrored: true,
            value: values.couplingCapacitance,
          }),
          symbol("capacitor", "block minus", {
            at: [MINUS - 3, GATES - 2],
            value: values.couplingCapacitance,
          }),
          symbol("resistor", "bias plus", {
            at: [PLUS + 3, GATES + 2],
            value: values.biasResistance,
          }),
          symbol("resistor", "bias minus", {
            at: [MINUS - 3, GATES + 5],
            mirrored: true,
            value: values.biasResistance,
          }),
          symbol("label", "bias", { at: [MIDDLE, GATES + 8] }),
          symbol("label", "gate bias", { at: [BIAS, GATES - 5] }),
          symbol("resistor", "bias filter", {
            at: [BIAS, GATES - 3],
            value: biasFilter.resistance,
          }),
          symbol("label", "bias", { at: [BIAS + 2, GATES - 1] }),
        ],
        wires: [
          [[PLUS, 3], [PLUS, GATES - 1]],
          [[MINUS, 3], [MINUS, GATES - 1]],
          [[PLUS + 2, GATES], [PLUS + 3, GATES], [PLUS + 3, GATES - 1]],
          [[MINUS - 2, GATES], [MINUS - 3, GATES], [MINUS - 3, GATES - 1]],
          [[PLUS + 3, GATES - 3], [PLUS + 3, GATES - 4], [MINUS - 3, CROSS], [MINUS, CROSS]],
          [[MINUS - 3, GATES - 3], [MINUS - 3, GATES - 4], [PLUS + 3, CROSS], [PLUS, CROSS]],
          [[PLUS + 3, GATES], [PLUS + 3, GATES + 1]],
          [[MINUS - 3, GATES], [MINUS - 3, GATES + 4]],
          // Staggered, so that both have room for their text.
          [[PLUS + 3, GATES + 3], [PLUS + 3, GATES + 7], [MINUS - 3, GATES + 7], [
            MINUS - 3,
            GATES + 6,
          ]],
          [[MIDDLE, GATES + 7], [MIDDLE, GATES + 8]],
          [[PLUS, GATES + 1], [PLUS, SOURCES], [MINUS, SOURCES], [MINUS, GATES + 1]],
          [[BIAS, GATES - 5], [BIAS, GATES - 4]],
          [[BIAS, GATES - 2], [BIAS, GATES - 1], [BIAS + 2, GATES - 1]],
        ],
        joints: [
          [PLUS, CROSS],
          [MINUS, CROSS],
          [PLUS + 3, GATES],
          [MINUS - 3, GATES],
          [MIDDLE, GATES + 7],
          [MIDDLE, SOURCES],
        ],
      },
      groundedCapacitor("bias capacitor", {
        from: [BIAS, GATES - 1],
        column: BIAS,
        floor: GATES + 4,
        capacitance: biasFilter.capacitance,
      }),
      tailPiece("tail", { column: MIDDLE, row: TAIL, from: SOURCES, width: tail.width }),
      referencePiece({
        row: TAIL,
        gateTo: MIDDLE - 2,
        mirrorWidth: values.mirrorWidth,
        referenceCurrent: values.referenceCurrent,
        mirrorCapacitance: values.mirrorCapacitance,
      }),
      groundedCapacitor("tail capacitor", {
        from: [MINUS, SOURCES],
        column: MINUS + 2,
        floor: TAIL + 3,
        capacitance: values.tailCapacitance,
      }),
    ]),
  };
}
