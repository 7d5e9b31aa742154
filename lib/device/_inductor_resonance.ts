/** Points per decade of the search; a lossy substrate changes slower than this. */
const SEARCH_PER_DECADE = 40;

/** Halvings that bring the bracket to rounding. */
const BISECTIONS = 60;

/**
 * First frequency at which a susceptance passes from inductive to capacitive, between two frequencies
 * above zero; none when it begins capacitive or stays inductive.
 */
export function firstResonance(
  susceptance: (frequency: number) => number,
  { lowest, highest }: { lowest: number; highest: number },
): number | undefined {
  if (!(susceptance(lowest) < 0)) return undefined;
  const count = Math.max(1, Math.ceil(Math.log10(highest / lowest) * SEARCH_PER_DECADE));
  let below = lowest;
  for (let k = 1; k <= count; k++) {
    const next = k === count ? highest : lowest * (highest / lowest) ** (k / count);
    if (susceptance(next) >= 0) return bisect(susceptance, below, next);
    below = next;
  }
  return undefined;
}

function bisect(value: (x: number) => number, below: number, above: number): number {
  let low = below;
  let high = above;
  for (let k = 0; k < BISECTIONS; k++) {
    const middle = (low + high) / 2;
    if (value(middle) < 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
