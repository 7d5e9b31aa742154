import { EigenvalueDecomposition, Matrix } from "ml-matrix";
import type { Complex } from "./equilibrium.ts";

/** Rounds of the orthogonal iteration around the period before the one that is read. */
const ROUNDS = 6;
/** Two directions couple when the last round still turns one into the other by more than this. */
const COUPLED = 1e-11;

/**
 * A multiplier of the period map, kept as logarithm: it may be below the smallest number.
 *
 * @internal
 */
export interface Multiplier {
  /** Natural logarithm of the modulus. */
  readonly logModulus: number;
  /** Argument [rad], in (-pi, pi]. */
  readonly argument: number;
}

/**
 * All multipliers of a product of step maps, largest modulus first.
 *
 * Orthogonal iteration around the period with the maps applied one at a time, so that multipliers far
 * below machine epsilon keep their relative accuracy; directions that do not separate are resolved
 * together in a small eigenvalue problem.
 *
 * @param stepMaps maps in the order of time, shape (steps, r, r), row-major
 * @see L. Dieci, R. Russell, E. Van Vleck, SIAM J. Numer. Anal. 34 (1997) 402, discrete QR method
 *
 * @internal
 */
export function multipliersOf(stepMaps: Float64Array, r: number): Multiplier[] {
  const steps = stepMaps.length / (r * r);
  let basis = Matrix.eye(r, r);
  let start = basis;
  let product = Matrix.eye(r, r);
  let logScale = new Float64Array(r);
  for (let round = 0; round < ROUNDS; round++) {
    start = basis.clone();
    product = Matrix.eye(r, r);
    logScale = new Float64Array(r);
    for (let step = 0; step < steps; step++) {
      const map = new Matrix(r, r);
      for (let i = 0; i < r; i++) {
        for (let j = 0; j < r; j++) map.set(i, j, stepMaps[(step * r + i) * r + j]!);
      }
      const { orthogonal, triangular } = orthonormalise(map.mmul(basis));
      basis = orthogonal;
      // True product = diag(exp(logScale)) product: the next factor sees the scaled rows.
      for (let i = 0; i < r; i++) {
        for (let j = i + 1; j < r; j++) {
          triangular.set(i, j, triangular.get(i, j) * Math.exp(logScale[j]! - logScale[i]!));
        }
      }
      product = triangular.mmul(product);
      for (let i = 0; i < r; i++) {
        const size = Math.abs(product.get(i, i));
        logScale[i]! += Math.log(size);
        if (size > 0) product.mulRow(i, 1 / size);
      }
    }
  }
  return blocks(start, basis, { product, logScale });
}

function orthonormalise(a: Matrix): { orthogonal: Matrix; triangular: Matrix } {
  const r = a.rows;
  const orthogonal = a.clone();
  const triangular = new Matrix(r, r);
  for (let j = 0; j < r; j++) {
    // Twice is enough (Kahan, Parlett).
    for (let pass = 0; pass < 2; pass++) {
      for (let k = 0; k < j; k++) {
        let dot = 0;
        for (let i = 0; i < r; i++) dot += orthogonal.get(i, k) * orthogonal.get(i, j);
        triangular.set(k, j, triangular.get(k, j) + dot);
        for (let i = 0; i < r; i++) {
          orthogonal.set(i, j, orthogonal.get(i, j) - dot * orthogonal.get(i, k));
        }
      }
    }
    let norm = 0;
    for (let i = 0; i < r; i++) norm = Math.hypot(norm, orthogonal.get(i, j));
    triangular.set(j, j, norm);
    for (let i = 0; i < r; i++) orthogonal.set(i, j, norm > 0 ? orthogonal.get(i, j) / norm : 0);
  }
  return { orthogonal, triangular };
}

/** Eigenvalues block by block, a block being a run of directions that the last round still mixed. */
function blocks(
  start: Matrix,
  end: Matrix,
  { product, logScale }: { product: Matrix; logScale: Float64Array },
): Multiplier[] {
  const r = start.rows;
  const turn = start.transpose().mmul(end);
  const found: Multiplier[] = [];
  for (let first = 0; first < r;) {
    let last = first;
    for (let j = first; j <= last; j++) {
      for (let k = r - 1; k > last; k--) {
        if (Math.abs(turn.get(k, j)) > COUPLED) {
          last = k;
          break;
        }
      }
    }
    const size = last - first + 1;
    const base = Math.max(...logScale.subarray(first, last + 1));
    if (base === -Infinity) {
      for (let k = 0; k < size; k++) found.push({ logModulus: -Infinity, argument: 0 });
    } else {
      const block = product.subMatrix(first, last, first, last);
      for (let i = 0; i < size; i++) block.mulRow(i, Math.exp(logScale[first + i]! - base));
      const matrix = turn.subMatrix(first, last, first, last).mmul(block);
      const { realEigenvalues: re, imaginaryEigenvalues: im } = new EigenvalueDecomposition(
        matrix,
        { assumeSymmetric: false },
      );
      re.forEach((real, k) => {
        found.push({
          logModulus: base + Math.log(Math.hypot(real, im[k]!)),
          argument: Math.atan2(im[k]!, real),
        });
      });
    }
    first = last + 1;
  }
  return found.sort((a, b) => b.logModulus - a.logModulus || b.argument - a.argument);
}

/**
 * The multiplier as a complex number; zero where it is below the smallest one.
 *
 * @internal
 */
export function multiplierValue({ logModulus, argument }: Multiplier): Complex {
  const size = Math.exp(logModulus);
  return { re: size * Math.cos(argument), im: size * Math.sin(argument) };
}
