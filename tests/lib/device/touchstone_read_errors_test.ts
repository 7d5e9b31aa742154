import { assert, assertEquals } from "../../assert.ts";
import { readTouchstone, type ReadTouchstoneOptions } from "../../../lib/device/touchstone_read.ts";

const SECOND = `[Version] 2.0
# MHz S RI R 50
[Number of Ports] 2
[Two-Port Data Order] 12_21
[Number of Frequencies] 1
[Network Data]
100 11 1 12 2 21 3 22 4
[End]
`;

/** Text, what the message must say, and options. */
type BadFile = readonly [
  what: string,
  text: string,
  message: string,
  options?: ReadTouchstoneOptions,
];

const HEAD = "# GHz S RI R 50\n";

const BAD_FILES: readonly BadFile[] = [
  [
    "nothing in it",
    "! only a comment\n\n",
    "line 3: expected an option line beginning with #, got no data",
  ],
  [
    "data before the option line",
    "! made by hand\n1 0 0\n" + HEAD,
    'line 2: expected an option line beginning with # before the data, got "1 0 0"',
  ],
  ["no data", HEAD + "! none\n", "line 3: expected data after the option line, got none"],
  [
    "a word in the option line that it cannot have",
    "# THz S RI R 50\n1 0 0\n",
    "line 1: expected a frequency unit (Hz, kHz, MHz, GHz), a parameter (S, Y, Z, H, G), a format (MA, " +
    'DB, RI) or R and a resistance in the option line, got "THz"',
  ],
  [
    "two formats",
    "# GHz S RI MA R 50\n1 0 0\n",
    'line 1: expected one format in the option line, got "MA" after RI',
  ],
  [
    "R without a resistance",
    "# GHz S RI R\n1 0 0\n",
    "line 1: expected a resistance > 0 ohm after R in the option line, got nothing",
  ],
  [
    "a negative reference",
    "!\n# GHz S RI R -50\n1 0 0\n",
    "line 2: expected a resistance > 0 ohm after R in the option line, got -50",
  ],
  [
    "a word among the numbers",
    HEAD + "1 0 0\n2 0.1 n/a\n",
    'line 3: expected an imaginary part, got "n/a"',
  ],
  [
    "a decimal comma",
    HEAD + "1 0,5 0\n",
    'line 2: expected a real part, got "0,5"',
  ],
  ["not a number", HEAD + "1 NaN 0\n", 'line 2: expected a real part, got "NaN"'],
  [
    "a value missing in the middle",
    HEAD + "1 0 0 0 0 0 0 0 0\n2 0 0 0 0 0 0 0\n3 0 0 0 0 0 0 0 0\n",
    "line 3: expected 9 values for one frequency of 2 ports, got 8 values",
    { name: "coil.s2p" },
  ],
  [
    "a value too many",
    HEAD + "1 0 0 7\n",
    "line 2: expected 3 values for one frequency of 1 port, got 4 values",
    { name: "coil.s1p" },
  ],
  [
    "a broken last line",
    HEAD + "1 0 0\n2 0 0\n3 0\n",
    "line 4: expected 3 values for one frequency of 1 port, got 2 values",
  ],
  [
    "a one-port called a two-port",
    HEAD + "1 0 0\n2 0 0\n3 0 0\n",
    "line 2: expected 9 values for one frequency of 2 ports, got 3 values",
    { name: "coil.s2p" },
  ],
  [
    "no way to tell the ports",
    HEAD + "1 0 0 0 0\n0 0 0 0\n",
    "line 2: expected 3 values (one port) or 9 values (two ports), or a name ending in .s1p or .s2p, got " +
    "5 values",
  ],
  [
    "a frequency twice",
    HEAD + "1 0 0\n! again\n1 0 0\n",
    'line 4: expected a frequency above that of line 2, got "1"',
  ],
  [
    "a falling frequency in a two-port",
    HEAD + "2 0 0 0 0 0 0 0 0\n1 0 0 0 0 0 0 0 0\n",
    'line 3: expected a frequency above that of line 2, got "1"',
  ],
  ["a negative frequency", HEAD + "-1 0 0\n", 'line 2: expected a frequency >= 0, got "-1"'],
  [
    "a negative magnitude",
    "# GHz S MA R 50\n1 -0.5 0\n",
    'line 2: expected a magnitude >= 0, got "-0.5"',
  ],
  [
    "noise parameters cut short",
    HEAD + "2 0 0 0 0 0 0 0 0\n1 0.5 0.1 0 0.2\n1.5 0.5 0.1 0\n",
    "line 4: expected 5 noise parameters, got 4 values",
  ],
  [
    "falling noise frequencies",
    HEAD + "2 0 0 0 0 0 0 0 0\n1.5 0.5 0.1 0 0.2\n1 0.5 0.1 0 0.2\n",
    'line 4: expected a frequency above that of line 3, got "1"',
  ],
  [
    "hybrid parameters of one port",
    "# GHz H RI R 50\n1 0 0\n",
    "line 1: expected S, Y or Z parameters of a one-port, got H",
  ],
  [
    "a keyword in the first version",
    HEAD + "[Network Data]\n1 0 0\n",
    "line 2: expected data (keywords need [Version] 2.0 as the first line), got [network data]",
  ],
  [
    "keywords before the version",
    "[Number of Ports] 1\n",
    "line 1: expected [Version] 2.0 before any other keyword, got [number of ports]",
  ],
  [
    "a letter outside ASCII in the data",
    HEAD + "1 0 0\u00B0\n",
    'line 2: expected ASCII characters outside comments, got "\u00B0"',
  ],
  [
    "an open keyword",
    "[Version 2.0\n",
    'line 1: expected a keyword closed by ], got "[Version 2.0"',
  ],
  [
    "an unknown version",
    SECOND.replace("2.0", "3.0"),
    'line 1: expected [Version] 2.0 or 2.1, got "3.0"',
  ],
  [
    "no option line",
    SECOND.replace(/#.*\n/, ""),
    "line 2: expected an option line beginning with # after [Version], got [number of ports]",
  ],
  [
    "three ports",
    SECOND.replace("Ports] 2", "Ports] 3"),
    "line 3: expected [Number of Ports] 1 or 2, got 3",
  ],
  [
    "half a port",
    SECOND.replace("Ports] 2", "Ports] 1.5"),
    'line 3: expected [Number of Ports] and a whole number >= 1, got "1.5"',
  ],
  [
    "another number of ports than its name says",
    SECOND,
    "line 3: expected [Number of Ports] 1, as the file is called, got 2",
    { name: "coil.s1p" },
  ],
  [
    "no order of a two-port",
    SECOND.replace(/\[Two-Port.*\n/, ""),
    "line 5: expected [Two-Port Data Order] before [Network Data], got none",
  ],
  [
    "an order it cannot have",
    SECOND.replace("12_21", "22_11"),
    'line 4: expected [Two-Port Data Order] 12_21 or 21_12, got "22_11"',
  ],
  [
    "a keyword twice",
    SECOND.replace("[Network Data]", "[Number of Ports] 2\n[Network Data]"),
    "line 6: expected [Number of Ports] once, got it again after line 3",
  ],
  [
    "a keyword that does not exist",
    SECOND.replace("[Network Data]", "[Impedance] 50\n[Network Data]"),
    "line 6: expected one of [Number of Ports], [Two-Port Data Order], [Number of Frequencies], [Number of " +
    "Noise Frequencies], [Reference], [Matrix Format], [Network Data], got [impedance]",
  ],
  [
    "mixed modes",
    SECOND.replace("[Network Data]", "[Mixed-Mode Order] D1,2 C1,2\n[Network Data]"),
    "line 6: expected single-ended ports (mixed-mode data are not read; write the file single-ended), got " +
    "[Mixed-Mode Order]",
  ],
  [
    "one reference of two",
    SECOND.replace("[Network Data]", "[Reference] 50\n[Network Data]"),
    "line 6: expected [Reference] and 2 resistances > 0 ohm, got 1 value",
  ],
  [
    "data without [Network Data]",
    SECOND.replace("[Network Data]\n", ""),
    'line 6: expected a keyword before the data, or [Network Data], got "100 11 1 12 2 21 3 22 4"',
  ],
  [
    "fewer frequencies than declared",
    SECOND.replace("Frequencies] 1", "Frequencies] 2"),
    "line 8: expected 2 frequency points as declared, got 1",
  ],
  [
    "more frequencies than declared",
    SECOND.replace("[End]", "200 11 1 12 2 21 3 22 4\n[End]"),
    "line 8: expected 1 frequency point as declared, got 2",
  ],
  ["no end", SECOND.replace("[End]\n", ""), "line 8: expected [End], got the end of the file"],
  [
    "something after the end",
    SECOND + "200 11 1 12 2 21 3 22 4\n",
    'line 9: expected nothing after [End], got "200 11 1 12 2 21 3 22 4"',
  ],
  [
    "an open information block",
    SECOND.replace("[Network Data]", "[Begin Information]\n[Network Data]"),
    "line 6: expected [End Information] after [Begin Information], got none",
  ],
  [
    "noise data that were not declared",
    SECOND.replace("[End]", "[Noise Data]\n150 1 0.5 0 12\n[End]"),
    "line 8: expected [Number of Noise Frequencies] before [Network Data], got none",
  ],
  [
    "no noise data though declared",
    SECOND.replace("[Network Data]", "[Number of Noise Frequencies] 1\n[Network Data]"),
    "line 9: expected [Noise Data] with 1 line, got [End]",
  ],
];

Deno.test("readTouchstone says of a bad file on which line what was expected", () => {
  for (const [what, text, message, options = {}] of BAD_FILES) {
    let found = "no error";
    try {
      readTouchstone(text, options);
    } catch (error) {
      assert(error instanceof SyntaxError, `${what}: ${String(error)}`);
      found = error.message;
    }
    assertEquals(found, `Cannot read ${options.name ?? "the network file"}: ${message}`, what);
  }
});
