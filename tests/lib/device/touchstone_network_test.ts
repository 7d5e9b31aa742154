import { assertClose, assertThrows } from "../../assert.ts";
import {
  networkAdmittance,
  type NetworkData,
  networkFromAdmittance,
} from "../../../lib/device/touchstone_network.ts";

/** Series branch and a branch to ground at each port, all different [S]. */
function unequalPi(frequency: number) {
  const w = 2 * Math.PI * frequency;
  const series = { re: 0.004, im: -1 / (w * 1e-9) };
  const left = { re: 0.001, im: w * 40e-15 };
  const right = { re: 0.002, im: w * 70e-15 };
  const minus = { re: -series.re, im: -series.im };
  return [
    { re: series.re + left.re, im: series.im + left.im },
    minus,
    minus,
    { re: series.re + right.re, im: series.im + right.im },
  ];
}

Deno.test("networkAdmittance gives back the admittance behind S, Y and Z of one and two ports", () => {
  const frequencies = [1e8, 2e9, 3e10];
  for (const parameter of ["S", "Y", "Z"] as const) {
    for (const ports of [1, 2] as const) {
      const admittance = (f: number) => unequalPi(f).slice(0, ports * ports);
      const network = networkFromAdmittance({
        ports,
        frequencies,
        admittance,
        parameter,
        referenceResistance: 30,
      });
      frequencies.forEach((frequency, index) => {
        const expected = admittance(frequency);
        const size = Math.max(...expected.map(({ re, im }) => Math.hypot(re, im)));
        const found = networkAdmittance(network, index);
        // S and Z of a large admittance lose the digits of the small one: 1.6 S against 1 mS.
        const bound = { rtol: 0, atol: 1e-11 * size };
        assertClose(found.map(({ re }) => re), expected.map(({ re }) => re), bound);
        assertClose(found.map(({ im }) => im), expected.map(({ im }) => im), bound);
      });
    }
  }
});

Deno.test("networkAdmittance reads S with another reference at each port", () => {
  // A series resistance R between ports of 50 and 100 ohm: S11 = (R + R2 - R1)/(R + R1 + R2),
  // S21 = 2 sqrt(R1 R2)/(R + R1 + R2).
  const sum = 25 + 50 + 100;
  const transfer = 2 * Math.sqrt(50 * 100) / sum;
  const network: NetworkData = {
    ports: 2,
    parameter: "S",
    referenceResistances: [50, 100],
    frequencies: Float64Array.of(1e9),
    re: Float64Array.of((25 + 100 - 50) / sum, transfer, transfer, (25 + 50 - 100) / sum),
    im: new Float64Array(4),
    noise: [],
  };
  const found = networkAdmittance(network, 0).map(({ re }) => re);
  assertClose(found, [0.04, -0.04, -0.04, 0.04], { rtol: 1e-14, atol: 0 });
});

Deno.test("networkAdmittance refuses a short and an index outside", () => {
  const short: NetworkData = {
    ports: 1,
    parameter: "S",
    referenceResistances: [50],
    frequencies: Float64Array.of(0),
    re: Float64Array.of(-1),
    im: Float64Array.of(0),
    noise: [],
  };
  assertThrows(
    () => networkAdmittance(short, 0),
    RangeError,
    /the network must not be a short between its terminals, got one at 0 Hz$/,
  );
  assertThrows(() => networkAdmittance(short, 1), RangeError, /index must lie from 0 to 0, got 1$/);
});

Deno.test("networkFromAdmittance refuses falling frequencies, a wrong count and missing parameters", () => {
  const description = { ports: 1 as const, admittance: () => [{ re: 1, im: 0 }] };
  assertThrows(
    () => networkFromAdmittance({ ...description, frequencies: [2, 1] }),
    RangeError,
    /frequencies must rise from >= 0 Hz, got 1 Hz at index 1$/,
  );
  assertThrows(
    () => networkFromAdmittance({ ...description, ports: 2, frequencies: [1] }),
    TypeError,
    /admittance must have 4 entries, got 1$/,
  );
  assertThrows(
    () => networkFromAdmittance({ ...description, frequencies: [1], referenceResistance: NaN }),
    RangeError,
    /reference must be > 0 ohm, got NaN ohm$/,
  );
  assertThrows(
    () =>
      networkFromAdmittance({
        ports: 1,
        frequencies: [1],
        admittance: () => [{ re: 0, im: 0 }],
        parameter: "Z",
      }),
    RangeError,
    /Z parameters must be finite, got none at 1 Hz$/,
  );
});
