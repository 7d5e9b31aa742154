/**
 * Varactors and their swing-averaged capacitance against published laws: the junction of S. M. Sze,
 * Physics of Semiconductor Devices; the fit of B. Razavi, RF Microelectronics, 2nd ed. (2012), sec. 8.5.2;
 * the effective capacitance of E. Hegazi, A. A. Abidi, JSSC 38 (2003) 1033, T. S. Bunch, S. Raman, JSSC 38
 * (2003) 1325, and S. Levantino et al., JSSC 37 (2002) 1003 (all from memory). The digits are those of
 * these laws, computed by independent quadrature (mpmath 1.3.0, 25 digits, where 12 are printed).
 */
import { assert, assertClose } from "../assert.ts";
import { integrate } from "../reference/integrate.ts";
import { swingCapacitance, waveformCapacitance } from "../../lib/device/swing_capacitance.ts";
import { varactorFigures } from "../../lib/device/varactor.ts";
import { AccumulationVaractor } from "../../lib/device/varactor_accumulation.ts";
import { JunctionVaractor } from "../../lib/device/varactor_junction.ts";

/** Half of the last printed digit. */
const NINE_DIGITS = { rtol: 0, atol: 0.5e-9 };
const SIX_DIGITS = { rtol: 0, atol: 0.5e-6 };

const tanhVaractor = new AccumulationVaractor({
  maximumCapacitance: 3,
  minimumCapacitance: 1,
  centreVoltage: 0,
  transitionVoltage: 0.3,
  seriesResistance: 0,
});

function junctionVaractor(grading: number): JunctionVaractor {
  return new JunctionVaractor({
    saturationCurrent: 0,
    emission: 1,
    temperature: 300,
    zeroBiasCapacitance: 1,
    builtInPotential: 0.7,
    grading,
    seriesResistance: 0,
  });
}

function junctionCapacitance(grading: number): (v: number) => number {
  const varactor = junctionVaractor(grading);
  return (v) => varactorFigures(varactor, { potentials: [v, 0], frequency: 1 }).capacitance;
}

Deno.test("JunctionVaractor has C0 (1 + V_R/phi)^-m under reverse bias", () => {
  const table = [
    [0.35, [0.828077, 0.733039, 0.623458]],
    [0.5, [0.763763, 0.641689, 0.509175]],
  ] as const;
  for (const [grading, expected] of table) {
    const law = junctionCapacitance(grading);
    assertClose([0.5, 1, 2].map((reverse) => law(-reverse)), expected, SIX_DIGITS);
  }
});

Deno.test("AccumulationVaractor is the fit (Cmax + Cmin)/2 + (Cmax - Cmin)/2 tanh((V - V0)/Vs)", () => {
  // tanh 1 = 0.761594155956, tanh 2 = 0.964027580076 (Abramowitz and Stegun, table 4.15).
  const found = [-0.6, -0.3, 0, 0.3, 0.6].map((v) => tanhVaractor.capacitance(v));
  assertClose(found, [
    2 - 0.964027580076,
    2 - 0.761594155956,
    2,
    2 + 0.761594155956,
    2 + 0.964027580076,
  ], { rtol: 0, atol: 1e-12 });
});

Deno.test("swingCapacitance of the tanh fit: effective and mean capacitance over bias and swing", () => {
  const biases = [-0.6, -0.3, 0, 0.3, 0.6];
  const table = [
    {
      amplitude: 0.01,
      effective: [1.035991342, 1.238494687, 2, 2.761505313, 2.964008658],
      average: [1.03601, 1.238584, 2, 2.761416, 2.96399],
    },
    {
      amplitude: 0.3,
      effective: [1.055223886, 1.313783774, 2, 2.686216226, 2.944776114],
      average: [1.076662, 1.383786, 2, 2.616214, 2.923338],
    },
    {
      amplitude: 0.6,
      effective: [1.134509142, 1.474061127, 2, 2.525938873, 2.865490858],
      average: [1.253178, 1.631585, 2, 2.368415, 2.746822],
    },
    {
      amplitude: 1,
      effective: [1.324680278, 1.640477672, 2, 2.359522328, 2.675319722],
      average: [1.56136, 1.795294, 2, 2.204706, 2.43864],
    },
  ];
  for (const { amplitude, effective, average } of table) {
    const found = biases.map((bias) =>
      swingCapacitance((v) => tanhVaractor.capacitance(v), { bias, amplitude })
    );
    assertClose(found.map((each) => each.effective), effective, NINE_DIGITS);
    assertClose(found.map((each) => each.average), average, SIX_DIGITS);
  }
});

Deno.test("swingCapacitance goes to Hegazi and Abidi's closed form as the transition becomes a step", () => {
  // Cmin + (Cmax - Cmin) [1/2 - (asin x + x sqrt(1 - x^2))/pi], x = (Vth - Vb)/A, Vth = 0.2.
  const table = [
    [0, 0.5, 1.504631575469],
    [0, 0.25, 1.104088038662],
    [0.3, 0.5, 2.252939921895],
  ] as const;
  for (const [bias, amplitude, expected] of table) {
    const [wide, narrow] = [4e-4, 2e-4].map((transitionVoltage) => {
      const varactor = new AccumulationVaractor({
        maximumCapacitance: 3,
        minimumCapacitance: 1,
        centreVoltage: 0.2,
        transitionVoltage,
        seriesResistance: 0,
      });
      const found = swingCapacitance((v) => varactor.capacitance(v), { bias, amplitude });
      assert(found.error < 1e-12);
      return found.effective;
    }) as [number, number];
    // A smooth step errs by the square of its width; what is left after extrapolation is of fourth order.
    assertClose(narrow, expected, { rtol: 0, atol: 5e-7 });
    assertClose((4 * narrow - wide) / 3, expected, { rtol: 0, atol: 1e-11 });
  }
});

Deno.test("swingCapacitance of a quadratic law is C0 (1 + a1 Vb + a2 Vb^2 + a2 A^2/4)", () => {
  const { effective, average } = swingCapacitance((v) => 1 + 0.2 * v + 0.4 * v * v, {
    bias: 0.1,
    amplitude: 0.5,
  });
  assertClose(effective, 1.049, { rtol: 1e-14, atol: 0 });
  assertClose(average, 1.049 + 0.4 * 0.25 / 4, { rtol: 1e-14, atol: 0 });
});

Deno.test("swingCapacitance of a junction under reverse bias", () => {
  const found = swingCapacitance(junctionCapacitance(0.5), { bias: -1, amplitude: 0.5 });
  assertClose(found.effective, 0.64706481289, { rtol: 0, atol: 0.5e-12 });
  assertClose([found.average, found.smallSignal], [0.65262070026855, 0.641688948], NINE_DIGITS);
});

/**
 * One period of a loop of an inductance of 1 and a charge q(v), released at rest from `peak`: the flux
 * grows with v, the charge falls by it. Integrated by an independent code in (v, flux).
 */
function lossless(
  { charge, capacitance, peak, period }: {
    charge: (v: number) => number;
    capacitance: (v: number) => number;
    peak: number;
    period: number;
  },
) {
  const count = 64;
  const flow = (x: Float64Array, into: Float64Array) => {
    into[0] = -x[1]! / capacitance(x[0]!);
    into[1] = x[0]!;
  };
  let state: Float64Array = Float64Array.of(peak, 0);
  const voltage = Array.from({ length: count }, () => {
    const [v] = state;
    state = integrate(flow, state, { duration: period / count });
    return v!;
  });
  return { back: state, waveform: { voltage, charge: voltage.map(charge) } };
}

Deno.test("waveformCapacitance is exactly the one of the frequency; the sinusoid's is close to it", () => {
  // (T/2 pi)^2 of the loop with C = 1 + a2 v^2, from its energy integral.
  const table = [
    [0.4, 0.1, 1.00100037412708, 1.001],
    [0.4, 0.5, 1.0252214704864, 1.025],
    [0.4, 1, 1.10304271721682, 1.1],
    [-0.4, 0.5, 0.975248913857425, 0.975],
  ] as const;
  for (const [a2, peak, exact, sinusoidal] of table) {
    const capacitance = (v: number) => 1 + a2 * v * v;
    const { back, waveform } = lossless({
      charge: (v) => v + a2 * v ** 3 / 3,
      capacitance,
      peak,
      period: 2 * Math.PI * Math.sqrt(exact),
    });
    // The published period closes the orbit.
    assertClose(back, [peak, 0], { rtol: 0, atol: 1e-11 });
    assertClose(waveformCapacitance(waveform).effective, exact, { rtol: 1e-11, atol: 0 });
    const { effective } = swingCapacitance(capacitance, { bias: 0, amplitude: peak });
    assertClose(effective, sinusoidal, { rtol: 1e-14, atol: 0 });
    assertClose(effective, exact, { rtol: 5e-3, atol: 0 });
  }
});

Deno.test("waveformCapacitance of a differential tanh pair gives its exact frequency", () => {
  // Each side sees half the swing with the other sign: C(v) = [C(Vb + v) + C(Vb - v)]/2.
  const side = (v: number) => varactorFigures(tanhVaractor, { potentials: [v, 0], frequency: 1 });
  const table = [
    [0.3, 2.5308576067165, 2.5259389],
    [-0.3, 1.4807343195159, 1.4740611],
    [0, 2, 2],
  ] as const;
  for (const [bias, exact, sinusoidal] of table) {
    const capacitance = (v: number) =>
      (tanhVaractor.capacitance(bias + v) + tanhVaractor.capacitance(bias - v)) / 2;
    const { back, waveform } = lossless({
      charge: (v) => (side(bias + v).charge - side(bias - v).charge) / 2,
      capacitance,
      peak: 0.6,
      period: 2 * Math.PI * Math.sqrt(exact),
    });
    assertClose(back, [0.6, 0], { rtol: 0, atol: 1e-11 });
    assertClose(waveformCapacitance(waveform).effective, exact, { rtol: 1e-11, atol: 0 });
    const { effective } = swingCapacitance(capacitance, { bias: 0, amplitude: 0.6 });
    assertClose(effective, sinusoidal, { rtol: 0, atol: 0.5e-7 });
    assertClose(effective, exact, { rtol: 5e-3, atol: 0 });
  }
});
