/**
 * Touchstone files end to end: a known lumped coil is written, read and recovered to 0.1 %.
 *
 * Format: IBIS Open Forum, Touchstone File Format Specification, version 1.1 (2002) and 2.0 (2009). The
 * coil's closed forms (self-resonance, coupling of its halves) are elementary.
 */
import { assert, assertClose } from "../assert.ts";
import { coilFromNetwork } from "../../lib/device/inductor_from_network.ts";
import type { CoilExcitation } from "../../lib/device/inductor_network.ts";
import {
  type NetworkData,
  type NetworkFormat,
  networkFromAdmittance,
} from "../../lib/device/touchstone_network.ts";
import { readTouchstone } from "../../lib/device/touchstone_read.ts";
import { writeTouchstone } from "../../lib/device/touchstone_write.ts";

interface Value {
  readonly re: number;
  readonly im: number;
}

const KNOWN = {
  inductance: 1.2e-9,
  constant: 0.8,
  skin: 1.5e-5,
  across: 8e-15,
  oxide: 60e-15,
  silicon: 700,
  siliconCapacitance: 15e-15,
};

/** One part in a thousand, what the fit must recover. */
const RECOVERED = { rtol: 1e-3, atol: 0 };

const FREQUENCIES = Array.from({ length: 120 }, (_, k) => 0.25e9 * (k + 1));

function inverse({ re, im }: Value): Value {
  const size = re * re + im * im;
  return { re: re / size, im: -im / size };
}

/** Series branch of the known coil, written out here and not taken from the library. */
function series(frequency: number): Value {
  const w = 2 * Math.PI * frequency;
  const resistance = KNOWN.constant + KNOWN.skin * Math.sqrt(frequency);
  const y = inverse({ re: resistance, im: w * KNOWN.inductance });
  return { re: y.re, im: y.im + w * KNOWN.across };
}

function shunt(frequency: number, siliconCapacitance: number): Value {
  const w = 2 * Math.PI * frequency;
  const silicon = inverse({ re: 1 / KNOWN.silicon, im: w * siliconCapacitance });
  return inverse({ re: silicon.re, im: silicon.im - 1 / (w * KNOWN.oxide) });
}

function twoPort(frequency: number): Value[] {
  const s = series(frequency);
  const g = shunt(frequency, KNOWN.siliconCapacitance);
  const own = { re: s.re + g.re, im: s.im + g.im };
  const transfer = { re: -s.re, im: -s.im };
  return [own, transfer, transfer, own];
}

/** Written with six digits, as instruments do, and read back. */
function throughFile(
  network: NetworkData,
  { format, version, name }: { format: NetworkFormat; version: "1.0" | "2.0"; name: string },
): NetworkData {
  return readTouchstone(writeTouchstone(network, { format, version, digits: 6 }), { name });
}

const WAYS = [
  { format: "MA", version: "1.0" },
  { format: "DB", version: "1.0" },
  { format: "RI", version: "2.0" },
] as const;

function recovered(network: NetworkData, excitation: CoilExcitation) {
  const result = coilFromNetwork(network, { excitation });
  assert(result.status === "found", result.status === "found" ? "" : result.reason);
  return result;
}

/*
 * Largest relative deviation of any element, six digits in the file: one-port R, L and C 9e-6 (skin
 * resistance); two-port with substrate 2.4e-5 (constant resistance); one-port with substrate 2.1e-5 (oxide);
 * coupling from a grounded tap 1.1e-4.
 */
Deno.test("coilFromNetwork recovers R, L and C of a one-port to 0.1 %", () => {
  for (const way of WAYS) {
    const network = networkFromAdmittance({
      ports: 1,
      frequencies: FREQUENCIES,
      admittance: (f) => [series(f)],
    });
    const { fit, coil, curves } = recovered(
      throughFile(network, { ...way, name: "coil.s1p" }),
      "differential",
    );
    assertClose(fit.parameters.inductance, KNOWN.inductance, RECOVERED);
    assertClose(fit.resistance.constant, KNOWN.constant, RECOVERED);
    assertClose(fit.resistance.skin, KNOWN.skin, RECOVERED);
    assertClose(fit.parameters.parallelCapacitance, KNOWN.across, RECOVERED);
    assert(fit.parameters.substrate === undefined, "no substrate was there to be found");
    assert(fit.residual.rms < 1e-4, `residual ${fit.residual.rms}`);
    assertClose(coil.inductance(2.1e9), seriesInductance(2.1e9), { rtol: 1e-5, atol: 0 });
    assert(curves.selfResonance === undefined && coil.selfResonance === undefined);
  }
});

/** Im(1/Y) over the angular frequency. */
function seriesInductance(frequency: number): number {
  const { re, im } = series(frequency);
  return -im / (re * re + im * im) / (2 * Math.PI * frequency);
}

Deno.test("coilFromNetwork recovers all seven elements of a two-port to 0.1 %", () => {
  const network = networkFromAdmittance({
    ports: 2,
    frequencies: FREQUENCIES,
    admittance: twoPort,
  });
  for (const way of WAYS) {
    for (const excitation of ["differential", "single_ended"] as const) {
      const { fit } = recovered(throughFile(network, { ...way, name: "coil.s2p" }), excitation);
      const { substrate } = fit.parameters;
      assertClose(
        [
          fit.parameters.inductance,
          fit.resistance.constant,
          fit.resistance.skin,
          fit.parameters.parallelCapacitance,
          substrate?.oxideCapacitance ?? NaN,
          substrate?.siliconResistance ?? NaN,
          substrate?.siliconCapacitance ?? NaN,
        ],
        Object.values(KNOWN),
        { ...RECOVERED, what: `${excitation} ${way.format}` },
      );
    }
  }
});

Deno.test("coilFromNetwork recovers the substrate of a one-port without silicon capacitance", () => {
  for (const [excitation, weight] of [["differential", 0.5], ["single_ended", 1]] as const) {
    const network = networkFromAdmittance({
      ports: 1,
      frequencies: FREQUENCIES,
      admittance: (f) => {
        const [s, g] = [series(f), shunt(f, 0)];
        return [{ re: s.re + weight * g.re, im: s.im + weight * g.im }];
      },
    });
    const { fit } = recovered(
      throughFile(network, { format: "MA", version: "1.0", name: "coil.s1p" }),
      excitation,
    );
    assertClose(
      [
        fit.parameters.inductance,
        fit.resistance.constant,
        fit.resistance.skin,
        fit.parameters.parallelCapacitance,
        fit.parameters.substrate?.oxideCapacitance ?? NaN,
        fit.parameters.substrate?.siliconResistance ?? NaN,
      ],
      Object.values(KNOWN).slice(0, 6),
      { ...RECOVERED, what: excitation },
    );
  }
});

Deno.test("coilFromNetwork finds the self-resonance between the points of the file", () => {
  // A parallel RLC with series R: the reactance vanishes at w^2 = 1/(L C) - (R/L)^2.
  const [inductance, resistance, capacitance] = [2e-9, 3, 120e-15];
  const network = networkFromAdmittance({
    ports: 1,
    frequencies: Array.from({ length: 30 }, (_, k) => 0.5e9 * (k + 1)),
    admittance: (frequency) => {
      const w = 2 * Math.PI * frequency;
      const y = inverse({ re: resistance, im: w * inductance });
      return [{ re: y.re, im: y.im + w * capacitance }];
    },
  });
  const expected = Math.sqrt(1 / (inductance * capacitance) - (resistance / inductance) ** 2) /
    (2 * Math.PI);
  const { coil, curves } = recovered(
    throughFile(network, { format: "RI", version: "2.0", name: "coil.s1p" }),
    "single_ended",
  );
  // Points 0.5 GHz apart; four-point interpolation of f B leaves less than 1e-5.
  assertClose(coil.selfResonance ?? NaN, expected, { rtol: 1e-5, atol: 0 });
  assertClose(curves.selfResonance ?? NaN, expected, { rtol: 1e-5, atol: 0 });
  assertClose(coil.quality(expected * (1 - 1e-9)), 0, { rtol: 0, atol: 1e-3 });
});

Deno.test("coilFromNetwork reads the coupling of the halves from a two-port with its tap at ground", () => {
  const [half, coupling, resistance] = [0.4e-9, 0.62, 0.7];
  const network = networkFromAdmittance({
    ports: 2,
    frequencies: FREQUENCIES,
    admittance: (frequency) => {
      const w = 2 * Math.PI * frequency;
      // V1 = z I1 - jwM I2: the current into the second end runs against the winding.
      const own = { re: resistance, im: w * half };
      const mutual = w * coupling * half;
      const differential = inverse({ re: own.re, im: own.im + mutual });
      const common = inverse({ re: own.re, im: own.im - mutual });
      const diagonal = {
        re: (differential.re + common.re) / 2,
        im: (differential.im + common.im) / 2,
      };
      const transfer = {
        re: (common.re - differential.re) / 2,
        im: (common.im - differential.im) / 2,
      };
      return [diagonal, transfer, transfer, diagonal];
    },
  });
  const { coil } = recovered(
    throughFile(network, { format: "MA", version: "1.0", name: "coil.s2p" }),
    "differential",
  );
  assertClose(coil.parameters.inductance, 2 * half * (1 + coupling), RECOVERED);
  assertClose(coil.parameters.coupling ?? NaN, coupling, RECOVERED);
  const windings = coil.elements(5e9).find((element) => element.kind === "windings");
  assertClose(windings?.windings[0]?.inductance ?? NaN, half, RECOVERED);
});
