/** Up-conversion of 1/f noise: the mean of the signed effective sensitivity. */
import { assert, assertClose } from "../assert.ts";
import { assemble } from "../../lib/circuit/circuit.ts";
import type { CircuitElement } from "../../lib/circuit/element.ts";
import { untailedPair } from "../../lib/circuit/untailed_pair.ts";
import { startup } from "../../lib/design/startup.ts";
import { noiseBudget } from "../../lib/noise/budget.ts";
import { flickerCorner, powerLawLevel, powerLawThrough } from "../../lib/noise/power_law.ts";
import { supplyPhaseNoise } from "../../lib/noise/supply_noise.ts";
import { odeSystem } from "../../lib/orbit/ode_system.ts";
import { phaseDiffusion } from "../../lib/orbit/phase_diffusion.ts";
import type { NoiseSource, OscillatorSystem } from "../../lib/orbit/system.ts";
import { UNTAILED_PAIR } from "../lib/circuit/_topology_examples.ts";
import { CARD, DESIGN, NOMINAL, pairOrbit } from "./_pair.ts";
import { orbitOf } from "./_tank.ts";

const [QUALITY, GAIN] = [5, 3];

/** Tank of L = C = 1 with -(gain / Q) tanh(v + lean), its constant current taken away. */
function leaning(lean: number): OscillatorSystem {
  return odeSystem({
    dimension: 2,
    flow: ([v, i], into) => {
      const drive = GAIN * (Math.tanh(v! + lean) - Math.tanh(lean));
      into[0] = -i! - (v! - drive) / QUALITY;
      into[1] = v!;
    },
  });
}

function flicker(amplitude: (v: number) => number): NoiseSource {
  return {
    label: "flicker",
    device: "test",
    color: "1/f",
    inject([v], into) {
      into[0] = amplitude(v!);
      into[1] = 0;
    },
  };
}

function meanAndRms(lean: number, amplitude: (v: number) => number): { mean: number; rms: number } {
  const orbit = orbitOf(leaning(lean), { start: Float64Array.of(2, 0), tolerance: 1e-11 });
  const [own] = phaseDiffusion(orbit, [flicker(amplitude)]).sources;
  return { mean: own!.mean, rms: own!.rms };
}

/** Noise that is strongest at the zero crossings, and at the peaks. A steady current cannot shift the frequency: the coil takes it. */
const AMPLITUDES = {
  "at the crossings": (v: number) => 1 / Math.cosh(v),
  "at the peaks": (v: number) => v * v,
};

Deno.test("1/f noise: none of it reaches the phase of a perfectly symmetric waveform", () => {
  // A. Hajimiri, T. Lee, IEEE J. Solid-State Circuits 33 (1998) 179: half-wave symmetry makes the ISF's mean zero.
  for (const [name, amplitude] of Object.entries(AMPLITUDES)) {
    const { mean, rms } = meanAndRms(0, amplitude);
    // Found 1e-13 of the rms.
    assert(Math.abs(mean) < 1e-10 * rms, `${name}: ${mean} of ${rms}`);
  }
});

Deno.test("1/f noise: up-conversion grows in proportion to an imposed asymmetry", () => {
  for (const [name, amplitude] of Object.entries(AMPLITUDES)) {
    const leans = [0.005, 0.01, 0.02, 0.04];
    const slopes = leans.map((lean) => meanAndRms(lean, amplitude).mean / lean);
    // An odd function of the lean: the slope's error falls with its square.
    const figures = `${name}: ${slopes.join(", ")}`;
    const zero = (4 * slopes[0]! - slopes[1]!) / 3;
    assert(Math.abs(zero) > 1e-3, figures);
    assertClose(slopes[0]!, zero, { rtol: 1e-4, atol: 0, what: figures });
    assertClose((slopes[3]! - zero) / (slopes[2]! - zero), 4, {
      rtol: 0.05,
      atol: 0,
      what: figures,
    });
    // The other way round, the same size.
    const other = meanAndRms(-leans[0]!, amplitude).mean;
    assertClose(other, -slopes[0]! * leans[0]!, { rtol: 1e-7, atol: 0, what: figures });
  }
});

/*
 * A 1/f noise current is the transconductance times a slow shift of the gate, so what it does to the frequency is the
 * derivative by such a shift. Where a drain swings below its source the transconductance and the noise current turn their
 * sign. A density knows no sign: its root has another mean, which is no derivative of anything.
 */
Deno.test("1/f noise: a transconductance that changes its sign does not fake an up-conversion", () => {
  // A pair without a tail at twice its usual width: the drains swing below ground.
  const design = { ...UNTAILED_PAIR, pair: { width: 40e-6, length: 60e-9 } };
  const { circuit, guess, kick } = untailedPair.build(design, { card: CARD, condition: NOMINAL });
  const started = startup(untailedPair.build(design, { card: CARD, condition: NOMINAL }));
  assert(started.status === "found" && guess && !kick);
  const orbit = orbitOf(circuit.system, { start: started.equilibrium, tolerance: 1e-10 });
  const source = circuit.sources.find(({ device, color }) =>
    device === "pair plus" && color === "1/f"
  )!;
  const drain = circuit.indexOf("plus")!;
  const into = new Float64Array(circuit.system.dimension);
  let [least, most] = [0, 0];
  for (let k = 0; k < 200; k++) {
    source.inject(orbit.at(k * orbit.period / 200), into);
    least = Math.min(least, -into[drain]!);
    most = Math.max(most, -into[drain]!);
  }
  assert(least < -0.05 * most, `amplitude from ${least} to ${most}: the sign must change`);
  const rectified: NoiseSource = {
    ...source,
    inject(x, out) {
      source.inject(x, out);
      out.forEach((value, j) => out[j] = j === drain ? -Math.abs(value) : Math.abs(value));
    },
  };
  const [own, fake] = phaseDiffusion(orbit, [source, rectified]).sources;
  // The gate of that device's current, not of its charges, shifted by a little and the orbit solved again.
  const shifted = (shift: number) => {
    const system = assemble(circuit.elements.map((element): CircuitElement => {
      if (element.name !== "pair plus" || element.kind !== "device") return element;
      const moved = new Float64Array(40);
      return {
        ...element,
        evaluate(v, out) {
          element.evaluate(v.map((value, k) => k === 1 ? value + shift : value), moved);
          element.evaluate(v, out);
          // Currents and their derivatives come first: 4 + 16 of 40 values.
          out.set(moved.subarray(0, 20));
        },
      };
    })).system;
    return orbitOf(system, { start: orbit, tolerance: 1e-10 }).period;
  };
  const step = 2e-3;
  const slope = (8 * (shifted(step) - shifted(-step)) - shifted(2 * step) + shifted(-2 * step)) /
    (12 * step);
  // Its amplitude is gm times this voltage.
  const element = circuit.elements.find(({ name }) => name === "pair plus");
  assert(element?.kind === "device" && element.transistor);
  const { transistor } = element;
  const voltage = Math.abs(transistor.flickerNoise(0.5, 0.6, 0, 0)) /
    transistor.operatingPoint(0.5, 0.6, 0, 0).gm;
  // dT/dt = -mean of advance for a steady shift, over a period.
  const expected = -slope / orbit.period * voltage;
  const figures = `signed ${own!.mean}, rectified ${fake!.mean}, by re-solving ${expected}`;
  // Found equal to 2e-10, the rectified one 14 % off; the amplitude reaches -0.15 of its largest.
  assertClose(own!.mean, expected, { rtol: 1e-7, atol: 0, what: figures });
  assert(Math.abs(fake!.mean / expected - 1) > 0.1, figures);
  assertClose(own!.rms, fake!.rms, {
    rtol: 1e-12,
    atol: 0,
    what: "for white noise the sign is idle",
  });
});

Deno.test("1/f noise of the pair: 30 dB per decade below and 20 above the corner, where the two lines cross", () => {
  const { oscillator, orbit } = pairOrbit({ ...DESIGN, mirrorCapacitance: 100e-12 }, NOMINAL);
  const offsets = Array.from({ length: 57 }, (_, k) => 10 ** (1 + k / 8));
  const { slopes, corner, asymptotes, total } = noiseBudget(oscillator, orbit, { offsets });
  const figures = `corner ${corner}, slopes ${slopes[1]} and ${slopes.at(-2)}`;
  assertClose(slopes[1]!, -30, { rtol: 0, atol: 0.02, what: figures });
  // Found -20.07 at 75 MHz.
  assertClose(slopes.at(-2)!, -20, { rtol: 0, atol: 0.1, what: figures });
  // Found 182.60 kHz by the budget against 182.72 kHz of the asymptotes; the mirror's pole bends the white part a little.
  assertClose(corner!, flickerCorner(asymptotes)!, { rtol: 3e-3, atol: 0, what: figures });
  // Three decibels above either line at the corner.
  const at = offsets.findIndex((offset) => offset > corner!);
  const both = powerLawLevel({
    inverseCube: asymptotes.inverseCube!,
    inverseSquare: asymptotes.inverseSquare!,
  }, offsets[at]!);
  assertClose(total[at]!, both, { rtol: 0, atol: 0.05, what: figures });
});

Deno.test("flicker corner worked by hand: 5 MHz/mA and 200 pA/sqrt(Hz) at 100 kHz", () => {
  // Invented example, hand arithmetic: 1 Hz/sqrt(Hz), -103.0 dBc/Hz at 100 kHz; white noise -118 at 1 MHz is -98 at 100 kHz;
  // equal at 100 kHz 10^(-5/10) = 31.6 kHz, the sum at 100 kHz -96.8. Four times the noise: -91.0 and 505 kHz.
  for (
    const [times, level, corner, sum] of [[1, -103.0, 31.6e3, -96.8], [
      4,
      -91.0,
      505e3,
      NaN,
    ]] as const
  ) {
    const own = supplyPhaseNoise({ gain: 5e9, density: times * 200e-12 }, 1e5).level;
    assertClose(own, level, { rtol: 0, atol: 0.05 });
    const law = powerLawThrough({
      inverseCube: { offset: 1e5, level: own },
      inverseSquare: { offset: 1e6, level: -118 },
    });
    assertClose(flickerCorner(law)!, corner, { rtol: 5e-3, atol: 0 });
    if (sum < 0) assertClose(powerLawLevel(law, 1e5), sum, { rtol: 0, atol: 0.05 });
  }
});
