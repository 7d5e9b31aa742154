import { assert, assertClose, assertThrows } from "../../assert.ts";
import { odeSystem } from "../../../lib/orbit/ode_system.ts";
import { phaseDiffusion } from "../../../lib/orbit/phase_diffusion.ts";
import { phaseSensitivity } from "../../../lib/orbit/phase_sensitivity.ts";
import { phaseTransfer } from "../../../lib/orbit/phase_transfer.ts";
import type { NoiseSource } from "../../../lib/orbit/system.ts";
import { type Flow, integrate } from "../../reference/integrate.ts";
import { orbitOf, stuartLandau, unitSource, vanDerPol } from "./_systems.ts";

const FIRST = Float64Array.of(1, 0);

Deno.test("phaseTransfer(): goes to w0 v1 / (i w) as the offset falls, with an error in proportion to it", () => {
  const { system, start } = vanDerPol(1);
  const orbit = orbitOf(system, { start, tolerance: 1e-10 });
  const sensitivity = phaseSensitivity(orbit).quadrature;
  const largest = Math.max(...sensitivity.map(Math.abs));
  const transfer = phaseTransfer(orbit, { output: FIRST });
  const errors = [1e-2, 1e-4, 1e-6].map((part) => {
    const { phase } = transfer.at(part * orbit.frequency);
    // w0 / w = 1 / part.
    let worst = 0;
    sensitivity.forEach((value, k) => {
      worst = Math.max(worst, Math.hypot(phase.re[k]! * part, phase.im[k]! * part + value));
    });
    return worst / largest;
  });
  // Found 1.2e-2, 1.2e-4 and 1.2e-6: the offset itself.
  const figures = errors.join(", ");
  assert(errors[2]! < 2e-6, figures);
  assertClose(errors[0]! / errors[1]!, 100, { rtol: 0.05, atol: 0, what: figures });
  assertClose(errors[1]! / errors[2]!, 100, { rtol: 0.05, atol: 0, what: figures });
});

Deno.test("phaseTransfer(): noise at small offsets is the diffusion's, white and 1/f", () => {
  const { system, start } = stuartLandau({ growth: 1, frequency: 5, damping: 1, shear: 0.7 });
  const orbit = orbitOf(system, { start, tolerance: 1e-10 });
  // A 1/f source whose amplitude turns with the state has a mean against the sensitivity.
  const flicker: NoiseSource = {
    label: "turning",
    device: "first row",
    color: "1/f",
    inject([x], into) {
      into[0] = x!;
      into[1] = 0;
    },
  };
  const sources = [unitSource(0), unitSource(1), flicker];
  const offset = 1e-6 * orbit.frequency;
  const own = phaseTransfer(orbit, { output: FIRST }).noise(sources, offset);
  const { sources: limits } = phaseDiffusion(orbit, sources);
  const scale = (orbit.frequency / offset) ** 2;
  assertClose(own.map(({ phase }) => phase / scale), [
    limits[0]!.diffusion,
    limits[1]!.diffusion,
    limits[2]!.mean ** 2 / 2 / offset,
  ], { rtol: 1e-8, atol: 0 });
  assert(Math.abs(limits[2]!.mean) > 1e-2, `${limits[2]!.mean}: the 1/f source must convert`);
});

/*
 * In the frame that turns with it the normal form is linear around its orbit and does not depend on time:
 * a' = -2 lambda a + n_r / r, phi' = -2 b r^2 a + n_t / r for u = a + i phi, whose spectra are exact at every
 * offset. Seen in x = Re z, the sidebands at an offset w also carry what modulates at w - 2 w0 and, conjugate,
 * at w + 2 w0: a quarter of the density of u there adds to both readings.
 * Y. Kuramoto, Chemical Oscillations, Waves and Turbulence (1984), for the normal form; spectra derived here.
 */
for (
  const parameters of [
    { growth: 1, frequency: 5, damping: 1, shear: 0.7 },
    { growth: 0.02, frequency: 1, damping: 0.5, shear: 0.5 },
  ]
) {
  const { growth, frequency, damping, shear } = parameters;
  const name = `lambda ${growth}, w0 ${frequency}, a ${damping}, b ${shear}`;
  Deno.test(`phaseTransfer(): phase and amplitude noise of Stuart-Landau at every offset, ${name}`, () => {
    const { system, start } = stuartLandau(parameters);
    const orbit = orbitOf(system, { start, tolerance: 1e-11 });
    const transfer = phaseTransfer(orbit, { output: FIRST });
    const square = growth / damping;
    const twist = 2 * shear * square;
    const carrier = frequency - shear * square;
    const both = (w: number) =>
      ((1 - twist / w) ** 2 / (w ** 2 + 4 * growth ** 2) + 1 / w ** 2) / square;
    for (const part of [1e-4, 1e-3, 1e-2, 0.1, 0.3, 0.49]) {
      const w = part * carrier;
      const own = transfer.noise([unitSource(0), unitSource(1)], part * orbit.frequency);
      const pole = w ** 2 + 4 * growth ** 2;
      const folded = (both(-w - 2 * carrier) + both(w - 2 * carrier)) / 4;
      const exact = {
        phase: (1 + twist ** 2 / pole) / square / w ** 2 + folded,
        amplitude: 1 / square / pole + folded,
      };
      for (const kind of ["phase", "amplitude"] as const) {
        // The sources have unit two-sided intensity, and half the one-sided density is the two-sided one.
        assertClose(own[0]![kind] + own[1]![kind], exact[kind], {
          rtol: 1e-8,
          atol: 0,
          what: `${kind} at ${part} f0`,
        });
      }
    }
  });
}

/** Complex sidebands of the first unknown under a tone, by integration alone. */
function sidebands(
  flow: Flow,
  start: Float64Array,
  { row, size, period, cycles, settle }: {
    row: number;
    size: number;
    period: number;
    cycles: number;
    settle: number;
  },
): { carrier: [number, number]; upper: [number, number]; lower: [number, number] } {
  const n = start.length;
  const w0 = 2 * Math.PI / period;
  const w = w0 / cycles;
  const angles = [w0, w0 + w, w - w0];
  // The last unknown is time; before it the three Fourier integrals.
  const driven: Flow = (x, into) => {
    flow(x.subarray(0, n), into);
    const time = x[n + 6]!;
    into[row]! += size * Math.cos(w * time);
    angles.forEach((angle, k) => {
      into[n + 2 * k] = x[0]! * Math.cos(angle * time);
      into[n + 2 * k + 1] = -x[0]! * Math.sin(angle * time);
    });
    into[n + 6] = 1;
  };
  const begin = new Float64Array(n + 7);
  begin.set(start);
  const window = cycles * period;
  const settled = integrate(driven, begin, { duration: settle * window, tolerance: 1e-12 });
  settled.fill(0, n, n + 6);
  const end = integrate(driven, settled, { duration: window, tolerance: 1e-12 });
  const at = (k: number): [number, number] => [
    end[n + 2 * k]! / window,
    end[n + 2 * k + 1]! / window,
  ];
  return { carrier: at(0), upper: at(1), lower: at(2) };
}

const over = ([a, b]: [number, number], [c, d]: [number, number]): [number, number] => [
  (a * c + b * d) / (c * c + d * d),
  (b * c - a * d) / (c * c + d * d),
];

Deno.test("phaseTransfer(): a tone injected into the circuit's equations makes the phase and amplitude it says", () => {
  // odex integrates the driven oscillator; sidebands from Fourier integrals over a common period.
  // A lopsided driver: on a symmetric waveform a steady tone makes no sidebands.
  const [quality, gain, lean] = [2, 3, 0.6];
  const flow: Flow = ([v, i], into) => {
    into[0] = -i! - v! / quality + gain / quality * Math.tanh(v! + lean);
    into[1] = v!;
  };
  const system = odeSystem({ dimension: 2, flow });
  const orbit = orbitOf(system, { start: Float64Array.of(1, 0), tolerance: 1e-12 });
  const transfer = phaseTransfer(orbit, { output: FIRST });
  const { weights, count } = orbit.quadrature;
  for (const [row, cycles] of [[0, 3], [1, 12]] as const) {
    const size = 1e-3;
    const measured = [size, -size].map((own) =>
      sidebands(flow, orbit.at(0), { row, size: own, period: orbit.period, cycles, settle: 8 })
    );
    // Over each run's own carrier A/2 (its conjugate for the lower side), where a side is half of V for half the
    // tone; half the difference of both signs, so that what is even in the tone drops out.
    const side = (name: "upper" | "lower") => {
      const [plus, minus] = measured.map(({ carrier: [re, im], ...sides }) =>
        over(sides[name], name === "upper" ? [re, im] : [re, -im])
      );
      return [(plus![0] - minus![0]) / 2 / size, (plus![1] - minus![1]) / 2 / size] as const;
    };
    const [up, low] = [side("upper"), side("lower")];
    // (up - low) / i and up + low.
    const phase = [up[1] - low[1], -(up[0] - low[0])];
    const amplitude = [up[0] + low[0], up[1] + low[1]];
    const found = transfer.at(orbit.frequency / cycles);
    const mean = (kind: "phase" | "amplitude") =>
      (["re", "im"] as const).map((part) => {
        let sum = 0;
        for (let k = 0; k < count; k++) sum += weights[k]! * found[kind][part][2 * k + row]!;
        return sum / orbit.period;
      });
    const what = `row ${row}, offset f0 / ${cycles}`;
    const scale = Math.hypot(phase[0]!, phase[1]!);
    // Found within 1e-6 of it; smaller tones drown in the integrator's own error, 1e-12 over the run.
    assertClose(mean("phase"), phase, { rtol: 0, atol: 2e-6 * scale, what: `phase, ${what}` });
    assertClose(mean("amplitude"), amplitude, {
      rtol: 0,
      atol: 2e-6 * scale,
      what: `amplitude, ${what}`,
    });
    assert(scale > 0.01, `${what}: ${phase}`);
  }
});

Deno.test("phaseTransfer(): refuses an output of another shape, one without carrier, and offsets at or below zero", () => {
  const { system, start } = vanDerPol(1);
  const orbit = orbitOf(system, { start });
  assertThrows(
    () => phaseTransfer(orbit, { output: Float64Array.of(1) }),
    TypeError,
    /output must have 2 entries, found 1/,
  );
  assertThrows(
    () => phaseTransfer(orbit, { output: Float64Array.of(0, 0) }),
    RangeError,
    /no fundamental/,
  );
  const transfer = phaseTransfer(orbit, { output: FIRST });
  for (const offset of [0, -1, NaN, Infinity]) {
    assertThrows(() => transfer.at(offset), RangeError, /offset must be > 0 Hz/);
  }
});
