/** A value with its name and unit, for a message. */
export interface Named {
  readonly what: string;
  readonly value: number;
  /** `""` for a pure number. */
  readonly unit: string;
}

function withUnit(value: number, unit: string): string {
  return unit === "" ? `${value}` : `${value} ${unit}`;
}

/** Refuses a value that is not positive and finite. `action` completes "Cannot ...". */
export function requirePositive(action: string, { what, value, unit }: Named): void {
  if (!(value > 0 && value < Infinity)) {
    throw new RangeError(
      `Cannot ${action}: ${what} must be > 0${unit && ` ${unit}`} and finite, got ${
        withUnit(value, unit)
      }`,
    );
  }
}

/** Refuses a value that is negative or not finite. */
export function requireNotNegative(action: string, { what, value, unit }: Named): void {
  if (!(value >= 0 && value < Infinity)) {
    throw new RangeError(
      `Cannot ${action}: ${what} must be >= 0${unit && ` ${unit}`} and finite, got ${
        withUnit(value, unit)
      }`,
    );
  }
}

/** Refuses a level that is not finite. */
export function requireFinite(action: string, { what, value, unit }: Named): void {
  if (!Number.isFinite(value)) {
    throw new RangeError(
      `Cannot ${action}: ${what} must be a finite number of ${unit}, got ${value}`,
    );
  }
}

/** Refuses limits of integration that are not 0 < from < to < Infinity. */
export function requireLimits(
  action: string,
  { from, to }: { readonly from: number; readonly to: number },
): void {
  if (!(from > 0 && from < to && to < Infinity)) {
    throw new RangeError(
      `Cannot ${action}: the limits must be 0 Hz < from < to and finite, got from ${from} Hz to ${to} Hz`,
    );
  }
}
