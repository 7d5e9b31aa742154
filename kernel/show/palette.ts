/**
 * Colours, dashes and symbols of the charts. A colour is a CSS variable, so that the report can use a
 * darker set on paper and a lighter one in the dark; its fallback reads on both grounds. No series is
 * told apart by colour alone: dash and symbol change with it.
 *
 * @module
 */

/** How one series is drawn. */
export interface SeriesStyle {
  /** CSS colour: the variable with its fallback. */
  readonly color: string;
  /** SVG dash array; "" is solid. */
  readonly dash: string;
  /** Shape of the symbols along the curve. */
  readonly symbol: "circle" | "square" | "triangle" | "diamond" | "cross" | "star";
}

/** One colour of a series: on light ground, on dark ground, and where the ground is unknown. */
export interface SeriesColor {
  readonly light: string;
  readonly dark: string;
  readonly either: string;
}

/** Grounds that the colours are made for. */
export const GROUNDS = { light: "#fbfaf6", dark: "#14181b" } as const;

/** In the order in which series take them. */
export const SERIES_COLORS: readonly SeriesColor[] = [
  { light: "#174a80", dark: "#7db4ee", either: "#3f7fbf" },
  { light: "#c04a12", dark: "#f2935c", either: "#cf5a20" },
  { light: "#0a7d68", dark: "#58d6b4", either: "#218c76" },
  { light: "#6d2480", dark: "#d6a2ea", either: "#a35fb5" },
  { light: "#8c6a00", dark: "#ecd25a", either: "#957414" },
  { light: "#4a5560", dark: "#c3ccd3", either: "#76828c" },
  { light: "#a3184a", dark: "#f58fb0", either: "#c94a76" },
  { light: "#6b3f1d", dark: "#d3a982", either: "#a06a3c" },
];

const DASHES = ["", "7 3", "2 3", "9 3 2 3", "4 2", "1 4"] as const;
const SYMBOLS = ["circle", "square", "triangle", "diamond", "cross", "star"] as const;

/**
 * The style of series number `index`; after eight, colours come again with another dash and symbol.
 *
 * @param index [1] counted from 0
 */
export function seriesStyle(index: number): SeriesStyle {
  const count = SERIES_COLORS.length;
  const slot = index % count;
  const shift = index + Math.floor(index / count);
  return {
    color: `var(--series-${slot + 1}, ${SERIES_COLORS[slot]!.either})`,
    dash: DASHES[shift % DASHES.length]!,
    symbol: SYMBOLS[shift % SYMBOLS.length]!,
  };
}
