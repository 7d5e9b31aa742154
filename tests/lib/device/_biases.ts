/** Seeded biases and derivatives for the device tests. */

/** Uniform numbers in [0, 1) from a seed: a 32-bit linear congruential generator (Numerical Recipes). */
export function seededUniform(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

/** Derivative at `x` from central differences at h, h/2 and h/4, extrapolated twice (error of order h^6). */
export function derivative(f: (x: number) => number, x: number, h: number): number {
  const central = [h, h / 2, h / 4].map((d) => (f(x + d) - f(x - d)) / (2 * d));
  const [a, b, c] = central as [number, number, number];
  const once = (4 * b - a) / 3;
  const next = (4 * c - b) / 3;
  return (16 * next - once) / 15;
}

/**
 * Largest error, relative to the largest value, of the polynomial through `count` Chebyshev nodes on
 * [-width, width]. For an analytic function it falls geometrically; a joint stops it.
 */
export function interpolationError(
  f: (x: number) => number,
  { width, count }: { width: number; count: number },
): number {
  const nodes = Array.from(
    { length: count },
    (_, k) => width * Math.cos(Math.PI * (k + 0.5) / count),
  );
  const weights = nodes.map((_, k) => (-1) ** k * Math.sin(Math.PI * (k + 0.5) / count));
  const values = nodes.map(f);
  let error = 0;
  for (let i = 0; i < 40; i++) {
    const x = width * (-0.9871 + 1.9742 * i / 39);
    let above = 0;
    let below = 0;
    nodes.forEach((node, k) => {
      above += weights[k]! * values[k]! / (x - node);
      below += weights[k]! / (x - node);
    });
    error = Math.max(error, Math.abs(above / below - f(x)));
  }
  return error / Math.max(...values.map(Math.abs));
}
