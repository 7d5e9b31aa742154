import { schematic } from "../../../kernel/show/schematic.ts";
import { crossCoupledPair } from "../../../lib/circuit/cross_coupled_pair.ts";
import type { Schematic, SchematicSymbol, SymbolKind } from "../../../lib/circuit/schematic.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";
import { design } from "./_bias_samples.ts";

type Point = [number, number];

const FULL = { ...design, mirrorCapacitance: 10e-12 };
const PLAIN = { ...design, loadCapacitance: 0, tailCapacitance: 0 };
/** As many digits as a value can have. */
const LONG = {
  ...FULL,
  tank: { ...design.tank, inductance: 123.4e-12, capacitance: 123.4e-15 },
  pair: { width: 123.4e-6, length: 60e-9 },
  tail: { width: 123.4e-6 * 1.1, length: 60e-9 },
  loadCapacitance: 123.4e-15,
  tailCapacitance: 123.4e-15,
  current: 0.987e-3,
};

function html(data: Schematic): string {
  return String(schematic(data, { title: "Made for the test" }).bundle["text/html"]);
}

/** Ends of all straight pieces of the drawing, and of the chords of its arcs [px]. */
function pieces(svg: string): [Point, Point][] {
  return [...svg.matchAll(/<path d="([^"]*)"/g)].flatMap(([, d]) => {
    const points = d!.replace(/A[\d.,]+ 0 0 [01] /g, "L").slice(1).split("L").map((pair) =>
      pair.split(",").map(Number) as Point
    );
    return points.slice(1).map((point, k): [Point, Point] => [points[k]!, point]);
  });
}

/** Boxes of all texts, 0.6 of their size wide per character [px]. */
function boxes(svg: string): { text: string; x0: number; x1: number; y0: number; y1: number }[] {
  const size = Number(/font-size="(\d+)"/.exec(svg)![1]);
  return [...svg.matchAll(/<text x="([^"]*)" y="([^"]*)" text-anchor="([^"]*)">([^<]*)</g)].map(
    ([, x, y, anchor, text]) => {
      const width = 0.6 * size * text!.length;
      const x0 = Number(x) - (anchor === "end" ? width : anchor === "middle" ? width / 2 : 0);
      return {
        text: text!,
        x0,
        x1: x0 + width,
        y0: Number(y) - 0.75 * size,
        y1: Number(y) + 0.2 * size,
      };
    },
  );
}

function one(kind: SymbolKind, more: Partial<SchematicSymbol> = {}): Schematic {
  return {
    width: 12,
    height: 8,
    symbols: [{ kind, name: "", at: [6, 4], ...more }],
    wires: [],
    joints: [],
  };
}

Deno.test("schematic: names and values of the pair cover no stroke and no other text", () => {
  for (const values of [FULL, PLAIN, LONG]) {
    const data = crossCoupledPair.schematic(values);
    const svg = html(data);
    const all = boxes(svg);
    assert(all.length > 15, `${all.length} texts`);
    for (const { text, x0, x1, y0, y1 } of all) {
      assert(x0 >= 0 && y0 >= 0, text);
      assert(x1 <= 20 * data.width && y1 <= 20 * data.height, `"${text}" leaves the drawing`);
      for (const [[ax, ay], [bx, by]] of pieces(svg)) {
        const steps = Math.ceil(Math.hypot(bx - ax, by - ay)) + 1;
        for (let k = 0; k <= steps; k++) {
          const [x, y] = [ax + (bx - ax) * k / steps, ay + (by - ay) * k / steps];
          assert(!(x > x0 && x < x1 && y > y0 && y < y1), `"${text}" is crossed at ${x}, ${y}`);
        }
      }
    }
    all.forEach((a, i) =>
      all.slice(i + 1).forEach((b) =>
        assert(a.x1 < b.x0 || b.x1 < a.x0 || a.y1 <= b.y0 || b.y1 <= a.y0, `${a.text}, ${b.text}`)
      )
    );
  }
});

Deno.test("schematic: says itself to those who do not see it, in the page's ink", () => {
  const showable = schematic(crossCoupledPair.schematic(FULL), {
    title: "Pair <N>",
    description: "Tank & pair",
  });
  const page = String(showable.bundle["text/html"]);
  assert(/<svg [^>]*role="img"/.test(page));
  assert(page.includes("<title>Pair &lt;N&gt;</title><desc>Tank &amp; pair. "));
  const svg = page.slice(page.indexOf("<svg"));
  assertEquals(
    [...svg.matchAll(/(?:fill|stroke)="([^"]*)"/g)].map(([, ink]) => ink).filter(
      (ink) => ink !== "none" && ink !== "currentColor",
    ),
    [],
  );
  const lines = showable.bundle["text/plain"].split("\n");
  assertEquals(lines.slice(0, 2), ["Pair <N>", "Tank & pair"]);
  for (
    const line of [
      "- coil, both halves (inductor): 1.2 nH",
      "- tank capacitor (capacitor): 650 fF",
      "- mirror (N transistor): W = 20 um",
      "- reference current (current source): 250 uA",
      "- mirror capacitor (capacitor): 10 pF",
    ]
  ) assert(lines.includes(line), line);
  assertEquals(lines.filter((line) => line.startsWith("- ")).length, 12);
});

Deno.test("schematic: same input, same bytes", () => {
  assertEquals(html(crossCoupledPair.schematic(FULL)), html(crossCoupledPair.schematic(FULL)));
});

Deno.test("schematic: N and P transistors are told apart by bubble and arrow", () => {
  const arrow = (svg: string) => {
    const [tip, ...rest] = /<path d="M([^"]*)" fill/.exec(svg)![1]!.split("L").map((pair) =>
      pair.split(",").map(Number)
    );
    return { tip: tip!, forward: tip![0]! - rest[0]![0]! };
  };
  const [n, p] = [html(one("transistor n")), html(one("transistor p"))];
  assertEquals([n, p].map((svg) => svg.match(/<circle/g)?.length ?? 0), [0, 1]);
  // N: out of the channel, on the lower lead; P: into the channel, on the upper lead.
  assert(arrow(n).forward > 0 && arrow(n).tip[1]! > 80);
  assert(arrow(p).forward < 0 && arrow(p).tip[1]! < 80);
});

Deno.test("schematic: a quarter turn and a mirror put a symbol's ends where its wires meet them", () => {
  const ends = (data: Schematic) =>
    pieces(html(data)).flat().map(([x, y]) => `${x / 20} ${y / 20}`);
  const has = (data: Schematic, ...points: string[]) => {
    const found = ends(data);
    for (const point of points) assert(found.includes(point), `${point} in ${found.join(", ")}`);
  };
  has(one("capacitor"), "6 3", "6 5");
  has(one("resistor", { turn: 1 }), "5 4", "7 4");
  has(one("inductor"), "6 2", "6 6");
  has(one("inductor", { turn: 3 }), "4 4", "8 4");
  has(one("current source", { turn: 2 }), "6 3", "6 5");
  has(one("transistor n"), "5 4", "7 3", "7 5");
  has(one("transistor p", { mirrored: true }), "7 4", "5 3", "5 5");
  // Counter-clockwise: the gate, on the left before, is below.
  has(one("transistor n", { turn: 1 }), "6 5", "5 3", "7 3");
});

Deno.test("schematic: a wire ends at the edge of an open terminal", () => {
  const data = one("label", { name: "out" });
  const found = pieces(html({ ...data, wires: [[[2, 4], [6, 4]]] }));
  assertEquals(found.length, 1);
  const [, [x, y]] = found[0]!;
  assertEquals([x / 20 < 6 && x / 20 > 5.7, y / 20], [true, 4]);
});

Deno.test("schematic: a text with no free place still appears", () => {
  const grid = Array.from({ length: 40 }, (_, k): Point[] => [[0, k / 5], [12, k / 5]]);
  assert(html({ ...one("resistor", { name: "R" }), wires: grid }).includes(">R</text>"));
});

Deno.test("schematic: a sheet without a size is refused", () => {
  assertThrows(
    () => schematic({ ...one("resistor"), height: 0 }, { title: "none" }),
    RangeError,
    /width and height must be > 0, got 12 by 0/,
  );
});
