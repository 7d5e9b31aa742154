import { add, type Complex, complex, reciprocal, scale, subtract } from "./_complex.ts";
import { firstResonance } from "./_inductor_resonance.ts";
import { COIL_EXCITATIONS, type CoilExcitation } from "./inductor_network.ts";
import { networkAdmittance, type NetworkData } from "./touchstone_network.ts";

/** A coil's curves as read from a network. Every array has shape (n,), one entry per frequency. */
export interface CoilCurves {
  readonly excitation: CoilExcitation;
  /** Rising, above zero [Hz]. */
  readonly frequencies: Float64Array;
  /** Admittance that the coil shows to its drive, real part [S]. */
  readonly conductance: Float64Array;
  /** Imaginary part [S]. */
  readonly susceptance: Float64Array;
  /** Im(Z) / (2 pi f) [H]. */
  readonly inductance: Float64Array;
  /** Im(Z) / Re(Z) [1]. */
  readonly quality: Float64Array;
  /** Re(Z) [ohm]. */
  readonly seriesResistance: Float64Array;
  /** First passage of the reactance through zero, between the points by interpolation [Hz]. */
  readonly selfResonance: number | undefined;
  /**
   * Admittance from an end to ground with both ends at one potential, per end [S]: the substrate branch,
   * or the common mode of a coil whose tap is at ground. None for a one-port.
   */
  readonly toGround:
    | { readonly conductance: Float64Array; readonly susceptance: Float64Array }
    | undefined;
  /** Whether a current can flow to ground at low frequency, as through a grounded tap. */
  readonly tapGrounded: boolean;
}

/** Options of {@linkcode coilCurves}. */
export interface CoilCurvesOptions {
  /**
   * What the file's port drives. A one-port is taken as it is; of a two-port, `differential` is between
   * the ports, `single_ended` is port 1 with port 2 at ground. There is no default: the two differ by the
   * substrate, and by much near self-resonance.
   */
  readonly excitation: CoilExcitation;
}

/**
 * Reads inductance, quality factor and self-resonance out of a one-port or two-port network.
 *
 * With the ports at +V/2 and -V/2 the differential admittance is (Y11 + Y22 - Y12 - Y21) / 4; with port 2
 * at ground it is Y11. L = Im(1/Y) / (2 pi f), Q = Im(1/Y) / Re(1/Y). A point at 0 Hz is left out.
 *
 * @throws {RangeError} when no frequency is above zero or the network is a short
 * @throws {TypeError} when the excitation is not known
 * @see M. Danesh, J. R. Long, "Differentially driven symmetric microstrip inductors", IEEE Trans. Microwave
 *   Theory Tech. 50 (2002) 332 (from memory)
 */
export function coilCurves(network: NetworkData, { excitation }: CoilCurvesOptions): CoilCurves {
  if (!COIL_EXCITATIONS.includes(excitation)) {
    throw new TypeError(
      `Cannot read the coil: excitation must be one of ${
        COIL_EXCITATIONS.join(", ")
      }, got ${excitation}`,
    );
  }
  const points: { frequency: number; drive: Complex; ground: Complex | undefined }[] = [];
  network.frequencies.forEach((frequency, index) => {
    if (frequency > 0) {
      points.push({ frequency, ...driven(networkAdmittance(network, index), excitation) });
    }
  });
  if (points.length === 0) {
    throw new RangeError(
      "Cannot read the coil: the network must have a frequency > 0 Hz, got none",
    );
  }
  const frequencies = Float64Array.from(points, (point) => point.frequency);
  const conductance = Float64Array.from(points, (point) => point.drive.re);
  const susceptance = Float64Array.from(points, (point) => point.drive.im);
  const impedances = points.map((point) => reciprocal(point.drive));
  const admittance = interpolatedAdmittance({ frequencies, conductance, susceptance });
  const toGround = network.ports === 1 ? undefined : {
    conductance: Float64Array.from(points, (point) => point.ground!.re),
    susceptance: Float64Array.from(points, (point) => point.ground!.im),
  };
  return {
    excitation,
    frequencies,
    conductance,
    susceptance,
    inductance: Float64Array.from(
      points,
      ({ frequency }, k) => impedances[k]!.im / (2 * Math.PI * frequency),
    ),
    quality: Float64Array.from(impedances, (z) => z.im / z.re),
    seriesResistance: Float64Array.from(impedances, (z) => z.re),
    selfResonance: firstResonance((frequency) => admittance(frequency).im, {
      lowest: frequencies[0]!,
      highest: frequencies.at(-1)!,
    }),
    toGround,
    tapGrounded: toGround !== undefined && toGround.susceptance[0]! < 0,
  };
}

function driven(
  y: readonly Complex[],
  excitation: CoilExcitation,
): { drive: Complex; ground: Complex | undefined } {
  const [y11, y12, y21, y22] = y;
  if (y11 === undefined || y12 === undefined || y21 === undefined || y22 === undefined) {
    return { drive: y11 ?? complex(0, 0), ground: undefined };
  }
  if (excitation === "single_ended") return { drive: y11, ground: add(y11, y12) };
  const own = add(y11, y22);
  const transfer = add(y12, y21);
  return { drive: scale(subtract(own, transfer), 1 / 4), ground: scale(add(own, transfer), 1 / 2) };
}

/** Neighbours used by the interpolation. */
const NEIGHBOURS = 4;

/**
 * Admittance between the points of measured curves, by the polynomial through the four nearest.
 *
 * Interpolated are f B and f^2 G: for an inductor with a capacitance the first is linear in f^2, the
 * second changes as slowly as the series resistance.
 *
 * @internal
 */
export function interpolatedAdmittance(
  curves: Pick<CoilCurves, "frequencies" | "conductance" | "susceptance">,
): (frequency: number) => Complex {
  const { frequencies, conductance, susceptance } = curves;
  const last = frequencies.length - 1;
  const neighbours = Math.min(NEIGHBOURS, frequencies.length);
  return (frequency) => {
    let low = 0;
    let high = last;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (frequencies[middle]! <= frequency) low = middle;
      else high = middle;
    }
    const start = Math.min(Math.max(low - 1, 0), last + 1 - neighbours);
    let re = 0;
    let im = 0;
    for (let k = start; k < start + neighbours; k++) {
      const at = frequencies[k]!;
      let weight = 1;
      for (let other = start; other < start + neighbours; other++) {
        if (other === k) continue;
        weight *= (frequency - frequencies[other]!) / (at - frequencies[other]!);
      }
      re += weight * conductance[k]! * (at / frequency) ** 2;
      im += weight * susceptance[k]! * (at / frequency);
    }
    return complex(re, im);
  };
}
