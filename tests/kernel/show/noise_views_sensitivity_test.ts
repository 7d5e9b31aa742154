import {
  foldingsTable,
  sensitivityChart,
  sensitivityTable,
} from "../../../kernel/show/noise_views_sensitivity.ts";
import { sensitivityView } from "../../../lib/noise/sensitivity_view.ts";
import { assert, assertEquals } from "../../assert.ts";
import { pageOf } from "./_bias_samples.ts";
import { sampleFound, samplePoint } from "./_noise_samples.ts";

function views() {
  const { orbit } = sampleFound();
  return samplePoint().oscillator.circuit.sources
    .filter(({ device, color }) => ["pair plus", "tail"].includes(device) && color === "white")
    .map((source) => sensitivityView(orbit, source));
}

Deno.test("sensitivityChart: the waveform and a panel for each source", () => {
  const page = pageOf(
    sensitivityChart({
      orbit: sampleFound().orbit,
      oscillator: samplePoint().oscillator,
      views: views(),
    }),
  );
  assertEquals(page.match(/<svg [^>]*role="img"/g)?.length, 3);
  for (const name of ["pair plus, plain", "tail, effective", "tank voltage", "s/C"]) {
    assert(page.includes(name), name);
  }
});

Deno.test("sensitivityTable: a mean of rounding is zero, a ratio is what it is", () => {
  const [pair] = views();
  const odd = { ...pair!, mean: { ...pair!.mean, effective: 1e-9 * pair!.rms.effective } };
  const page = pageOf(sensitivityTable([odd]));
  const row = page.split("\n").find((line) => line.startsWith("pair plus"))!;
  assert(/ 0(\.0+)?$/.test(row), row);
  const ratio = pair!.rms.effective / pair!.rms.sensitivity;
  assert(row.includes(ratio.toPrecision(3)), row);
});

Deno.test("foldingsTable: shares of the bands add up to a hundred per cent", () => {
  const all = views();
  const page = pageOf(foldingsTable(all));
  for (const view of all) {
    const row = page.split("\n").find((line) => line.startsWith(`${view.device}, `))!;
    const numbers = row.slice(`${view.device}, ${view.label}`.length).trim().split(/\s+/).map(
      Number,
    );
    assertEquals(numbers.length, 6);
    const sum = numbers.reduce((total, value) => total + value, 0);
    assert(Math.abs(sum - 100) < 0.35, `${row}: ${sum}`);
  }
});
