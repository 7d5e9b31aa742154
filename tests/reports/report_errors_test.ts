import { join } from "node:path";
import { Stopped } from "../../reports/command.ts";
import { assert, assertEquals } from "../assert.ts";
import {
  CARD,
  EXAMPLE,
  FAULTY,
  faultyRevision,
  inFolder,
  previousIntact,
  run,
  writePrevious,
} from "./_run.ts";

const UNTOUCHED = "No report was written; a previous one is as it was\n";

/** Reports a revision over a previous report, which must stay as it was. */
async function failing(
  revision: string,
  { templates, card, cellTimeout }: {
    readonly templates?: string;
    readonly card?: string;
    readonly cellTimeout?: number;
  } = {},
): Promise<{ readonly status: number; readonly err: string }> {
  let outcome = { status: -1, err: "" };
  await inFolder(revision, async (folder) => {
    await writePrevious(folder);
    if (card !== undefined) await Deno.writeTextFile(join(folder, "card.yaml"), card);
    const { status, out, err } = await run(["report", "rev.yaml", "--out", "out"], {
      cwd: folder,
      ...(templates === undefined ? {} : { templates }),
      ...(cellTimeout === undefined ? {} : { cellTimeout }),
    });
    assertEquals(out, "", "nothing is printed as a result");
    assert(await previousIntact(folder), "the previous report is intact");
    assert(!/\bat .*\.ts:\d+/.test(err), `no stack trace: ${err}`);
    outcome = { status, err };
  });
  return outcome;
}

/** Lines that are about the input, without progress. */
function complaints(err: string): string[] {
  return err.split("\n").filter((line) => line !== "" && !/: \d+ cells? run$/.test(line));
}

Deno.test("report lists everything wrong with a revision at once and exits with 2", async () => {
  const text = EXAMPLE.replace('"1.0 V"', '"1 mA"').replace("quality_factor:", "qualty_factor:")
    .replace("fields:\n", 'fields:\n  knee_multiple: { value: "1.1", reason: more }\n')
    .replace("value: nmos_pair, reason: fastest", "value: nmos_pair")
    .replace("2026-11-16", "2026-13-16");
  const { status, err } = await failing(text);
  assertEquals(status, 2);
  assertEquals(complaints(err), [
    'rev.yaml:4:14: review_date: expected a date of the calendar such as 2026-11-16, got "2026-13-16"',
    "rev.yaml:7:1: missing choice quality_factor (asked by quality: Which quality factor has the tank?): " +
    'write quality_factor: { value: "1", reason: "..." }',
    "rev.yaml:8:3: knee_multiple: fixed at 0.9 by swing (house rule); remove it from the revision",
    'rev.yaml:9:28: supply_voltage: expected a voltage such as "1.0 V", got "1 mA" (a current)',
    'rev.yaml:10:3: unknown field qualty_factor, perhaps "quality_factor"',
    'rev.yaml:11:3: topology: a choice needs a reason: add reason: "..."',
  ]);
});

Deno.test("report refuses a value out of bounds", async () => {
  const { status, err } = await failing(EXAMPLE.replace('"1.0 V"', '"1.6 V"'));
  assertEquals(status, 2);
  assertEquals(complaints(err), [
    'rev.yaml:8:28: supply_voltage: must be from 600 mV to 1.4 V, got "1.6 V"',
  ]);
});

Deno.test("report refuses unreadable YAML, an unknown template and a wrong card before any kernel", async () => {
  const broken = await failing(EXAMPLE.replace("{ value: 12.5", "{ value: 12.5 }}"));
  assertEquals(broken.status, 2);
  assert(/^rev\.yaml:9:\d+: cannot read as YAML: /.test(broken.err), broken.err);
  const unknown = await failing(EXAMPLE.replace("[swing, quality]", "[swing, qualty]"));
  assertEquals(unknown.status, 2);
  assertEquals(complaints(unknown.err), [
    'rev.yaml:6:20: templates: there is no template "qualty", perhaps "quality"; known are quality, swing',
  ]);
});

Deno.test("report refuses a wrong card at its own line, together with the revision's faults", async () => {
  const { status, err } = await failing(EXAMPLE.replace('"1.0 V"', '"1 mA"'), {
    card: CARD.replace("nominal:", "nominel:"),
  });
  assertEquals(status, 2);
  const lines = complaints(err);
  assert(
    lines.some((line) =>
      /^card\.yaml:\d+:\d+: supply: unknown key "nominel", perhaps "nominal"$/.test(line)
    ),
    err,
  );
  assert(lines.some((line) => line.startsWith("rev.yaml:8:28: supply_voltage:")), err);
});

Deno.test("report names a revision or a card that is not there", async () => {
  await inFolder(EXAMPLE, async (folder) => {
    const { status, err } = await run(["report", "nothing.yaml", "--out", "out"], { cwd: folder });
    assertEquals([status, err], [
      2,
      `nothing.yaml:1:1: cannot read ${join(folder, "nothing.yaml")}: there is no such file\n`,
    ]);
    await Deno.remove(join(folder, "card.yaml"));
    const second = await run(["report", "rev.yaml", "--out", "out"], { cwd: folder });
    assertEquals([second.status, second.err], [
      2,
      `rev.yaml:5:7: cannot read ${join(folder, "card.yaml")}: there is no such file\n`,
    ]);
  });
});

Deno.test("report refuses a waiver of a verdict that its template does not give", async () => {
  const { status, err } = await failing(
    `${EXAMPLE}waivers:\n  - { template: swing, verdict: swimg, reason: x, by: y, expires: 2027-01-01 }\n`,
  );
  assertEquals(status, 2);
  assertEquals(complaints(err), [
    'rev.yaml:12:33: waivers: swing gives no verdict "swimg", perhaps "swing"',
  ]);
});

const FAULTS: readonly (readonly [template: string, wording: RegExp])[] = [
  ["throws", /^throws\.ipynb cell 3 line 3: the tank has no loss1$/],
  ["dies", /^dies\.ipynb cell 2: the kernel ended by itself with status 5/],
  ["no_sheet", /^no_sheet\.ipynb: its first code cell must declare a sheet/],
  ["first_cell_throws", /^first_cell_throws\.ipynb cell 1 line 1: no sheet today$/],
  ["twice", /^twice\.ipynb: shows two verdicts named "swing"/],
  [
    "not_a_number",
    /^not_a_number\.ipynb: hands over the figure "period", whose value must be number$/,
  ],
  ["misnamed", /^misnamed\.ipynb: its sheet is declared as "other_name"/],
  ["syntax_error", /^syntax_error\.ipynb cell 2 line 1/],
  ["not_json", /not_json\.ipynb: the file is not JSON/],
];

for (const [template, wording] of FAULTS) {
  Deno.test(`report exits with 3 and one message for the faulty template ${template}`, async () => {
    const { status, err } = await failing(faultyRevision(template), { templates: FAULTY });
    assertEquals(status, 3);
    const lines = complaints(err);
    assertEquals(lines.length, 2, err);
    assert(wording.test(lines[0]!), lines[0]);
    assertEquals(`${lines[1]}\n`, UNTOUCHED);
  });
}

for (const template of ["endless", "waits"]) {
  Deno.test(`report ends a cell that never ends: ${template}`, async () => {
    const { status, err } = await failing(faultyRevision(template), {
      templates: FAULTY,
      cellTimeout: 2,
    });
    assertEquals(status, 3);
    assertEquals(
      complaints(err)[0],
      `${template}.ipynb cell 2: the cell took longer than its time limit of 2 s`,
    );
  });
}

Deno.test("report stops when told to, with its kernel ended and the previous report intact", async () => {
  await inFolder(faultyRevision("waits"), async (folder) => {
    await writePrevious(folder);
    const controller = new AbortController();
    const begin = performance.now();
    const { status, err } = await run(["report", "rev.yaml", "--out", "out"], {
      cwd: folder,
      templates: FAULTY,
      terminal: true,
      signal: controller.signal,
      writeError: (text) => {
        // The second cell waits for ever; the person stops it there.
        if (text.includes("cell 2 of 2")) controller.abort(new Stopped());
      },
    });
    assertEquals([status, err], [130, ""]);
    assert(performance.now() - begin < 20_000, "well before the cell's time limit of 120 s");
    assert(await previousIntact(folder));
  });
});

Deno.test("report exits with 2 before any work when the output cannot be written", async () => {
  await inFolder(EXAMPLE, async (folder) => {
    await Deno.writeTextFile(join(folder, "taken"), "a file");
    for (const out of ["taken", "taken/below"]) {
      const { status, err } = await run(["report", "rev.yaml", "--out", out], { cwd: folder });
      assertEquals([status, err], [
        2,
        `Cannot write to ${join(folder, out)}: ${join(folder, "taken")} is a file\n`,
      ]);
    }
    assertEquals(await Deno.readTextFile(join(folder, "taken")), "a file");
  });
});

Deno.test("report puts the results back when the page cannot be replaced", async () => {
  await inFolder(EXAMPLE, async (folder) => {
    await Deno.mkdir(join(folder, "out", "index.html"), { recursive: true });
    await Deno.writeTextFile(join(folder, "out", "results.json"), "previous");
    const { status, err } = await run(["report", "rev.yaml", "--out", "out"], { cwd: folder });
    assertEquals(status, 2);
    assert(
      err.endsWith(
        `Cannot write to ${join(folder, "out")}: a folder stands where a file belongs\n`,
      ),
      err,
    );
    assertEquals(await Deno.readTextFile(join(folder, "out", "results.json")), "previous");
    assertEquals([...Deno.readDirSync(join(folder, "out"))].length, 2);
  });
});
