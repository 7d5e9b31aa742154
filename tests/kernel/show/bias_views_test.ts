import {
  amplitudeChart,
  noiseChart,
  noiseSharesChart,
  tankWaveform,
} from "../../../kernel/show/bias_views.ts";
import { tankResistance } from "../../../lib/circuit/tank_resistance.ts";
import { formatQuantity } from "../../../lib/quantity/format_quantity.ts";
import { assert, assertClose, assertEquals } from "../../assert.ts";
import { deadPoint, deadSweep, design, OFFSET, pageOf, sampleSweep } from "./_bias_samples.ts";

function texts(html: string): string[] {
  return [...html.matchAll(/<text[^>]*>([^<]*)</g)].map(([, text]) => text!);
}

function line(page: string, start: string): string {
  const found = page.split("\n").find((text) => text.startsWith(start));
  assert(found !== undefined, `no line begins with "${start}"`);
  return found!;
}

Deno.test("amplitudeChart: names the regimes in their order and marks the currents", () => {
  const sweep = sampleSweep();
  const recommended = 0.9 * sweep.knee!;
  const page = pageOf(amplitudeChart(sweep, { proposed: 4e-3, recommended }));
  const bands = texts(page).filter((text) =>
    /start|limited|knee$/.test(text) && !/[○◇□]/.test(text)
  );
  assertEquals(bands, ["does not start", "current-limited", "at the knee", "voltage-limited"]);
  for (const mark of ["○ knee", "◇ recommended", "□ proposed"]) assert(texts(page).includes(mark));
  assert(line(page, "- knee at").includes(formatQuantity(sweep.knee!, "A")));
});

Deno.test("amplitudeChart: a regime ends midway between two currents on the logarithmic axis", () => {
  const sweep = sampleSweep();
  const html = String(amplitudeChart(sweep).bundle["text/html"]);
  const rects = [...html.matchAll(/<rect ([^>]*)/g)].map(([, text]) => text!).filter((text) =>
    text.includes("x=")
  );
  const first = rects[0]!;
  const [from, width] = ["x", "width"].map((name) =>
    Number(new RegExp(`\\b${name}="([^"]*)"`).exec(first)![1])
  );
  const change = sweep.points.findIndex(({ regime }) => regime !== "does not start");
  const last = sweep.points.length - 1;
  // The drawn area is 520 px wide from 60 px; the currents are evenly spread in their logarithm.
  assertClose(from!, 60, { rtol: 0, atol: 1e-3 });
  assertClose(width!, 520 * (change - 0.5) / last, { rtol: 0, atol: 0.01 });
});

Deno.test("amplitudeChart: draws the hand line beside the computed curve as far as it is of use", () => {
  const sweep = sampleSweep();
  const resistance = tankResistance(design.tank);
  const values = sweep.points.map(({ current }) => 2 / Math.PI * current * resistance);
  const page = pageOf(amplitudeChart(sweep, { hand: { name: "(2/pi) I R", values } }));
  const amplitudes = sweep.points.flatMap(({ figures }) => figures?.amplitude ?? []);
  const reach = 1.4 * Math.max(...amplitudes);
  assert(Math.max(...values) > reach, "the sample must go past the knee");
  const drawn = values.filter((value) => value <= reach);
  assertEquals(
    line(page, "- (2/pi) I R by hand"),
    `- (2/pi) I R by hand: ${formatQuantity(Math.min(...drawn), "V")} to ${
      formatQuantity(Math.max(...drawn), "V")
    }`,
  );
});

Deno.test("noiseChart: phase noise, figure of merit and slope in panels of their own", () => {
  const sweep = sampleSweep();
  const page = pageOf(noiseChart(sweep, {
    offset: OFFSET,
    exponent: true,
    hand: { name: "Leeson", values: sweep.points.map((_, k) => k === 2 ? NaN : -100 - k) },
  }));
  for (
    const label of ["white phase noise at 1 MHz, dBc/Hz", "figure of merit, dBc/Hz", "△ quietest"]
  ) {
    assert(texts(page).some((text) => text.slice(2) === label.slice(2)), label);
  }
  assertEquals(page.match(/<svg [^>]*role="img"/g)?.length, 3);
  const values = sweep.points.flatMap(({ figures }) => figures?.phaseNoise ?? []);
  assertEquals(
    line(page, "- computed"),
    `- computed: ${formatQuantity(Math.min(...values), "dBc/Hz")} to ${
      formatQuantity(Math.max(...values), "dBc/Hz")
    }`,
  );
  assertEquals(line(page, "- Leeson by hand"), "- Leeson by hand: -109.0 dBc/Hz to -100.0 dBc/Hz");
  const plain = noiseChart(sweep, { offset: OFFSET }).bundle["text/html"];
  assertEquals(String(plain).match(/<svg [^>]*role="img"/g)?.length, 2);
});

Deno.test("noiseSharesChart: merges the devices of a part and draws only currents with an orbit", () => {
  const sweep = sampleSweep();
  const page = pageOf(noiseSharesChart(sweep));
  const alive = sweep.points.filter(({ figures }) => figures !== undefined);
  const [first, last] = [alive[0]!, alive[alive.length - 1]!];
  const share = (point: typeof first, device: RegExp) =>
    formatQuantity(
      point.figures!.shares.filter((one) => device.test(one.device))
        .reduce((sum, one) => sum + one.share, 0),
      "%",
      { digits: 3 },
    );
  for (
    const [part, device] of [["tank", /^tank loss/], ["pair", /^pair/], ["tail", /^tail$/]] as const
  ) {
    assertEquals(
      line(page, `- ${part}: `),
      `- ${part}: ${share(first, device)} at the left, ${share(last, device)} at the right`,
    );
  }
  assert(line(page, "- programmed current").includes(formatQuantity(first.current, "A")));
});

Deno.test("noiseSharesChart: a source of no part is not lost", () => {
  const sweep = sampleSweep();
  const points = sweep.points.map((point) => ({
    ...point,
    oscillator: { ...point.oscillator, parts: { tank: point.oscillator.parts["tank"]! } },
  }));
  const page = pageOf(noiseSharesChart({ ...sweep, points }));
  assert(line(page, "- other: ") !== "");
});

Deno.test("bias charts: a sweep without any orbit says so and shows no number that is none", () => {
  const sweep = deadSweep(4);
  assert(pageOf(amplitudeChart(sweep, { proposed: 2e-3 })).includes("computed n/a"));
  assert(pageOf(noiseChart(sweep, { offset: OFFSET, exponent: true })).includes("no values"));
  const shares = pageOf(noiseSharesChart(sweep));
  assert(shares.includes("nothing to draw, an orbit exists at 0 of the currents"));
});

Deno.test("tankWaveform: starts at a maximum of the differential voltage and covers one period", () => {
  const point = sampleSweep().points[6]!;
  const page = pageOf(tankWaveform(point));
  assert(line(page, "- time").includes(formatQuantity(point.orbit!.period, "s")));
  for (const name of ["plus", "minus", "tail", "drain of pair plus", "drain of tail"]) {
    assert(line(page, `- ${name}: `).includes(" to "), name);
  }
  const paths = [...page.matchAll(/<path [^>]*\bd="(M[^"]*)"/g)].map(([, d]) => d!)
    .filter((d) => d.split("L").length > 100).map((d) =>
      d.slice(1).split("L").map((pair) => pair.split(",").map(Number))
    );
  // Two outputs, the tail node and three drain currents, 201 points each.
  assertEquals(paths.map((d) => d.length), Array.from({ length: 6 }, () => 201));
  const [plus, minus] = [paths[0]!, paths[1]!];
  // On the page y runs down; the fundamental of plus less minus is largest at time zero.
  let [cosine, sine] = [0, 0];
  for (let k = 0; k < 200; k++) {
    const difference = minus[k]![1]! - plus[k]![1]!;
    cosine += difference * Math.cos(2 * Math.PI * k / 200);
    sine += difference * Math.sin(2 * Math.PI * k / 200);
  }
  assert(cosine > 0);
  assertClose(sine / cosine, 0, { rtol: 0, atol: 1e-4 });
});

Deno.test("tankWaveform: a point without an orbit says why", () => {
  assertEquals(
    tankWaveform(deadPoint(1e-3)).bundle["text/plain"],
    "Waveforms over one period at 1 mA: there is no orbit (there is no operating point)",
  );
});
