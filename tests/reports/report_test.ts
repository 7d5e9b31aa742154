import { Ajv } from "ajv";
import { join } from "node:path";
import schema from "../../reports/results.schema.json" with { type: "json" };
import { assert, assertEquals } from "../assert.ts";
import { EXAMPLE, inFolder, run } from "./_run.ts";

async function readOut(folder: string, name: string): Promise<string> {
  return await Deno.readTextFile(join(folder, name));
}

Deno.test("report writes page and results with one input hash, and prints the verdicts", async () => {
  await inFolder(EXAMPLE, async (folder) => {
    const { status, out, err } = await run(["report", "rev.yaml", "--out", "out"], { cwd: folder });
    assertEquals([status, err], [0, "swing: 3 cells run\nquality: 2 cells run\n"]);
    assertEquals(
      out,
      `template  verdict            value          limit                  margin  state  note
swing     swing              720 mV         at most 800 mV         80 mV   met
swing     startup loop gain  2.5            at least 2             0.5     met    slow, 125 °C
quality   quality factor     12.5           at least 10            2.5     met
quality   noise              -110.0 dBc/Hz  at most -105.0 dBc/Hz  5.0 dB  met    1 MHz offset

4 verdicts: 4 met
Report:  out/index.html
Results: out/results.json
`,
    );
    const results = JSON.parse(await readOut(folder, "out/results.json"));
    assertEquals(new Ajv().validate(schema, results), true);
    const page = await readOut(folder, "out/index.html");
    assert(page.includes(results.inputHash), "the page carries the hash of the results");
    assertEquals(results.figures, [{ template: "swing", name: "supply", value: 1, unit: "V" }]);
    assertEquals(results.stresses.map(({ device }: { device: string }) => device), ["M1"]);
    // Readers other than the person who ran it may read the report.
    const { mode } = await Deno.stat(join(folder, "out", "index.html"));
    if (Deno.build.os !== "windows") assertEquals(mode! & 0o777, 0o644);
  });
});

Deno.test("report gives the same bytes for the same input, wherever it lies", async () => {
  const runs: string[][] = [];
  for (const place of ["here", "another place/deeper"]) {
    await inFolder(EXAMPLE, async (folder) => {
      const nested = join(folder, place);
      await Deno.mkdir(nested, { recursive: true });
      for (const name of ["rev.yaml", "card.yaml"]) {
        await Deno.copyFile(join(folder, name), join(nested, name));
      }
      const { status } = await run(["report", `${place}/rev.yaml`, "--out", "out"], {
        cwd: folder,
      });
      assertEquals(status, 0);
      runs.push([
        await readOut(folder, "out/results.json"),
        await readOut(folder, "out/index.html"),
      ]);
      assert(!runs.at(-1)!.join("").includes(folder), "no path of this machine is in the report");
    });
  }
  assertEquals(runs[0], runs[1]!);
});

Deno.test("report exits with 1 when a verdict is missed or not run, and replaces an older report", async () => {
  const text = EXAMPLE.replace('"1.0 V"', '"1.2 V"').replace("nmos_pair,", "pmos_pair,");
  await inFolder(text, async (folder) => {
    await Deno.mkdir(join(folder, "out"));
    for (const name of ["index.html", "other.txt"]) {
      await Deno.writeTextFile(join(folder, "out", name), "older");
    }
    const { status, out } = await run(["report", "rev.yaml", "--out=out"], { cwd: folder });
    assertEquals(status, 1);
    assert(/^swing +swing +864 mV +at most 800 mV +-64 mV +missed$/m.test(out), out);
    assert(/^quality +noise +- +at most -105.0 dBc\/Hz +- +not run +1 MHz offset$/m.test(out), out);
    assert(out.includes("4 verdicts: 2 met, 1 missed, 1 not run"), out);
    const names = [...Deno.readDirSync(join(folder, "out"))].map(({ name }) => name).sort();
    assertEquals(names, ["index.html", "other.txt", "results.json"]);
    assertEquals(await readOut(folder, "out/other.txt"), "older");
    assert(await readOut(folder, "out/index.html") !== "older");
  });
});

Deno.test("report exits with 0 for a waiver on its last day and with 1 a day later", async () => {
  const missed = EXAMPLE.replace('"1.0 V"', '"1.2 V"');
  const waiver = (expires: string) =>
    `${missed}waivers:\n  - { template: swing, verdict: swing, reason: known, by: lead, expires: ${expires} }\n`;
  await inFolder(waiver("2026-11-16"), async (folder) => {
    const { status, out } = await run(["report", "rev.yaml", "--out", "out"], { cwd: folder });
    assertEquals(status, 0);
    assert(/-64 mV +waived$/m.test(out), out);
    const results = JSON.parse(await readOut(folder, "out/results.json"));
    assertEquals(results.verdicts[0].state, "waived");
    assertEquals(new Ajv().validate(schema, results), true);
  });
  await inFolder(waiver("2026-11-15"), async (folder) => {
    const { status, out } = await run(["report", "rev.yaml", "--out", "out"], { cwd: folder });
    assertEquals(status, 1);
    assert(/missed +the waiver by lead ended on 2026-11-15$/m.test(out), out);
  });
});

Deno.test("report puts its output under out/ by folder and revision unless told otherwise", async () => {
  await inFolder(EXAMPLE, async (folder) => {
    const { status, out } = await run(["report", join(folder, "rev.yaml")], { cwd: folder });
    assertEquals(status, 0);
    const place = join("out", folder.split("/").at(-1)!, "rev");
    assert(out.includes(`Report:  ${join(place, "index.html")}`), out);
    assert(Deno.statSync(join(folder, place, "results.json")).isFile);
  });
});
