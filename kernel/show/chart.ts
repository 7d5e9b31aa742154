import type { PlotOptions } from "@observablehq/plot";
import { chartFigure } from "./_chart_figure.ts";
import { FRAME } from "./_chart_frame.ts";
import { drawSvg } from "./_draw_svg.ts";
import type { ChartScale, DrawingText } from "./chart_parts.ts";
import { seriesStyle } from "./palette.ts";
import type { Showable } from "./showable.ts";

/** Options of {@linkcode chart}: what Observable Plot takes under the same names, and what to call it. */
export interface ChartOptions extends DrawingText {
  /** Plot's marks: `Plot.line(...)`, `Plot.dot(...)`, ... */
  readonly marks: readonly object[];
  /** Horizontal scale. @default as Plot chooses */
  readonly x?: ChartScale;
  /** Vertical scale. @default as Plot chooses */
  readonly y?: ChartScale;
  /** Colour scale; without Plot's own legend, which is not part of the drawing. @default Plot's */
  readonly color?: ChartScale;
  /** Height of the drawing, which is 600 wide. @default as Plot chooses */
  readonly height?: number;
  /** Room on the left for the vertical axis. @default 60 */
  readonly marginLeft?: number;
  /** Names of the series, in the order in which they take `seriesStyle(0)`, `seriesStyle(1)`, ... */
  readonly key?: readonly string[];
}

/**
 * Draws any Observable Plot, without a browser and the same to the byte every time. Label the axes with
 * their unit (`x: { label: "offset, Hz" }`) and take colours from `seriesStyle`.
 *
 * @throws {TypeError} when the plot asks for a legend of Plot's own (give `key` instead)
 */
export function chart({ title, description, key = [], ...options }: ChartOptions): Showable {
  // The options are Plot's; our own types spare a notebook's author Plot's whole vocabulary.
  const plot = {
    width: FRAME.width,
    marginLeft: FRAME.left,
    marginBottom: FRAME.bottom,
    ...options,
  };
  const { svg, scale } = drawSvg(plot as unknown as PlotOptions, { title, description });
  const entries = key.map((name, i) => ({ name, style: seriesStyle(i) }));
  const ranges = (["x", "y"] as const).flatMap((name) => {
    const domain = scale(name)?.domain;
    if (domain === undefined || domain.length === 0) return [];
    return [
      `${options[name]?.label ?? name}: ${end(domain[0])} to ${end(domain[domain.length - 1])}`,
    ];
  });
  return chartFigure({ title, description, drawings: [{ svg, key: entries }], ranges });
}

function end(value: unknown): string {
  return typeof value === "number" ? String(Number(value.toPrecision(4))) : String(value);
}
