/**
 * Dense LU factors with partial pivoting, in place, on slices of flat row-major arrays, so that the
 * hot loops of the orbit engine allocate nothing.
 *
 * Indices stay inside the slices by construction; `!` says so to the compiler.
 *
 * @module
 */

/**
 * Factors the `n` by `n` matrix at `a[at...]` (row-major, overwritten) as P A = L U.
 *
 * @param a row-major storage, overwritten by the factors
 * @param pivots row exchanges, written at `pivots[pivotsAt...pivotsAt + n]`
 * @returns whether all pivots are finite and different from zero
 */
export function factor(
  a: Float64Array,
  pivots: Int32Array,
  { n, at = 0, pivotsAt = 0 }: { n: number; at?: number; pivotsAt?: number },
): boolean {
  for (let k = 0; k < n; k++) {
    const rowK = at + k * n;
    let best = k;
    let size = Math.abs(a[rowK + k]!);
    for (let i = k + 1; i < n; i++) {
      const candidate = Math.abs(a[at + i * n + k]!);
      if (candidate > size) {
        size = candidate;
        best = i;
      }
    }
    pivots[pivotsAt + k] = best;
    if (!(size > 0 && size < Infinity)) return false;
    if (best !== k) {
      const rowBest = at + best * n;
      for (let j = 0; j < n; j++) {
        const swap = a[rowK + j]!;
        a[rowK + j] = a[rowBest + j]!;
        a[rowBest + j] = swap;
      }
    }
    const inverse = 1 / a[rowK + k]!;
    for (let i = k + 1; i < n; i++) {
      const rowI = at + i * n;
      const entry = a[rowI + k]!;
      // Collocation matrices are sparse; an untouched row costs nothing.
      if (entry === 0) continue;
      const multiplier = entry * inverse;
      a[rowI + k] = multiplier;
      for (let j = k + 1; j < n; j++) a[rowI + j]! -= multiplier * a[rowK + j]!;
    }
  }
  return true;
}

/**
 * Solves A X = B from the factors, for `columns` right-hand sides stored row-major (n, columns) at
 * `b[bAt...]`, overwritten by X.
 */
export function solve(
  a: Float64Array,
  pivots: Int32Array,
  b: Float64Array,
  { n, columns = 1, at = 0, pivotsAt = 0, bAt = 0 }: {
    n: number;
    columns?: number;
    at?: number;
    pivotsAt?: number;
    bAt?: number;
  },
): void {
  for (let k = 0; k < n; k++) {
    const p = pivots[pivotsAt + k]!;
    if (p === k) continue;
    const rowK = bAt + k * columns;
    const rowP = bAt + p * columns;
    for (let c = 0; c < columns; c++) {
      const swap = b[rowK + c]!;
      b[rowK + c] = b[rowP + c]!;
      b[rowP + c] = swap;
    }
  }
  for (let i = 1; i < n; i++) {
    const rowI = at + i * n;
    const out = bAt + i * columns;
    for (let k = 0; k < i; k++) {
      const l = a[rowI + k]!;
      if (l === 0) continue;
      const from = bAt + k * columns;
      for (let c = 0; c < columns; c++) b[out + c]! -= l * b[from + c]!;
    }
  }
  for (let i = n - 1; i >= 0; i--) {
    const rowI = at + i * n;
    const out = bAt + i * columns;
    for (let k = i + 1; k < n; k++) {
      const u = a[rowI + k]!;
      if (u === 0) continue;
      const from = bAt + k * columns;
      for (let c = 0; c < columns; c++) b[out + c]! -= u * b[from + c]!;
    }
    const inverse = 1 / a[rowI + i]!;
    for (let c = 0; c < columns; c++) b[out + c]! *= inverse;
  }
}

/** Solves A^T x = b from the factors of A, for one right-hand side at `b[bAt...]`, overwritten. */
export function solveTransposed(
  a: Float64Array,
  pivots: Int32Array,
  b: Float64Array,
  { n, at = 0, pivotsAt = 0, bAt = 0 }: {
    n: number;
    at?: number;
    pivotsAt?: number;
    bAt?: number;
  },
): void {
  for (let i = 0; i < n; i++) {
    const rowI = at + i * n;
    const value = b[bAt + i]! / a[rowI + i]!;
    b[bAt + i] = value;
    if (value === 0) continue;
    for (let k = i + 1; k < n; k++) b[bAt + k]! -= a[rowI + k]! * value;
  }
  for (let i = n - 1; i > 0; i--) {
    const rowI = at + i * n;
    const value = b[bAt + i]!;
    if (value === 0) continue;
    for (let k = 0; k < i; k++) b[bAt + k]! -= a[rowI + k]! * value;
  }
  for (let k = n - 1; k >= 0; k--) {
    const p = pivots[pivotsAt + k]!;
    if (p === k) continue;
    const swap = b[bAt + k]!;
    b[bAt + k] = b[bAt + p]!;
    b[bAt + p] = swap;
  }
}
