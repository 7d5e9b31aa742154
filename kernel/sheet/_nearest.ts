import { closest, distance } from "fastest-levenshtein";

/** A known name further away than this share of its length is no slip of the pen. */
const GREATEST_SHARE = 0.4;

/** Writes `, perhaps "known"` when one of `known` is a likely meaning of `name`, else nothing. */
export function perhaps(name: string, known: readonly string[]): string {
  if (known.length === 0) return "";
  const nearest = closest(name, known);
  const near = distance(name, nearest) <= Math.max(2, GREATEST_SHARE * nearest.length);
  return near ? `, perhaps "${nearest}"` : "";
}
