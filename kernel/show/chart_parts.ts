/** What a drawing is called and says, for those who do not see it. */
export interface DrawingText {
  /** What the drawing shows, in one line. */
  readonly title: string;
  /** What there is to see, for those who do not see it; also the caption. */
  readonly description: string;
}

/** A named range of the horizontal axis, such as a regime; an end left out is open. */
export interface ChartBand {
  /** In the axis' SI unit. */
  readonly from?: number;
  /** Upper end; open when left out. */
  readonly to?: number;
  /** Name of the range. */
  readonly label: string;
}

/** A named point on the horizontal axis, such as the knee. */
export interface ChartMark {
  /** In the axis' SI unit. */
  readonly at: number;
  /** Name of the point. */
  readonly label: string;
}

/** The horizontal axis that the panels of one chart share. */
export interface ChartAxis {
  /** In SI, ascending. */
  readonly x: ArrayLike<number>;
  /** Name of the axis, without its unit. */
  readonly xLabel: string;
  /** SI unit of `x`; the prefix is chosen. @default "1": the label stands as it is */
  readonly xUnit?: string;
  /** Logarithmic axis. @default false */
  readonly log?: boolean;
  /** Named ranges, as shaded bands. */
  readonly bands?: readonly ChartBand[];
  /** Named points, as rules with a symbol on every curve. */
  readonly marks?: readonly ChartMark[];
}

/** A horizontal line that a series is held against. */
export interface ChartLimit {
  /** In the series' SI unit. */
  readonly at: number;
  /** What the line means. */
  readonly label: string;
}

/** One curve. */
export interface ChartSeries {
  /** Name in the key and the readings. */
  readonly name: string;
  /** In SI, one per value of x; `null` and NaN leave a gap. */
  readonly y: ArrayLike<number | null>;
  /** SI unit of `y`; the prefix is chosen. @default "1": the label stands as it is */
  readonly unit?: string;
  /** Label of the vertical axis; series with the same label and unit share a panel. @default `name` */
  readonly yLabel?: string;
  /** Line that the curve is held against. */
  readonly limit?: ChartLimit;
}

/** A scale of a `chart`, as Observable Plot takes it. */
export interface ChartScale {
  /** Name of the axis with its unit: "offset, Hz". */
  readonly label?: string | null;
  /** Kind of scale. @default "linear" for numbers */
  readonly type?: "linear" | "log" | "symlog" | "sqrt" | "band" | "point" | "ordinal" | "threshold";
  /** Ends of the scale, or its categories. @default what the marks span */
  readonly domain?: readonly (number | string)[];
  /** What the domain is mapped to: colours, or pixels. @default Plot's */
  readonly range?: readonly (number | string)[];
  /** Extends the domain to round values. @default false */
  readonly nice?: boolean;
  /** Makes the domain include zero. @default false */
  readonly zero?: boolean;
  /** Turns the scale round. @default false */
  readonly reverse?: boolean;
  /** Draws grid lines. @default false */
  readonly grid?: boolean;
  /** How many ticks, or where. @default Plot's */
  readonly ticks?: number | readonly (number | string)[];
  /** Text of a tick. @default Plot's */
  readonly tickFormat?: string | ((value: number) => string);
}
