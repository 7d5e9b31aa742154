import {
  LINE_VARIABLE,
  MARK_TYPE,
  markCode,
  readMark,
  SETUP_CODE,
} from "../../../kernel/run/kernel_setup.ts";
import { assert, assertEquals } from "../../assert.ts";

Deno.test("readMark, reads what the set-up code sends", () => {
  const faults = [{ name: "Error", message: "lost" }];
  assertEquals(readMark({ id: "a", line: 3, faults }), { id: "a", line: 3, faults });
});

Deno.test("SETUP_CODE, marks are sent under the names the reader looks for", () => {
  assert(SETUP_CODE.includes(`broadcast("${MARK_TYPE}", { id, line, faults:`));
  assert(SETUP_CODE.includes(`globalThis, "${LINE_VARIABLE}"`));
  const symbol = /Symbol\.for\("[^"]+"\)/;
  assertEquals(markCode("a").match(symbol)?.[0], SETUP_CODE.match(symbol)?.[0]);
});
