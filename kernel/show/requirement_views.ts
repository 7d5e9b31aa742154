/**
 * From a radio's or a clock's numbers to the mask: its demands and where each part comes from.
 *
 * @module
 */
import * as Plot from "@observablehq/plot";
import { levelOf, type Mask, type MaskPiece } from "../../lib/noise/mask.ts";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { chartFigure } from "./_chart_figure.ts";
import { ChartFrame } from "./_chart_frame.ts";
import { drawSvg } from "./_draw_svg.ts";
import { maskLayers } from "./_mask_layers.ts";
import type { CsvOptions } from "./bias_tables.ts";
import { seriesStyle } from "./palette.ts";
import type { Showable } from "./showable.ts";
import { table } from "./table.ts";
import type { TableCell } from "./table_parts.ts";

/** Room above and below the demands [dB]. */
const ROOM = 8;
/** Points along the axis, for its ticks alone. */
const AXIS_POINTS = 3;

/** Options of {@linkcode maskChart}. */
export interface MaskChartOptions {
  /** What the chart shows, in one line. @default "Phase-noise mask" */
  readonly title?: string;
  /** Every demand by itself, at the mask's carrier. */
  readonly demands: readonly MaskPiece[];
  /** Offsets drawn [Hz]. */
  readonly range: { readonly from: number; readonly to: number };
}

/** A mask with the demands it is the lowest of. */
export function maskChart(
  mask: Mask,
  { title = "Phase-noise mask", demands, range }: MaskChartOptions,
): Showable {
  const x = Array.from(
    { length: AXIS_POINTS },
    (_, k) => range.from * (range.to / range.from) ** (k / (AXIS_POINTS - 1)),
  );
  const frame = new ChartFrame({ x, xLabel: "offset", xUnit: "Hz", log: true });
  const { layers, levels } = maskLayers(mask, { frame, range });
  const lines = demands.flatMap((demand, k) => {
    const [from, to] = [Math.max(demand.from, range.from), Math.min(demand.to, range.to)];
    if (!(from <= to)) return [];
    const style = seriesStyle(k);
    const ends = [from, to].map((offset) => ({
      x: frame.unit.from(offset),
      y: levelOf(demand, offset),
    }));
    levels.push(...ends.map(({ y }) => y));
    return [{ name: demand.origin.label, style, ends }];
  });
  const description = `Highest allowed phase noise at ${
    formatQuantity(mask.frequency, "Hz")
  }, half the one-sided density of phase (IEEE Std 1139); the hatched line is the lowest of all demands`;
  const options = frame.options({
    first: true,
    last: true,
    single: true,
    yLabel: "phase noise, dBc/Hz",
    y: { domain: [Math.min(...levels) - ROOM, Math.max(...levels) + ROOM], nice: true },
    layers: [
      ...layers,
      ...lines.map(({ ends, style }) =>
        Plot.line(ends, {
          x: "x",
          y: "y",
          stroke: style.color,
          strokeWidth: 2,
          strokeDasharray: style.dash,
        })
      ),
    ],
  });
  return chartFigure({
    title,
    description,
    drawings: [{
      svg: drawSvg(options, { title, description }).svg,
      key: lines.map(({ name, style }) => ({ name, style })),
    }],
    ranges: lines.map(({ name, ends }) =>
      `${name}: ${formatQuantity(ends[0]!.y, "dBc/Hz")} to ${formatQuantity(ends[1]!.y, "dBc/Hz")}`
    ),
  });
}

/** The pieces of a mask with the numbers each follows from. */
export function maskTable(mask: Mask, { csv }: CsvOptions = {}): Showable {
  return table({
    caption: `The mask at ${formatQuantity(mask.frequency, "Hz")}, piece by piece`,
    columns: [
      { name: "from" },
      { name: "to" },
      { name: "level at the beginning", unit: "dBc/Hz", digits: 4 },
      { name: "slope per decade", unit: "dB", digits: 3 },
      { name: "demand" },
      { name: "follows from" },
    ],
    rows: mask.pieces.map(({ from, to, level, slope, origin }): TableCell[] => [
      unbroken(formatQuantity(from, "Hz")),
      to === Infinity ? "no end" : unbroken(formatQuantity(to, "Hz")),
      level,
      slope,
      origin.label,
      origin.basis,
    ]),
    ...(csv === undefined ? {} : { csv }),
  });
}

/** A narrow column does not part a number from its unit. */
function unbroken(text: string): string {
  return text.replaceAll(" ", "\u00a0");
}
