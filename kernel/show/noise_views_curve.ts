/**
 * Phase noise over the offset: against its mask, and split among its sources.
 *
 * @module
 */
import * as Plot from "@observablehq/plot";
import type { BuiltOscillator } from "../../lib/circuit/topology.ts";
import type { BudgetEntry, NoiseBudget } from "../../lib/noise/budget.ts";
import type { Mask } from "../../lib/noise/mask.ts";
import type { MaskComparison } from "../../lib/noise/mask_comparison.ts";
import type { PhaseNoiseCurve } from "../../lib/noise/piecewise.ts";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { chartFigure, type KeyEntry } from "./_chart_figure.ts";
import { ChartFrame } from "./_chart_frame.ts";
import { drawSvg } from "./_draw_svg.ts";
import { maskLayers } from "./_mask_layers.ts";
import type { ChartMark } from "./chart_parts.ts";
import { type SeriesStyle, seriesStyle } from "./palette.ts";
import { shareChart } from "./share_chart.ts";
import type { Showable } from "./showable.ts";
import { sweepChart } from "./sweep_chart.ts";

/** Room above and below the curves [dB]. */
const ROOM = 8;
/** Asymptotes this far below the total, or above it, tell nothing [dB]. */
const FAR = 30;
/** A source below this share at every offset goes into "others". */
const SMALL_SHARE = 0.03;
/** Contributors told apart, one for each colour there is. */
const MOST_TOLD = 8;
const MASK_STYLE: SeriesStyle = { color: "currentColor", dash: "", symbol: "triangle" };

/** Options of {@linkcode noiseCurveChart}. */
export interface NoiseCurveChartOptions {
  /** What the chart shows, in one line. @default "Phase noise" */
  readonly title?: string;
  /** What the oscillator is held against. */
  readonly mask?: Mask;
  /** The curve held against the mask, for the reading of the worst margin. */
  readonly comparison?: MaskComparison;
  /** A measured or simulated curve, drawn as points. */
  readonly measured?: { readonly name: string; readonly curve: PhaseNoiseCurve };
}

/** Total phase noise with its 1/f^3 and 1/f^2 asymptotes and floor, against the mask. */
export function noiseCurveChart(
  { offsets, total, asymptotes, corner, frequency }: NoiseBudget,
  { title = "Phase noise", mask, comparison, measured }: NoiseCurveChartOptions = {},
): Showable {
  const marks: ChartMark[] = [
    ...(corner === undefined ? [] : [{ at: corner, label: "1/f^3 corner" }]),
    ...(comparison === undefined ? [] : [{ at: comparison.worst.offset, label: "least margin" }]),
  ];
  const frame = new ChartFrame({ x: offsets, xLabel: "offset", xUnit: "Hz", log: true, marks });
  const [from, to] = [offsets[0]!, offsets.at(-1)!];
  const { inverseCube = 0, inverseSquare = 0, floor = 0 } = asymptotes;
  const lines = [
    { name: "1/f^3", level: (f: number) => inverseCube / f ** 3 },
    { name: "1/f^2", level: (f: number) => inverseSquare / f ** 2 },
    { name: "floor", level: () => floor },
  ];
  const masked = mask ? maskLayers(mask, { frame, range: { from, to } }) : undefined;
  const points = (levels: readonly number[]) =>
    offsets.map((offset, k) => ({ x: frame.unit.from(offset), y: levels[k]! }));
  const key: KeyEntry[] = [{ name: "total", style: seriesStyle(0) }];
  const layers: Plot.Markish[] = [];
  lines.forEach(({ name, level }, k) => {
    const levels = offsets.map((offset) => 10 * Math.log10(level(offset)));
    const drawn = levels.map((own, i) =>
      own > total[i]! - FAR && own < total[i]! + ROOM ? own : NaN
    );
    if (!drawn.some(Number.isFinite)) return;
    const style = seriesStyle(k + 1);
    key.push({ name, style });
    layers.push(
      Plot.line(points(drawn), {
        x: "x",
        y: "y",
        stroke: style.color,
        strokeWidth: 1.5,
        strokeDasharray: style.dash,
      }),
    );
  });
  layers.push(
    Plot.line(points(total), { x: "x", y: "y", stroke: seriesStyle(0).color, strokeWidth: 2.5 }),
    ...frame.marks.map(({ shown, symbol }) =>
      Plot.dot([{ x: shown, y: levelAt(frame, total, shown) }], {
        x: "x",
        y: "y",
        symbol,
        stroke: "currentColor",
        strokeWidth: 2,
        r: 5,
      })
    ),
  );
  if (measured) {
    const style = seriesStyle(4);
    key.push({ name: measured.name, style });
    const inside = measured.curve.filter(({ offset }) => offset >= from && offset <= to);
    layers.push(
      Plot.dot(inside.map(({ offset, level }) => ({ x: frame.unit.from(offset), y: level })), {
        x: "x",
        y: "y",
        stroke: style.color,
        symbol: style.symbol,
        r: 3,
      }),
    );
  }
  if (masked) {
    layers.push(...masked.layers);
    key.push({ name: "mask, the free side below it", style: MASK_STYLE });
  }
  const levels = [...total, ...(masked?.levels ?? [])];
  const description = `Half the one-sided density of phase (IEEE Std 1139) at ${
    formatQuantity(frequency, "Hz")
  }${mask ? "; the mask is translated to this carrier" : ""}`;
  const options = frame.options({
    first: true,
    last: true,
    single: true,
    yLabel: "phase noise, dBc/Hz",
    y: { domain: [Math.min(...levels) - ROOM, Math.max(...levels) + ROOM], nice: true },
    layers,
  });
  return chartFigure({
    title,
    description,
    drawings: [{ svg: drawSvg(options, { title, description }).svg, key }],
    readings: [
      ...(comparison ? [worstText(comparison)] : []),
      ...(corner === undefined ? [] : [`1/f^3 corner at ${formatQuantity(corner, "Hz")}`]),
    ],
    ranges: [
      `offset: ${formatQuantity(from, "Hz")} to ${formatQuantity(to, "Hz")}`,
      `total: ${formatQuantity(total[0]!, "dBc/Hz")} to ${formatQuantity(total.at(-1)!, "dBc/Hz")}`,
    ],
  });
}

function worstText({ worst: { offset, level, limit, margin, origin } }: MaskComparison): string {
  return `least margin ${formatQuantity(margin, "dB")} at ${formatQuantity(offset, "Hz")}: ` +
    `${formatQuantity(level, "dBc/Hz")} against ${
      formatQuantity(limit, "dBc/Hz")
    }, ${origin.label}`;
}

function levelAt(frame: ChartFrame, levels: readonly number[], shown: number): number {
  const right = Math.max(1, frame.x.findIndex((value) => value >= shown));
  const [a, b] = [frame.x[right - 1]!, frame.x[right]!];
  const share = Math.log(shown / a) / Math.log(b / a);
  return levels[right - 1]! + share * (levels[right]! - levels[right - 1]!);
}

/** A group of a budget's entries with what it contributes. */
export interface ContributorGroup {
  readonly name: string;
  /** Phase noise at each offset of the budget [1/Hz], shape (m,). */
  readonly phase: Float64Array;
}

/** Entries of a budget by the part of the oscillator and the kind of noise, in the budget's order. */
export function contributorGroups(
  { entries, offsets }: NoiseBudget,
  { parts }: Pick<BuiltOscillator, "parts">,
): ContributorGroup[] {
  const groups = new Map<string, Float64Array>();
  for (const entry of entries) {
    const name = groupName(entry, parts);
    const own = groups.get(name) ?? new Float64Array(offsets.length);
    entry.phase.forEach((value, k) => own[k]! += value);
    groups.set(name, own);
  }
  return [...groups].map(([name, phase]) => ({ name, phase }));
}

function groupName(
  { device, label, origin }: BudgetEntry,
  parts: BuiltOscillator["parts"],
): string {
  if (origin === "input" || origin === "added") return label;
  const part = Object.keys(parts).find((name) => parts[name]?.includes(device)) ?? device;
  return origin === "1/f" ? `${part}, 1/f` : part;
}

/** Shares of the contributors in the total over the offset, stacked; small ones together. */
export function contributorsChart(
  budget: NoiseBudget,
  oscillator: Pick<BuiltOscillator, "parts">,
): Showable {
  const groups = contributorGroups(budget, oscillator);
  const sums = budget.offsets.map((_, k) => groups.reduce((sum, { phase }) => sum + phase[k]!, 0));
  const shares = groups.map(({ name, phase }) => ({
    name,
    values: budget.offsets.map((_, k) => phase[k]! / sums[k]!),
  }));
  const peak = ({ values }: (typeof shares)[number]) => Math.max(...values);
  const told = new Set(
    shares.filter((own) => peak(own) >= SMALL_SHARE).sort((a, b) => peak(b) - peak(a))
      .slice(0, MOST_TOLD),
  );
  const large = shares.filter((own) => told.has(own));
  const small = shares.filter((own) => !told.has(own));
  const others = small.length === 0 ? [] : [{
    name: "others",
    values: budget.offsets.map((_, k) => small.reduce((sum, { values }) => sum + values[k]!, 0)),
  }];
  const { corner } = budget;
  return shareChart({
    x: budget.offsets,
    xLabel: "offset",
    xUnit: "Hz",
    log: true,
    marks: corner === undefined ? [] : [{ at: corner, label: "1/f^3 corner" }],
    title: "Contributors to phase noise over the offset",
    description:
      "Share of each in the total at that offset, sources next to slow poles as they act there",
    shares: [...large, ...others],
  });
}

/** Phase and amplitude noise over the offset. */
export function amplitudeNoiseChart({ offsets, total, amplitude }: NoiseBudget): Showable {
  const yLabel = "noise against the carrier";
  return sweepChart({
    x: offsets,
    xLabel: "offset",
    xUnit: "Hz",
    log: true,
    title: "Phase noise and amplitude noise",
    description:
      "Half the one-sided densities of phase and of relative amplitude of the tank voltage; " +
      "what a limiting buffer leaves of the latter is not counted",
    series: [
      { name: "phase", y: total, unit: "dBc/Hz", yLabel },
      { name: "amplitude", y: amplitude, unit: "dBc/Hz", yLabel },
    ],
  });
}
