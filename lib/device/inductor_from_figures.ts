import { type CoilModel, coilModel } from "./inductor_model.ts";
import type { CoilExcitation } from "./inductor_network.ts";

/** A coil known by two figures. */
export interface CoilFigures {
  /** Between the ends [H]. */
  readonly inductance: number;
  /** Quality factor at `frequency`, driven as `excitation` says [1]. */
  readonly quality: number;
  /** [Hz] */
  readonly frequency: number;
  readonly excitation: CoilExcitation;
  /** Of the halves of a centre-tapped coil [1]. @default the coil has no tap */
  readonly coupling?: number;
}

/**
 * A coil from its inductance and quality factor at one frequency: R = 2 pi f L / Q in series, the same at
 * every frequency, and no capacitance. The quality factor then grows with frequency; trust it near the
 * one given.
 *
 * @throws {RangeError} when a figure is out of range
 */
export function coilFromFigures(figures: CoilFigures): CoilModel {
  const { inductance, quality, frequency, excitation, coupling } = figures;
  if (!(quality > 0 && quality < Infinity)) {
    throw new RangeError(`Cannot make the coil: quality factor must be > 0, got ${quality}`);
  }
  if (!(frequency > 0 && frequency < Infinity)) {
    throw new RangeError(`Cannot make the coil: frequency must be > 0 Hz, got ${frequency} Hz`);
  }
  const resistance = 2 * Math.PI * frequency * inductance / quality;
  return coilModel(
    {
      inductance,
      seriesResistance: () => resistance,
      parallelCapacitance: 0,
      ...(coupling === undefined ? {} : { coupling }),
    },
    { origin: "figures", excitation },
  );
}
