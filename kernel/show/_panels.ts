import * as Plot from "@observablehq/plot";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import type { KeyEntry } from "./_chart_figure.ts";
import type { ChartFrame } from "./_chart_frame.ts";
import { axisUnit, withUnit } from "./_display_unit.ts";
import { drawSvg } from "./_draw_svg.ts";
import { seriesStyle } from "./palette.ts";
import type { ChartLimit, ChartSeries, DrawingText } from "./chart_parts.ts";

/** Symbols along a curve, at most about this many. */
const SYMBOLS_PER_CURVE = 8;
/** A vertical axis starts at zero when the smallest value is below this share of the largest. */
const FROM_ZERO = 0.5;

/** Drawings of the series in panels under each other, with what each series spans. */
export function drawPanels(
  series: readonly ChartSeries[],
  { frame, text }: { readonly frame: ChartFrame; readonly text: DrawingText },
): { drawings: { svg: string; key: KeyEntry[] }[]; ranges: string[] } {
  for (const { name, y } of series) {
    if (y.length !== frame.x.length) {
      throw new TypeError(
        `Cannot draw "${name}": y must have as many values as x (${frame.x.length}), got ${y.length}`,
      );
    }
  }
  const panels = groupBy(series);
  let index = 0;
  const drawings = panels.map((members, p) => {
    const { yLabel, name, unit = "1" } = members[0]!;
    const limits = members.flatMap(({ limit }) => limit === undefined ? [] : [limit]);
    const values = members.flatMap(({ y }) => finite(y)).concat(limits.map(({ at }) => at));
    const shown = axisUnit(values, unit);
    const styles = members.map(() => seriesStyle(index++));
    const layers = [
      ...members.flatMap((member, k) =>
        curve(frame, { y: scaled(member.y, shown.from), style: styles[k]! })
      ),
      ...limits.flatMap((limit) => limitLine({ ...limit, at: shown.from(limit.at) })),
    ];
    const label = withUnit(yLabel ?? name, shown.unit);
    const options = frame.options({
      first: p === 0,
      last: p === panels.length - 1,
      single: panels.length === 1,
      yLabel: label,
      y: { domain: verticalDomain(values.map(shown.from)), nice: true },
      layers,
    });
    const title = panels.length === 1 ? text.title : `${text.title}: ${yLabel ?? name}`;
    return {
      svg: drawSvg(options, { ...text, title }).svg,
      key: members.length < 2 ? [] : members.map((m, k) => ({ name: m.name, style: styles[k]! })),
    };
  });
  return { drawings, ranges: series.flatMap(range) };
}

/** The series' value at a point of the horizontal axis, between its neighbours; null in a gap. */
export function valueAt(
  frame: ChartFrame,
  { y, shown }: { readonly y: ArrayLike<number | null>; readonly shown: number },
): number | null {
  const { x, log } = frame;
  const right = Math.max(1, x.findIndex((value) => value >= shown));
  const scale = log ? Math.log : (value: number) => value;
  const share = (scale(shown) - scale(x[right - 1]!)) / (scale(x[right]!) - scale(x[right - 1]!));
  const [before, after] = [y[right - 1] ?? NaN, y[right] ?? NaN];
  const value = share === 0 ? before : share === 1 ? after : before + share * (after - before);
  return Number.isFinite(value) ? value : null;
}

function groupBy(series: readonly ChartSeries[]): ChartSeries[][] {
  const panels = new Map<string, ChartSeries[]>();
  for (const one of series) {
    const name = `${one.yLabel ?? one.name}\n${one.unit ?? "1"}`;
    panels.set(name, [...(panels.get(name) ?? []), one]);
  }
  return [...panels.values()];
}

function curve(
  frame: ChartFrame,
  { y, style: { color, dash, symbol } }: {
    readonly y: readonly number[];
    readonly style: ReturnType<typeof seriesStyle>;
  },
): Plot.Markish[] {
  const points = y.map((value, i) => ({ x: frame.x[i]!, y: value }));
  const step = Math.max(1, Math.ceil(points.length / SYMBOLS_PER_CURVE));
  const sampled = points.filter((p, i) =>
    i % step === Math.floor(step / 2) && Number.isFinite(p.y)
  );
  const marked = frame.marks.flatMap(({ shown, symbol: sign }) => {
    const value = valueAt(frame, { y, shown });
    return value === null ? [] : [{ x: shown, y: value, sign }];
  });
  return [
    Plot.line(points, { x: "x", y: "y", stroke: color, strokeWidth: 2, strokeDasharray: dash }),
    Plot.dot(sampled, { x: "x", y: "y", fill: color, symbol, r: 2.6 }),
    ...marked.map((mark) =>
      Plot.dot([mark], {
        x: "x",
        y: "y",
        symbol: mark.sign,
        stroke: "currentColor",
        strokeWidth: 2,
        r: 5,
      })
    ),
  ];
}

function limitLine({ at, label }: ChartLimit): Plot.Markish[] {
  return [
    Plot.ruleY([at], { stroke: "currentColor", strokeWidth: 1.5, strokeDasharray: "8 4" }),
    Plot.text([label], {
      y: () => at,
      text: (d: string) => d,
      frameAnchor: "right",
      textAnchor: "end",
      dx: -4,
      dy: -8,
      fill: "currentColor",
    }),
  ];
}

function scaled(y: ArrayLike<number | null>, from: (value: number) => number): number[] {
  return Array.from(y, (value) => value === null ? NaN : from(value));
}

function finite(y: ArrayLike<number | null>): number[] {
  return Array.from(y).filter((value) => value !== null && Number.isFinite(value)) as number[];
}

function verticalDomain(values: readonly number[]): [number, number] {
  if (values.length === 0) return [0, 1];
  const [low, high] = [Math.min(...values), Math.max(...values)];
  if (low === high) {
    return low === 0 ? [-1, 1] : [low - Math.abs(low) / 10, low + Math.abs(low) / 10];
  }
  if (low >= 0 && low < FROM_ZERO * high) return [0, high];
  return [low - (high - low) / 20, high + (high - low) / 20];
}

function range({ name, y, unit = "1" }: ChartSeries): string[] {
  const values = finite(y);
  if (values.length === 0) return [`${name}: no values`];
  const [low, high] = [Math.min(...values), Math.max(...values)];
  return [`${name}: ${formatQuantity(low, unit)} to ${formatQuantity(high, unit)}`];
}
