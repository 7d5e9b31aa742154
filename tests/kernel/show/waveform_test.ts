import { waveform } from "../../../kernel/show/waveform.ts";
import { assert, assertEquals } from "../../assert.ts";

Deno.test("waveform: voltages and currents in panels of their own, time from zero with its unit", () => {
  const period = 200e-12;
  const time = Array.from({ length: 41 }, (_, i) => 5e-9 + period * i / 40);
  const wave = (k: number) => time.map((t) => Math.cos(2 * Math.PI * k * t / period));
  const { bundle } = waveform({
    title: "One period",
    description: "Invented",
    time,
    traces: [
      { name: "tank", unit: "V", values: wave(1) },
      { name: "source", unit: "V", values: wave(2) },
      { name: "drain", unit: "A", values: wave(1).map((v) => 1e-3 * v) },
    ],
  });
  const html = String(bundle["text/html"]);
  assertEquals(html.match(/<svg [^>]*role="img"/g)?.length, 2);
  for (const label of ["time, ps", "voltage, V", "current, mA"]) {
    assert(html.includes(`>${label}<`));
  }
  assert(bundle["text/plain"].includes("- time: 0 s to 200 ps"));
  assert(bundle["text/plain"].includes("- drain: -1 mA to 1 mA"));
});
