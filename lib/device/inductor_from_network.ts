import { couplingFromModes } from "./inductor_common_mode.ts";
import { type CoilCurves, coilCurves, interpolatedAdmittance } from "./inductor_curves.ts";
import { type CoilFit, fitCoil, type FitCoilOptions } from "./inductor_fit.ts";
import type { CoilWarning } from "./inductor_geometry.ts";
import { type CoilModel, coilModel } from "./inductor_model.ts";
import type { CoilExcitation } from "./inductor_network.ts";
import type { NetworkData } from "./touchstone_network.ts";

/** Options of {@linkcode coilFromNetwork}. */
export interface CoilFromNetworkOptions extends FitCoilOptions {
  /** What drives the coil in the file; see {@linkcode coilCurves}. */
  readonly excitation: CoilExcitation;
  /**
   * Of the halves of a centre-tapped coil [1].
   * @default read from a two-port whose tap is at ground; else the coil has no tap
   */
  readonly coupling?: number;
}

/** A coil read from a network, or its curves and why no lumped elements describe them. */
export type CoilFromNetwork =
  | {
    readonly status: "found";
    /** Curves by interpolation of the file, elements from the fit. */
    readonly coil: CoilModel;
    readonly curves: CoilCurves;
    readonly fit: CoilFit;
  }
  | { readonly status: "no fit"; readonly reason: string; readonly curves: CoilCurves };

/** Residual of a fit above which a reader is warned [1]. */
const FAIR_RESIDUAL = 0.05;

/**
 * A coil from a measured or field-solved network: its curves, and a lumped network fitted to them.
 *
 * @throws {RangeError} when too few frequencies are left to fit, or the network is a short
 * @throws {TypeError} when the excitation is not known
 */
export function coilFromNetwork(
  network: NetworkData,
  options: CoilFromNetworkOptions,
): CoilFromNetwork {
  const { excitation } = options;
  const curves = coilCurves(network, { excitation });
  const fit = fitCoil(curves, options);
  if (fit.status === "no fit") return { status: "no fit", reason: fit.reason, curves };
  const coupling = options.coupling ?? couplingOf(curves, fit);
  const parameters = coupling === undefined ? fit.parameters : { ...fit.parameters, coupling };
  const coil = coilModel(parameters, {
    origin: "file",
    excitation,
    warnings: warningsOf(curves, fit),
    admittance: interpolatedAdmittance(curves),
    range: { lowest: curves.frequencies[0]!, highest: curves.frequencies.at(-1)! },
  });
  return { status: "found", coil, curves, fit };
}

/** With the tap at ground the ends together see the common-mode inductance. */
function couplingOf(curves: CoilCurves, fit: CoilFit): number | undefined {
  const { tapGrounded, toGround, excitation, frequencies } = curves;
  if (!tapGrounded || !toGround || excitation !== "differential") return undefined;
  const [g, b] = [2 * toGround.conductance[0]!, 2 * toGround.susceptance[0]!];
  const common = -b / (g * g + b * b) / (2 * Math.PI * frequencies[0]!);
  return couplingFromModes(fit.parameters.inductance, common);
}

function warningsOf(curves: CoilCurves, fit: CoilFit): CoilWarning[] {
  const warnings: CoilWarning[] = [];
  const gain = curves.conductance.findIndex((conductance) => !(conductance > 0));
  if (gain >= 0) {
    const frequency = curves.frequencies[gain]!;
    warnings.push({
      quantity: "conductance",
      value: curves.conductance[gain]!,
      lowest: 0,
      highest: Infinity,
      unit: "S",
      text:
        `the file shows no loss at ${frequency} Hz, which a coil cannot; its quality factor there ` +
        "has no meaning",
    });
  }
  const { rms } = fit.residual;
  if (!(rms <= FAIR_RESIDUAL)) {
    warnings.push({
      quantity: "residual of the lumped fit",
      value: rms,
      lowest: 0,
      highest: FAIR_RESIDUAL,
      unit: "1",
      text:
        `the lumped elements miss the file by ${
          (100 * rms).toPrecision(2)
        } % (root mean square); ` +
        "fit a narrower range of frequencies",
    });
  }
  return warnings;
}
