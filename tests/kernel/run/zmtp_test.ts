import { ZmtpSocket } from "../../../kernel/run/zmtp.ts";
import { assert, assertEquals, assertRejects } from "../../assert.ts";

/** Greeting and READY command of a peer, byte by byte from ZeroMQ RFC 23. */
function greeting(): number[] {
  return [0xff, 0, 0, 0, 0, 0, 0, 0, 0, 0x7f, 3, 0, 78, 85, 76, 76, ...new Array(48).fill(0)];
}
const READY = [4, 6, 5, 82, 69, 65, 68, 89];

/** A peer on a free port that sends `bytes` in pieces of `piece` and keeps all it hears. */
function peer(bytes: readonly number[], piece = bytes.length) {
  const listener = Deno.listen({ hostname: "127.0.0.1", port: 0 });
  const heard: number[] = [];
  const done = (async () => {
    const connection = await listener.accept();
    listener.close();
    const hearing = (async () => {
      for await (const part of connection.readable) heard.push(...part);
    })();
    const writer = connection.writable.getWriter();
    for (let i = 0; i < bytes.length; i += piece) {
      await writer.write(new Uint8Array(bytes.slice(i, i + piece)));
    }
    await hearing;
    await writer.close().catch(() => {});
  })();
  return { port: listener.addr.port, heard, done };
}

Deno.test("ZmtpSocket, shakes hands and subscribes to everything", async () => {
  const { port, heard, done } = peer([...greeting(), ...READY]);
  const socket = await ZmtpSocket.open({ port, socketType: "SUB" });
  socket.close();
  await done;
  assertEquals(heard.slice(0, 64), greeting());
  const rest = String.fromCharCode(...heard.slice(64));
  assertEquals(
    rest,
    "\x04\x26\x05READY\x0bSocket-Type\0\0\0\x03SUB\x08Identity\0\0\0\0" + "\0\x01\x01",
  );
});

Deno.test("ZmtpSocket, puts messages together from any pieces, short and long frames alike", async () => {
  const long = new Array(300).fill(7);
  const message = [1, 2, 65, 66, 3, 0, 0, 0, 0, 0, 0, 1, 44, ...long, 0, 0];
  for (const piece of [1, 7, 100, 1000]) {
    const { port, done } = peer([...greeting(), ...READY, ...message, 0, 1, 9], piece);
    const socket = await ZmtpSocket.open({ port, socketType: "DEALER" });
    const first = await socket.receive();
    assertEquals(first?.map((frame) => [...frame]), [[65, 66], long, []]);
    assertEquals((await socket.receive())?.map((frame) => [...frame]), [[9]]);
    const pending = socket.receive();
    socket.close();
    assertEquals(await pending, null);
    await done;
  }
});

Deno.test("ZmtpSocket, sends messages of any length in the order of the calls", async () => {
  const { port, heard, done } = peer([...greeting(), ...READY]);
  const socket = await ZmtpSocket.open({ port, socketType: "DEALER" });
  const before = 64 + 2 + 41;
  await Promise.all([
    socket.send([new Uint8Array([1, 2]), new Uint8Array(255).fill(3)]),
    socket.send([new Uint8Array(70000).fill(4)]),
  ]);
  socket.close();
  await done;
  const expected = [1, 2, 1, 2, 0, 255, ...new Array(255).fill(3)];
  expected.push(2, 0, 0, 0, 0, 0, 1, 17, 112, ...new Array(70000).fill(4));
  assertEquals(heard.slice(before), expected);
});

Deno.test("ZmtpSocket, refuses a port that speaks something else, and one that is closed", async () => {
  const { port, done } = peer([...new TextEncoder().encode("HTTP/1.1 400 Bad".repeat(4))]);
  await assertRejects(
    () => ZmtpSocket.open({ port, socketType: "DEALER" }),
    SyntaxError,
    /does not speak ZMTP 3/,
  );
  await done;
  assert(port > 0);
  await assertRejects(
    () => ZmtpSocket.open({ port, socketType: "DEALER" }),
    Deno.errors.ConnectionRefused,
    /refused/,
  );
});
