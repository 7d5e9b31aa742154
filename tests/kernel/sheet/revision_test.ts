import fc from "fast-check";
import { problemText } from "../../../kernel/sheet/problem.ts";
import { readRevision } from "../../../kernel/sheet/revision.ts";
import { assert, assertEquals } from "../../assert.ts";
import { GOOD } from "./_samples.ts";

function problemsOf(text: string): string[] {
  return readRevision(text, "rev.yaml").problems.map(problemText);
}

Deno.test("readRevision reads every part as it was written", () => {
  const { revision, problems } = readRevision(GOOD, "rev.yaml");
  assertEquals(problems, []);
  assertEquals(revision, {
    design: "Test oscillator",
    revision: "2",
    author: "A. Tester",
    reviewDate: "2026-11-16",
    card: "card.yaml",
    templates: ["first_sheet", "second_sheet"],
    fields: {
      supply_voltage: {
        value: "1.0 V",
        reason: "the regulator gives it",
        estimate: "about 1 V",
      },
      topology: { value: "nmos_pair", reason: "fastest" },
      quality_factor: { value: "12.50", reason: "measured" },
    },
    waivers: [{
      template: "first_sheet",
      verdict: "swing",
      reason: "known",
      by: "lead",
      expires: "2027-01-31",
    }],
  });
});

Deno.test("readRevision says where a text cannot be read as YAML", () => {
  const problems = problemsOf(
    'design: Test\nfields:\n  a: { value: "1 V", reason: "x"\nauthor: y\n',
  );
  assert(problems.length > 0);
  for (const problem of problems) assert(/^rev\.yaml:\d+:\d+: cannot read as YAML: /.test(problem));
  assert(problems[0]!.startsWith("rev.yaml:4:"), problems[0]);
});

Deno.test("readRevision finds a key given twice", () => {
  const problems = problemsOf(GOOD.replace("author: A. Tester", "author: A\nauthor: B"));
  assert(problems.some((text) => /^rev\.yaml:4:1: cannot read as YAML: .*unique/.test(text)));
});

Deno.test("readRevision collects everything that is wrong, in order, each with its place", () => {
  const text = `desing: Test oscillator
revision: a
author: A. Tester
review_date: 2026-02-30
card: [a, b]
templates: [first_sheet, ../secrets, first_sheet]
fields:
  supply_voltage: 1.0 V
  topology: { valu: nmos_pair, reason: fastest }
waivers:
  - { template: first_sheet, verdict: swing, reason: known, by: lead, expires: soon }
  - nothing
`;
  assertEquals(
    problemsOf(text),
    [
      'rev.yaml:1:1: unknown key "desing", perhaps "design"',
      "rev.yaml:1:1: design is missing: write design: Surface buoy oscillator",
      'rev.yaml:4:14: review_date: expected a date of the calendar such as 2026-11-16, got "2026-02-30"',
      "rev.yaml:5:7: card: expected a text, got a list",
      'rev.yaml:6:26: templates: expected a template\'s name such as bias_selection, got "../secrets"',
      'rev.yaml:6:38: templates: "first_sheet" is named twice',
      "rev.yaml:8:3: supply_voltage: expected a value with its reason, as in supply_voltage: " +
      '{ value: "1.0 V", reason: "..." }',
      "rev.yaml:9:3: topology: value is missing",
      'rev.yaml:9:15: topology: unknown key "valu", perhaps "value"',
      'rev.yaml:11:80: waivers: expires: expected a date of the calendar such as 2026-11-16, got "soon"',
      "rev.yaml:12:5: waivers: expected { template, verdict, reason, by, expires }",
    ],
  );
});

Deno.test("readRevision refuses an empty file and a file that is no map", () => {
  for (const text of ["", "# nothing\n", "- a\n- b\n", "hello\n"]) {
    assertEquals(problemsOf(text).length, 1);
    assert(/^rev\.yaml:\d+:\d+: expected a revision/.test(problemsOf(text)[0]!));
  }
});

Deno.test("readRevision takes a key without value as missing", () => {
  const problems = problemsOf(
    GOOD.replace("A. Tester", "").replace("[first_sheet, second_sheet]", ""),
  );
  assertEquals(problems, [
    "rev.yaml:3:1: author is missing: write author: your name",
    "rev.yaml:6:1: templates is missing: name at least one, as in templates: [bias_selection]",
  ]);
});

Deno.test("readRevision never throws, and places every problem inside the text", () => {
  const keys = [
    "design",
    "fields",
    "waivers",
    "templates",
    "a",
    "{",
    "[",
    "- ",
    ": ",
    "\n  ",
    "*x",
    "&x",
  ];
  fc.assert(
    fc.property(
      fc.array(fc.oneof(fc.constantFrom(...keys), fc.string()), { maxLength: 12 }),
      (parts) => {
        const text = parts.join("");
        const lines = text.split("\n").length;
        for (const { line, column, message } of readRevision(text, "rev.yaml").problems) {
          assert(line >= 1 && line <= lines && column >= 1, `${line}:${column}`);
          assert(!message.includes("\n"), message);
        }
      },
    ),
    { numRuns: 300 },
  );
});
