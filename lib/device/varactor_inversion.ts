import { type Transistor, TRANSISTOR_VALUES } from "./transistor.ts";
import type { Varactor, VaractorNoise } from "./varactor.ts";

/** Place of the transistor's drain, gate, source and bulk among gate, channel and bulk. */
const PLACES = [1, 0, 1, 2] as const;

/** Terminals of a transistor. */
const FOUR = 4;
const THREE = 3;

/** A channel fed from both ends looks like this part of its end-to-end resistance. */
const DISTRIBUTED = 1 / 12;

/** The part of the loss that a transistor's model does not hold. */
export interface InversionVaractorOptions {
  /** Of gate and contacts [ohm]. @default 0 */
  readonly gateResistance?: number;
}

/**
 * Inversion-mode MOS varactor: a transistor with drain and source tied, between gate, channel (both ends)
 * and bulk; the bulk stands at its own potential. Charges are the transistor's, so the step of the
 * capacitance lies where the channel forms and moves with the bulk. Its model has no accumulation: with the
 * gate far on the other side of the bulk the capacitance stays at the depletion layer's.
 *
 * No noise between the tied ends; the channel's loss appears as
 * R = R_gate + (C_ch/C)^2 / (12 G_ch), C_ch the gate's capacitance to the channel without overlap, G_ch
 * the channel's conductance from end to end: the low-frequency limit of a uniform line fed from both
 * ends. It is good up to w of about G_ch/C_ch.
 *
 * @see A.-S. Porret, T. Melly, C. C. Enz, E. A. Vittoz, IEEE J. Solid-State Circuits 35 (2000) 337, for
 *   the loss of MOS varactors (from memory)
 * @see P. Andreani, S. Mattisson, IEEE J. Solid-State Circuits 35 (2000) 905, for the modes (from memory)
 */
export class InversionVaractor implements Varactor {
  readonly terminals = ["gate", "channel", "bulk"] as const;
  readonly transistor: Transistor;
  readonly noise: readonly VaractorNoise[] = [];
  readonly #gateResistance: number;
  readonly #values = new Float64Array(TRANSISTOR_VALUES);

  /** @throws {RangeError} when the gate resistance is below zero */
  constructor(transistor: Transistor, { gateResistance = 0 }: InversionVaractorOptions = {}) {
    if (!(gateResistance >= 0)) {
      throw new RangeError(
        `Cannot make the varactor: gate resistance must be >= 0 ohm, got ${gateResistance} ohm`,
      );
    }
    this.transistor = transistor;
    this.#gateResistance = gateResistance;
  }

  /** Gate, channel, bulk; layout of {@linkcode Varactor.evaluate} for three terminals. */
  evaluate(v: Float64Array, out: Float64Array): void {
    const values = this.#values;
    const channel = v[1]!;
    this.transistor.evaluate(channel, v[0]!, channel, v[2]!, values);
    for (let e = 0; e < 2 * THREE * (1 + THREE); e++) out[e] = 0;
    // Currents with their slopes, then charges with theirs.
    for (let half = 0; half < 2; half++) {
      const from = half * FOUR * (1 + FOUR);
      const to = half * THREE * (1 + THREE);
      for (let r = 0; r < FOUR; r++) {
        const row = PLACES[r]!;
        out[to + row] = out[to + row]! + values[from + r]!;
        for (let c = 0; c < FOUR; c++) {
          const entry = to + THREE + THREE * row + PLACES[c]!;
          out[entry] = out[entry]! + values[from + FOUR + FOUR * r + c]!;
        }
      }
    }
  }

  /** Gate resistance and the channel's at the bias. */
  lossResistance(v: Float64Array): number {
    const [gate, channel, bulk] = v as unknown as [number, number, number];
    const { parameters, size } = this.transistor;
    const point = this.transistor.operatingPoint(channel, gate, channel, bulk);
    const { gateSourceCapacitance, gateDrainCapacitance, gateBulkCapacitance } = point;
    const toEnds = gateSourceCapacitance + gateDrainCapacitance;
    const overlap = 2 * parameters.overlapCapacitance * size.width * (size.multiplier ?? 1);
    const part = (toEnds - overlap) / (toEnds + gateBulkCapacitance);
    // Without a channel there is neither charge nor path; the loss goes to zero with it.
    if (!(point.gds > 0)) return this.#gateResistance;
    return this.#gateResistance + DISTRIBUTED * part * part / point.gds;
  }
}
