/** How an oscillator stands at one programmed current. */
export type Regime =
  | "does not start"
  | "sustains but does not start"
  | "current-limited"
  | "at the knee"
  | "voltage-limited";

/**
 * The exponent d ln A / d ln I at which the knee lies unless the lead says otherwise, and how far from it
 * a point still counts as at the knee.
 */
export const KNEE_EXPONENT = 0.5;
const KNEE_BAND = 0.15;

/**
 * The regime of a point by the stated rule: it does not start where no orbit exists, it sustains but
 * does not start where an orbit exists and the equilibrium is stable; otherwise the exponent
 * e = d ln A / d ln I decides: at the knee within 0.15 of the knee exponent, current-limited above,
 * voltage-limited below.
 *
 * @param exponent e [1]; undefined where there is no orbit
 * @param kneeExponent the lead's [1]
 */
export function regimeOf(
  { starts, exponent, kneeExponent = KNEE_EXPONENT }: {
    readonly starts: boolean;
    readonly exponent: number | undefined;
    readonly kneeExponent?: number;
  },
): Regime {
  if (exponent === undefined) return "does not start";
  if (!starts) return "sustains but does not start";
  if (exponent > kneeExponent + KNEE_BAND) return "current-limited";
  return exponent < kneeExponent - KNEE_BAND ? "voltage-limited" : "at the knee";
}

/**
 * Slopes d ln y / d ln x of a sampled curve by local parabolas in the logarithms, shape (m,); the chord's
 * for two points, undefined for one.
 *
 * @param x abscissas, increasing, positive, shape (m,)
 * @param y values, positive, shape (m,)
 */
export function localExponents(
  x: readonly number[],
  y: readonly number[],
): (number | undefined)[] {
  const count = x.length;
  const lx = x.map(Math.log);
  const ly = y.map(Math.log);
  if (count < 3) {
    const [x0, x1] = lx;
    const [y0, y1] = ly;
    const chord = x0 === undefined || x1 === undefined || y0 === undefined || y1 === undefined
      ? undefined
      : (y1 - y0) / (x1 - x0);
    return x.map(() => chord);
  }
  return x.map((_, k) => {
    const i = Math.min(Math.max(k, 1), count - 2);
    const [x0, x1, x2] = [lx[i - 1] ?? NaN, lx[i] ?? NaN, lx[i + 1] ?? NaN];
    const [y0, y1, y2] = [ly[i - 1] ?? NaN, ly[i] ?? NaN, ly[i + 1] ?? NaN];
    const at = lx[k] ?? NaN;
    return y0 * (2 * at - x1 - x2) / ((x0 - x1) * (x0 - x2)) +
      y1 * (2 * at - x0 - x2) / ((x1 - x0) * (x1 - x2)) +
      y2 * (2 * at - x0 - x1) / ((x2 - x0) * (x2 - x1));
  });
}

/**
 * The knee current: where the exponent first falls to `kneeExponent` with rising current,
 * interpolated in ln I.
 *
 * @returns [A]; undefined where the exponent does not fall so far within the sweep, or starts below
 */
export function kneeCurrent(
  currents: readonly number[],
  exponents: readonly (number | undefined)[],
  { kneeExponent = KNEE_EXPONENT }: { readonly kneeExponent?: number } = {},
): number | undefined {
  for (let k = 1; k < currents.length; k++) {
    const [before, after] = [exponents[k - 1] ?? NaN, exponents[k] ?? NaN];
    if (!(before > kneeExponent && after <= kneeExponent)) continue;
    const part = (before - kneeExponent) / (before - after);
    const [low, high] = [Math.log(currents[k - 1] ?? NaN), Math.log(currents[k] ?? NaN)];
    return Math.exp(low + part * (high - low));
  }
  return undefined;
}
