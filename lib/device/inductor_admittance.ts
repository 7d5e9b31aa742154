/** A complex admittance. */
export interface Admittance {
  /** Conductance [S]. */
  readonly re: number;
  /** Susceptance [S]. */
  readonly im: number;
}
