import type { SchematicSymbol, SymbolKind } from "../../lib/circuit/schematic.ts";

/** A point or a vector in grid units, x to the right and y down. */
export type Point = readonly [number, number];

/** A stroke of a drawing, in grid units. */
export type Stroke =
  | { readonly kind: "line"; readonly points: readonly Point[]; readonly filled?: boolean }
  | { readonly kind: "bows"; readonly points: readonly Point[]; readonly clockwise: boolean }
  | {
    readonly kind: "circle";
    readonly middle: Point;
    readonly radius: number;
    readonly filled?: boolean;
  };

/** Radius of an open terminal, where the wire to it ends. */
export const TERMINAL_RADIUS = 0.17;

const INDUCTOR_TURNS = 4;
/** Half the length of an inductor's winding, and of a resistor's zigzag. */
const WINDING = 1.3;
const ZIGZAG = 0.66;
const GATE = -0.32;
const CHANNEL = 0.8;
const LEAD = 0.55;

function line(...points: Point[]): Stroke {
  return { kind: "line", points };
}

/** A filled arrow head. */
function arrow([x, y]: Point, [dx, dy]: Point): Stroke {
  const [length, half] = [0.34, 0.16];
  return {
    kind: "line",
    filled: true,
    points: [
      [x, y],
      [x - length * dx - half * dy, y - length * dy + half * dx],
      [x - length * dx + half * dy, y - length * dy - half * dx],
      [x, y],
    ],
  };
}

/** The strokes common to both transistors: gate, channel, the leads of drain and source. */
const TRANSISTOR: readonly Stroke[] = [
  line([GATE, -CHANNEL + 0.1], [GATE, CHANNEL - 0.1]),
  line([0, -CHANNEL], [0, CHANNEL]),
  line([0, -LEAD], [1, -LEAD], [1, -1]),
  line([0, LEAD], [1, LEAD], [1, 1]),
];

/**
 * The symbols by kind, without turn: the two ends of a capacitor, resistor or current source at (0, -1)
 * and (0, 1), of an inductor at (0, -2) and (0, 2); a transistor's gate at (-1, 0), its other ends at
 * (1, -1) and (1, 1), the source of an N transistor below and that of a P transistor above; a supply, a
 * ground or a label at (0, 0).
 */
const STROKES: Readonly<Record<SymbolKind, readonly Stroke[]>> = {
  inductor: [
    line([0, -2], [0, -WINDING]),
    {
      kind: "bows",
      clockwise: true,
      points: Array.from({ length: INDUCTOR_TURNS + 1 }, (_, k): Point => [
        0,
        -WINDING + 2 * WINDING * k / INDUCTOR_TURNS,
      ]),
    },
    line([0, WINDING], [0, 2]),
  ],
  capacitor: [
    line([0, -1], [0, -0.17]),
    line([-0.62, -0.17], [0.62, -0.17]),
    line([-0.62, 0.17], [0.62, 0.17]),
    line([0, 0.17], [0, 1]),
  ],
  resistor: [
    line(
      [0, -1],
      [0, -ZIGZAG],
      ...Array.from({ length: 6 }, (_, k): Point => [
        k % 2 === 0 ? 0.32 : -0.32,
        -ZIGZAG + (k + 0.5) * ZIGZAG / 3,
      ]),
      [0, ZIGZAG],
      [0, 1],
    ),
  ],
  "transistor n": [
    line([-1, 0], [GATE, 0]),
    ...TRANSISTOR,
    arrow([0.78, LEAD], [1, 0]),
  ],
  "transistor p": [
    line([-1, 0], [GATE - 0.28, 0]),
    { kind: "circle", middle: [GATE - 0.14, 0], radius: 0.14 },
    ...TRANSISTOR,
    arrow([0.22, -LEAD], [-1, 0]),
  ],
  "current source": [
    line([0, -1], [0, -0.68]),
    { kind: "circle", middle: [0, 0], radius: 0.68 },
    line([0, -0.42], [0, 0.2]),
    arrow([0, 0.44], [0, 1]),
    line([0, 0.68], [0, 1]),
  ],
  supply: [line([-0.62, 0], [0.62, 0])],
  ground: [
    line([-0.62, 0], [0.62, 0]),
    line([-0.38, 0.22], [0.38, 0.22]),
    line([-0.14, 0.44], [0.14, 0.44]),
  ],
  label: [{ kind: "circle", middle: [0, 0], radius: TERMINAL_RADIUS }],
};

/** The strokes of a symbol where it stands: mirrored first, then turned, then moved. */
export function symbolStrokes(symbol: SchematicSymbol): Stroke[] {
  const placed = (point: Point) => placePoint(symbol, point);
  return STROKES[symbol.kind].map((stroke): Stroke => {
    if (stroke.kind === "circle") return { ...stroke, middle: placed(stroke.middle) };
    const points = stroke.points.map(placed);
    if (stroke.kind === "line") return { ...stroke, points };
    return { ...stroke, points, clockwise: stroke.clockwise !== (symbol.mirrored ?? false) };
  });
}

/** A direction of a symbol's own drawing, as it points once mirrored and turned. */
export function symbolDirection(symbol: SchematicSymbol, direction: Point): Point {
  const [x, y] = placePoint({ ...symbol, at: [0, 0] }, direction);
  return [x, y];
}

function placePoint({ at, turn = 0, mirrored = false }: SchematicSymbol, [x, y]: Point): Point {
  let placed: Point = [mirrored ? -x : x, y];
  for (let k = 0; k < turn; k++) placed = [placed[1], -placed[0]];
  return [at[0] + placed[0], at[1] + placed[1]];
}
