/** How fast a disturbance of an orbit grows, told without the orbit engine. */
import { factor, solve } from "../../../lib/numeric/lu.ts";
import type { Orbit } from "../../../lib/orbit/orbit.ts";
import type { OscillatorSystem } from "../../../lib/orbit/system.ts";
import { type Flow, integrate } from "../../reference/integrate.ts";

/** In units of each unknown's scale. */
const DISTURBANCE = 1e-6;
const PERIODS = 40;
/** Periods after which what dies out fast has died out. */
const SETTLED = 24;

/** dx/dt = -C^-1 f of a system whose rows all hold charge; time in a unit [s], unknowns in their scale. */
function flowOf(system: OscillatorSystem, { unit }: { unit: number }): Flow {
  const n = system.dimension;
  const scale = system.scale!;
  const values = {
    q: new Float64Array(n),
    f: new Float64Array(n),
    C: new Float64Array(n * n),
    G: new Float64Array(n * n),
  };
  const pivots = new Int32Array(n);
  const state = new Float64Array(n);
  return (x, into) => {
    x.forEach((value, j) => state[j] = value * scale[j]!);
    system.evaluate(state, values);
    factor(values.C, pivots, { n });
    const rate = values.f.map((value) => -value * unit);
    solve(values.C, pivots, rate, { n });
    rate.forEach((value, j) => into[j] = value / scale[j]!);
  };
}

/**
 * Ranges of the difference and the mean of two unknowns over one period, `settled` periods after a start,
 * by an integrator the project did not write.
 */
export function rangesAfter(
  system: OscillatorSystem,
  { start, period, settled, of: [a, b] }: {
    start: Float64Array;
    period: number;
    settled: number;
    of: readonly [number, number];
  },
): { difference: number; mean: number } {
  const scale = system.scale!;
  const flow = flowOf(system, { unit: period });
  const integrated = (x: Float64Array, duration: number) =>
    integrate(flow, x, { duration, tolerance: 1e-8 });
  let x = integrated(start.map((value, j) => value / scale[j]!), settled);
  const samples = Array.from({ length: 50 }, () => {
    x = integrated(x, 0.02);
    return [x[a]! - x[b]!, (x[a]! + x[b]!) / 2] as const;
  });
  const range = (values: readonly number[]) => Math.max(...values) - Math.min(...values);
  return {
    difference: range(samples.map(([difference]) => difference)),
    mean: range(samples.map(([, mean]) => mean)),
  };
}

/**
 * Growth per period of a small disturbance of an orbit, by an integrator the project did not write.
 *
 * Between periods k the disturbance d obeys d(k+1) = 2 r cos(a) d(k) - r^2 d(k-1); differences from period to
 * period leave out the shift along the orbit.
 */
export function growthPerPeriod(orbit: Orbit): number {
  const { system } = orbit;
  const n = system.dimension;
  const scale = system.scale!;
  const flow = flowOf(system, { unit: orbit.period });
  const start = orbit.at(0).map((value, j) => value / scale[j]!);
  let x: Float64Array = start.slice();
  // Node by node differently, so that common and differential modes are both met.
  x.forEach((_, j) => x[j]! += DISTURBANCE * (1 + j % 3));
  const disturbances: Float64Array[] = [];
  for (let k = 0; k < PERIODS; k++) {
    x = integrate(flow, x, { duration: 1, tolerance: 1e-11 });
    disturbances.push(x.map((value, j) => value - start[j]!));
  }
  const changes = disturbances.slice(1).map((d, k) =>
    d.map((value, j) => value - disturbances[k]![j]!)
  );
  let [aa, ab, bb, ac, bc] = [0, 0, 0, 0, 0];
  for (let k = SETTLED; k < changes.length - 1; k++) {
    for (let j = 0; j < n; j++) {
      const [before, now, next] = [changes[k - 1]![j]!, changes[k]![j]!, changes[k + 1]![j]!];
      aa += now * now;
      ab += now * before;
      bb += before * before;
      ac += now * next;
      bc += before * next;
    }
  }
  // next = p now + s before by least squares; r^2 = -s.
  return Math.sqrt(-(bc * aa - ac * ab) / (aa * bb - ab * ab));
}
