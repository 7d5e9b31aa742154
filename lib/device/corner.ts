/** Process corners of a technology card, from the slowest transistors to the fastest. */
export const CORNERS = ["slow", "typical", "fast"] as const;

/**
 * A process corner. Slow transistors have the higher threshold, the lower mobility and the thicker
 * oxide; fast ones the opposite. A skewed corner (slow N with fast P) is resolved transistor by transistor.
 */
export type Corner = (typeof CORNERS)[number];
