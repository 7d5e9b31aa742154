/**
 * What the Colpitts oscillators share.
 *
 * @module
 */
import { demandPositive, SUPPLY } from "./_topology_parts.ts";
import type { CircuitElement } from "./element.ts";
import type { AmplitudeValues, Divider, HandValue, LoopGainValues } from "./topology.ts";

/** Fraction n of the tank voltage at the source, C1 / (C1 + C2) [1]. */
export function tapOf({ first, second }: Divider): number {
  return first / (first + second);
}

/** C1 and C2 in series [F]. */
export function seriesCapacitance({ first, second }: Divider): number {
  return first * second / (first + second);
}

/** Where a common gate is held: at the supply, or at a bias of its own. */
export function heldGate(
  gateBias: number | undefined,
  { supply }: { readonly supply: number },
): { readonly node: string; readonly potential: number; readonly elements: CircuitElement[] } {
  if (gateBias === undefined) return { node: SUPPLY, potential: supply, elements: [] };
  demandPositive("build the Colpitts oscillator", { "gate bias": [gateBias, "V"] });
  const [name, node] = ["gate bias", "gate bias"];
  return {
    node,
    potential: gateBias,
    elements: [{ kind: "potential", name, node, potential: gateBias }],
  };
}

/** @throws RangeError for a tap that is missing or not between 0 and 1 */
export function demandTap(tap: number | undefined): number {
  if (!(tap !== undefined && tap > 0 && tap < 1)) {
    throw new RangeError(
      `Cannot use the hand formula of a Colpitts oscillator: tap must be between 0 and 1, got ${tap}`,
    );
  }
  return tap;
}

/** @throws RangeError for a capacitance of the divider that is not positive */
export function demandDivider({ first, second }: Divider): void {
  demandPositive("build the Colpitts oscillator", {
    "first capacitance of the divider": [first, "F"],
    "second capacitance of the divider": [second, "F"],
  });
}

/** gms n (1 - n) R for one side of resistance R. */
export function sideLoopGain({ transconductance, resistance, tap }: LoopGainValues): number {
  const n = demandTap(tap);
  return transconductance * n * (1 - n) * resistance;
}

export const SIDE_LOOP_GAIN: HandValue = {
  name: "startup loop gain",
  formula: "a = g_{ms} n (1 - n) R",
  source: "common gate, loop opened at the source; T. Lee, The Design of CMOS RFIC (from memory)",
  holds: "the source's conductance is small against the divider's susceptance; else divide by " +
    "1 + (g_ms / (w (C1 + C2)))^2",
};

/** 2 I R (1 - n) for one side of resistance R and mean current I. */
export function sideAmplitude({ current, resistance, tap }: AmplitudeValues): number {
  return 2 * current * resistance * (1 - demandTap(tap));
}
