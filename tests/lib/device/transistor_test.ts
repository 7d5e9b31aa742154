import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { CORNERS } from "../../../lib/device/corner.ts";
import { resolveTransistor } from "../../../lib/device/resolve_transistor.ts";
import { Transistor, TRANSISTOR_VALUES } from "../../../lib/device/transistor.ts";
import type { TransistorParameters } from "../../../lib/device/transistor_parameters.ts";
import { BOLTZMANN } from "../../../lib/quantity/constants.ts";
import { derivative, interpolationError, seededUniform } from "./_biases.ts";
import { illustrativeCard } from "./_card.ts";

type Bias = [number, number, number, number];

const card = illustrativeCard();
const typical = { corner: "typical", temperature: 300 } as const;
const nParameters = resolveTransistor(card, { kind: "n", ...typical });
const pParameters = resolveTransistor(card, { kind: "p", ...typical });
const size = { width: 20e-6, length: 60e-9, multiplier: 2 };
const devices = [nParameters, pParameters].map((p) => new Transistor(p, size));
const channels = [nParameters, pParameters].map((p) =>
  new Transistor(p, { ...size, bulkJunctions: false })
);

function values(device: Transistor, bias: Bias): Float64Array {
  const out = new Float64Array(TRANSISTOR_VALUES);
  device.evaluate(...bias, out);
  return out;
}

/** Biases around the supplies, either sign of the drain-source voltage, bulk at most slightly forward. */
function biases(device: Transistor, count: number): Bias[] {
  const uniform = seededUniform(20261116);
  const sign = device.parameters.kind === "n" ? 1 : -1;
  const terminal = () => sign * (1.8 * uniform() - 0.3);
  return Array.from(
    { length: count },
    (): Bias => [terminal(), terminal(), terminal(), sign * (0.4 * uniform() - 0.5)],
  );
}

function shifted(bias: Bias, terminal: number, by: number): Bias {
  const result: Bias = [...bias];
  result[terminal]! += by;
  return result;
}

Deno.test("Transistor gives the derivatives of its currents and charges at random biases", () => {
  for (const device of devices) {
    for (const bias of biases(device, 150)) {
      const exact = values(device, bias);
      for (const [start, from] of [[4, 0], [24, 20]] as const) {
        const expected = new Float64Array(16);
        for (let row = 0; row < 4; row++) {
          for (let column = 0; column < 4; column++) {
            expected[4 * row + column] = derivative(
              (by) => values(device, shifted(bias, column, by))[from + row]!,
              0,
              2e-3,
            );
          }
        }
        const block = exact.subarray(start, start + 16);
        const largest = Math.max(...block.map(Math.abs));
        // h^6 of the extrapolation, (2 mV / U_T)^6 / 64, is 3e-9; and the rounding of the values over h,
        // which is all there is to see where the whole device is off.
        const rounding = 1e-15 * Math.max(...exact.subarray(from, from + 4).map(Math.abs)) / 2e-3;
        const atol = 1e-8 * largest + rounding;
        assertClose(block, expected, { rtol: 1e-8, atol, what: `${bias}` });
      }
    }
  }
});

Deno.test("Transistor conserves current and charge, and only differences of potential count", () => {
  for (const device of devices) {
    for (const bias of biases(device, 100)) {
      const out = values(device, bias);
      assert(out[20]! + out[22]! + out[21]! + out[23]! === 0);
      assertClose(out[0]! + out[1]! + out[2]! + out[3]!, 0, {
        rtol: 0,
        atol: 1e-15 * Math.max(Math.abs(out[0]!), Math.abs(out[2]!), Math.abs(out[3]!)),
      });
      for (const start of [4, 24]) {
        const block = out.subarray(start, start + 16);
        const atol = 1e-14 * Math.max(...block.map(Math.abs));
        for (let k = 0; k < 4; k++) {
          const row = block[4 * k]! + block[4 * k + 1]! + block[4 * k + 2]! + block[4 * k + 3]!;
          const column = block[k]! + block[4 + k]! + block[8 + k]! + block[12 + k]!;
          assertClose([row, column], [0, 0], { rtol: 0, atol });
        }
      }
    }
  }
});

Deno.test("Transistor is the same with drain and source swapped, to the last bit", () => {
  const order = [2, 1, 0, 3];
  for (const device of channels) {
    for (const [vd, vg, vs, vb] of biases(device, 100)) {
      const out = values(device, [vd, vg, vs, vb]);
      const other = values(device, [vs, vg, vd, vb]);
      order.forEach((k, i) => {
        assert(other[k] === out[i] && other[20 + k] === out[20 + i]);
        order.forEach((l, j) => {
          assertClose(other[4 + 4 * k + l]!, out[4 + 4 * i + j]!, { rtol: 1e-14, atol: 1e-16 });
          assertClose(other[24 + 4 * k + l]!, out[24 + 4 * i + j]!, { rtol: 1e-14, atol: 1e-28 });
        });
      });
      assert(device.channelNoise(vd, vg, vs, vb) === device.channelNoise(vs, vg, vd, vb));
      assert(device.flickerNoise(vd, vg, vs, vb) === -device.flickerNoise(vs, vg, vd, vb));
    }
  }
});

Deno.test("Transistor of kind p is the mirror of kind n", () => {
  for (const bundle of [{ bulkJunctions: true }, { bulkJunctions: false }]) {
    const n = new Transistor(nParameters, { ...size, ...bundle });
    const p = new Transistor({ ...nParameters, kind: "p" }, { ...size, ...bundle });
    for (const bias of biases(n, 50)) {
      const out = values(n, bias);
      const mirrored = bias.map((v) => -v) as Bias;
      const other = values(p, mirrored);
      for (let k = 0; k < TRANSISTOR_VALUES; k++) {
        const odd = k < 4 || (k >= 20 && k < 24);
        // Adding zero makes the negative zero of an absent current a plain zero.
        assertEquals(other[k]! + 0, (odd ? -out[k]! : out[k]!) + 0);
      }
      assert(n.channelNoise(...bias) === p.channelNoise(...mirrored));
      assert(n.flickerNoise(...bias) === p.flickerNoise(...mirrored));
    }
  }
});

Deno.test("Transistor is analytic through zero drain-source voltage", () => {
  for (const device of channels) {
    const sign = device.parameters.kind === "n" ? 1 : -1;
    for (const vg of [0.1, 0.4, 0.6, 1.2]) {
      const entries: Record<string, (x: number) => number> = {
        noise: (x) => device.channelNoise(0.2 + x, sign * vg, 0.2, 0),
        flicker: (x) => device.flickerNoise(0.2 + x, sign * vg, 0.2, 0),
      };
      for (const k of [0, 4, 5, 20, 21, 22, 23, 24, 29]) {
        entries[`out[${k}]`] = (x) => values(device, [0.2 + x, sign * vg, 0.2, 0])[k]!;
      }
      for (const [name, f] of Object.entries(entries)) {
        const error = interpolationError(f, { width: 0.01, count: 14 });
        assert(error < 1e-11, `${name} at gate ${vg} V: ${error}`);
      }
    }
  }
  // What the bound means: the third derivative of |x|^3 jumps, and that is seen.
  const kinked = interpolationError((x) => 1 + Math.abs(x / 0.01) ** 3, { width: 0.01, count: 14 });
  assert(kinked > 1e-4);
});

Deno.test("Transistor drives more current with more drain-source and more gate voltage", () => {
  for (const saturationVelocity of [Infinity, 0.9e5, 1e3]) {
    for (const outputConductanceLength of [0, 5e-8]) {
      const parameters = { ...nParameters, saturationVelocity, outputConductanceLength };
      const device = new Transistor(parameters, { width: 1e-6, length: 60e-9 });
      for (let vg = -0.5; vg <= 2.5; vg += 0.1) {
        let last = device.operatingPoint(-2, vg, 0, 0).current;
        for (let vd = -1.95; vd <= 3; vd += 0.05) {
          const point = device.operatingPoint(vd, vg, 0, 0);
          // On an ideal plateau the rise is below rounding.
          assert(point.current >= last - 1e-15 * Math.abs(last), `vd ${vd} vg ${vg}`);
          assert(point.gds > 0);
          assert(Math.abs(vd) < 1e-9 || point.gm * vd > 0);
          last = point.current;
        }
      }
    }
  }
});

Deno.test("Transistor stays finite anywhere within 5 V on every terminal", () => {
  const levels = [-5, -2.5, -1, 0, 0.4, 1, 2.5, 5];
  for (const temperature of [233.15, 398.15]) {
    for (const kind of ["n", "p"] as const) {
      const device = new Transistor(
        resolveTransistor(card, { kind, corner: "fast", temperature }),
        size,
      );
      for (const vd of levels) {
        for (const vg of levels) {
          for (const vs of levels) {
            for (const vb of levels) {
              const bias: Bias = [vd, vg, vs, vb];
              assert(values(device, bias).every(Number.isFinite), `${bias}`);
              assert(Number.isFinite(device.channelNoise(...bias)));
              assert(Number.isFinite(device.flickerNoise(...bias)));
            }
          }
        }
      }
    }
  }
});

Deno.test("channelNoise is 4kT times the channel conductance at zero drain-source voltage", () => {
  // H. Nyquist, Phys. Rev. 32 (1928) 110, with velocity saturation, output conductance and body effect on.
  for (const device of channels) {
    const sign = device.parameters.kind === "n" ? 1 : -1;
    for (let vg = -0.6; vg <= 4; vg += 0.05) {
      for (const source of [0, 0.3, 1]) {
        const bias: Bias = [sign * source, sign * vg, sign * source, 0];
        const density = device.channelNoise(...bias) ** 2;
        const conductance = values(device, bias)[4]!;
        assertClose(density, 4 * BOLTZMANN * 300 * conductance, { rtol: 1e-14, atol: 0 });
      }
    }
  }
});

Deno.test("channelNoise carries the same output conductance as the current", () => {
  const without = new Transistor({ ...nParameters, outputConductanceLength: 0 }, size);
  const device = devices[0]!;
  for (const vd of [0.05, 0.3, 1, -0.7]) {
    const bias: Bias = [vd, 0.7, 0, -0.2];
    const current = device.operatingPoint(...bias).current /
      without.operatingPoint(...bias).current;
    const noise = (device.channelNoise(...bias) / without.channelNoise(...bias)) ** 2;
    assert(current > 1);
    assertClose(noise, current, { rtol: 1e-13, atol: 0 });
  }
});

Deno.test("flickerNoise is the transconductance times the gate's noise and keeps its sign", () => {
  for (const device of devices) {
    const { oxideCapacitance, flickerCoefficient } = device.parameters;
    const sign = device.parameters.kind === "n" ? 1 : -1;
    const area = size.width * size.length * size.multiplier;
    const gate = Math.sqrt(flickerCoefficient / (oxideCapacitance * area));
    for (const vds of [-0.6, -0.02, 0, 0.02, 0.6]) {
      const bias: Bias = [sign * (0.7 + vds), sign * 1.3, sign * 0.7, 0];
      const amplitude = device.flickerNoise(...bias);
      assertClose(amplitude, values(device, bias)[5]! * gate, { rtol: 1e-14, atol: 1e-40 });
      assertEquals(Math.sign(amplitude), Math.sign(vds));
    }
  }
});

Deno.test("Transistor carries source charge times saturation velocity when velocity is saturated", () => {
  const saturationVelocity = 10;
  const width = 3e-6;
  const parameters = { ...nParameters, saturationVelocity, outputConductanceLength: 0 };
  const device = new Transistor(parameters, { width, length: 60e-9, bulkJunctions: false });
  // Strong inversion: the charge per area is C_ox (V_G - V_T) to the logarithm in 2q + ln q.
  const gate = 40;
  const charge = parameters.oxideCapacitance * (gate - parameters.threshold);
  const expected = width * saturationVelocity * charge;
  assertClose(device.operatingPoint(60, gate, 0, 0).current, expected, { rtol: 1e-2, atol: 0 });
});

Deno.test("Transistor has a hot current below its cold one at high gate voltage, above it at low", () => {
  for (const kind of ["n", "p"] as const) {
    const sign = kind === "n" ? 1 : -1;
    const current = (temperature: number, vg: number) => {
      const device = new Transistor(
        resolveTransistor(card, { kind, corner: "typical", temperature }),
        size,
      );
      return Math.abs(device.operatingPoint(sign, sign * vg, 0, 0).current);
    };
    assert(current(398.15, 0.1) > 10 * current(300, 0.1));
    assert(current(300, 0.1) > 10 * current(233.15, 0.1));
    assert(current(398.15, 1.2) < current(300, 1.2));
    assert(current(300, 1.2) < current(233.15, 1.2));
  }
});

Deno.test("Transistor is faster from the slow over the typical to the fast corner", () => {
  for (const kind of ["n", "p"] as const) {
    const sign = kind === "n" ? 1 : -1;
    for (const vg of [0.2, 0.5, 1]) {
      const [slow, middle, fast] = CORNERS.map((corner) => {
        const device = new Transistor(
          resolveTransistor(card, { kind, corner, temperature: 300 }),
          size,
        );
        return Math.abs(device.operatingPoint(sign * 0.6, sign * vg, 0, 0).current);
      }) as [number, number, number];
      assert(slow < 0.95 * middle && middle < 0.95 * fast);
    }
  }
});

Deno.test("operatingPoint names the region and agrees with evaluate", () => {
  const device = channels[0]!;
  const point = device.operatingPoint(0.6, 0.48, 0, 0);
  const out = values(device, [0.6, 0.48, 0, 0]);
  assertEquals(
    [point.current, point.gm, -point.gms, point.gds, -point.gateDrainCapacitance],
    [out[0], out[5], out[6], out[4], out[28]],
  );
  assertEquals([point.region, point.inversion], ["saturation", "moderate"]);
  assertEquals(device.operatingPoint(0.05, 1.2, 0, 0).region, "triode");
  assertEquals(device.operatingPoint(0.6, 1.2, 0, 0).inversion, "strong");
  assertEquals(device.operatingPoint(0.6, 0.1, 0, 0).inversion, "weak");
});

Deno.test("Transistor scales with its multiplier and its width", () => {
  const one = new Transistor(nParameters, { width: 20e-6, length: 60e-9, bulkJunctions: false });
  const wide = new Transistor(nParameters, { width: 40e-6, length: 60e-9, bulkJunctions: false });
  const bias: Bias = [0.8, 0.7, 0.1, 0];
  const single = values(one, bias).map((x) => 2 * x);
  assertClose(values(channels[0]!, bias), single, { rtol: 1e-14, atol: 1e-40 });
  assertClose(values(wide, bias), single, { rtol: 1e-14, atol: 1e-40 });
  assertClose(
    channels[0]!.channelNoise(...bias) ** 2,
    2 * one.channelNoise(...bias) ** 2,
    { rtol: 1e-14, atol: 0 },
  );
});

Deno.test("Transistor refuses sizes and parameters outside their range", () => {
  const make = (change: Partial<TransistorParameters>, width = 1e-6, length = 60e-9) => () =>
    new Transistor({ ...nParameters, ...change }, { width, length });
  assertThrows(make({}, 0), RangeError, /Cannot size the transistor: width must be > 0 m, got 0 m/);
  assertThrows(make({}, 1e-6, 50e-9), RangeError, /length must be >= 6e-8 m, got 5e-8 m/);
  assertThrows(make({ slopeFactor: 0.9 }), RangeError, /slope factor must be >= 1, got 0.9/);
  assertThrows(make({ temperature: NaN }), RangeError, /temperature must be > 0 K, got NaN K/);
  assertThrows(make({ oxideCapacitance: 0 }), RangeError, /oxideCapacitance must be > 0, got 0/);
});
