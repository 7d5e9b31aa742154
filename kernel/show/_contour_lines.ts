/** A function sampled on a grid of ascending coordinates; NaN where it has no value. */
export interface SampledGrid {
  /** Shape (m,). */
  readonly x: readonly number[];
  /** Shape (n,). */
  readonly y: readonly number[];
  /** Shape (n, m): a row for each y. */
  readonly z: readonly (readonly number[])[];
}

/** A point of a contour. */
export type ContourPoint = readonly [number, number];

/**
 * Lines on which a sampled function has a value, linear along the edges of the grid's cells; nothing is
 * drawn in a cell with a corner that has no value.
 *
 * Saddles are told apart by the mean of the corners.
 *
 * @returns each line as its points, closed ones with the first point again at the end
 */
export function contourLines(grid: SampledGrid, level: number): ContourPoint[][] {
  const joins = new Map<string, string[]>();
  const places = new Map<string, ContourPoint>();
  const link = (a: string, b: string) => {
    joins.set(a, [...(joins.get(a) ?? []), b]);
    joins.set(b, [...(joins.get(b) ?? []), a]);
  };
  for (let j = 0; j + 1 < grid.y.length; j++) {
    for (let i = 0; i + 1 < grid.x.length; i++) {
      for (const [a, b] of segments(grid, { i, j, level, places })) link(a, b);
    }
  }
  return chains(joins).map((chain) => chain.map((key) => places.get(key)!));
}

function segments(
  { x, y, z }: SampledGrid,
  { i, j, level, places }: {
    readonly i: number;
    readonly j: number;
    readonly level: number;
    readonly places: Map<string, ContourPoint>;
  },
): [string, string][] {
  // Corners and edges counter-clockwise from the lower left.
  const corners = [[i, j], [i + 1, j], [i + 1, j + 1], [i, j + 1]] as const;
  const values = corners.map(([column, row]) => z[row]![column]!);
  if (!values.every(Number.isFinite)) return [];
  const above = values.map((value) => value >= level);
  const crossed = [0, 1, 2, 3].filter((k) => above[k] !== above[(k + 1) % 4]);
  const keys = [`h${i},${j}`, `v${i + 1},${j}`, `h${i},${j + 1}`, `v${i},${j}`];
  for (const k of crossed) {
    const [from, to] = [corners[k]!, corners[(k + 1) % 4]!];
    const part = (level - values[k]!) / (values[(k + 1) % 4]! - values[k]!);
    places.set(keys[k]!, [
      x[from[0]]! + part * (x[to[0]]! - x[from[0]]!),
      y[from[1]]! + part * (y[to[1]]! - y[from[1]]!),
    ]);
  }
  if (crossed.length === 2) return [[keys[crossed[0]!]!, keys[crossed[1]!]!]];
  if (crossed.length !== 4) return [];
  const middleAbove = values.reduce((sum, value) => sum + value, 0) / 4 >= level;
  // The middle joins the corners on its side: each of the others is cut off alone.
  return middleAbove === above[0]
    ? [[keys[0]!, keys[1]!], [keys[2]!, keys[3]!]]
    : [[keys[3]!, keys[0]!], [keys[1]!, keys[2]!]];
}

function chains(joins: ReadonlyMap<string, readonly string[]>): string[][] {
  const visited = new Set<string>();
  const follow = (start: string): string[] => {
    const chain = [start];
    visited.add(start);
    for (let at = start;;) {
      const next = joins.get(at)!.find((key) => !visited.has(key));
      if (next === undefined) break;
      visited.add(next);
      chain.push(next);
      at = next;
    }
    return chain;
  };
  const open = [...joins].filter(([, ends]) => ends.length === 1).map(([key]) => key);
  const lines = open.flatMap((key) => visited.has(key) ? [] : [follow(key)]);
  for (const key of joins.keys()) {
    if (visited.has(key)) continue;
    const ring = follow(key);
    lines.push([...ring, key]);
  }
  return lines;
}
