import { assertClose, assertEquals, assertThrows } from "../../assert.ts";
import { readCurve } from "../../../lib/noise/curve_csv.ts";

const EXPECTED = [{ offset: 1e4, level: -80.5 }, { offset: 1e5, level: -105 }];

Deno.test("readCurve: plain numbers are Hz and dBc/Hz; comments and empty lines are left out", () => {
  assertEquals(readCurve("# measured\n10000,-80.5\n\n1e5 , -105.0\n"), EXPECTED);
  assertEquals(readCurve("\uFEFF10000;-80.5\r\n1e5;\u2212105\r\n"), EXPECTED);
  assertEquals(readCurve("10000\t-80.5\n1e5\t-105"), EXPECTED);
});

Deno.test("readCurve: a first line names the columns and their units", () => {
  assertEquals(readCurve("offset [kHz], phase noise [dBc/Hz]\n10,-80.5\n100,-105"), EXPECTED);
  assertEquals(readCurve("Frequency (MHz);L (dBc/Hz)\n0.01;-80.5\n0.1;-105"), EXPECTED);
  assertEquals(readCurve("offset,level\n10000,-80.5\n100000,-105"), EXPECTED);
});

Deno.test("readCurve: linear densities, named as such, become decibels", () => {
  const curve = readCurve("offset [Hz],L [1/Hz]\n1e4,1e-8\n1e5,2e-11");
  assertClose(curve.map(({ level }) => level), [-80, 10 * Math.log10(2e-11)], {
    rtol: 0,
    atol: 1e-12,
  });
});

const FAULTS: readonly [
  what: string,
  text: string,
  kind: typeof SyntaxError | typeof RangeError,
  RegExp,
][] = [
  ["an empty text", "", SyntaxError, /^noise\.csv: .*at least 2 lines .*got 0$/],
  ["only comments", "# nothing\n", SyntaxError, /got 0/],
  ["a single point", "1e4,-80", SyntaxError, /at least 2 lines .* got 1/],
  ["a header alone", "offset [Hz],L [dBc/Hz]", SyntaxError, /got 0/],
  [
    "unsorted offsets",
    "1e4,-80\n1e6,-120\n1e5,-100",
    RangeError,
    /:3: offsets must rise, got 100000 Hz after 1000000 Hz/,
  ],
  [
    "a repeated offset",
    "1e4,-80\n# x\n1e5,-100\n10000,-81",
    RangeError,
    /:4: offset 10000 Hz is already on line 1/,
  ],
  [
    "an offset at the carrier",
    "1e4,-80\n1e9,-150",
    RangeError,
    /:2: offset must be below the carrier's 1000000000 Hz/,
  ],
  ["an offset of zero", "0,-20\n1e4,-80", RangeError, /:1: offset must be > 0 Hz/],
  [
    "a negative offset",
    "-1e4,-80\n1e4,-80",
    RangeError,
    /:1: offset must be > 0 Hz and finite, got -10000 Hz/,
  ],
  [
    "linear among decibels",
    "1e4,-80\n1e5,1e-11",
    RangeError,
    /:2: level must be in dBc\/Hz, but 1e-11 looks like a linear/,
  ],
  [
    "decibels among linear",
    "offset [Hz],L [1/Hz]\n1e4,1e-8\n1e5,-110",
    RangeError,
    /:3: .*-110 looks like a level in dBc\/Hz/,
  ],
  [
    "a negative density",
    "offset [Hz],L [1/Hz]\n1e4,1e-8\n1e5,-1e-11",
    RangeError,
    /:3: density must be > 0 1\/Hz, got -1e-11/,
  ],
  [
    "a density of zero",
    "offset [Hz],L [1/Hz]\n1e4,0\n1e5,1e-11",
    RangeError,
    /:2: density must be > 0/,
  ],
  ["a word for a level", "1e4,-80\n1e5,low", SyntaxError, /:2: level must be a number, got "low"/],
  ["not a number", "1e4,NaN\n1e5,-100", SyntaxError, /:1: level must be a number, got "NaN"/],
  ["an overflow", "1e4,-80\n1e999,-100", RangeError, /:2: offset must be > 0 Hz and finite/],
  ["an empty cell", "1e4,-80\n1e5,", SyntaxError, /:2: level must be a number, got ""/],
  ["three columns", "1e4,-80,0.1\n1e5,-100,0.1", SyntaxError, /:1: expected 2 columns.*got 3/],
  ["one column", "1e4 -80\n1e5 -100", SyntaxError, /:1: expected 2 columns.*got 1/],
  [
    "decimal commas",
    "1e4;-80,5\n1e5;-100,2",
    SyntaxError,
    /:1: .*"-80,5"; the decimal mark must be a point/,
  ],
  [
    "columns the wrong way",
    "L [dBc/Hz],offset [Hz]\n-80,1e4",
    SyntaxError,
    /:1: the first column must be the offset/,
  ],
  [
    "an unknown unit of level",
    "offset [Hz],L [dBm/Hz]\n1e4,-80",
    SyntaxError,
    /must be in dBc\/Hz or 1\/Hz, got "dBm\/Hz"/,
  ],
  [
    "an unknown unit of offset",
    "offset [rad],L [dBc/Hz]\n1e4,-80",
    SyntaxError,
    /Hz, kHz, MHz or GHz, got "rad"/,
  ],
];

for (const [what, text, kind, wording] of FAULTS) {
  Deno.test(`readCurve: ${what} is refused with its line`, () => {
    const read = () => readCurve(text, { name: "noise.csv", frequency: 1e9 });
    assertThrows(read, kind, wording);
    assertThrows(read, kind, /^noise\.csv/);
  });
}
