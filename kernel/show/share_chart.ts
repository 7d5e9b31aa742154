import * as Plot from "@observablehq/plot";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { ChartFrame, FRAME } from "./_chart_frame.ts";
import { AREA_OPACITY, chartFigure } from "./_chart_figure.ts";
import { drawSvg, FONT_SIZE } from "./_draw_svg.ts";
import { valueAt } from "./_panels.ts";
import { seriesStyle } from "./palette.ts";
import type { Showable } from "./showable.ts";
import type { ChartAxis, DrawingText } from "./chart_parts.ts";

/** One share of a whole along the horizontal axis. */
export interface Share {
  /** Name on the area and in the key. */
  readonly name: string;
  /** Fraction, 0 to 1, one per value of x. */
  readonly values: ArrayLike<number>;
}

/** Options of {@linkcode shareChart}. */
export interface ShareChartOptions extends ChartAxis, DrawingText {
  /** From the bottom up; at every x they add up to 1. */
  readonly shares: readonly Share[];
  /** Label of the vertical axis. @default "share" */
  readonly yLabel?: string;
}

/** How far the shares' sum may be from 1: rounding of a few dozen terms, not a forgotten one. */
const SUM_TOLERANCE = 1e-6;
/** Least height [px] of an area that carries its name. */
const NAME_HEIGHT = FONT_SIZE * 1.3;
/** Least width [px] of a name's place, and of one of its characters. */
const NAME_CHARACTER = FONT_SIZE * 0.56;

/**
 * Shares of a whole, stacked, each named on its area where it is wide enough and in the key.
 *
 * @throws {RangeError} when a share is negative or the shares do not add up to 1
 */
export function shareChart(
  { shares, yLabel = "share", title, description, ...axis }: ShareChartOptions,
): Showable {
  checkShares(shares, axis.x.length);
  const frame = new ChartFrame(axis);
  const styles = shares.map((_, i) => seriesStyle(i));
  const low = axis.x.length === 0 ? [] : Array.from(axis.x, () => 0);
  const layers: Plot.Markish[] = [];
  const names: Plot.Markish[] = [];
  shares.forEach(({ name, values }, k) => {
    const area = frame.x.map((x, i) => ({ x, y1: low[i]!, y2: low[i]! + 100 * values[i]! }));
    area.forEach(({ y2 }, i) => low[i] = y2);
    const { color } = styles[k]!;
    layers.push(
      Plot.areaY(area, { x: "x", y1: "y1", y2: "y2", fill: color, fillOpacity: AREA_OPACITY }),
      Plot.line(area, { x: "x", y: "y2", stroke: color, strokeWidth: 1.5 }),
    );
    const place = namePlace(area, { name, frame });
    if (place !== undefined) {
      names.push(Plot.text([place], { x: "x", y: "y", text: () => name, fill: "currentColor" }));
    }
  });
  const options = frame.options({
    first: true,
    last: true,
    single: true,
    yLabel: `${yLabel}, %`,
    y: { domain: [0, 100] },
    layers: [...layers, ...names],
  });
  const unit = axis.xUnit ?? "1";
  const percent = (value: number | null) =>
    value === null ? "n/a" : formatQuantity(value, "%", { digits: 3 });
  const last = axis.x.length - 1;
  return chartFigure({
    title,
    description,
    drawings: [{
      svg: drawSvg(options, { title, description }).svg,
      // Top of the stack first, as the eye meets them in the drawing.
      key: shares.map(({ name }, i) => ({ name, style: styles[i]!, area: true })).reverse(),
    }],
    readings: frame.marks.map(({ label, at, shown }) =>
      `${label} at ${formatQuantity(at, unit)}: ${
        shares.map(({ name, values }) => `${name} ${percent(valueAt(frame, { y: values, shown }))}`)
          .join(", ")
      }`
    ),
    ranges: [
      `${axis.xLabel}: ${formatQuantity(axis.x[0]!, unit)} to ${
        formatQuantity(axis.x[last]!, unit)
      }`,
      ...shares.map(({ name, values }) =>
        `${name}: ${percent(values[0]!)} at the left, ${percent(values[last]!)} at the right`
      ),
    ],
  });
}

function checkShares(shares: readonly Share[], count: number): void {
  for (const { name, values } of shares) {
    if (values.length !== count) {
      throw new TypeError(
        `Cannot draw the share "${name}": it must have as many values as x (${count}), got ${values.length}`,
      );
    }
  }
  for (let i = 0; i < count; i++) {
    let sum = 0;
    for (const { name, values } of shares) {
      if (!(values[i]! >= 0)) {
        throw new RangeError(
          `Cannot draw the share "${name}": value ${i + 1} must be >= 0, got ${values[i]}`,
        );
      }
      sum += values[i]!;
    }
    if (!(Math.abs(sum - 1) <= SUM_TOLERANCE)) {
      throw new RangeError(
        `Cannot draw shares: at value ${
          i + 1
        } they must add up to 1 within ${SUM_TOLERANCE}, got ${sum}`,
      );
    }
  }
}

/** The middle of the thickest stretch of an area that holds its name, if any does. */
function namePlace(
  area: readonly { readonly x: number; readonly y1: number; readonly y2: number }[],
  { name, frame }: { readonly name: string; readonly frame: ChartFrame },
): { x: number; y: number } | undefined {
  const half = [...name].length * NAME_CHARACTER / 2 + 4;
  const needed = NAME_HEIGHT * 100 / FRAME.single;
  let best: { x: number; y: number; free: number } | undefined;
  for (const { x } of area) {
    const centre = frame.pixel(x);
    if (centre - half < FRAME.left || centre + half > FRAME.width - FRAME.right) continue;
    const under = area.filter((p) => Math.abs(frame.pixel(p.x) - centre) <= half);
    const [bottom, top] = [
      Math.max(...under.map((p) => p.y1)),
      Math.min(...under.map((p) => p.y2)),
    ];
    if (top - bottom >= needed && (best === undefined || top - bottom > best.free)) {
      best = { x, y: (top + bottom) / 2, free: top - bottom };
    }
  }
  return best;
}
