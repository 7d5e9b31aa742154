import { join } from "node:path";
import { assert, assertEquals } from "../assert.ts";
import { FAULTY, inFolder, run, TEMPLATES } from "./_run.ts";

Deno.test("begin, filled in by hand, gives a report", async () => {
  await inFolder("", async (folder) => {
    const begun = await run(["begin", "designs/my_buoy"], { cwd: folder });
    assertEquals([begun.status, begun.err], [0, ""]);
    assert(begun.out.includes("designs/my_buoy/rev_a.yaml"), begun.out);
    assert(begun.out.includes("author, review date and 3 choices"), begun.out);
    const design = join(folder, "designs", "my_buoy");
    const names = [...Deno.readDirSync(design)].map(({ name }) => name).sort();
    assertEquals(names, ["illustrative_65nm.yaml", "rev_a.yaml", "revision.schema.json"]);
    const blank = await Deno.readTextFile(join(design, "rev_a.yaml"));
    assert(blank.includes('\ndesign: "My buoy"\n'));

    const unfilled = await run(["report", "designs/my_buoy/rev_a.yaml", "--out", "out"], {
      cwd: folder,
    });
    assertEquals(unfilled.status, 2);
    assertEquals(unfilled.err.match(/missing choice/g)?.length, 3, unfilled.err);

    const filled = blank.replace("author:", "author: A. Tester")
      .replace(/review_date:.*/, "review_date: 2026-11-16")
      .replace(
        '# supply_voltage: { value: "", reason: ""',
        'supply_voltage: { value: "1 V", reason: "a"',
      )
      .replace(
        '# quality_factor: { value: "", reason: ""',
        'quality_factor: { value: "12", reason: "b"',
      )
      .replace(
        '# topology: { value: "", reason: ""',
        'topology: { value: "nmos_pair", reason: "c"',
      );
    await Deno.writeTextFile(join(design, "rev_a.yaml"), filled);
    const report = await run(["report", "designs/my_buoy/rev_a.yaml", "--out", "out"], {
      cwd: folder,
    });
    assertEquals(report.status, 0, report.err);
    assert(report.out.includes("4 verdicts: 4 met"), report.out);
  });
});

Deno.test("begin never overwrites: neither a first revision nor a card", async () => {
  await inFolder("", async (folder) => {
    await Deno.writeTextFile(join(folder, "illustrative_65nm.yaml"), "mine");
    const first = await run(["begin", ".", "swing"], { cwd: folder });
    assertEquals(first.status, 0, first.err);
    assertEquals(await Deno.readTextFile(join(folder, "illustrative_65nm.yaml")), "mine");
    await Deno.writeTextFile(join(folder, "rev_a.yaml"), "mine too");
    const second = await run(["begin", ".", "swing"], { cwd: folder });
    assertEquals(second.status, 2);
    assert(
      /rev_a\.yaml is there already; copy it to the next revision\n$/.test(second.err),
      second.err,
    );
    assertEquals(await Deno.readTextFile(join(folder, "rev_a.yaml")), "mine too");
  });
});

Deno.test("begin writes nothing when a template's first cell fails", async () => {
  await inFolder("", async (folder) => {
    const { status, err } = await run(["begin", "new", "first_cell_throws"], {
      cwd: folder,
      templates: FAULTY,
    });
    assertEquals(status, 3);
    assert(err.startsWith("first_cell_throws.ipynb cell 1 line 1: no sheet today\n"), err);
    assertEquals([...Deno.readDirSync(folder)].map(({ name }) => name).sort(), [
      "card.yaml",
      "rev.yaml",
    ]);
  });
});

Deno.test("begin refuses a folder that is a file", async () => {
  await inFolder("", async (folder) => {
    const { status, err } = await run(["begin", "rev.yaml"], { cwd: folder, templates: TEMPLATES });
    assertEquals(status, 2);
    assert(/^Cannot write to .*: .*rev\.yaml is a file\n$/.test(err), err);
  });
});
