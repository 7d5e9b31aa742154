import { inputHash, textHash } from "../../reports/input_hash.ts";
import { assert, assertEquals } from "../assert.ts";

Deno.test("textHash is SHA-256, in lower case hex", async () => {
  // FIPS 180-4 example, message "abc" (NIST, Secure Hash Standard examples, SHA-256).
  assertEquals(
    await textHash("abc"),
    "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad",
  );
});

Deno.test("inputHash changes with version, order and every text, not with line ends", async () => {
  const base = await inputHash("1.0.0", ["a\nb", "c"]);
  assertEquals(await inputHash("1.0.0", ["a\r\nb", "c"]), base);
  const others = await Promise.all([
    inputHash("1.0.1", ["a\nb", "c"]),
    inputHash("1.0.0", ["c", "a\nb"]),
    inputHash("1.0.0", ["a\nb", "d"]),
    inputHash("1.0.0", ["a\nbc", ""]),
    inputHash("1.0.0", ["a\nb"]),
  ]);
  assert(new Set([base, ...others]).size === 6);
});
