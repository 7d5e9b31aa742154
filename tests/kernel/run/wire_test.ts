import { Wire } from "../../../kernel/run/wire.ts";
import { assertEquals, assertThrows } from "../../assert.ts";

const text = (frame: Uint8Array | undefined) => new TextDecoder().decode(frame);
const bytes = (value: string) => new TextEncoder().encode(value);

Deno.test("Wire, reads what another session with the same key has sent", () => {
  const { frames } = new Wire("key").request("execute_request", { code: "ä" });
  const { type, content, parentId } = new Wire("key").read([bytes("topic"), ...frames]);
  assertEquals([type, content, parentId], ["execute_request", { code: "ä" }, ""]);
});

Deno.test("Wire, signs the four parts with HMAC-SHA256 of the key", async () => {
  // Independent of the code: the web platform's HMAC.
  const { frames } = new Wire("secret").request("kernel_info_request", {});
  const key = await crypto.subtle.importKey(
    "raw",
    bytes("secret"),
    { name: "HMAC", hash: "SHA-256" },
    false,
    ["sign"],
  );
  const signature = await crypto.subtle.sign(
    "HMAC",
    key,
    bytes(frames.slice(2).map(text).join("")),
  );
  assertEquals(text(frames[0]), "<IDS|MSG>");
  assertEquals(text(frames[1]), new Uint8Array(signature).toHex());
});

Deno.test("Wire, refuses a changed, a foreign and a short message", () => {
  const { frames } = new Wire("key").request("execute_request", { code: "1" });
  const changed = [...frames.slice(0, 5), bytes(`{"code":"2"}`)];
  assertThrows(() => new Wire("key").read(changed), SyntaxError, /signature is wrong/);
  assertThrows(() => new Wire("other").read(frames), SyntaxError, /signature is wrong/);
  assertThrows(() => new Wire("key").read(frames.slice(0, 4)), SyntaxError, /frames are missing/);
  assertThrows(() => new Wire("key").read([bytes("noise")]), SyntaxError, /frames are missing/);
});
