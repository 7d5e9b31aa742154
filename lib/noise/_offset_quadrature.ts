import { gaussLegendre } from "../numeric/gauss.ts";

/** Gauss nodes per panel: smooth integrands over less than a decade converge to rounding. */
const NODES = 10;
const RULE = gaussLegendre(NODES);
/** A panel is halved until both halves agree with it to this share of the whole integral. */
const TOLERANCE = 1e-11;
/** Halvings after which a panel is 1e-9 of a decade wide: the integrand is not smooth there. */
const DEEPEST = 30;

/**
 * Integral of a positive, piecewise smooth density over the offset, by adaptive Gauss quadrature in the
 * logarithm of the offset. Panels begin at every break.
 *
 * @throws {RangeError} where the density is not smooth
 */
export function integrateOffsets(
  density: (offset: number) => number,
  { from, to, breaks }: {
    readonly from: number;
    readonly to: number;
    /** Offsets of corners and resonances; those outside the limits are left out. */
    readonly breaks: readonly number[];
  },
): number {
  const integrand = (logarithm: number) => {
    const offset = Math.exp(logarithm);
    // exp(log(x)) may round to just beyond the limits, where a curve cannot be read.
    const inside = Math.min(Math.max(offset, from), to);
    return density(inside) * inside;
  };
  const edges = [from, ...breaks.filter((each) => each > from && each < to), to]
    .map(Math.log).sort((a, b) => a - b);
  const panels = edges.slice(1).map((high, index) => {
    const low = edges[index]!;
    return { low, high, area: panelArea(integrand, low, high) };
  });
  const bound = TOLERANCE * panels.reduce((sum, { area }) => sum + area, 0);
  const refine = (low: number, high: number, area: number, depth: number): number => {
    const middle = (low + high) / 2;
    const lower = panelArea(integrand, low, middle);
    const upper = panelArea(integrand, middle, high);
    if (Math.abs(lower + upper - area) <= Math.max(bound, TOLERANCE * area)) return lower + upper;
    if (depth === DEEPEST) {
      throw new RangeError(
        `Cannot integrate phase noise: the density must be smooth, but it jumps near ` +
          `${Math.exp(middle)} Hz`,
      );
    }
    return refine(low, middle, lower, depth + 1) + refine(middle, high, upper, depth + 1);
  };
  return panels.reduce((sum, { low, high, area }) => sum + refine(low, high, area, 0), 0);
}

function panelArea(integrand: (x: number) => number, low: number, high: number): number {
  let sum = 0;
  for (let i = 0; i < NODES; i++) {
    sum += RULE.weights[i]! * integrand(low + RULE.nodes[i]! * (high - low));
  }
  return sum * (high - low);
}
