import type { CoilModel } from "../device/inductor_model.ts";
import type { TankDesign } from "./topology.ts";

/**
 * A tank around a coil: its differential inductance and quality factor at a frequency for the hand
 * formulas, its lumped elements for the circuit.
 *
 * @param coil a coil with a centre tap, read differentially
 * @param frequency about that of oscillation, where the coil's resistance is taken [Hz]
 * @param capacitance linear capacitance between the outputs [F]
 * @throws RangeError for a coil read from one end, or used above its self-resonance
 */
export function tankOfCoil(
  coil: CoilModel,
  { frequency, capacitance }: { readonly frequency: number; readonly capacitance: number },
): TankDesign {
  if (coil.excitation !== "differential") {
    throw new RangeError(
      `Cannot make a tank of the coil: it must be read differentially, got ${coil.excitation}`,
    );
  }
  const inductance = coil.inductance(frequency);
  if (!(inductance > 0)) {
    throw new RangeError(
      `Cannot make a tank of the coil: its self-resonance must lie above ${frequency} Hz, got ${
        coil.selfResonance ?? "none in its range"
      }`,
    );
  }
  return {
    inductance,
    quality: coil.quality(frequency),
    qualityFrequency: frequency,
    capacitance,
    coil,
  };
}
