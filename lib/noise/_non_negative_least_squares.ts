import { factor, solve } from "../numeric/lu.ts";

/**
 * Non-negative x that minimizes |sum of x_k column_k - target|^2, for a few columns: every choice of
 * columns that may be different from zero is solved, and the best one without a negative entry is the
 * minimum.
 *
 * @param columns at least one, not parallel, each of the length of `target`
 */
export function nonNegativeLeastSquares(
  columns: readonly (readonly number[])[],
  target: readonly number[],
): number[] {
  const count = columns.length;
  let best = new Array<number>(count).fill(0);
  let least = Infinity;
  for (let choice = 1; choice < 2 ** count; choice++) {
    const chosen = columns.map((_, k) => k).filter((k) => (choice >> k) & 1);
    const solution = leastSquares(chosen.map((k) => columns[k]!), target);
    if (!solution || solution.some((value) => !(value >= 0))) continue;
    const x = new Array<number>(count).fill(0);
    chosen.forEach((k, i) => x[k] = solution[i]!);
    const residual = target.reduce(
      (sum, value, row) =>
        sum + (value - columns.reduce((part, column, k) => part + x[k]! * column[row]!, 0)) ** 2,
      0,
    );
    if (residual < least) {
      least = residual;
      best = x;
    }
  }
  return best;
}

/** Least squares by the normal equations of columns of unit length; undefined where they are parallel. */
function leastSquares(
  columns: readonly (readonly number[])[],
  target: readonly number[],
): number[] | undefined {
  const n = columns.length;
  const lengths = columns.map((column) => Math.hypot(...column));
  const product = (a: readonly number[], b: readonly number[]) =>
    a.reduce((sum, value, row) => sum + value * b[row]!, 0);
  const normal = new Float64Array(n * n);
  const right = new Float64Array(n);
  columns.forEach((a, i) => {
    right[i] = product(a, target) / lengths[i]!;
    columns.forEach((b, j) => normal[i * n + j] = product(a, b) / (lengths[i]! * lengths[j]!));
  });
  const pivots = new Int32Array(n);
  if (!factor(normal, pivots, { n })) return undefined;
  solve(normal, pivots, right, { n });
  return Array.from(right, (value, i) => value / lengths[i]!);
}
