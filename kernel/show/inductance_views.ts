/**
 * The map of inductance against bias current, made from what `lib/design/` computes.
 *
 * @module
 */
import * as Plot from "@observablehq/plot";
import type { BindingLimit } from "../../lib/design/inductance_check.ts";
import type { FamilyLimit, InductanceColumn } from "../../lib/design/inductance_map.ts";
import { formatQuantity } from "../../lib/quantity/format_quantity.ts";
import { chartFigure, type KeyEntry } from "./_chart_figure.ts";
import { contourLevels, contourMarks } from "./_contour_marks.ts";
import { axisName, FRAME } from "./_chart_frame.ts";
import { withUnit } from "./_display_unit.ts";
import { drawSvg } from "./_draw_svg.ts";
import { type Box, LabelBoxes, type LabelOffset } from "./_label_boxes.ts";
import { MAP, MapFrame } from "./_map_frame.ts";
import { type InductanceMark, limitReading, pointReading, truths } from "./_map_readings.ts";
import { seriesStyle } from "./palette.ts";
import type { Showable } from "./showable.ts";

export type { InductanceMark };

const SHADE = 0.16;
const QUIETEST_STYLE = 4;
const MARKS = [
  { symbol: "circle", sign: "\u25cb" },
  { symbol: "diamond", sign: "\u25c7" },
  { symbol: "square", sign: "\u25a1" },
  { symbol: "triangle", sign: "\u25b3" },
] as const;

const POINT_OFFSETS: readonly [LabelOffset, ...LabelOffset[]] = [
  { dx: 12, dy: 0, anchor: "start" },
  { dx: -12, dy: 0, anchor: "end" },
  { dx: 10, dy: -18, anchor: "start" },
  { dx: 10, dy: 18, anchor: "start" },
  { dx: -10, dy: -18, anchor: "end" },
  { dx: -10, dy: 18, anchor: "end" },
];

/** Options of {@linkcode inductanceMap}. */
export interface InductanceMapOptions {
  /** Offset at which the columns computed the phase noise [Hz]. */
  readonly offset: number;
  /** Recommended current over knee current, the lead's [1]. */
  readonly kneeMultiple: number;
  /** Startup loop gain that the boundary holds at the worst corner [1]. */
  readonly loopGain: number;
  /** Most power [W]. */
  readonly mostPower: number;
  /** Where the family and its limits end. @default none */
  readonly limits?: readonly FamilyLimit[];
  /** Points to mark, such as the proposed and the recommended one. @default none */
  readonly points?: readonly InductanceMark[];
  /** What keeps the inductance from being smaller, and where, for the summary. @default not said */
  readonly binding?: readonly { readonly where: string; readonly limit: BindingLimit }[];
}

/**
 * The map of inductance against bias current on logarithmic axes: contours of computed white phase noise,
 * the knee line and the recommended current, and what is forbidden, shaded: no startup at the worst corner,
 * too much power, coils that the family or its limits rule out. Blank where there is no orbit.
 *
 * @param columns at least two, by rising inductance, all over the same currents
 * @throws {RangeError} when there are fewer than two columns
 * @throws {TypeError} when the columns do not share their currents
 */
export function inductanceMap(
  columns: readonly InductanceColumn[],
  options: InductanceMapOptions,
): Showable {
  const { offset, kneeMultiple, loopGain, mostPower, limits = [], points = [], binding = [] } =
    options;
  const frame = new MapFrame(columns);
  const levels = contourLevels(frame.grid.z);
  const title = "Inductance against bias current";
  const description = `Contours: computed white phase noise at ${formatQuantity(offset, "Hz")}, ` +
    "nominal, dBc/Hz; shaded: what the limits forbid; blank where there is no orbit";
  const marks = points.map((point, k) => ({ ...point, ...MARKS[k % MARKS.length]! }));
  const labels = new LabelBoxes();
  const inside = marks.filter((mark) => frame.holds(mark));
  for (const mark of inside) labels.take(around(frame, mark));
  const lines: [string, number | undefined, number][] = [
    ["knee", 1, 0],
    [`recommended, ${formatQuantity(kneeMultiple, "1")} of the knee`, kneeMultiple, 2],
  ];
  const shades = [
    ...startupShade(columns, frame),
    ...powerShade(columns, frame),
    ...limitShades(limits, { frame, labels }),
  ];
  const named = inside.flatMap((mark) => pointMarks(frame, { mark, labels }));
  const plot: Plot.PlotOptions = {
    width: FRAME.width,
    height: MAP.height,
    marginLeft: FRAME.left,
    marginRight: FRAME.right,
    marginTop: MAP.top,
    marginBottom: FRAME.bottom,
    x: frame.axis("x", "programmed current"),
    y: frame.axis("y", "inductance"),
    marks: [
      axisName(withUnit("inductance", frame.unitY.unit)),
      ...shades,
      ...contourMarks(frame, { levels, labels }),
      ...quietestLine(frame),
      ...lines.flatMap(([, multiple, style]) => kneeLine(columns, { frame, multiple, style })),
      ...named,
    ],
  };
  const style = (index: number) => ({ ...seriesStyle(index), dash: "" });
  const forbidden: KeyEntry[] = [
    {
      name: `loop gain below ${formatQuantity(loopGain, "1")} at the worst corner`,
      style: style(1),
      area: true,
    },
    {
      name: `more than ${formatQuantity(mostPower, "W", { digits: 3 })}`,
      style: style(3),
      area: true,
    },
    ...(limits.length === 0
      ? []
      : [{ name: "outside the family or its limits", style: style(5), area: true }]),
  ];
  const key = [
    ...lines.map(([name, , index]): KeyEntry => ({ name, style: seriesStyle(index) })),
    { name: "quietest at that current", style: seriesStyle(QUIETEST_STYLE) },
    ...forbidden,
  ];
  return chartFigure({
    title,
    description,
    drawings: [{ svg: drawSvg(plot, { title, description }).svg, key }],
    ranges: [
      `programmed current: ${ends(frame.currents, "A")}`,
      `inductance: ${ends(columns.map(({ inductance }) => inductance), "H")}`,
      levels.length === 0
        ? "white phase noise: no contour, too few orbits"
        : `white phase noise: contours from ${levels[0]} to ${levels[levels.length - 1]} dBc/Hz`,
    ],
    readings: [
      ...marks.map((mark) => pointReading(mark, { frame, columns })),
      ...limits.map(limitReading),
      ...truths(columns, { kneeMultiple, fixed: points[0]?.current, frame }),
      ...binding.map(({ where, limit }) =>
        `what keeps the inductance from being smaller ${where}: ${limit}`
      ),
    ],
  });
}

function kneeLine(
  columns: readonly InductanceColumn[],
  { frame, multiple = 1, style }: {
    readonly frame: MapFrame;
    readonly multiple: number | undefined;
    readonly style: number;
  },
): Plot.Markish[] {
  const { color, dash } = seriesStyle(style);
  const points = columns.flatMap(({ inductance, sweep: { knee } }) => {
    const current = knee === undefined ? NaN : multiple * knee;
    return frame.holds({ current, inductance })
      ? [{ x: frame.unitX.from(current), y: frame.unitY.from(inductance) }]
      : [];
  });
  return points.length < 2 ? [] : [
    Plot.line(points, {
      x: "x",
      y: "y",
      stroke: color,
      strokeWidth: 2.5,
      strokeDasharray: dash,
    }),
  ];
}

/** Between the left edge and the boundary, or the right edge where nothing starts. */
function startupShade(columns: readonly InductanceColumn[], frame: MapFrame): Plot.Markish[] {
  const edge = columns.map(({ inductance, startupCurrent }) => ({
    y: frame.unitY.from(inductance),
    x1: frame.unitX.from(frame.left),
    x2: frame.unitX.from(startupCurrent ?? frame.right),
    reached: startupCurrent !== undefined,
  }));
  return area(edge, { style: 1, border: "x2" });
}

function powerShade(columns: readonly InductanceColumn[], frame: MapFrame): Plot.Markish[] {
  const edge = columns.map(({ inductance, powerCurrent }) => ({
    y: frame.unitY.from(inductance),
    x1: frame.unitX.from(powerCurrent ?? frame.right),
    x2: frame.unitX.from(frame.right),
    reached: powerCurrent !== undefined,
  }));
  return area(edge, { style: 3, border: "x1" });
}

function area(
  edge: readonly {
    readonly x1: number;
    readonly x2: number;
    readonly y: number;
    /** Whether the boundary lies inside the map there. */
    readonly reached: boolean;
  }[],
  { style, border }: { readonly style: number; readonly border: "x1" | "x2" },
): Plot.Markish[] {
  const { color, dash } = seriesStyle(style);
  return [
    Plot.areaX(edge, { y: "y", x1: "x1", x2: "x2", fill: color, fillOpacity: SHADE }),
    Plot.line(edge.filter(({ reached }) => reached), {
      x: border,
      y: "y",
      stroke: color,
      strokeWidth: 2,
      strokeDasharray: dash,
    }),
  ];
}

function limitShades(
  limits: readonly FamilyLimit[],
  { frame, labels }: { readonly frame: MapFrame; readonly labels: LabelBoxes },
): Plot.Markish[] {
  const { color, dash } = seriesStyle(5);
  const x1 = frame.unitX.from(frame.left);
  const x2 = frame.unitX.from(frame.right);
  const right = FRAME.width - FRAME.right;
  return limits.filter(({ inductance }) => inductance > frame.bottom && inductance < frame.top)
    .flatMap(({ forbids, inductance, limit }) => {
      const y = frame.unitY.from(inductance);
      const end = frame.unitY.from(forbids === "above" ? frame.top : frame.bottom);
      const beside = forbids === "above" ? [-10, 11, -26, 27] : [11, -10, 27, -26];
      const [first, ...rest] = beside.map((dy) => ({ dx: -5, dy, anchor: "end" as const }));
      const [, pixel] = frame.pixel([Math.log(frame.right), Math.log(inductance)]);
      const { dx, dy } = labels.place(limit, { x: right, y: pixel, offsets: [first!, ...rest] });
      return [
        Plot.rect([{ x1, x2, y1: Math.min(y, end), y2: Math.max(y, end) }], {
          x1: "x1",
          x2: "x2",
          y1: "y1",
          y2: "y2",
          fill: color,
          fillOpacity: SHADE,
        }),
        Plot.ruleY([y], { stroke: color, strokeWidth: 2, strokeDasharray: dash }),
        Plot.text([limit], {
          y: () => y,
          frameAnchor: "right",
          textAnchor: "end",
          dx,
          dy,
          text: (d: string) => d,
          fill: "currentColor",
        }),
      ];
    });
}

type PlacedMark = InductanceMark & (typeof MARKS)[number];

function around(frame: MapFrame, { current, inductance }: PlacedMark): Box {
  const [x, y] = frame.pixel([Math.log(current), Math.log(inductance)]);
  return { x1: x - 9, x2: x + 9, y1: y - 9, y2: y + 9 };
}

function pointMarks(
  frame: MapFrame,
  { mark, labels }: { readonly mark: PlacedMark; readonly labels: LabelBoxes },
): Plot.Markish[] {
  const { label, sign, symbol, current, inductance } = mark;
  const place = { x: frame.unitX.from(current), y: frame.unitY.from(inductance) };
  const [x, y] = frame.pixel([Math.log(current), Math.log(inductance)]);
  const text = `${sign} ${label}`;
  const { dx, dy, anchor } = labels.place(text, { x, y, offsets: POINT_OFFSETS });
  return [
    Plot.dot([place], {
      x: "x",
      y: "y",
      symbol,
      stroke: "currentColor",
      strokeWidth: 2.5,
      r: 6,
    }),
    Plot.text([place], {
      x: "x",
      y: "y",
      text: () => text,
      fill: "currentColor",
      fontWeight: "bold",
      textAnchor: anchor,
      dx,
      dy,
    }),
  ];
}

/** At each current the inductance with the least noise, where it lies between two others: a parabola in ln L. */
function quietestPoints({ grid: { x, y, z } }: MapFrame): { x: number; y: number }[] {
  return x.flatMap((at, i) => {
    const noise = y.map((_, row) => z[row]![i]!);
    const known = noise.filter(Number.isFinite);
    const k = noise.indexOf(Math.min(...known));
    const [a, b, c] = [noise[k - 1], noise[k], noise[k + 1]];
    if (a === undefined || b === undefined || c === undefined) return [];
    if (!Number.isFinite(a) || !Number.isFinite(c)) return [];
    // Columns are evenly spread enough for the vertex of the parabola through the three.
    const shift = (a - c) / (2 * (a - 2 * b + c));
    const step = shift < 0 ? y[k]! - y[k - 1]! : y[k + 1]! - y[k]!;
    return [{ x: at, y: y[k]! + shift * step }];
  });
}

function quietestLine(frame: MapFrame): Plot.Markish[] {
  const { color, dash } = seriesStyle(QUIETEST_STYLE);
  const points = quietestPoints(frame).map(({ x, y }) => frame.shown([x, y]));
  return points.length < 2 ? [] : [
    Plot.line(points, { x: "x", y: "y", stroke: color, strokeWidth: 2, strokeDasharray: dash }),
  ];
}

function ends(values: readonly number[], unit: string): string {
  return [values[0]!, values[values.length - 1]!].map((value) =>
    formatQuantity(value, unit, { digits: 3 })
  ).join(" to ");
}
