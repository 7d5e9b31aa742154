import { capacitorLoss } from "./capacitor_loss.ts";

/** Bits a bank may have: its codes are listed one by one. */
const MOST_BITS = 10;

/** Substitutions after which a bank's resonance no longer moves. */
const SUBSTITUTIONS = 4;

/** What a process gives for the switches and capacitors of a bank, in SI. */
export interface BankProcess {
  /** Resistance of a closed differential switch times its width [ohm m]. */
  readonly switchOnResistance: number;
  /** Capacitance between the two ends of an open differential switch over its width [F/m]. */
  readonly switchOffCapacitance: number;
  /** Resistance that holds each end of an open switch at its bias [ohm]. @default Infinity */
  readonly biasResistance?: number;
  /** Quality factor of the capacitors themselves [1]. @default Infinity */
  readonly capacitorQuality?: number;
  /** Frequency at which that holds; must be given with it [Hz]. */
  readonly capacitorQualityFrequency?: number;
  /** Capacitance of the outer plates to the substrate over the cell's own, switched or not [1]. @default 0 */
  readonly plateFraction?: number;
}

/** A bank of switched cells: capacitor, differential switch, capacitor. */
export interface CapacitorBankDesign {
  readonly bits: number;
  /** Cells of 1, 2, 4, ... units, or 2^bits - 1 equal cells closed one after the other. */
  readonly weighting: "binary" | "thermometer";
  /** Capacitance of one unit with its switch closed, differential: both capacitors in series [F]. */
  readonly unitCapacitance: number;
  /** Width of one unit's switch [m]. */
  readonly switchWidth: number;
  /**
   * Whether the switch of a cell grows with its capacitance, which gives every cell the same quality
   * factor, or is one unit's in all cells. @default "with capacitance"
   */
  readonly switchScaling?: "with capacitance" | "equal";
  /** Relative deviation of each cell's capacitance, smallest cell first [1]. @default none */
  readonly deviations?: readonly number[];
}

/** A bank at one code and frequency. */
export interface BankState {
  readonly code: number;
  /** Parallel capacitance of the whole bank [F]. */
  readonly capacitance: number;
  /** Parallel conductance of the whole bank [S]. */
  readonly conductance: number;
  /** w C / G; Infinity without loss [1]. */
  readonly quality: number;
}

/** Some cells as one capacitor in series with one resistor. */
export interface BankBranch {
  /** [F] */
  readonly capacitance: number;
  /** [ohm] */
  readonly seriesResistance: number;
}

/** Adjacent codes between which the capacitance does not rise. */
export interface MonotonyFault {
  readonly code: number;
  /** Capacitance of `code` less that of the code before [F]. */
  readonly change: number;
}

/**
 * A switched capacitor bank, all values differential.
 *
 * A cell of weight w is C in series with its own loss and with the switch: R_on beside C_off when closed,
 * C_off beside twice the bias resistance when open. So a closed cell has Q = (1 + a^2)/(w R_on C) + a with
 * a = w R_on C_off, far below 1, and the capacitance falls by 1 + C/C_off on opening, whatever the weight when
 * the switch grows with the capacitance. Plates' capacitance to the substrate is there at any code.
 */
export class CapacitorBank {
  readonly design: CapacitorBankDesign;
  readonly process: BankProcess;
  /** Number of codes: 2^bits. */
  readonly codes: number;
  readonly #weights: readonly number[];

  /** @throws {RangeError} when a value is outside its range */
  constructor(design: CapacitorBankDesign, process: BankProcess) {
    const { bits, weighting, unitCapacitance, switchWidth, deviations } = design;
    demand(
      Number.isInteger(bits) && bits >= 1 && bits <= MOST_BITS,
      `bits must be a whole number from 1 to ${MOST_BITS}`,
      `${bits}`,
    );
    demand(unitCapacitance > 0, "unit capacitance must be > 0 F", `${unitCapacitance} F`);
    demand(switchWidth > 0, "switch width must be > 0 m", `${switchWidth} m`);
    const { switchOnResistance, switchOffCapacitance, biasResistance = Infinity } = process;
    const { capacitorQuality = Infinity, capacitorQualityFrequency, plateFraction = 0 } = process;
    demand(
      switchOnResistance > 0,
      "on-resistance must be > 0 ohm m",
      `${switchOnResistance} ohm m`,
    );
    demand(
      switchOffCapacitance > 0,
      "off-capacitance must be > 0 F/m",
      `${switchOffCapacitance} F/m`,
    );
    demand(biasResistance > 0, "bias resistance must be > 0 ohm", `${biasResistance} ohm`);
    demand(
      capacitorQuality > 0,
      "quality factor of the capacitors must be > 0",
      `${capacitorQuality}`,
    );
    demand(
      capacitorQuality === Infinity || capacitorQualityFrequency! > 0,
      "the frequency of the capacitors' quality factor must be > 0 Hz",
      `${capacitorQualityFrequency} Hz`,
    );
    demand(plateFraction >= 0, "plate fraction must be >= 0", `${plateFraction}`);
    this.design = design;
    this.process = process;
    this.codes = 2 ** bits;
    this.#weights = weighting === "binary"
      ? Array.from({ length: bits }, (_, bit) => 2 ** bit)
      : new Array<number>(this.codes - 1).fill(1);
    if (deviations === undefined) return;
    demand(
      deviations.length === this.#weights.length,
      `there must be ${this.#weights.length} deviations, one a cell`,
      `${deviations.length}`,
    );
    for (const each of deviations) demand(each > -1, "a deviation must be > -1", `${each}`);
  }

  /** R_on C_off of the process, the same for any width [s]. */
  get switchTimeConstant(): number {
    return this.process.switchOnResistance * this.process.switchOffCapacitance;
  }

  /**
   * The bank at a code.
   *
   * @param code whole number, 0 (all open) to codes - 1 (all closed) [1]
   * @param options frequency [Hz]
   * @throws {RangeError} when there is no such code or the frequency is not above zero
   */
  at(code: number, { frequency }: { readonly frequency: number }): BankState {
    const angular = angularFrequency(frequency);
    const { closed, open, plates } = this.#sums(code, angular);
    const conductance = closed.g + open.g;
    const capacitance = (closed.b + open.b) / angular + plates;
    return {
      code,
      capacitance,
      conductance,
      quality: angular * capacitance / conductance,
    };
  }

  /** The bank at every code, from all open to all closed. */
  table({ frequency }: { readonly frequency: number }): BankState[] {
    return Array.from({ length: this.codes }, (_, code) => this.at(code, { frequency }));
  }

  /**
   * What a circuit takes at a code: the closed cells and the open ones, each as a capacitor in series with a
   * resistor that have their admittance at the frequency, and the plates' capacitance. A branch without
   * cells is undefined.
   *
   * @param code as in {@linkcode CapacitorBank.at} [1]
   * @param options frequency [Hz]
   */
  branches(
    code: number,
    { frequency }: { readonly frequency: number },
  ): { closed: BankBranch | undefined; open: BankBranch | undefined; plateCapacitance: number } {
    const angular = angularFrequency(frequency);
    const { closed, open, plates } = this.#sums(code, angular);
    const branch = ({ g, b }: { g: number; b: number }): BankBranch | undefined => {
      if (!(b > 0)) return undefined;
      const square = g * g + b * b;
      return { capacitance: square / (angular * b), seriesResistance: g / square };
    };
    return { closed: branch(closed), open: branch(open), plateCapacitance: plates };
  }

  /**
   * Capacitance of the switched cells all closed over all open, plates left out: 1 + C/C_off where the
   * losses do not count.
   */
  onOffRatio({ frequency }: { readonly frequency: number }): number {
    const angular = angularFrequency(frequency);
    const [on, off] = [this.#sums(this.codes - 1, angular), this.#sums(0, angular)];
    return (on.closed.b + on.open.b) / (off.closed.b + off.open.b);
  }

  /** Every code whose capacitance is not above that of the code before: none in a monotone bank. */
  monotonyFaults({ frequency }: { readonly frequency: number }): MonotonyFault[] {
    const table = this.table({ frequency });
    return table.slice(1).map(({ code, capacitance }) => ({
      code,
      // The table starts one code earlier.
      change: capacitance - table[code - 1]!.capacitance,
    })).filter(({ change }) => !(change > 0));
  }

  /**
   * Resonance with an inductance and a fixed capacitance at every code, each with the bank's capacitance
   * at its own frequency; the steps between neighbours are the tuning steps.
   *
   * @param tank differential inductance [H] and capacitance beside the bank [F]
   * @returns frequencies [Hz], highest (all open) first
   */
  frequencies(
    tank: { readonly inductance: number; readonly capacitance: number },
  ): Float64Array {
    const { inductance, capacitance } = tank;
    demand(inductance > 0, "inductance must be > 0 H", `${inductance} H`);
    demand(capacitance >= 0, "fixed capacitance must be >= 0 F", `${capacitance} F`);
    const resonance = (total: number) => 1 / (2 * Math.PI * Math.sqrt(inductance * total));
    const { unitCapacitance } = this.design;
    const units = this.#weights.reduce((sum, weight) => sum + weight, 0);
    return Float64Array.from({ length: this.codes }, (_, code) => {
      let frequency = resonance(capacitance + unitCapacitance * units);
      // The bank's capacitance hardly moves with frequency: a few substitutions settle it to rounding.
      for (let k = 0; k < SUBSTITUTIONS; k++) {
        frequency = resonance(capacitance + this.at(code, { frequency }).capacitance);
      }
      return frequency;
    });
  }

  /** Admittances of closed and open cells, and the plates' capacitance. */
  #sums(code: number, angular: number) {
    demand(
      Number.isInteger(code) && code >= 0 && code < this.codes,
      `code must be a whole number from 0 to ${this.codes - 1}`,
      `${code}`,
    );
    const { weighting, unitCapacitance, switchWidth, deviations } = this.design;
    const { switchScaling = "with capacitance" } = this.design;
    const { switchOnResistance, switchOffCapacitance, biasResistance = Infinity } = this.process;
    const { plateFraction = 0 } = this.process;
    const closed = { g: 0, b: 0 };
    const open = { g: 0, b: 0 };
    let plates = 0;
    this.#weights.forEach((weight, cell) => {
      const capacitance = unitCapacitance * weight * (1 + (deviations?.[cell] ?? 0));
      const width = switchWidth * (switchScaling === "equal" ? 1 : weight);
      const isClosed = weighting === "binary" ? (code >> cell) % 2 === 1 : cell < code;
      const into = isClosed ? closed : open;
      // Bias resistors grow smaller with the cell as its switch grows larger.
      const conductance = isClosed ? width / switchOnResistance : weight / (2 * biasResistance);
      const [g, b] = inSeries({
        reactance: 1 / (angular * capacitance),
        resistance: this.#seriesResistance(capacitance),
        conductance,
        susceptance: angular * switchOffCapacitance * width,
      });
      into.g += g;
      into.b += b;
      plates += plateFraction * capacitance;
    });
    return { closed, open, plates };
  }

  #seriesResistance(capacitance: number): number {
    const { capacitorQuality: quality = Infinity, capacitorQualityFrequency } = this.process;
    if (quality === Infinity) return 0;
    // The constructor has seen to the frequency.
    const qualityFrequency = capacitorQualityFrequency!;
    return capacitorLoss({ capacitance, quality, qualityFrequency }).seriesResistance;
  }
}

/** Conductance and susceptance of a capacitor with its loss in series with a switch. */
function inSeries(
  { reactance, resistance, conductance, susceptance }: {
    readonly reactance: number;
    readonly resistance: number;
    readonly conductance: number;
    readonly susceptance: number;
  },
): [number, number] {
  const square = conductance ** 2 + susceptance ** 2;
  const r = resistance + conductance / square;
  const x = -(reactance + susceptance / square);
  const size = r * r + x * x;
  return [r / size, -x / size];
}

function angularFrequency(frequency: number): number {
  demand(frequency > 0, "frequency must be > 0 Hz", `${frequency} Hz`);
  return 2 * Math.PI * frequency;
}

function demand(condition: boolean, wording: string, found: string): void {
  if (!condition) {
    throw new RangeError(`Cannot make the capacitor bank: ${wording}, got ${found}`);
  }
}
