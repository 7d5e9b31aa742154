import { type DisplayUnit, displayUnit } from "./_display_unit.ts";

/** Ratio of largest to smallest magnitude above which fixed decimals would lose the small ones. */
const WIDE_RATIO = 1e3;

/** A column of numbers as text, with the unit they share. */
export interface FormattedColumn extends DisplayUnit {
  /** @returns the SI value as text without its unit; "n/a" when it is not finite */
  readonly text: (value: number) => string;
}

/**
 * Formats numbers that stand under each other: one unit, and the same count of decimals unless they
 * span more than three decades.
 *
 * @param values in SI
 */
export function formatColumn(
  values: readonly number[],
  { unit, digits }: { readonly unit: string; readonly digits: number },
): FormattedColumn {
  const shared = displayUnit(values, unit);
  const sizes = values.filter((v) => Number.isFinite(v) && v !== 0)
    .map((v) => Math.abs(shared.from(v))).filter((v) => v > 0);
  const largest = Math.max(...sizes, 0);
  const smallest = Math.min(...sizes, Infinity);
  const order = largest > 0 ? Math.floor(Math.log10(largest)) : 0;
  const wide = largest > WIDE_RATIO * smallest;
  const whole = values.every((v) => !Number.isFinite(v) || Number.isInteger(shared.from(v)));
  const decimals = whole ? 0 : Math.min(Math.max(digits - 1 - order, 0), 20);
  const text = (value: number): string => {
    if (!Number.isFinite(value)) return "n/a";
    const shown = shared.from(value);
    if (wide && !whole) return String(Number(shown.toPrecision(digits)));
    const fixed = shown.toFixed(decimals);
    return /^-0(\.0*)?$/.test(fixed) ? fixed.slice(1) : fixed;
  };
  return { ...shared, text };
}
