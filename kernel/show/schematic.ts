import type { Schematic, SchematicSymbol, SymbolKind } from "../../lib/circuit/schematic.ts";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { chartFigure } from "./_chart_figure.ts";
import { placeTexts } from "./_schematic_labels.ts";
import { type Point, type Stroke, symbolStrokes, TERMINAL_RADIUS } from "./_schematic_symbols.ts";
import { type Markup, markup, raw } from "./markup.ts";
import type { Showable } from "./showable.ts";

/** Options of {@linkcode schematic}. */
export interface SchematicOptions {
  /** What the circuit is, in one line. */
  readonly title: string;
  /** Caption under the title. @default what a transistor's value is */
  readonly description?: string;
}

/** Size of a grid unit, of the text and of its lines [px]. */
const GRID = 20;
const FONT = 13;
const LINE = 16;
const CHARACTER = 0.64 * FONT;
const JOINT_RADIUS = 3.2;

/** What a kind of part is called, for those that are parts. */
const PART_NAMES: Partial<Record<SymbolKind, string>> = {
  inductor: "inductor",
  capacitor: "capacitor",
  resistor: "resistor",
  "transistor n": "N transistor",
  "transistor p": "P transistor",
  "current source": "current source",
};

/**
 * A schematic, drawn in the page's ink with the usual symbols; names and values stand where they cover
 * no wire. A transistor's value is its width W.
 *
 * @throws {RangeError} when the schematic has no size or a value is not finite
 */
export function schematic(
  data: Schematic,
  { title, description = "W is the width of a transistor" }: SchematicOptions,
): Showable {
  const { width, height, symbols } = data;
  if (!(width > 0 && height > 0)) {
    throw new RangeError(
      `Cannot draw the schematic: width and height must be > 0, got ${width} by ${height}`,
    );
  }
  const list = symbols.flatMap((part) => {
    const kind = PART_NAMES[part.kind];
    if (kind === undefined || part.name === "") return [];
    const value = valueText(part);
    return [`${part.name} (${kind})${value === "" ? "" : `: ${value}`}`];
  });
  const parts = list.length === 0 ? "no parts" : list.join("; ");
  return chartFigure({
    title,
    description,
    drawings: [{ svg: draw(data, { title, description: `${description}. ${parts}` }).text }],
    ranges: list,
  });
}

function valueText({ kind, value }: SchematicSymbol): string {
  if (value === undefined) return "";
  const text = formatQuantity(value.value, value.unit);
  return kind.startsWith("transistor") ? `W = ${text}` : text;
}

function draw(
  { width, height, symbols, wires, joints }: Schematic,
  { title, description }: Required<SchematicOptions>,
): Markup {
  const terminals = symbols.filter(({ kind }) => kind === "label").map(({ at }) => at);
  const trimmed = wires.map((wire) => trimWire(wire, terminals));
  const texts = placeTexts(symbols, {
    textOf: (symbol) => [symbol.name, valueText(symbol)].filter((line) => line !== ""),
    wires: trimmed,
    width,
    height,
    measures: { line: LINE / GRID, character: CHARACTER / GRID },
  });
  const [w, h] = [width * GRID, height * GRID];
  const lines = markup`
    <g fill="none" stroke="currentColor" stroke-width="1.6" stroke-linecap="round" stroke-linejoin="round">
    ${trimmed.map((points) => strokeMarkup({ kind: "line", points }))}
    ${symbols.map((symbol) => symbolStrokes(symbol).map(strokeMarkup))}
    ${
    joints.map(([x, y]) =>
      markup`<circle cx="${px(x)}" cy="${
        px(y)
      }" r="${JOINT_RADIUS}" fill="currentColor" stroke="none"/>`
    )
  }</g>`;
  const words = texts.flatMap((text) =>
    text === undefined ? [] : text.lines.map((line, k) => {
      // The baseline of a line lies at about three quarters of its height.
      const y = round(text.top * GRID + (k + 0.76) * LINE);
      return markup`<text x="${px(text.x)}" y="${y}" text-anchor="${text.anchor}">${line}</text>`;
    })
  );
  return markup`
    <svg xmlns="http://www.w3.org/2000/svg" role="img" viewBox="0 0 ${w} ${h}" width="${w}" height="${h}" ${STYLE}>
    <title>${title}</title><desc>${description}</desc>
    ${lines}<g fill="currentColor" font-size="${FONT}" font-family="system-ui, sans-serif">${words}</g></svg>`;
}

const STYLE = raw('style="display:block;max-width:100%;height:auto"');

function strokeMarkup(stroke: Stroke): Markup {
  if (stroke.kind === "circle") {
    const [x, y] = stroke.middle;
    return markup`<circle cx="${px(x)}" cy="${px(y)}" r="${px(stroke.radius)}"/>`;
  }
  const [first, ...rest] = stroke.points;
  let path = `M${px(first![0])},${px(first![1])}`;
  let before = first!;
  for (const point of rest) {
    const to = `${px(point[0])},${px(point[1])}`;
    const radius = px(Math.hypot(point[0] - before[0], point[1] - before[1]) / 2);
    path += stroke.kind === "line"
      ? `L${to}`
      : `A${radius},${radius} 0 0 ${stroke.clockwise ? 1 : 0} ${to}`;
    before = point;
  }
  const filled = stroke.kind === "line" && stroke.filled === true;
  return filled ? markup`<path d="${path}" fill="currentColor"/>` : markup`<path d="${path}"/>`;
}

/** A wire that ends at a terminal's edge, not in its middle. */
function trimWire(wire: readonly Point[], terminals: readonly Point[]): readonly Point[] {
  const last = wire.length - 1;
  return wire.map((point, k) => {
    const inward = k === 0 ? wire[1] : k === last ? wire[last - 1] : undefined;
    if (inward === undefined || !terminals.some(([x, y]) => x === point[0] && y === point[1])) {
      return point;
    }
    const [dx, dy] = [inward[0] - point[0], inward[1] - point[1]];
    const part = TERMINAL_RADIUS / Math.hypot(dx, dy);
    return [point[0] + part * dx, point[1] + part * dy];
  });
}

function px(grid: number): number {
  return round(grid * GRID);
}

function round(value: number): number {
  return Number(value.toFixed(2)) + 0;
}
