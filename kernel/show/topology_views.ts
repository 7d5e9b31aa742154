/**
 * Topologies on equal terms, made from what `lib/design/` computes. What could not be computed is a dash.
 *
 * @module
 */
import * as Plot from "@observablehq/plot";
import type { TopologyResult } from "../../lib/design/compare_topologies.ts";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { chartFigure } from "./_chart_figure.ts";
import { axisName, FRAME } from "./_chart_frame.ts";
import { withUnit } from "./_display_unit.ts";
import { drawSvg } from "./_draw_svg.ts";
import { LabelBoxes, type LabelOffset } from "./_label_boxes.ts";
import { MAP } from "./_map_frame.ts";
import { seriesStyle } from "./palette.ts";
import type { Showable } from "./showable.ts";
import { table } from "./table.ts";
import type { TableCell } from "./table_parts.ts";

const SHADE = 0.12;
/** Free space beside the outermost points, as a part of what they span. */
const MARGIN = 0.12;

/** A topology with what it does at its worst corner. */
export interface TopologyEntry {
  readonly result: TopologyResult;
  /** Least startup loop gain over the corners [1]; undefined where one has no equilibrium. */
  readonly worstLoopGain: number | undefined;
}

/** Options of {@linkcode topologyTable} and {@linkcode topologyChart}. */
export interface TopologyViewOptions {
  /** Name of the chosen topology. */
  readonly chosen: string;
}

/** The topologies side by side, the quietest first. */
export function topologyTable(
  entries: readonly TopologyEntry[],
  { chosen }: TopologyViewOptions,
): Showable {
  const noise = ({ result }: TopologyEntry) => result.figures?.phaseNoise ?? Infinity;
  const order = [...entries].sort((a, b) => noise(a) - noise(b));
  const remarks = order.map(({ result }) => remark(result));
  const withRemarks = remarks.some((text) => text !== null);
  return table({
    caption:
      "Topologies with one coil, frequency, supply and power; nominal but for the worst loop gain",
    columns: [
      { name: "topology" },
      { name: "programmed current", unit: "A", digits: 3 },
      { name: "amplitude", unit: "V", digits: 3 },
      { name: "loop gain", digits: 3 },
      { name: "worst corner's", digits: 3 },
      { name: "white phase noise", unit: "dBc/Hz", digits: 4 },
      { name: "noise factor", digits: 3 },
      { name: "figure of merit", unit: "dBc/Hz", digits: 4 },
      { name: "highest share of a voltage limit", unit: "%", digits: 3 },
      ...(withRemarks ? [{ name: "remark" }] : []),
    ],
    rows: order.map(({ result, worstLoopGain }, row): TableCell[] => {
      const { name, figures, stresses: [worst] } = result;
      return [
        name === chosen ? `${name} (chosen)` : name,
        figures ? result.current : null,
        known(figures?.amplitude),
        known(result.loopGain),
        known(worstLoopGain),
        known(figures?.phaseNoise),
        known(figures?.noiseFactor),
        known(figures?.figureOfMerit),
        worst === undefined ? null : worst.peak / worst.limit,
        ...(withRemarks ? [remarks[row] ?? null] : []),
      ];
    }),
  });
}

function remark({ starts, reason, figures }: TopologyResult): string | null {
  if (reason !== undefined) return reason;
  return figures && !starts ? "sustains but does not start by itself" : null;
}

/** Options of {@linkcode topologyChart}. */
export interface TopologyChartOptions extends TopologyViewOptions {
  /** Offset of the phase noise [Hz]. */
  readonly offset: number;
  /** Loop gain asked for at the worst corner [1]. */
  readonly leastLoopGain: number;
  /** How far above the best the noise of the chosen one may lie [dB]. */
  readonly noiseReach: number;
}

/** Worst startup against white noise: a point for each topology, what is asked for left unshaded. */
export function topologyChart(
  entries: readonly TopologyEntry[],
  { chosen, offset, leastLoopGain, noiseReach }: TopologyChartOptions,
): Showable {
  const points = entries.flatMap(({ result, worstLoopGain }) =>
    result.figures && worstLoopGain !== undefined
      ? [{ name: result.name, noise: result.figures.phaseNoise, gain: worstLoopGain }]
      : []
  );
  const title = "Worst startup against phase noise";
  const description = `Worst loop gain over the corners against nominal white phase noise at ${
    formatQuantity(offset, "Hz")
  }, all at one power; shaded: too little loop gain, or more than ${
    formatQuantity(noiseReach, "dB")
  } above the quietest that starts everywhere`;
  const missing = entries.filter(({ result }) => !points.some(({ name }) => name === result.name));
  const readings = [
    ...points.map(({ name, noise, gain }) =>
      `${name}: ${formatQuantity(noise, "dBc/Hz")}, worst loop gain ${
        formatQuantity(gain, "1", { digits: 3 })
      }`
    ),
    ...missing.map(({ result }) => `${result.name}: not drawn, ${result.reason ?? "no startup"}`),
  ];
  if (points.length === 0) return chartFigure({ title, description, drawings: [], readings });
  const best = quietest(entries, leastLoopGain);
  const limit = best === undefined ? undefined : best + noiseReach;
  const x = spread([...points.map(({ noise }) => noise), ...(limit === undefined ? [] : [limit])]);
  const y = spread([0, leastLoopGain, ...points.map(({ gain }) => gain)]);
  const place = (at: { noise: number; gain: number }) => ({
    x: FRAME.left + (at.noise - x[0]) / (x[1] - x[0]) * (FRAME.width - FRAME.left - FRAME.right),
    y: MAP.height - FRAME.bottom -
      (at.gain - y[0]) / (y[1] - y[0]) * (MAP.height - FRAME.bottom - MAP.top),
  });
  const labels = new LabelBoxes();
  for (const point of points) {
    const { x: px, y: py } = place(point);
    labels.take({ x1: px - 8, x2: px + 8, y1: py - 8, y2: py + 8 });
  }
  const { color } = seriesStyle(5);
  const plot: Plot.PlotOptions = {
    width: FRAME.width,
    height: MAP.height,
    marginLeft: FRAME.left,
    marginRight: FRAME.right,
    marginTop: MAP.top,
    marginBottom: FRAME.bottom,
    x: {
      domain: x,
      label: withUnit("white phase noise", "dBc/Hz"),
      labelArrow: "none",
      labelAnchor: "center",
      labelOffset: 38,
      ticks: 6,
    },
    y: { domain: y, label: null, ticks: 6 },
    marks: [
      axisName("worst startup loop gain"),
      Plot.rect([{ x1: x[0], x2: x[1], y1: y[0], y2: leastLoopGain }], shaded(color)),
      Plot.ruleY([leastLoopGain], {
        stroke: "currentColor",
        strokeWidth: 1.5,
        strokeDasharray: "8 4",
      }),
      ...(limit === undefined || !(limit < x[1]) ? [] : [
        Plot.rect([{ x1: limit, x2: x[1], y1: leastLoopGain, y2: y[1] }], shaded(color)),
        Plot.ruleX([limit], { stroke: "currentColor", strokeWidth: 1.5, strokeDasharray: "8 4" }),
      ]),
      ...points.flatMap((point, k): Plot.Markish[] => {
        const isChosen = point.name === chosen;
        const text = isChosen ? `${point.name} (chosen)` : point.name;
        const { dx, dy, anchor } = labels.place(text, { ...place(point), offsets: OFFSETS });
        const style = seriesStyle(k);
        return [
          Plot.dot([point], {
            x: "noise",
            y: "gain",
            symbol: style.symbol,
            stroke: style.color,
            strokeWidth: 2,
            fill: isChosen ? style.color : "none",
            r: isChosen ? 8 : 6,
          }),
          Plot.text([point], {
            x: "noise",
            y: "gain",
            text: () => text,
            fill: "currentColor",
            fontWeight: isChosen ? "bold" : "normal",
            textAnchor: anchor,
            dx,
            dy,
          }),
        ];
      }),
    ],
  };
  const { svg } = drawSvg(plot, { title, description });
  return chartFigure({ title, description, drawings: [{ svg }], readings });
}

/**
 * The lowest noise of the topologies whose worst loop gain is enough.
 *
 * @param leastLoopGain asked for at the worst corner [1]
 * @returns [dBc/Hz]; undefined where none has enough
 */
export function quietest(
  entries: readonly TopologyEntry[],
  leastLoopGain: number,
): number | undefined {
  const noises = entries.flatMap(({ result, worstLoopGain = 0 }) =>
    result.figures && worstLoopGain >= leastLoopGain ? [result.figures.phaseNoise] : []
  );
  return noises.length === 0 ? undefined : Math.min(...noises);
}

const OFFSETS: readonly [LabelOffset, ...LabelOffset[]] = [
  { dx: 12, dy: 0, anchor: "start" },
  { dx: -12, dy: 0, anchor: "end" },
  { dx: 0, dy: -18, anchor: "middle" },
  { dx: 0, dy: 18, anchor: "middle" },
  { dx: 9, dy: -18, anchor: "start" },
  { dx: 9, dy: 18, anchor: "start" },
  { dx: -9, dy: -18, anchor: "end" },
  { dx: -9, dy: 18, anchor: "end" },
];

function shaded(color: string) {
  return { x1: "x1", x2: "x2", y1: "y1", y2: "y2", fill: color, fillOpacity: SHADE };
}

function spread(values: readonly number[]): [number, number] {
  const [low, high] = [Math.min(...values), Math.max(...values)];
  const margin = MARGIN * (high - low || 1);
  return [low === 0 ? 0 : low - margin, high + margin];
}

function known(value: number | undefined): number | null {
  return value !== undefined && Number.isFinite(value) ? value : null;
}
