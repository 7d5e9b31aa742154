import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { networkAdmittance, type NetworkData } from "../../../lib/device/touchstone_network.ts";
import { readTouchstone } from "../../../lib/device/touchstone_read.ts";

const ROUNDING = { rtol: 1e-14, atol: 1e-15 };

/** Entries 11, 12, 21, 22 at one frequency, real and imaginary parts alternating. */
function entries({ ports, re, im }: NetworkData, index = 0): number[] {
  const size = ports * ports;
  return Array.from({ length: 2 * size }, (_, k) => {
    const at = index * size + (k >> 1);
    return (k % 2 === 0 ? re : im)[at]!;
  });
}

Deno.test("readTouchstone takes a bare option line as GHz, S, MA, R 50", () => {
  const network = readTouchstone("#\n2 0.5 90\n");
  assertEquals([...network.frequencies], [2e9]);
  assertEquals(network.parameter, "S");
  assertEquals(network.referenceResistances, [50]);
  assertClose(entries(network), [0, 0.5], ROUNDING);
});

Deno.test("readTouchstone takes the parts of the option line in any order and case", () => {
  const network = readTouchstone("# r 75 ri mhz y\n100 1.5 -3\n");
  assertEquals([...network.frequencies], [100e6]);
  // In the first version admittances are divided by 1/R.
  assertClose(entries(network), [1.5 / 75, -3 / 75], ROUNDING);
  assertEquals(network.referenceResistances, [75]);
});

Deno.test("readTouchstone reads decibels, magnitudes and parts as the same number", () => {
  const size = Math.hypot(0.3, 0.4);
  const degrees = Math.atan2(0.4, 0.3) * 180 / Math.PI;
  for (
    const text of [
      "# Hz S RI R 50\n10 0.3 0.4\n",
      `# Hz S MA R 50\n10 ${size} ${degrees}\n`,
      `# Hz S DB R 50\n10 ${20 * Math.log10(size)} ${degrees}\n`,
    ]
  ) assertClose(entries(readTouchstone(text)), [0.3, 0.4], ROUNDING);
});

Deno.test("readTouchstone scales every frequency unit", () => {
  for (const [unit, size] of [["Hz", 1], ["kHz", 1e3], ["MHz", 1e6], ["GHz", 1e9]] as const) {
    const { frequencies } = readTouchstone(`# ${unit} S RI R 50\n3 0 0\n4 0 0\n`);
    assertEquals([...frequencies], [3 * size, 4 * size]);
  }
});

Deno.test("readTouchstone reads a two-port of the first version as 11, 21, 12, 22", () => {
  const network = readTouchstone("# GHz S RI R 50\n1 11 0.11 21 0.21 12 0.12 22 0.22\n");
  assertEquals(network.ports, 2);
  assertEquals(entries(network), [11, 0.11, 12, 0.12, 21, 0.21, 22, 0.22]);
});

Deno.test("readTouchstone passes over comments, blank lines, tabs, line ends and a byte order mark", () => {
  const plain = readTouchstone("# GHz S RI R 50\n1 0.1 0.2\n2 0.3 0.4\n");
  const odd = "\uFEFF! écrit ici [Version] # 3\r\n\r\n  #\tGHz S RI R 50 ! options\r\n!\r\n" +
    "\t 1 \t 0.1\t0.2 ! a comment\r\n\r\n2 0.3 0.4";
  assertEquals(readTouchstone(odd), plain);
  assertEquals(readTouchstone(odd.replaceAll("\r\n", "\r")), plain);
});

Deno.test("readTouchstone ignores option lines after the first", () => {
  const network = readTouchstone("# GHz S RI R 50\n1 0.1 0.2\n# Hz Z MA R 1\n2 0.3 0.4\n");
  assertEquals([...network.frequencies], [1e9, 2e9]);
  assertEquals(entries(network, 1), [0.3, 0.4]);
});

Deno.test("readTouchstone reads every legal way to write a number", () => {
  const network = readTouchstone("# Hz S RI R 5e1\n1. +.5 -1E-1\n2e0 5e-1 1.e+1\n");
  assertEquals([...network.frequencies], [1, 2]);
  assertEquals([...entries(network, 0), ...entries(network, 1)], [0.5, -0.1, 0.5, 10]);
});

Deno.test("readTouchstone joins a frequency's values over further lines in pairs", () => {
  const values = "11 1 21 2 12 3 22 4".split(" ");
  const cut = (...at: number[]) => {
    const words = ["1", ...values];
    at.forEach((place, k) => words.splice(place + k, 0, "\n"));
    return `# GHz S RI R 50\n${words.join(" ")}\n2 ${values.join(" ")}\n`;
  };
  const whole = readTouchstone(cut(), { ports: 2 });
  assertEquals(whole.frequencies.length, 2);
  for (const places of [[5], [1], [3], [7], [3, 5, 7], [1, 3, 5, 7]]) {
    assertEquals(readTouchstone(cut(...places), { ports: 2 }), whole);
  }
});

Deno.test("readTouchstone reads noise parameters where the frequency of a two-port falls back", () => {
  // An example of the specification, version 1 (from memory).
  const network = readTouchstone(
    `! 2-port network, S-parameter and noise data
# GHZ S MA R 50
2  .95  -26 3.57 157 .04 76 .66 -14
22 .60 -144 1.30  40 .14 40 .56 -85
! NOISE PARAMETERS
4  .7 .64  69 .38
18 2.7 .46 -33 .40
`,
    { name: "amplifier.s2p" },
  );
  assertEquals([...network.frequencies], [2e9, 22e9]);
  assertEquals(network.noise.map(({ frequency }) => frequency), [4e9, 18e9]);
  assertEquals(network.noise.map((point) => point.minimumNoiseFigureDb), [0.7, 2.7]);
  assertClose(network.noise.map((point) => point.noiseResistance), [19, 20], ROUNDING);
  const { re, im } = network.noise[0]!.sourceReflection;
  assertClose(Math.hypot(re, im), 0.64, ROUNDING);
  assertClose(Math.atan2(im, re) * 180 / Math.PI, 69, ROUNDING);
  const [s11] = [entries(network)];
  assertClose(s11[0]!, 0.95 * Math.cos(26 * Math.PI / 180), ROUNDING);
});

Deno.test("readTouchstone reads the number of ports from the name, the options or the first line", () => {
  const one = "# GHz S RI R 50\n1 0 0\n";
  assertEquals(readTouchstone(one, { name: "coil.S1P" }).ports, 1);
  assertEquals(readTouchstone(one, { ports: 1 }).ports, 1);
  assertEquals(readTouchstone(one).ports, 1);
  assertThrows(
    () => readTouchstone(one, { name: "coil.s4p" }),
    RangeError,
    /Cannot read coil\.s4p: a coil's file must have 1 or 2 ports, got 4 by its name/,
  );
});

const SECOND = `[Version] 2.0
# MHz S RI R 50
[Number of Ports] 2
[Two-Port Data Order] 12_21
[Number of Frequencies] 1
[Network Data]
100 11 1 12 2 21 3 22 4
[End]
`;

Deno.test("readTouchstone reads version 2 with keywords in any case, spacing and order", () => {
  const plain = readTouchstone(SECOND);
  assertEquals(entries(plain), [11, 1, 12, 2, 21, 3, 22, 4]);
  const odd = `! first
[ VERSION ]   2.1
# mhz s ri R 50
[number  of frequencies] 1 ! one
# GHz
[Begin Information]
[Manufacturer] anyone
any text at all 1 2 3
[End Information]
[number of ports] 2
[Reference] 50
50
[two-port data order] 21_12
[Matrix Format] Full
[network data]
100 11 1 21 3
    12 2 22 4
[end]
! after`;
  assertEquals(readTouchstone(odd, { name: "coil.ts" }), plain);
});

Deno.test("readTouchstone fills a symmetric matrix from its lower or upper half", () => {
  for (const half of ["Lower", "upper"]) {
    const text = SECOND.replace("[Network Data]", `[Matrix Format] ${half}\n[Network Data]`)
      .replace("12 2 21 3", "12 2");
    assertEquals(entries(readTouchstone(text)), [11, 1, 12, 2, 12, 2, 22, 4]);
  }
});

Deno.test("readTouchstone takes Y and Z of version 2 as they are, of version 1 times the reference", () => {
  const second = (parameter: string) =>
    readTouchstone(
      `[Version] 2.0\n# GHz ${parameter} RI R 20\n[Number of Ports] 1\n[Number of Frequencies] 1\n` +
        "[Network Data]\n1 3 4\n[End]\n",
    );
  const first = (parameter: string) => readTouchstone(`# GHz ${parameter} RI R 20\n1 3 4\n`);
  assertClose(entries(second("Z")), [3, 4], ROUNDING);
  assertClose(entries(first("Z")), [60, 80], ROUNDING);
  assertClose(entries(second("Y")), [3, 4], ROUNDING);
  assertClose(entries(first("Y")), [0.15, 0.2], ROUNDING);
});

Deno.test("readTouchstone reads noise data and the reference of each port of version 2", () => {
  const network = readTouchstone(
    SECOND.replace(
      "[Network Data]",
      "[Number of Noise Frequencies] 1\n[Reference] 50 75\n[Network Data]",
    )
      .replace("[End]", "[Noise Data]\n150 1.2 0.5 0 12\n[End]"),
  );
  assertEquals(network.referenceResistances, [50, 75]);
  assertEquals(network.noise, [{
    frequency: 150e6,
    minimumNoiseFigureDb: 1.2,
    sourceReflection: { re: 0.5, im: 0 },
    noiseResistance: 12,
  }]);
});

Deno.test("readTouchstone reads hybrid parameters as the same network", () => {
  // A two-port of three resistors: 10 ohm to ground at port 1, 20 ohm between, 40 ohm at port 2.
  const y = [0.15, -0.05, -0.05, 0.075];
  const determinant = y[0]! * y[3]! - y[1]! * y[2]!;
  const h = [1 / y[0]!, -y[1]! / y[0]!, y[2]! / y[0]!, determinant / y[0]!];
  const g = [determinant / y[3]!, y[1]! / y[3]!, -y[2]! / y[3]!, 1 / y[3]!];
  const R = 25;
  const line = (m: readonly number[], scale: readonly number[]) =>
    [0, 2, 1, 3].map((k) => `${m[k]! * scale[k]!} 0`).join(" ");
  const files = [
    `# GHz H RI R ${R}\n1 ${line(h, [1 / R, 1, 1, R])}\n`,
    `# GHz G RI R ${R}\n1 ${line(g, [R, 1, 1, 1 / R])}\n`,
    `# GHz Y RI R ${R}\n1 ${line(y, [R, R, R, R])}\n`,
  ];
  for (const file of files) {
    const admittance = networkAdmittance(readTouchstone(file), 0);
    assertClose(admittance.map(({ re }) => re), y, { rtol: 1e-14, atol: 0 });
    assertClose(admittance.map(({ im }) => im), [0, 0, 0, 0], { rtol: 0, atol: 1e-16 });
  }
});
