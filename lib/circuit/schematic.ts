/** A schematic as data: symbols on a grid, wires and values; drawing is somebody else's work. */
export interface Schematic {
  /** Width and height in grid units [1]. */
  readonly width: number;
  readonly height: number;
  readonly symbols: readonly SchematicSymbol[];
  /** Polylines through grid points. */
  readonly wires: readonly (readonly (readonly [number, number])[])[];
  /** Points where wires join. */
  readonly joints: readonly (readonly [number, number])[];
}

/** What a symbol stands for. */
export type SymbolKind =
  | "inductor"
  | "capacitor"
  | "resistor"
  | "transistor n"
  | "transistor p"
  | "current source"
  | "supply"
  | "ground"
  | "label";

/** One symbol of a schematic. */
export interface SchematicSymbol {
  readonly kind: SymbolKind;
  readonly name: string;
  /** Grid point of the symbol's middle. */
  readonly at: readonly [number, number];
  /** Quarter turns, counter-clockwise [1]. @default 0 */
  readonly turn?: 0 | 1 | 2 | 3;
  /** Drawn mirrored left to right. @default false */
  readonly mirrored?: boolean;
  /** Value with unit: SI number and unit name. */
  readonly value?: { readonly value: number; readonly unit: string };
}
