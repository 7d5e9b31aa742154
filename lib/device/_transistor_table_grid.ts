/**
 * Rows of a characterization put on a grid.
 *
 * @module
 */

/** Voltages nearer than this are the same, written with different rounding [V]. */
const SAME = 1e-9;

/** Part of the middle spacing below which two different voltages are a slip, not a grid. */
const TOO_CLOSE = 0.01;

/** Missing points named before the rest are counted. */
const NAMED = 3;

/** One row: where it stands and its values in SI. */
export interface TableRow {
  readonly line: number;
  readonly values: readonly number[];
}

/** One axis: its values and which of them each row has. */
export interface GridAxis {
  readonly name: string;
  readonly points: Float64Array;
  readonly places: Int32Array;
}

/**
 * The voltages of one column in rising order.
 *
 * @throws {RangeError} when there are fewer than `atLeast`, or two that are too close to be meant
 */
export function gridAxis(
  rows: readonly TableRow[],
  { name, column, atLeast }: {
    readonly name: string;
    readonly column: number;
    readonly atLeast: number;
  },
): GridAxis {
  // Every row has every column.
  const voltage = (row: number) => rows[row]!.values[column]!;
  const order = rows.map((_, row) => row).sort((a, b) => voltage(a) - voltage(b) || a - b);
  const points: number[] = [];
  const firstRow: number[] = [];
  const places = new Int32Array(rows.length);
  for (const row of order) {
    const last = points.at(-1);
    if (last === undefined || voltage(row) - last > SAME) {
      points.push(voltage(row));
      firstRow.push(row);
    }
    places[row] = points.length - 1;
  }
  const gaps = points.slice(1).map((point, i) => point - points[i]!);
  const middle = gaps.toSorted((a, b) => a - b)[gaps.length >> 1] ?? 0;
  const slip = gaps.findIndex((gap) => gap < TOO_CLOSE * middle);
  if (slip >= 0) {
    const [one, other] = [slip, slip + 1].map((i) =>
      `${points[i]} V in line ${rows[firstRow[i]!]!.line}`
    );
    throw new RangeError(
      `Cannot read the transistor table: values of ${name} must form a grid, got ${one} and ${other}`,
    );
  }
  if (points.length < atLeast) {
    throw new RangeError(
      `Cannot read the transistor table: ${name} must take at least ${atLeast} values, got ${
        points.join(" V, ")
      } V`,
    );
  }
  return { name, points: Float64Array.from(points), places };
}

/**
 * For each row its place in arrays of shape (n0, n1, n2).
 *
 * @throws {RangeError} when two rows are at one point or a point has no row
 */
export function gridPlaces(
  rows: readonly TableRow[],
  axes: readonly [GridAxis, GridAxis, GridAxis],
): Int32Array {
  const [n0, n1, n2] = axes.map(({ points }) => points.length) as [number, number, number];
  const rowAt = new Int32Array(n0 * n1 * n2).fill(-1);
  const result = new Int32Array(rows.length);
  const point = (place: number) => {
    const indices = [Math.floor(place / (n1 * n2)), Math.floor(place / n2) % n1, place % n2];
    return axes.filter(({ points }) => points.length > 1).map(({ name, points }) =>
      `${name} ${points[indices[axes.findIndex((axis) => axis.name === name)]!]} V`
    ).join(", ");
  };
  rows.forEach(({ line }, row) => {
    const [i, j, k] = axes.map(({ places }) => places[row]!) as [number, number, number];
    const place = (i * n1 + j) * n2 + k;
    const earlier = rowAt[place]!;
    if (earlier >= 0) {
      throw new RangeError(
        `Cannot read the transistor table: every point must stand once, got ${
          point(place)
        } in line ${rows[earlier]!.line} and in line ${line}`,
      );
    }
    rowAt[place] = row;
    result[row] = place;
  });
  const missing: number[] = [];
  rowAt.forEach((row, place) => {
    if (row < 0) missing.push(place);
  });
  if (missing.length > 0) {
    const named = missing.slice(0, NAMED).map((place) => `(${point(place)})`).join(", ");
    const rest = missing.length > NAMED ? ` and ${missing.length - NAMED} more` : "";
    throw new RangeError(
      `Cannot read the transistor table: every point of the grid of ${n0} x ${n1}${
        n2 > 1 ? ` x ${n2}` : ""
      } must have a row, missing are ${named}${rest}`,
    );
  }
  return result;
}
