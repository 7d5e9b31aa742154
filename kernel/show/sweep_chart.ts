import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { ChartFrame } from "./_chart_frame.ts";
import { chartFigure } from "./_chart_figure.ts";
import { drawPanels, valueAt } from "./_panels.ts";
import type { Showable } from "./showable.ts";
import type { ChartAxis, ChartSeries, DrawingText } from "./chart_parts.ts";

/** Options of {@linkcode sweepChart}. */
export interface SweepChartOptions extends ChartAxis, DrawingText {
  /** The curves. */
  readonly series: readonly ChartSeries[];
}

/**
 * Curves over one swept quantity: one panel for each vertical axis, under each other; regimes as bands;
 * marked points as rules with a symbol on every curve and their values read off below.
 *
 * @throws {TypeError} when a series has another length than `x`
 * @throws {RangeError} when `x` is not ascending
 */
export function sweepChart({ series, title, description, ...axis }: SweepChartOptions): Showable {
  const frame = new ChartFrame(axis);
  const { drawings, ranges } = drawPanels(series, { frame, text: { title, description } });
  const unit = axis.xUnit ?? "1";
  const ends = [axis.x[0]!, axis.x[axis.x.length - 1]!].map((value) => formatQuantity(value, unit));
  const readings = (axis.marks ?? []).map(({ label, at }) => {
    const placed = frame.marks.find((mark) => mark.at === at && mark.label === label);
    const where = `${label} at ${formatQuantity(at, unit)}`;
    if (placed === undefined) return `${where}: outside the range drawn`;
    const values = series.map(({ name, y, unit: own = "1" }) => {
      const value = valueAt(frame, { y, shown: placed.shown });
      return `${name} ${value === null ? "n/a" : formatQuantity(value, own)}`;
    });
    return `${where}: ${values.join(", ")}`;
  });
  return chartFigure({
    title,
    description,
    drawings,
    readings,
    ranges: [`${axis.xLabel}: ${ends.join(" to ")}`, ...ranges],
  });
}
