import { sweepChart, type SweepChartOptions } from "../../../kernel/show/sweep_chart.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";

const current = [1e-4, 2e-4, 5e-4, 1e-3, 2e-3, 5e-3];
const options: SweepChartOptions = {
  title: "Amplitude and phase noise",
  description: "Invented values for the test",
  x: current,
  xLabel: "programmed current",
  xUnit: "A",
  log: true,
  series: [
    { name: "amplitude", y: current.map((i) => 300 * i), unit: "V" },
    {
      name: "phase noise",
      y: current.map((_, k) => k === 0 ? null : -100 - k),
      unit: "dBc/Hz",
      limit: { at: -102, label: "mask" },
    },
  ],
  bands: [{ to: 1e-3, label: "current-limited" }, { from: 1e-3, label: "voltage-limited" }],
  marks: [{ at: 1e-3, label: "knee" }, { at: 9e-4, label: "recommended" }, { at: 1, label: "far" }],
};

function texts(html: string): string[] {
  return [...html.matchAll(/<text[^>]*>([^<]*)</g)].map(([, text]) => text!);
}

Deno.test("sweepChart: one panel for each vertical axis, with units on every axis", () => {
  const html = String(sweepChart(options).bundle["text/html"]);
  assertEquals(html.match(/<svg [^>]*role="img"/g)?.length, 2);
  const shown = texts(html);
  for (const label of ["programmed current, mA", "amplitude, V", "phase noise, dBc/Hz", "mask"]) {
    assert(shown.includes(label), label);
  }
  assertEquals(shown.filter((text) => text === "programmed current, mA").length, 1);
});

Deno.test("sweepChart: names bands and marks, and reads the curves off at the marks", () => {
  const { bundle } = sweepChart(options);
  const shown = texts(String(bundle["text/html"]));
  for (const label of ["current-limited", "voltage-limited", "○ knee", "◇ recommended"]) {
    assert(shown.includes(label), label);
  }
  const lines = bundle["text/plain"].split("\n");
  // On the grid the curve's own value; between, straight in the logarithm of the current.
  assert(lines.includes("- knee at 1 mA: amplitude 300 mV, phase noise -103.0 dBc/Hz"));
  const share = Math.log(9e-4 / 5e-4) / Math.log(1e-3 / 5e-4);
  const millivolts = 150 + share * 150;
  assert(
    lines.some((line) =>
      line.startsWith(`- recommended at 900 uA: amplitude ${Number(millivolts.toPrecision(4))} mV`)
    ),
  );
  assert(lines.includes("- far at 1 A: outside the range drawn"));
  assert(lines.includes("- programmed current: 100 uA to 5 mA"));
});

Deno.test("sweepChart: labels of marks and bands neither cover each other nor leave the drawing", () => {
  const marks = [1e-3, 1.05e-3, 1.1e-3, 4.9e-3].map((at, i) => ({ at, label: `mark number ${i}` }));
  const html = String(sweepChart({ ...options, marks }).bundle["text/html"]);
  const boxes = [...html.matchAll(/<g ([^>]*)><text([^>]*)>([○◇□△] mark[^<]*)</g)].map(
    ([, group, own, text]) => {
      const all = `${group} ${own}`;
      const moves = [...all.matchAll(/translate\(([-\d.]+),([-\d.]+)\)/g)];
      const x = moves.reduce((sum, [, dx]) => sum + Number(dx), 0);
      const y = moves.reduce((sum, [, , dy]) => sum + Number(dy), 0);
      const width = text!.length * 7;
      const left = all.includes('text-anchor="end"')
        ? x - width
        : all.includes('text-anchor="start"')
        ? x
        : x - width / 2;
      return { left, right: left + width, y };
    },
  );
  assertEquals(boxes.length, 4);
  boxes.forEach((a, i) =>
    boxes.slice(i + 1).forEach((b) =>
      assert(a.right <= b.left || b.right <= a.left || Math.abs(a.y - b.y) >= 13)
    )
  );
  for (const { left, right } of boxes) assert(left >= 0 && right <= 600);
});

Deno.test("sweepChart: same input, same bytes", () => {
  assertEquals(sweepChart(options).bundle, sweepChart(options).bundle);
});

Deno.test("sweepChart: an axis that cannot be drawn is refused", () => {
  assertThrows(
    () => sweepChart({ ...options, x: [1, 1, 2, 3, 4, 5] }),
    RangeError,
    /x must be finite and ascending, got 1 after 1/,
  );
  assertThrows(
    () => sweepChart({ ...options, x: [0, 1, 2, 3, 4, 5] }),
    RangeError,
    /x must be > 0 on a logarithmic axis, got 0/,
  );
  assertThrows(
    () => sweepChart({ ...options, x: [1, 2], series: [{ name: "a", y: [1] }] }),
    TypeError,
    /"a": y must have as many values as x \(2\), got 1/,
  );
});

Deno.test("sweepChart: no coordinate of a gap or of missing values is NaN", () => {
  const html = String(
    sweepChart({ ...options, series: [{ name: "none", y: current.map(() => NaN), unit: "V" }] })
      .bundle["text/html"],
  );
  assert(!html.includes("NaN"));
});
