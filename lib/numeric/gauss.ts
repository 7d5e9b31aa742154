/**
 * Gauss-Legendre nodes and the collocation (implicit Runge-Kutta) coefficients built on them.
 *
 * @see E. Hairer, C. Lubich, G. Wanner, Geometric Numerical Integration, 2nd ed. (2006), II.1.3
 * @module
 */

/** Coefficients of the Gauss collocation method with `stages` stages, order 2 stages. */
export interface GaussMethod {
  readonly stages: number;
  /** Nodes in (0, 1), shape (s,). */
  readonly nodes: Float64Array;
  /** Quadrature weights, shape (s,), sum 1. */
  readonly weights: Float64Array;
  /** Runge-Kutta matrix a_ij, the integral of the j-th Lagrange polynomial to node i, shape (s, s). */
  readonly matrix: Float64Array;
}

const ROOT_ITERATIONS = 60;

/** Legendre polynomial of degree `n` and its derivative at `x`. */
function legendre(n: number, x: number): [number, number] {
  let previous = 1;
  let current = x;
  for (let k = 2; k <= n; k++) {
    [previous, current] = [current, ((2 * k - 1) * x * current - (k - 1) * previous) / k];
  }
  return [current, n * (x * current - previous) / (x * x - 1)];
}

/**
 * Nodes and weights of Gauss-Legendre quadrature on (0, 1).
 *
 * @param count number of nodes [1], at least 1
 * @returns nodes and weights, each shape (count,), exact for polynomials of degree 2 count - 1
 * @throws RangeError for a count below 1
 */
export function gaussLegendre(count: number): { nodes: Float64Array; weights: Float64Array } {
  if (!(Number.isInteger(count) && count >= 1)) {
    throw new RangeError(`Cannot build a Gauss rule: count must be an integer >= 1, got ${count}`);
  }
  const nodes = new Float64Array(count);
  const weights = new Float64Array(count);
  if (count === 1) return { nodes: Float64Array.of(0.5), weights: Float64Array.of(1) };
  for (let i = 0; i < count; i++) {
    let x = -Math.cos(Math.PI * (i + 0.75) / (count + 0.5));
    for (let step = 0; step < ROOT_ITERATIONS; step++) {
      const [value, slope] = legendre(count, x);
      const change = value / slope;
      x -= change;
      if (Math.abs(change) <= Number.EPSILON) break;
    }
    const slope = legendre(count, x)[1];
    nodes[i] = (1 + x) / 2;
    weights[i] = 1 / ((1 - x * x) * slope * slope);
  }
  return { nodes, weights };
}

/**
 * Values of the Lagrange polynomials on `nodes` at a point, shape (nodes.length,).
 *
 * @param nodes distinct points, shape (m,)
 * @param x where [1]
 */
export function lagrangeBasis(nodes: ArrayLike<number>, x: number): Float64Array {
  const count = nodes.length;
  const values = new Float64Array(count).fill(1);
  for (let j = 0; j < count; j++) {
    for (let k = 0; k < count; k++) {
      if (k !== j) values[j]! *= (x - nodes[k]!) / (nodes[j]! - nodes[k]!);
    }
  }
  return values;
}

/**
 * Integrals of the Lagrange polynomials on `nodes` from `from` to `to`, shape (nodes.length,).
 * Exact to rounding: a Gauss rule of sufficient degree does the integration.
 */
export function lagrangeIntegrals(
  nodes: ArrayLike<number>,
  { from, to }: { from: number; to: number },
): Float64Array {
  const rule = gaussLegendre(Math.ceil(nodes.length / 2));
  const integrals = new Float64Array(nodes.length);
  rule.nodes.forEach((node, k) => {
    const basis = lagrangeBasis(nodes, from + node * (to - from));
    for (let j = 0; j < basis.length; j++) {
      integrals[j]! += rule.weights[k]! * (to - from) * basis[j]!;
    }
  });
  return integrals;
}

/**
 * The Gauss collocation method.
 *
 * @param stages number of stages s [1], 1 to 8; the order is 2 s
 * @throws RangeError outside that range
 */
export function gaussMethod(stages: number): GaussMethod {
  if (!(Number.isInteger(stages) && stages >= 1 && stages <= 8)) {
    throw new RangeError(
      `Cannot build a Gauss method: stages must be an integer from 1 to 8, got ${stages}`,
    );
  }
  const { nodes, weights } = gaussLegendre(stages);
  const matrix = new Float64Array(stages * stages);
  nodes.forEach((node, i) => {
    matrix.set(lagrangeIntegrals(nodes, { from: 0, to: node }), i * stages);
  });
  return { stages, nodes, weights, matrix };
}
