import { shareChart } from "../../../kernel/show/share_chart.ts";
import { assert, assertEquals, assertThrows } from "../../assert.ts";

const base = {
  title: "Noise by device",
  description: "Invented shares for the test",
  x: [1e-3, 2e-3, 3e-3, 4e-3],
  xLabel: "current",
  xUnit: "A",
};
const shares = [
  { name: "tank", values: [0.5, 0.4, 0.3, 0.2] },
  { name: "pair", values: [0.495, 0.595, 0.695, 0.795] },
  { name: "mirror", values: [0.005, 0.005, 0.005, 0.005] },
];

Deno.test("shareChart: names wide areas on the drawing and every share in the key", () => {
  const html = String(shareChart({ ...base, shares }).bundle["text/html"]);
  const onDrawing = [...html.matchAll(/<text[^>]*>([a-z]+)</g)].map(([, text]) => text);
  assertEquals(onDrawing.sort(), ["pair", "tank"]);
  const key = /<p class="key".*?<\/p>/s.exec(html)![0];
  for (const { name } of shares) assert(key.includes(name), name);
});

Deno.test("shareChart: plain text gives the shares at both ends and at marks", () => {
  const lines = shareChart({ ...base, shares, marks: [{ at: 2e-3, label: "chosen" }] })
    .bundle["text/plain"].split("\n");
  assert(lines.includes("- tank: 50 % at the left, 20 % at the right"));
  assert(lines.includes("- chosen at 2 mA: tank 40 %, pair 59.5 %, mirror 0.5 %"));
});

Deno.test("shareChart: shares that do not add up to 1, or are negative, are refused", () => {
  assertThrows(
    () => shareChart({ ...base, shares: shares.slice(0, 2) }),
    RangeError,
    /at value 1 they must add up to 1 within 0.000001, got 0.995/,
  );
  assertThrows(
    () =>
      shareChart({
        ...base,
        shares: [{ name: "a", values: [2, 1, 1, 1] }, { name: "b", values: [-1, 0, 0, 0] }],
      }),
    RangeError,
    /share "b": value 1 must be >= 0, got -1/,
  );
  assertThrows(
    () => shareChart({ ...base, shares: [{ name: "a", values: [1] }] }),
    TypeError,
    /as many values as x \(4\), got 1/,
  );
});
