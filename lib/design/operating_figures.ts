/**
 * What an orbit of an oscillator means to a designer.
 *
 * @module
 */
import type { BuiltOscillator } from "../circuit/topology.ts";
import type { CardLimit, TechnologyCard } from "../device/technology_card.ts";
import { figureOfMerit, whitePhaseNoise } from "../noise/phase_noise.ts";
import type { Orbit } from "../orbit/orbit.ts";
import { phaseDiffusion } from "../orbit/phase_diffusion.ts";

/** One noise source's part of the white phase diffusion. */
export interface NoiseShare {
  readonly device: string;
  readonly label: string;
  /** Part of the total [1]. */
  readonly share: number;
}

/** Figures of one orbit. */
export interface OperatingFigures {
  /** [Hz] */
  readonly frequency: number;
  /** Peak of the fundamental of the differential tank voltage [V]. */
  readonly amplitude: number;
  /** Mean current from the supply, reference branch included [A]. */
  readonly supplyCurrent: number;
  /** [W] */
  readonly power: number;
  /** White phase diffusion [s]. */
  readonly diffusion: number;
  /** White phase noise at the offset [dBc/Hz]. */
  readonly phaseNoise: number;
  /** [dBc/Hz] */
  readonly figureOfMerit: number;
  /** Total diffusion over that of the tank's loss alone [1]. */
  readonly noiseFactor: number;
  /** Parts of the total, largest first; they sum to one. */
  readonly shares: readonly NoiseShare[];
}

/**
 * Figures of an orbit.
 *
 * @param supply supply voltage [V]
 * @param offset of the phase noise from the carrier [Hz]
 */
export function operatingFigures(
  oscillator: BuiltOscillator,
  orbit: Orbit,
  { supply, offset }: { readonly supply: number; readonly offset: number },
): OperatingFigures {
  const { circuit, tank } = oscillator;
  const phasor = orbit.phasor((x) => circuit.voltage(tank.plus, tank.minus, x));
  const supplyCurrent = orbit.mean((x) => oscillator.supplyCurrent(x));
  const power = supply * supplyCurrent;
  const white = circuit.sources.filter(({ color }) => color === "white");
  const { sources, total } = phaseDiffusion(orbit, white);
  const tankDiffusion = sources
    .filter(({ device }) => oscillator.parts["tank"]?.includes(device))
    .reduce((sum, { diffusion }) => sum + diffusion, 0);
  const phaseNoise = whitePhaseNoise(total, { frequency: orbit.frequency, offset });
  return {
    frequency: orbit.frequency,
    amplitude: Math.hypot(phasor.re, phasor.im),
    supplyCurrent,
    power,
    diffusion: total,
    phaseNoise,
    figureOfMerit: figureOfMerit(phaseNoise, { frequency: orbit.frequency, offset, power }),
    noiseFactor: total / tankDiffusion,
    shares: sources
      .map(({ device, label, diffusion }) => ({ device, label, share: diffusion / total }))
      .sort((a, b) => b.share - a.share),
  };
}

/** A peak voltage of a device over the period. */
export interface DeviceStress {
  readonly device: string;
  readonly quantity: "gate-source" | "gate-drain" | "drain-source" | "drain-bulk";
  /** Largest magnitude over the period [V]. */
  readonly peak: number;
  /** The card's limit [V]. */
  readonly limit: number;
  readonly origin: string;
}

/**
 * Peak voltages of the watched devices over an orbit, at its mesh and quadrature points, against the
 * card's limits.
 */
export function deviceStresses(
  oscillator: BuiltOscillator,
  orbit: Orbit,
  card: TechnologyCard,
): DeviceStress[] {
  const { circuit, watched } = oscillator;
  const n = circuit.system.dimension;
  const limits: Record<DeviceStress["quantity"], CardLimit> = {
    "gate-source": card.limits.gateSourceVoltage,
    "gate-drain": card.limits.gateDrainVoltage,
    "drain-source": card.limits.drainSourceVoltage,
    "drain-bulk": card.limits.drainBulkVoltage,
  };
  return watched.map(({ device, quantity, plus, minus }) => {
    let peak = 0;
    for (const states of [orbit.samples.states, orbit.quadrature.states]) {
      for (let at = 0; at < states.length; at += n) {
        const x = states.subarray(at, at + n);
        peak = Math.max(peak, Math.abs(circuit.voltage(plus, minus, x)));
      }
    }
    const { value, origin } = limits[quantity];
    return { device, quantity, peak, limit: value, origin };
  });
}
