import * as Plot from "@observablehq/plot";
import { axisUnit, type DisplayUnit, withUnit } from "./_display_unit.ts";
import { FONT_SIZE } from "./_draw_svg.ts";
import type { ChartAxis, ChartMark } from "./chart_parts.ts";

/** Measures of every drawing [px]. */
export const FRAME = {
  width: 600,
  left: 60,
  right: 20,
  bottom: 44,
  /** Room above the frame for the vertical axis' label. */
  labelRow: 26,
  /** Height of one row of labels above that. */
  row: 18,
  /** Height of the drawn area of one panel among several, and alone. */
  panel: 170,
  single: 250,
} as const;

/** Width of one character [px], on average, of the drawings' text. */
const CHARACTER = FONT_SIZE * 0.56;
/** Gap between labels in a row [px]. */
const LABEL_GAP = 8;
/** Gap between a leader line and a label beside it [px]. */
const LEADER_GAP = 5;
/** Symbols of marked points, drawn on the curves and written before the mark's label. */
const MARK_SYMBOLS = [
  { symbol: "circle", sign: "\u25cb" },
  { symbol: "diamond", sign: "\u25c7" },
  { symbol: "square", sign: "\u25a1" },
  { symbol: "triangle", sign: "\u25b3" },
] as const;

/** A mark inside the drawn range, placed. */
export interface PlacedMark extends ChartMark {
  /** In the unit of the drawing. */
  readonly shown: number;
  readonly symbol: "circle" | "diamond" | "square" | "triangle";
}

interface PlacedLabel {
  readonly x: number;
  readonly text: string;
  readonly row: number;
  readonly anchor: "start" | "middle" | "end";
}

/** The vertical axis' name, level above the top left of the drawing. */
export function axisName(name: string): Plot.Markish {
  return Plot.text([name], {
    frameAnchor: "top-left",
    dx: -FRAME.left,
    dy: -10,
    textAnchor: "start",
    lineAnchor: "bottom",
    text: (d: string) => d,
    fill: "currentColor",
  });
}

/** Lays out the shared horizontal axis, its bands and its marks. */
export class ChartFrame {
  /** The axis' values in the unit of the drawing. */
  readonly x: readonly number[];
  readonly unit: DisplayUnit;
  readonly label: string;
  readonly log: boolean;
  readonly marks: readonly PlacedMark[];
  readonly #domain: readonly [number, number];
  readonly #bands: readonly { readonly x1: number; readonly x2: number; readonly label: string }[];
  readonly #labels: readonly PlacedLabel[];
  readonly #rows: number;

  /** @throws {RangeError} when `x` is not ascending, or not above 0 on a logarithmic axis */
  constructor({ x, xLabel, xUnit = "1", log = false, bands = [], marks = [] }: ChartAxis) {
    const values = Array.from(x);
    if (values.length < 2) {
      throw new RangeError(
        `Cannot draw a chart: x must have at least 2 values, got ${values.length}`,
      );
    }
    values.forEach((value, i) => {
      if (!Number.isFinite(value) || (i > 0 && !(value > values[i - 1]!))) {
        throw new RangeError(
          `Cannot draw a chart: x must be finite and ascending, got ${value} after ${
            values[i - 1]
          }`,
        );
      }
    });
    if (log && !(values[0]! > 0)) {
      throw new RangeError(
        `Cannot draw a chart: x must be > 0 on a logarithmic axis, got ${values[0]}`,
      );
    }
    this.unit = axisUnit(values, xUnit);
    this.label = withUnit(xLabel, this.unit.unit);
    this.log = log;
    this.x = values.map(this.unit.from);
    const [low, high] = [this.x[0]!, this.x[this.x.length - 1]!];
    this.#domain = [low, high];
    this.#bands = bands.map(({ from, to, label }) => ({
      x1: from === undefined ? low : Math.max(low, this.unit.from(from)),
      x2: to === undefined ? high : Math.min(high, this.unit.from(to)),
      label,
    })).filter(({ x1, x2 }) => x1 < x2);
    this.marks = marks.map((mark, i) => ({
      ...mark,
      shown: this.unit.from(mark.at),
      symbol: MARK_SYMBOLS[i % MARK_SYMBOLS.length]!.symbol,
    })).filter(({ shown }) => shown >= low && shown <= high);
    const signOf = (mark: PlacedMark) =>
      MARK_SYMBOLS.find(({ symbol }) => symbol === mark.symbol)!.sign;
    const markLabels = placeLabels(
      this.marks.map((mark) => ({
        at: this.pixel(mark.shown),
        text: `${signOf(mark)} ${mark.label}`,
      })),
      { firstRow: 0, leaders: true },
    );
    const bandLabels = placeLabels(
      this.#bands.map(({ x1, x2, label }) => ({
        at: (this.pixel(x1) + this.pixel(x2)) / 2,
        text: label,
      })),
      { firstRow: rowCount(markLabels), leaders: false },
    );
    this.#labels = [...markLabels, ...bandLabels];
    this.#rows = rowCount(this.#labels);
  }

  /**
   * The options of one panel: frame, axes, bands under and marks over what `layers` draws.
   *
   * @param panel `first` carries the labels of bands and marks, `last` the horizontal axis' label
   */
  options(
    { first, last, single, yLabel, y, layers }: {
      readonly first: boolean;
      readonly last: boolean;
      readonly single: boolean;
      readonly yLabel: string;
      readonly y: Plot.ScaleOptions;
      readonly layers: Plot.Markish[];
    },
  ): Plot.PlotOptions {
    const top = FRAME.labelRow + (first ? this.#rows * FRAME.row : 0);
    const bottom = last ? FRAME.bottom : 26;
    return {
      width: FRAME.width,
      height: top + bottom + (single ? FRAME.single : FRAME.panel),
      marginLeft: FRAME.left,
      marginRight: FRAME.right,
      marginTop: top,
      marginBottom: bottom,
      x: {
        type: this.log ? "log" : "linear",
        domain: [...this.#domain],
        label: last ? this.label : null,
        labelArrow: "none",
        labelAnchor: "center",
        labelOffset: 38,
        ...(this.log ? { ticks: logTicks(...this.#domain), tickFormat: plain } : {}),
      },
      y: { label: null, grid: true, ...y },
      marks: [
        axisName(yLabel),
        ...this.#bands.map((band, i) =>
          Plot.rect([band], {
            x1: "x1",
            x2: "x2",
            fill: "currentColor",
            fillOpacity: i % 2 === 0 ? 0.04 : 0.1,
          })
        ),
        ...layers,
        ...this.marks.map((mark, i) => {
          const { row, anchor } = this.#labels[i]!;
          const beside = anchor === "middle" ? 0 : FRAME.row - 4;
          return Plot.ruleX([mark.shown], {
            stroke: "currentColor",
            strokeDasharray: "4 3",
            insetTop: first ? -(FRAME.labelRow + row * FRAME.row + beside) : 0,
          });
        }),
        ...(first ? this.#labels : []).map(({ x, text, row, anchor }) =>
          Plot.text([text], {
            frameAnchor: "top-left",
            dx: x - FRAME.left,
            dy: -(FRAME.labelRow + row * FRAME.row + 4),
            textAnchor: anchor,
            lineAnchor: "bottom",
            text: (d: string) => d,
            fill: "currentColor",
          })
        ),
      ],
    };
  }

  /** Horizontal place [px] of a value in the unit of the drawing. */
  pixel(shown: number): number {
    const scale = this.log ? Math.log : (value: number) => value;
    const [low, high] = this.#domain;
    const share = (scale(shown) - scale(low)) / (scale(high) - scale(low));
    return FRAME.left + share * (FRAME.width - FRAME.left - FRAME.right);
  }
}

/** A label to place: its text and the horizontal place it belongs to [px]. */
interface Label {
  readonly at: number;
  readonly text: string;
}

type Anchor = PlacedLabel["anchor"];

/**
 * Puts each label into the lowest row where it covers neither another label nor, for labels on a leader
 * line, another's line: above its line, else to the left of it, else to the right.
 */
function placeLabels(
  labels: readonly Label[],
  { firstRow, leaders }: { readonly firstRow: number; readonly leaders: boolean },
): PlacedLabel[] {
  const placed: Candidate[] = [];
  const order = labels.map((label, i) => ({ ...label, i })).sort((a, b) => a.at - b.at);
  const anchors: readonly Anchor[] = leaders ? ["middle", "end", "start"] : ["middle"];
  const found: PlacedLabel[] = [];
  for (const { at, text, i } of order) {
    const free = ({ from, to, row, anchor }: Candidate) =>
      (anchor === "middle" || (from >= 0 && to <= FRAME.width)) &&
      !placed.some((p) => p.row === row && from < p.to + LABEL_GAP && to + LABEL_GAP > p.from) &&
      !(leaders && labels.some((other, k) => k !== i && other.at > from - 3 && other.at < to + 3));
    let choice: Candidate | undefined;
    // Higher than one row for each label cannot be needed unless lines stand closer than letters.
    for (let row = firstRow; choice === undefined && row <= firstRow + labels.length; row++) {
      choice = anchors.map((anchor) => candidate({ at, text }, { row, anchor })).find(free);
    }
    choice ??= candidate({ at, text }, { row: firstRow + i, anchor: "middle" });
    placed.push(choice);
    found[i] = choice;
  }
  return found;
}

type Candidate = PlacedLabel & { readonly from: number; readonly to: number };

function candidate(
  { at, text }: Label,
  { row, anchor }: { readonly row: number; readonly anchor: Anchor },
): Candidate {
  const width = [...text].length * CHARACTER;
  if (anchor === "end") {
    return {
      x: at - LEADER_GAP,
      text,
      row,
      anchor,
      from: at - LEADER_GAP - width,
      to: at - LEADER_GAP,
    };
  }
  if (anchor === "start") {
    return {
      x: at + LEADER_GAP,
      text,
      row,
      anchor,
      from: at + LEADER_GAP,
      to: at + LEADER_GAP + width,
    };
  }
  const from = Math.min(Math.max(at - width / 2, 0), FRAME.width - width);
  return { x: from + width / 2, text, row, anchor, from, to: from + width };
}

function rowCount(labels: readonly PlacedLabel[]): number {
  return labels.length === 0 ? 0 : Math.max(...labels.map(({ row }) => row)) + 1;
}

/** Round values between the ends: 1, 2, 5 over a few decades, more over less, powers of ten over many. */
function logTicks(low: number, high: number): number[] {
  const decades = Math.log10(high / low);
  const steps = decades > 3.5 ? [1] : decades > 1.2 ? [1, 2, 5] : [1, 1.5, 2, 3, 4, 5, 7];
  const ticks: number[] = [];
  for (let k = Math.floor(Math.log10(low)); k <= Math.ceil(Math.log10(high)); k++) {
    for (const step of steps) {
      const tick = Number(`${step}e${k}`);
      if (tick >= low && tick <= high) ticks.push(tick);
    }
  }
  return ticks;
}

function plain(value: number): string {
  return String(Number(value.toPrecision(6)));
}
