import { writeConnection } from "../../../kernel/run/connection.ts";
import { assert, assertEquals } from "../../assert.ts";
import { exists } from "./processes.ts";

Deno.test("writeConnection, five different ports and a new key each time, gone after remove", () => {
  const one = writeConnection();
  const two = writeConnection();
  const told = JSON.parse(Deno.readTextFileSync(one.file));
  const ports = ["shell", "control", "iopub", "stdin", "hb"].map((name) => told[`${name}_port`]);
  assertEquals(new Set(ports).size, 5);
  assertEquals(ports.slice(0, 3), [one.shellPort, one.controlPort, one.iopubPort]);
  assertEquals([told.key, told.ip, told.transport], [one.key, "127.0.0.1", "tcp"]);
  assert(one.key !== two.key);
  assertEquals((Deno.statSync(one.file).mode ?? 0) & 0o077, 0, "only this user may read the key");
  for (const connection of [one, two]) {
    connection.remove();
    connection.remove();
    assert(!exists(connection.file.slice(0, connection.file.lastIndexOf("/"))));
  }
});
