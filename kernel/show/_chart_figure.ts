import { type Markup, markup, type MarkupPart, raw } from "./markup.ts";
import type { SeriesStyle } from "./palette.ts";
import { Showable } from "./showable.ts";
import type { DrawingText } from "./chart_parts.ts";

/** Opacity of filled areas: their names are written on them in the page's ink. */
export const AREA_OPACITY = 0.34;
const HIDDEN = raw(`aria-hidden="true" style="display:inline-block;vertical-align:middle"`);
const AREA_FILL = raw(`fill-opacity="${AREA_OPACITY}"`);

/** An entry of a chart's key. */
export interface KeyEntry {
  readonly name: string;
  readonly style: SeriesStyle;
  /** A filled area instead of a line. */
  readonly area?: boolean;
}

/** The parts of a chart that are put under each other. */
export interface ChartFigureOptions extends DrawingText {
  /** Each drawing with the key above it. */
  readonly drawings: readonly { readonly svg: string; readonly key?: readonly KeyEntry[] }[];
  /** Lines to read under the drawing, in the plain text too. */
  readonly readings?: readonly string[];
  /** What the axes span: for the plain text only, where there are no axes. */
  readonly ranges?: readonly string[];
}

/** One figure with caption, keys, drawings and readings. */
export function chartFigure(
  { title, description, drawings, readings = [], ranges = [] }: ChartFigureOptions,
): Showable {
  const figure = markup`
    <figure class="chart" style="margin:1em 0">
    <figcaption><strong>${title}</strong><br>${description}</figcaption>
    ${drawings.map(({ svg, key = [] }): MarkupPart => [keyMarkup(key), raw(svg)])}
    ${readings.length > 0 && markup`<ul class="readings">${readings.map(item)}</ul>`}
    </figure>`;
  return new Showable({
    "text/plain": [title, description, ...[...ranges, ...readings].map((line) => `- ${line}`)].join(
      "\n",
    ),
    "text/html": figure.text,
  });
}

function keyMarkup(entries: readonly KeyEntry[]): Markup | false {
  return entries.length > 0 &&
    markup`<p class="key" style="display:flex;flex-wrap:wrap;gap:4px 18px;margin:8px 0 0">${
      entries.map((entry) =>
        markup`<span style="white-space:nowrap">${sample(entry)} ${entry.name}</span>`
      )
    }</p>`;
}

function sample({ style: { color, dash }, area = false }: KeyEntry): Markup {
  const shape = area
    ? markup`<rect x="1" y="1" width="32" height="10" ${AREA_FILL} fill="${color}" stroke="${color}"/>`
    : markup`<path d="M0,6H34" stroke="${color}" stroke-width="2.5" stroke-dasharray="${dash}"/>`;
  return markup`
    <svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 34 12" width="34" height="12" ${HIDDEN}>
    ${shape}</svg>`;
}

function item(text: string): Markup {
  return markup`<li>${text}</li>`;
}
