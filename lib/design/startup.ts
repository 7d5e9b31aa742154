/**
 * Whether and how fast an oscillator starts by itself.
 *
 * Indices stay inside the arrays by construction; `!` says so to the compiler.
 *
 * @module
 */
import { factor, solve } from "../numeric/lu.ts";
import type { BuiltOscillator } from "../circuit/topology.ts";
import { BOLTZMANN } from "../quantity/constants.ts";
import {
  type Equilibrium,
  findEquilibrium,
  type NoEquilibrium,
  type Pole,
} from "../orbit/equilibrium.ts";
import type { SystemValues } from "../orbit/system.ts";

const FREQUENCY_ITERATIONS = 50;
/** Relative accuracy of the frequency at which the port is resistive. */
const FREQUENCY_TOLERANCE = 1e-13;
/** A mode without loss, unseen by the port, makes the matrix singular at its frequency: step aside by this. */
const NUDGE = 1e-9;
/** A start is complete at this part of the final amplitude. */
const COMPLETE = 0.9;

/** A pole with the name of the pattern it lives in. */
export interface NamedPole {
  readonly name: string;
  /** Real and imaginary part [1/s]. */
  readonly re: number;
  readonly im: number;
}

/** Startup of an oscillator. */
export interface Startup {
  readonly status: "found";
  readonly equilibrium: Equilibrium;
  /** a = 1 + dG/Gp [1]. */
  readonly loopGain: number;
  /** Frequency at which the tank port is resistive [Hz]. */
  readonly frequency: number;
  /** Real part of the tank's pole [1/s]; positive when it starts. */
  readonly growthRate: number;
  /** Whether the tank's pole pair lies in the right half plane. */
  readonly starts: boolean;
  /** All poles, largest real part first. */
  readonly poles: readonly NamedPole[];
  /** Poles in the right half plane that are not the tank's. */
  readonly otherUnstable: readonly NamedPole[];
}

/**
 * Startup of an oscillator: its equilibrium, its poles by name and the startup loop gain
 * a = 1 + dG/Gp, where dG is the conductance across the tank port that brings the tank's pole pair to
 * the imaginary axis with the operating point held, and Gp the loss of the passive tank at that
 * frequency.
 *
 * dG is minus the port's admittance at the frequency where that is real.
 *
 * @returns startup figures, or why there is no equilibrium
 */
export function startup(oscillator: BuiltOscillator): Startup | NoEquilibrium {
  const { circuit, guess } = oscillator;
  const equilibrium = findEquilibrium(circuit.system, { guess });
  if (equilibrium.status !== "found") return equilibrium;
  const named = equilibrium.poles.map((pole) => ({
    name: patternOf(oscillator, pole),
    re: pole.re,
    im: pole.im,
  }));
  const tank = tankPole(named);
  if (!tank) {
    return {
      status: "no equilibrium",
      reason: "no pole pair belongs to the tank: it does not ring",
      residual: equilibrium.residual,
      iterations: equilibrium.iterations,
    };
  }
  const { angularFrequency, conductance } = resistivePort(oscillator, equilibrium, tank.near);
  return {
    status: "found",
    equilibrium,
    loopGain: 1 - conductance / oscillator.tank.conductance(angularFrequency),
    frequency: angularFrequency / (2 * Math.PI),
    growthRate: tank.re,
    starts: tank.re > 0,
    poles: named,
    otherUnstable: named.filter(({ name, re }) => re > 0 && name !== tank.name),
  };
}

/**
 * The tank's pole pair: its growth, and an angular frequency near which its port is resistive. With a
 * gain far above the quality factor the pair is real; it then lies around the tank's frequency as
 * its geometric mean.
 */
function tankPole(
  poles: readonly NamedPole[],
): { name: string; re: number; near: number } | undefined {
  const own = poles.filter(({ name }) => name === "tank");
  const ringing = own.find(({ im }) => im > 0);
  if (ringing) return { name: ringing.name, re: ringing.re, near: ringing.im };
  const [fast, slow] = own;
  if (fast && slow && fast.re * slow.re > 0) {
    return { name: fast.name, re: fast.re, near: Math.sqrt(fast.re * slow.re) };
  }
  const other = poles.find(({ im }) => im > 0);
  return other && { name: other.name, re: other.re, near: other.im };
}

/** Name of the pattern that holds the largest part of a pole's mode. */
function patternOf({ circuit, patterns }: BuiltOscillator, { mode }: Pole): string {
  let best = "other";
  let largest = 0;
  for (const { name, weights } of patterns) {
    let re = 0;
    let im = 0;
    let norm = 0;
    for (const [node, weight] of Object.entries(weights)) {
      const at = circuit.indexOf(node);
      if (at === undefined) continue;
      re += weight * mode.re[at]!;
      im += weight * mode.im[at]!;
      norm += weight * weight;
    }
    const size = norm > 0 ? Math.hypot(re, im) / Math.sqrt(norm) : 0;
    if (size > largest) {
      largest = size;
      best = name;
    }
  }
  return best;
}

/** The frequency near `start` [rad/s] at which the tank port's admittance is real, and that value. */
function resistivePort(
  oscillator: BuiltOscillator,
  { system, state }: Equilibrium,
  start: number,
): { angularFrequency: number; conductance: number } {
  const n = system.dimension;
  const values: SystemValues = {
    q: new Float64Array(n),
    f: new Float64Array(n),
    C: new Float64Array(n * n),
    G: new Float64Array(n * n),
  };
  system.evaluate(state, values);
  const port = new Float64Array(n);
  const { plus, minus } = oscillator.tank;
  const [p, m] = [oscillator.circuit.indexOf(plus), oscillator.circuit.indexOf(minus)];
  if (p !== undefined) port[p] = 1;
  if (m !== undefined) port[m] = -1;
  const admittance = (w: number) => {
    const found = portAdmittance(values, port, w) ??
      portAdmittance(values, port, w * (1 + NUDGE));
    if (found) return found;
    throw new RangeError(
      `Cannot find the startup loop gain: the circuit has no answer at ${w / (2 * Math.PI)} Hz`,
    );
  };
  // Secant on the susceptance.
  let w0 = start;
  let y0 = admittance(w0);
  let w1 = start * (1 + 1e-4);
  let y1 = admittance(w1);
  for (let iteration = 0; iteration < FREQUENCY_ITERATIONS; iteration++) {
    if (y1.im === y0.im) break;
    const w2 = w1 - y1.im * (w1 - w0) / (y1.im - y0.im);
    [w0, y0] = [w1, y1];
    w1 = w2;
    y1 = admittance(w1);
    if (Math.abs(w1 - w0) < FREQUENCY_TOLERANCE * w1) break;
  }
  return { angularFrequency: w1, conductance: y1.re };
}

/** Admittance 1 / (e^T (j w C + G)^-1 e) of a port e at an angular frequency [S]; none where that is singular. */
function portAdmittance(
  { C, G }: SystemValues,
  port: Float64Array,
  w: number,
): { re: number; im: number } | undefined {
  const n = port.length;
  const size = 2 * n;
  const matrix = new Float64Array(size * size);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      matrix[i * size + j] = G[i * n + j]!;
      matrix[i * size + n + j] = -w * C[i * n + j]!;
      matrix[(n + i) * size + j] = w * C[i * n + j]!;
      matrix[(n + i) * size + n + j] = G[i * n + j]!;
    }
  }
  const x = new Float64Array(size);
  x.set(port);
  const pivots = new Int32Array(size);
  if (!factor(matrix, pivots, { n: size })) return undefined;
  solve(matrix, pivots, x, { n: size });
  let re = 0;
  let im = 0;
  for (let i = 0; i < n; i++) {
    re += port[i]! * x[i]!;
    im += port[i]! * x[n + i]!;
  }
  const square = re * re + im * im;
  return { re: re / square, im: -im / square };
}

/**
 * Time from thermal noise to 90 % of the final amplitude, ln(0.9 A / sqrt(kT/C)) / s.
 *
 * The growth is taken as exponential at the small-signal rate s, which ignores the slowing near the
 * end: common practice, within about 2/s.
 *
 * @param growthRate s [1/s]
 * @returns [s]; Infinity where it does not start
 */
export function startTime(
  growthRate: number,
  { amplitude, capacitance, temperature }: {
    /** Final amplitude [V]. */
    readonly amplitude: number;
    /** Capacitance across the tank [F]. */
    readonly capacitance: number;
    /** [K] */
    readonly temperature: number;
  },
): number {
  if (!(growthRate > 0)) return Infinity;
  const noise = Math.sqrt(BOLTZMANN * temperature / capacitance);
  return Math.log(Math.max(1, COMPLETE * amplitude / noise)) / growthRate;
}
