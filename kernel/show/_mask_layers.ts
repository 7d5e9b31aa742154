import * as Plot from "@observablehq/plot";
import { levelOf, type Mask } from "../../lib/noise/mask.ts";
import type { ChartFrame } from "./_chart_frame.ts";

/** Dashes of the short strokes on the forbidden side of a mask. */
const HATCH = { spacing: 12, length: 7 } as const;

/** A mask's pieces inside the drawing: thick lines, triangles for demands at one offset, hatched above. */
export function maskLayers(
  mask: Mask,
  { frame, range }: {
    readonly frame: ChartFrame;
    /** Offsets drawn [Hz]. */
    readonly range: { readonly from: number; readonly to: number };
  },
): { readonly layers: Plot.Markish[]; readonly levels: number[] } {
  const levels: number[] = [];
  const layers = mask.pieces.flatMap((piece): Plot.Markish[] => {
    const from = Math.max(piece.from, range.from);
    const to = Math.min(piece.to, range.to);
    if (!(from <= to)) return [];
    const ends = [from, to].map((offset) => ({
      x: frame.unit.from(offset),
      y: levelOf(piece, offset),
    }));
    levels.push(...ends.map(({ y }) => y));
    if (from === to) {
      return [
        Plot.dot([ends[0]], { x: "x", y: "y", symbol: "triangle", rotate: 180, r: 6, fill: INK }),
      ];
    }
    return [
      Plot.line(ends, { x: "x", y: "y", stroke: INK, strokeWidth: 3 }),
      ...hatches(ends, frame),
    ];
  });
  return { layers, levels };
}

const INK = "currentColor";

/** Strokes upwards from a line, evenly spread on the paper. */
function hatches(
  ends: readonly { readonly x: number; readonly y: number }[],
  frame: ChartFrame,
): Plot.Markish[] {
  const [start, end] = ends;
  if (!start || !end) return [];
  const [left, right] = [frame.pixel(start.x), frame.pixel(end.x)];
  const count = Math.floor((right - left) / HATCH.spacing);
  const points = Array.from({ length: count }, (_, k) => {
    const share = (k + 0.5) * HATCH.spacing / (right - left);
    return { x: start.x * (end.x / start.x) ** share, y: start.y + share * (end.y - start.y) };
  });
  return [
    Plot.vector(points, {
      x: "x",
      y: "y",
      length: HATCH.length,
      rotate: 35,
      shape: "spike",
      r: 0.6,
      anchor: "start",
      stroke: INK,
      strokeWidth: 1,
    }),
  ];
}
