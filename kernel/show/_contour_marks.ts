import * as Plot from "@observablehq/plot";
import { contourLines, type ContourPoint } from "./_contour_lines.ts";
import { FONT_SIZE } from "./_draw_svg.ts";
import type { LabelBoxes } from "./_label_boxes.ts";
import type { MapFrame } from "./_map_frame.ts";

/** Contours, at most about this many. */
const CONTOURS = 14;
const CONTOUR_STEPS = [0.5, 1, 2, 3, 5, 10] as const;
/** Where the oscillation sets in the noise is steep; contours end at this part of the sorted values. */
const STEEP_FROM = 0.94;
/** Half the size of a contour's label [px]. */
const LABEL = { width: 19, height: 8 } as const;
/** Contours shorter than this are not labelled [px]. */
const SHORTEST_LABELLED = 90;
/** Scraps of contours beside a gap, shorter than this, are left out [px]. */
const SHORTEST_DRAWN = 24;
/** Along a contour [1]. */
const LABEL_PLACES = [0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8, 0.12, 0.88] as const;

/** Round values, about as many as can be read. */
export function contourLevels(z: readonly (readonly number[])[]): number[] {
  const values = z.flat().filter(Number.isFinite).sort((a, b) => a - b);
  if (values.length < 4) return [];
  const [low, high] = [values[0]!, values[Math.floor(STEEP_FROM * values.length)]!];
  const step = CONTOUR_STEPS.find((size) => (high - low) / size <= CONTOURS) ?? 10;
  const first = Math.ceil(low / step);
  const count = Math.floor(high / step) - first + 1;
  return Array.from({ length: Math.max(0, count) }, (_, k) => (first + k) * step);
}

/** Contours with a gap in each for its label, which keeps clear of what stands there already. */
export function contourMarks(
  frame: MapFrame,
  { levels, labels }: { readonly levels: readonly number[]; readonly labels: LabelBoxes },
): Plot.Markish[] {
  return levels.flatMap((level) => {
    const lines = contourLines(frame.grid, level).filter((line) =>
      lengthOf(line, frame) > SHORTEST_DRAWN
    );
    const longest = lines.reduce<ContourPoint[]>(
      (best, line) => lengthOf(line, frame) > lengthOf(best, frame) ? line : best,
      [],
    );
    const place = labelPlace(longest, { frame, labels });
    const label = place === undefined ? [] : [
      Plot.text([frame.shown(place)], {
        x: "x",
        y: "y",
        text: () => String(level).replace("-", "\u2212"),
        fill: "currentColor",
        fontSize: FONT_SIZE - 2,
      }),
    ];
    return [
      ...lines.flatMap((line) =>
        broken(line, { frame, place }).map((part) =>
          Plot.line(part.map((point) => frame.shown(point)), {
            x: "x",
            y: "y",
            stroke: "currentColor",
            strokeOpacity: 0.6,
            strokeWidth: 1,
          })
        )
      ),
      ...label,
    ];
  });
}

function lengthOf(line: readonly ContourPoint[], frame: MapFrame): number {
  const at = line.map((point) => frame.pixel(point));
  return at.reduce(
    (sum, [x, y], k) => k === 0 ? 0 : sum + Math.hypot(x - at[k - 1]![0], y - at[k - 1]![1]),
    0,
  );
}

/** A point of the line for its label, near its middle, where nothing else is written. */
function labelPlace(
  line: readonly ContourPoint[],
  { frame, labels }: { readonly frame: MapFrame; readonly labels: LabelBoxes },
): ContourPoint | undefined {
  const whole = lengthOf(line, frame);
  if (whole < SHORTEST_LABELLED) return undefined;
  for (const part of LABEL_PLACES) {
    const place = alongLine(line, { frame, distance: part * whole });
    const [x, y] = frame.pixel(place);
    const box = {
      x1: x - LABEL.width,
      x2: x + LABEL.width,
      y1: y - LABEL.height,
      y2: y + LABEL.height,
    };
    if (!labels.isFree(box)) continue;
    labels.take(box);
    return place;
  }
  return undefined;
}

function alongLine(
  line: readonly ContourPoint[],
  { frame, distance }: { readonly frame: MapFrame; readonly distance: number },
): ContourPoint {
  let left = distance;
  for (let k = 1; k < line.length; k++) {
    const [a, b] = [line[k - 1]!, line[k]!];
    const size = lengthOf([a, b], frame);
    if (left <= size) {
      const part = size > 0 ? left / size : 0;
      return [a[0] + part * (b[0] - a[0]), a[1] + part * (b[1] - a[1])];
    }
    left -= size;
  }
  return line[line.length - 1]!;
}

/** The parts of a line outside its label, finely enough cut. */
function broken(
  line: readonly ContourPoint[],
  { frame, place }: { readonly frame: MapFrame; readonly place: ContourPoint | undefined },
): ContourPoint[][] {
  if (place === undefined) return [[...line]];
  const [px, py] = frame.pixel(place);
  const whole = lengthOf(line, frame);
  const count = Math.max(2, Math.ceil(whole / 3));
  const parts: ContourPoint[][] = [[]];
  for (let k = 0; k <= count; k++) {
    const point = alongLine(line, { frame, distance: whole * k / count });
    const [x, y] = frame.pixel(point);
    const hidden = Math.abs(x - px) < LABEL.width && Math.abs(y - py) < LABEL.height;
    if (!hidden) parts[parts.length - 1]!.push(point);
    else if (parts[parts.length - 1]!.length > 0) parts.push([]);
  }
  return parts.filter((part) => part.length > 1);
}
