import type { SchematicSymbol } from "../../lib/circuit/schematic.ts";
import { type Point, type Stroke, symbolDirection, symbolStrokes } from "./_schematic_symbols.ts";

/** Measures of a label's text, in grid units. */
export interface TextMeasures {
  /** Height of a line. */
  readonly line: number;
  /** Width of a character: ample, because the reader's typeface is not known. */
  readonly character: number;
}

/** A label where it stands, in grid units. */
export interface PlacedText {
  readonly lines: readonly string[];
  readonly anchor: "start" | "middle" | "end";
  /** Where the anchor of the text lies, and the top of its first line. */
  readonly x: number;
  readonly top: number;
}

interface Box {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

/** Gap between a symbol and its text, and between text and anything else. */
const GAP = 0.3;
const MARGIN = 0.18;
/** How far a text may be shifted along its symbol's side. */
const SHIFTS = [0, -0.5, 0.5, -1, 1, -1.5, 1.5, -2, 2, -2.5, 2.5, -3, 3];
const BOW_CHORDS = 4;
const CIRCLE_CHORDS = 12;

/**
 * Places a text at every symbol that has one, so that it touches no wire, no symbol and no other text,
 * and stays on the sheet; where there is no such place, it takes the one that touches least.
 *
 * @returns one entry per symbol; undefined where it has no text
 */
export function placeTexts(
  symbols: readonly SchematicSymbol[],
  { textOf, wires, width, height, measures }: {
    readonly textOf: (symbol: SchematicSymbol) => readonly string[];
    readonly wires: readonly (readonly Point[])[];
    readonly width: number;
    readonly height: number;
    readonly measures: TextMeasures;
  },
): (PlacedText | undefined)[] {
  const obstacles = [
    ...wires.flatMap(chords),
    ...symbols.flatMap((symbol) => symbolStrokes(symbol).flatMap(strokeChords)),
  ];
  const taken: Box[] = [];
  return symbols.map((symbol) => {
    const lines = textOf(symbol);
    if (lines.length === 0) return undefined;
    let best: { readonly text: PlacedText; readonly touched: number } | undefined;
    for (const text of candidates(symbol, lines, measures)) {
      const box = textBox(text, measures);
      const outside = box.left < 0 || box.right > width || box.top < 0 || box.bottom > height;
      const touched = obstacles.filter((chord) => crosses(box, chord)).length +
        taken.filter((other) => overlap(box, other)).length + (outside ? obstacles.length : 0);
      if (best === undefined || touched < best.touched) best = { text, touched };
      if (touched === 0) break;
    }
    taken.push(textBox(best!.text, measures));
    return best!.text;
  });
}

/** Places of a symbol's text, the best first. */
function* candidates(
  symbol: SchematicSymbol,
  lines: readonly string[],
  measures: TextMeasures,
): Generator<PlacedText> {
  const words = lines.flatMap((text, k) => k === 0 ? text.split(" ") : [text]);
  const layouts = [lines, words, [lines.join(" ")]].filter((layout, k, all) =>
    all.findIndex(({ length }) => length === layout.length) === k
  );
  const far = symbolDirection(symbol, [1, 0]);
  const near: Point = [-far[0], -far[1]];
  const isTransistor = symbol.kind.startsWith("transistor");
  const alongside = symbol.kind === "supply" ? [[0, -1] as Point, far, near] : [far, near];
  const body = boxOf(symbolStrokes(symbol).flatMap(strokeChords).flat());
  for (const [index, side] of alongside.entries()) {
    const own = side[0] === 0 ? [...layouts].reverse() : layouts;
    for (const layout of own) {
      const tall = layout.length * measures.line;
      for (const shift of SHIFTS) {
        if (isTransistor && index === 1) {
          // Under or over the gate's lead, inside the symbol's own square.
          const x = symbol.at[0] + 0.55 * side[0];
          if (side[0] === 0 || Math.abs(shift) > 1) continue;
          const top = symbol.at[1] + (shift <= 0 ? GAP - shift : -GAP - tall - shift);
          yield { lines: layout, anchor: side[0] > 0 ? "start" : "end", x, top };
        } else if (side[0] !== 0) {
          const x = side[0] > 0 ? body.right + GAP : body.left - GAP;
          const top = symbol.at[1] + shift - tall / 2;
          yield { lines: layout, anchor: side[0] > 0 ? "start" : "end", x, top };
        } else {
          const top = side[1] > 0 ? body.bottom + GAP : body.top - GAP - tall;
          yield { lines: layout, anchor: "middle", x: symbol.at[0] + shift, top };
        }
      }
    }
  }
}

/** The box a text fills. */
export function textBox(
  { lines, anchor, x, top }: PlacedText,
  { line, character }: TextMeasures,
): Box {
  const wide = Math.max(...lines.map((text) => [...text].length)) * character;
  const left = anchor === "start" ? x : anchor === "end" ? x - wide : x - wide / 2;
  return { left, right: left + wide, top, bottom: top + lines.length * line };
}

type Chord = readonly [Point, Point];

function chords(points: readonly Point[]): Chord[] {
  return points.slice(1).map((point, k): Chord => [points[k]!, point]);
}

function strokeChords(stroke: Stroke): Chord[] {
  if (stroke.kind === "line") return chords(stroke.points);
  if (stroke.kind === "circle") {
    return chords(
      arc(stroke.middle, [stroke.radius, 0], { turn: 2 * Math.PI, count: CIRCLE_CHORDS }),
    );
  }
  return chords(stroke.points).flatMap(([from, to]) => {
    const middle: Point = [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2];
    const start: Point = [from[0] - middle[0], from[1] - middle[1]];
    const turn = stroke.clockwise ? Math.PI : -Math.PI;
    return chords(arc(middle, start, { turn, count: BOW_CHORDS }));
  });
}

function arc(
  middle: Point,
  start: Point,
  { turn, count }: { readonly turn: number; readonly count: number },
): Point[] {
  return Array.from({ length: count + 1 }, (_, k): Point => {
    const [cos, sin] = [Math.cos(turn * k / count), Math.sin(turn * k / count)];
    return [
      middle[0] + cos * start[0] - sin * start[1],
      middle[1] + sin * start[0] + cos * start[1],
    ];
  });
}

function boxOf(points: readonly Point[]): Box {
  const [xs, ys] = [points.map(([x]) => x), points.map(([, y]) => y)];
  return {
    left: Math.min(...xs),
    right: Math.max(...xs),
    top: Math.min(...ys),
    bottom: Math.max(...ys),
  };
}

function overlap(a: Box, b: Box): boolean {
  return a.left < b.right + MARGIN && b.left < a.right + MARGIN &&
    a.top < b.bottom + MARGIN && b.top < a.bottom + MARGIN;
}

/** Whether a chord comes within the margin of a box (Liang and Barsky's clipping of a segment). */
function crosses(box: Box, [[x0, y0], [x1, y1]]: Chord): boolean {
  let [from, to] = [0, 1];
  const sides = [
    [x0 - x1, x0 - (box.left - MARGIN)],
    [x1 - x0, box.right + MARGIN - x0],
    [y0 - y1, y0 - (box.top - MARGIN)],
    [y1 - y0, box.bottom + MARGIN - y0],
  ] as const;
  for (const [rate, room] of sides) {
    if (rate === 0) {
      if (room < 0) return false;
    } else if (rate < 0) from = Math.max(from, room / rate);
    else to = Math.min(to, room / rate);
  }
  return from <= to;
}
