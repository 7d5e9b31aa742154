import { isIsoDate } from "../../../kernel/sheet/iso_date.ts";
import { assertEquals } from "../../assert.ts";

Deno.test("isIsoDate knows the calendar, leap years included", () => {
  for (const good of ["2026-11-16", "2028-02-29", "2000-02-29", "2026-12-31"]) {
    assertEquals(isIsoDate(good), true, good);
  }
  for (
    const bad of [
      "2026-02-29",
      "2100-02-29",
      "2026-13-01",
      "2026-00-10",
      "2026-04-31",
      "26-1-1",
      "",
      "2026-11-16T00",
    ]
  ) {
    assertEquals(isIsoDate(bad), false, bad);
  }
});
