import { assertThrows } from "../../assert.ts";
import { assemble } from "../../../lib/circuit/circuit.ts";
import type { CircuitElement } from "../../../lib/circuit/element.ts";
import { tanhDriver, tankElements } from "./_examples.ts";

const resistor = (name: string, nodes: readonly [string, string], resistance = 1e3) =>
  ({ kind: "resistor", name, nodes, resistance, temperature: 300 }) satisfies CircuitElement;
const capacitor = (name: string, nodes: readonly [string, string], capacitance = 1e-12) =>
  ({ kind: "capacitor", name, nodes, capacitance }) satisfies CircuitElement;
const inductor = (
  name: string,
  nodes: readonly [string, string],
  { inductance = 1e-9, seriesResistance = 0 } = {},
) =>
  ({
    kind: "inductor",
    name,
    windings: [{ nodes, inductance, seriesResistance }],
    coupling: 0,
    temperature: 300,
  }) satisfies CircuitElement;
const current = (name: string, nodes: readonly [string, string], value = 1e-3) =>
  ({ kind: "current", name, nodes, current: value }) satisfies CircuitElement;
const potential = (name: string, node: string, value = 1) =>
  ({ kind: "potential", name, node, potential: value }) satisfies CircuitElement;

/** One fault each, added to a sound tank, and the message it must give. */
const FAULTS: readonly {
  readonly fault: string;
  readonly added: readonly CircuitElement[];
  readonly message: string;
}[] = [
  {
    fault: "a resistance of zero",
    added: [resistor("load", ["a", "ground"], 0)],
    message: "the resistance of load must be > 0 ohm, got 0 ohm",
  },
  {
    fault: "a resistance that is not a number",
    added: [resistor("load", ["a", "ground"], NaN)],
    message: "the resistance of load must be > 0 ohm, got NaN ohm",
  },
  {
    fault: "an infinite resistance",
    added: [resistor("load", ["a", "ground"], Infinity)],
    message: "the resistance of load must be > 0 ohm, got Infinity ohm",
  },
  {
    fault: "a negative capacitance",
    added: [capacitor("load", ["a", "ground"], -1e-12)],
    message: "the capacitance of load must be > 0 F, got -1e-12 F",
  },
  {
    fault: "a negative inductance",
    added: [inductor("choke", ["a", "b"], { inductance: -2e-9 }), resistor("r", ["b", "ground"])],
    message: "the inductance of choke must be > 0 H, got -2e-9 H",
  },
  {
    fault: "a negative series resistance",
    added: [
      inductor("choke", ["a", "b"], { seriesResistance: -1 }),
      resistor("r", ["b", "ground"]),
    ],
    message: "the series resistance of choke must be >= 0 ohm, got -1 ohm",
  },
  {
    fault: "a coupling of one",
    added: [{
      kind: "inductor",
      name: "transformer",
      windings: [
        { nodes: ["a", "ground"], inductance: 1e-9, seriesResistance: 1 },
        { nodes: ["a", "ground"], inductance: 1e-9, seriesResistance: 1 },
      ],
      coupling: 1,
      temperature: 300,
    }],
    message: "the coupling of transformer must be below 1, got 1",
  },
  {
    fault: "a current that is not a number",
    added: [current("bias", ["ground", "a"], NaN)],
    message: "the current of bias must be finite, got NaN A",
  },
  {
    fault: "an infinite potential",
    added: [potential("supply", "b", Infinity)],
    message: "the potential of supply must be finite, got Infinity V",
  },
  {
    fault: "a name used twice",
    added: [resistor("R", ["a", "ground"])],
    message: 'two elements are named "R"',
  },
  {
    fault: "a node held twice",
    added: [potential("one", "b"), potential("other", "b")],
    message: "node b is held twice",
  },
  {
    fault: "ground held",
    added: [potential("one", "ground")],
    message: "node ground is held twice",
  },
  {
    fault: "an island behind capacitors",
    added: [capacitor("in", ["a", "b"]), resistor("r", ["b", "c"]), capacitor("out", ["c", "a"])],
    message: "node b has no path for direct current: only capacitors or current sources reach it",
  },
  {
    fault: "an island that only a current source feeds",
    added: [current("bias", ["ground", "b"]), capacitor("c", ["b", "ground"])],
    message: "node b has no path for direct current: only capacitors or current sources reach it",
  },
  {
    fault: "two lossless inductors in parallel",
    added: [inductor("second", ["a", "ground"])],
    message: "second closes a loop of inductors without any resistance",
  },
  {
    fault: "a lossless loop through a supply",
    added: [potential("supply", "b"), inductor("second", ["b", "a"])],
    message: "second closes a loop of inductors without any resistance",
  },
  {
    fault: "a current source in series with an inductor",
    added: [inductor("choke", ["a", "b"]), current("bias", ["ground", "b"])],
    message:
      "at node b only inductors and current sources meet: a capacitor or a resistor is needed",
  },
  {
    fault: "two inductors in series",
    added: [inductor("one", ["a", "b"]), inductor("two", ["b", "ground"], { seriesResistance: 1 })],
    message:
      "at node b only inductors and current sources meet: a capacitor or a resistor is needed",
  },
];

for (const { fault, added, message } of FAULTS) {
  Deno.test(`assemble() refuses ${fault}`, () => {
    const wording = message.replace(/[().*+?$]/g, "\\$&");
    assertThrows(
      () => assemble([...tankElements(), ...added]),
      RangeError,
      new RegExp(`^Cannot assemble the circuit: ${wording}$`),
    );
  });
}

Deno.test("assemble() takes what looks alike but is sound", () => {
  const sound: readonly (readonly CircuitElement[])[] = [
    // A second inductor with loss in parallel; a series pair with a capacitor between.
    [inductor("second", ["a", "ground"], { seriesResistance: 1 })],
    [
      inductor("choke", ["a", "b"]),
      capacitor("c", ["b", "ground"]),
      resistor("r", ["b", "ground"]),
    ],
    // A node behind a capacitor with a resistor to ground; a device is a path for direct current.
    [capacitor("in", ["a", "b"]), resistor("r", ["b", "ground"])],
    [
      capacitor("in", ["a", "b"]),
      tanhDriver("second driver", ["b", "ground"], { current: 1e-3, width: 1 }),
    ],
    // Negative coupling, a current of zero, a potential of zero.
    [current("off", ["ground", "a"], 0), potential("control", "b", 0), resistor("r", ["a", "b"])],
  ];
  for (const added of sound) assemble([...tankElements(), ...added]);
});
