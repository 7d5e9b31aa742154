import { progressTo } from "../../reports/progress.ts";
import { assertEquals } from "../assert.ts";

function shown(terminal: boolean): string {
  let text = "";
  const progress = progressTo((part) => text += part, { terminal });
  for (const done of [0, 1, 2]) progress.show({ template: "swing", done, of: 2 });
  progress.end();
  progress.end();
  return text;
}

Deno.test("progressTo rewrites one line on a terminal and leaves it clean", () => {
  const clear = "\r\x1b[2K";
  assertEquals(
    shown(true),
    `${clear}swing: cell 1 of 2${clear}swing: cell 2 of 2${clear}swing: done${clear}`,
  );
});

Deno.test("progressTo writes a plain line per template elsewhere", () => {
  assertEquals(shown(false), "swing: 2 cells run\n");
});
