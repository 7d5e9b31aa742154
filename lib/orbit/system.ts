/**
 * The one form in which every oscillator is described: `d/dt q(x) + f(x) = 0`.
 *
 * @module
 */

/** Where {@linkcode OscillatorSystem.evaluate} writes; owned by the caller, overwritten whole. */
export interface SystemValues {
  /** Charges, shape (n,): coulomb on node rows, weber on inductor rows. */
  readonly q: Float64Array;
  /** Currents, shape (n,): ampere on node rows, volt on inductor rows. */
  readonly f: Float64Array;
  /** dq/dx, shape (n, n), row-major. */
  readonly C: Float64Array;
  /** df/dx, shape (n, n), row-major. */
  readonly G: Float64Array;
}

/** An input of a system: a supply, a control voltage, a programmed current. */
export interface SystemInput {
  readonly name: string;
  readonly unit: string;
}

/** An autonomous system `d/dt q(x) + f(x) = 0` with `n` unknowns. */
export interface OscillatorSystem {
  /** Number of unknowns n. */
  readonly dimension: number;
  /** Typical size of each unknown, shape (n,), what a tolerance is relative to. @default ones */
  readonly scale?: Float64Array;
  /** Names of the unknowns, shape (n,), for messages. @default x0, x1, ... */
  readonly unknowns?: readonly string[];
  /** Charges, currents and their Jacobians at `x`; writes every entry of `into`. */
  evaluate(x: Float64Array, into: SystemValues): void;
  /** Named inputs p of the system. */
  readonly inputs?: readonly SystemInput[];
  /** dq/dp and df/dp of input `k` at `x`, each shape (n,); writes every entry of `into`. */
  evaluateInput?(
    k: number,
    x: Float64Array,
    into: { readonly dq: Float64Array; readonly df: Float64Array },
  ): void;
}

/**
 * A noise source: a signed amplitude per row of the system.
 *
 * The density is one-sided: `inject` writes the square root of, for instance, 4kT/R in A/sqrt(Hz) on
 * node rows (V/sqrt(Hz) on inductor rows). A 1/f source writes its amplitude at 1 Hz. The sign matters
 * for 1/f sources, whose conversion is a mean and not an rms.
 */
export interface NoiseSource {
  readonly label: string;
  /** Device the noise comes from. */
  readonly device: string;
  readonly color: "white" | "1/f";
  /** Signed amplitude per row at state `x`, shape (n,); writes every entry of `into`. */
  inject(x: Float64Array, into: Float64Array): void;
}
