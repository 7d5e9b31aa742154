const ITERATIONS = 40;
/** Relative distance of the ends at which the search stops. */
const TOLERANCE = 1e-4;

/**
 * Closes in on where `holds` turns true, by bisection in the logarithm to 1e-4.
 *
 * @param ends a low end where it does not hold and a high end where it does, both above zero
 * @returns the ends of the last bracket
 */
export function closeIn(
  ends: { readonly low: number; readonly high: number },
  holds: (value: number) => boolean,
): { low: number; high: number } {
  let { low, high } = ends;
  for (let k = 0; k < ITERATIONS && high / low > 1 + TOLERANCE; k++) {
    const middle = Math.sqrt(low * high);
    if (holds(middle)) high = middle;
    else low = middle;
  }
  return { low, high };
}
