import fc from "fast-check";
import { assert, assertClose, assertEquals, assertThrows } from "../../assert.ts";
import {
  NETWORK_FORMATS,
  NETWORK_FREQUENCY_UNITS,
  NETWORK_PARAMETERS,
  type NetworkData,
} from "../../../lib/device/touchstone_network.ts";
import { readTouchstone } from "../../../lib/device/touchstone_read.ts";
import { writeTouchstone } from "../../../lib/device/touchstone_write.ts";

const coil: NetworkData = {
  ports: 1,
  parameter: "S",
  referenceResistances: [50],
  frequencies: Float64Array.of(1e9, 2.5e9),
  re: Float64Array.of(0.5, -0.25),
  im: Float64Array.of(0.25, 0.125),
  noise: [],
};

Deno.test("writeTouchstone writes a first-version file with comments and few digits", () => {
  const text = writeTouchstone(coil, { digits: 3, comments: ["planar coil", "port 1 to 2"] });
  assertEquals(
    text,
    "! planar coil\n! port 1 to 2\n# GHz S RI R 50\n1.00 0.500 0.250\n2.50 -0.250 0.125\n",
  );
});

Deno.test("writeTouchstone writes the keywords of version 2 that a two-port needs", () => {
  const network: NetworkData = {
    ports: 2,
    parameter: "S",
    referenceResistances: [50, 75],
    frequencies: Float64Array.of(1e9),
    re: Float64Array.of(11, 12, 21, 22),
    im: Float64Array.of(1, 2, 3, 4),
    noise: [],
  };
  assertEquals(
    writeTouchstone(network, { version: "2.0", frequencyUnit: "MHz", digits: 4 }),
    "[Version] 2.0\n# MHz S RI R 50\n[Number of Ports] 2\n[Two-Port Data Order] 12_21\n" +
      "[Number of Frequencies] 1\n[Reference] 50 75\n[Network Data]\n" +
      "1000 11.00 1.000 12.00 2.000 21.00 3.000 22.00 4.000\n[End]\n",
  );
  assertThrows(
    () => writeTouchstone(network),
    RangeError,
    /in version 1\.0 all ports must have one reference resistance, got 50 and 75 ohm$/,
  );
});

/** Away from zero, which has no decibels and no angle, and from overflow. */
const entry = fc.double({ min: 1e-9, max: 1e3, noNaN: true }).chain((size) =>
  fc.double({ min: -Math.PI, max: Math.PI, noNaN: true }).map((angle) => ({
    re: size * Math.cos(angle),
    im: size * Math.sin(angle),
  }))
);

const rising = (least: number) =>
  fc.array(fc.double({ min: 1e5, max: 1e9, noNaN: true }), { minLength: least, maxLength: 6 }).map(
    (steps) => {
      let sum = 0;
      return steps.map((step) => (sum += step));
    },
  );

const network = fc.record({
  ports: fc.constantFrom(1 as const, 2 as const),
  hybrid: fc.constantFrom(...NETWORK_PARAMETERS),
  references: fc.tuple(
    fc.double({ min: 1, max: 1e3, noNaN: true }),
    fc.double({ min: 1, max: 1e3, noNaN: true }),
  ),
  frequencies: rising(1),
  noiseFrequencies: rising(0),
}).chain(({ ports, hybrid, references, frequencies, noiseFrequencies }) => {
  const size = ports * ports * frequencies.length;
  const last = frequencies.at(-1) ?? 0;
  return fc.record({
    values: fc.array(entry, { minLength: size, maxLength: size }),
    reflections: fc.array(entry, { minLength: 6, maxLength: 6 }),
  }).map(({ values, reflections }): NetworkData => ({
    ports,
    parameter: ports === 1 && (hybrid === "H" || hybrid === "G") ? "Z" : hybrid,
    referenceResistances: references.slice(0, ports),
    frequencies: Float64Array.from(frequencies),
    re: Float64Array.from(values, ({ re }) => re),
    im: Float64Array.from(values, ({ im }) => im),
    // Without a keyword, noise parameters begin where the frequency falls back.
    noise: (ports === 1 ? [] : noiseFrequencies).map((frequency, k) => ({
      frequency: last / 2 + frequency - noiseFrequencies[0]!,
      minimumNoiseFigureDb: k + 0.5,
      sourceReflection: reflections[k]!,
      noiseResistance: 10 + k,
    })),
  }));
});

Deno.test("writeTouchstone and readTouchstone give back any network, whatever the format", () => {
  fc.assert(
    fc.property(
      network,
      fc.constantFrom("1.0" as const, "2.0" as const),
      fc.constantFrom(...NETWORK_FORMATS),
      fc.constantFrom(...NETWORK_FREQUENCY_UNITS),
      fc.constantFrom("12_21" as const, "21_12" as const),
      (drawn, version, format, frequencyUnit, twoPortOrder) => {
        const written: NetworkData = {
          ...drawn,
          referenceResistances: version === "1.0"
            ? drawn.referenceResistances.map(() => drawn.referenceResistances[0]!)
            : drawn.referenceResistances,
        };
        const text = writeTouchstone(written, {
          version,
          format,
          frequencyUnit,
          twoPortOrder,
          digits: 17,
        });
        const read = readTouchstone(text, { ports: written.ports });
        assertEquals(read.parameter, written.parameter);
        assertEquals(read.referenceResistances, written.referenceResistances);
        // Seventeen digits are exact; a unit, a reference, a logarithm and an angle each round once or twice.
        const rounding = { rtol: 1e-14, atol: 0 };
        assertClose(read.frequencies, written.frequencies, { ...rounding, what: "frequencies" });
        written.re.forEach((re, k) => {
          const im = written.im[k]!;
          const bound = 1e-13 * Math.hypot(re, im);
          assertClose([read.re[k]!, read.im[k]!], [re, im], { rtol: 0, atol: bound });
        });
        assertEquals(read.noise.length, written.noise.length);
        written.noise.forEach((point, k) => {
          assertClose(read.noise[k]!.frequency, point.frequency, rounding);
          assertClose(read.noise[k]!.noiseResistance, point.noiseResistance, rounding);
        });
      },
    ),
    { seed: 1999, numRuns: 400 },
  );
});

Deno.test("writeTouchstone refuses what a file cannot hold", () => {
  assertThrows(() => writeTouchstone(coil, { digits: 0 }), RangeError, /from 1 to 17, got 0$/);
  assertThrows(
    () => writeTouchstone(coil, { comments: ["two\nlines"] }),
    RangeError,
    /a comment must be one line, got "two\\nlines"$/,
  );
  assertThrows(
    () =>
      writeTouchstone({ ...coil, re: new Float64Array(2), im: new Float64Array(2) }, {
        format: "DB",
      }),
    RangeError,
    /a value in decibels must not be 0, got 0$/,
  );
  assertThrows(
    () =>
      writeTouchstone({
        ...coil,
        noise: [{
          frequency: 3e9,
          minimumNoiseFigureDb: 1,
          sourceReflection: { re: 0, im: 0 },
          noiseResistance: 10,
        }],
      }),
    RangeError,
    /in version 1\.0 noise parameters must begin at or below the last frequency, 2500000000 Hz, got 3000000000 Hz$/,
  );
  assert(
    writeTouchstone({ ...coil, re: new Float64Array(2), im: new Float64Array(2) }, { format: "MA" })
      .includes("0.00000000000"),
  );
});
