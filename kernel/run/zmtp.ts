/**
 * The little of ZeroMQ's wire protocol that a Jupyter client needs: ZMTP 3.0 with the NULL mechanism
 * over TCP, as DEALER (shell, control) or SUB (iopub).
 *
 * Source: ZeroMQ RFC 23/ZMTP (rfc.zeromq.org/spec/23), sections "Framing", "Version negotiation",
 * "The NULL security mechanism".
 *
 * @module
 */

const GREETING_BYTES = 64;
const FLAG_MORE = 1;
const FLAG_LONG = 2;
const FLAG_COMMAND = 4;
/** Frames up to this size carry a one-byte length. */
const SHORT_FRAME_BYTES = 255;
/** A frame of this size is no message of a kernel but a broken stream. */
const LARGEST_FRAME_BYTES = 2 ** 31;

const encoder = new TextEncoder();

/** Where and as what to connect. */
export interface ZmtpOptions {
  readonly port: number;
  /** A SUB socket subscribes to everything. */
  readonly socketType: "DEALER" | "SUB";
}

/** One connected socket; a message is a list of frames. */
export class ZmtpSocket {
  readonly #connection: Deno.TcpConn;
  #buffer = new Uint8Array(4096);
  #start = 0;
  #end = 0;
  #writing: Promise<void> = Promise.resolve();
  #closed = false;

  private constructor(connection: Deno.TcpConn) {
    this.#connection = connection;
  }

  /**
   * Connects to this machine's `port` and shakes hands.
   *
   * @throws {Deno.errors.ConnectionRefused} while nobody listens there
   * @throws {SyntaxError} when the other side does not speak ZMTP 3
   */
  static async open({ port, socketType }: ZmtpOptions): Promise<ZmtpSocket> {
    const connection = await Deno.connect({ hostname: "127.0.0.1", port, transport: "tcp" });
    const socket = new ZmtpSocket(connection);
    try {
      connection.setNoDelay(true);
      await socket.#shakeHands(socketType);
      // In version 3.0 a subscription is a message: 1, then the prefix (here empty: everything).
      if (socketType === "SUB") await socket.send([new Uint8Array([1])]);
    } catch (error) {
      socket.close();
      throw error;
    }
    return socket;
  }

  /** Sends one message; messages leave in the order of the calls. */
  send(frames: readonly Uint8Array[]): Promise<void> {
    const bytes = joined(
      frames.map((frame, i) => framed(frame, i < frames.length - 1 ? FLAG_MORE : 0)),
    );
    return this.#write(bytes);
  }

  /** Waits for the next message; null once the other side has hung up or this one was closed. */
  async receive(): Promise<Uint8Array[] | null> {
    const frames: Uint8Array[] = [];
    for (;;) {
      const frame = await this.#readFrame();
      if (frame === null) return null;
      if (frame.flags & FLAG_COMMAND) continue;
      frames.push(frame.body);
      if (!(frame.flags & FLAG_MORE)) return frames;
    }
  }

  /** Hangs up; a pending {@linkcode receive} answers null. */
  close(): void {
    if (this.#closed) return;
    this.#closed = true;
    this.#connection.close();
  }

  async #shakeHands(socketType: string): Promise<void> {
    const greeting = new Uint8Array(GREETING_BYTES);
    greeting[0] = 0xff;
    greeting[9] = 0x7f;
    greeting[10] = 3;
    greeting.set(encoder.encode("NULL"), 12);
    await this.#write(greeting);
    const theirs = await this.#readBytes(GREETING_BYTES);
    if (theirs === null || theirs[0] !== 0xff || !(theirs[10]! >= 3)) {
      throw new SyntaxError("Cannot talk to the kernel: its port does not speak ZMTP 3");
    }
    const ready = [
      encoder.encode("\x05READY"),
      ...property("Socket-Type", socketType),
      ...property("Identity", ""),
    ];
    await this.#write(framed(joined(ready), FLAG_COMMAND));
    const answer = await this.#readFrame();
    if (answer === null || !(answer.flags & FLAG_COMMAND) || commandName(answer.body) !== "READY") {
      throw new SyntaxError("Cannot talk to the kernel: it refused the ZMTP handshake");
    }
  }

  async #readFrame(): Promise<{ flags: number; body: Uint8Array } | null> {
    const flags = (await this.#readBytes(1))?.[0];
    if (flags === undefined) return null;
    const sizeBytes = await this.#readBytes(flags & FLAG_LONG ? 8 : 1);
    if (sizeBytes === null) return null;
    let size = 0;
    for (const byte of sizeBytes) size = size * 256 + byte;
    if (!(size < LARGEST_FRAME_BYTES)) return null;
    const body = await this.#readBytes(size);
    return body && { flags, body };
  }

  /** Exactly `count` bytes as a copy of their own, or null at the end of the stream. */
  async #readBytes(count: number): Promise<Uint8Array | null> {
    while (this.#end - this.#start < count) {
      this.#makeRoom(count);
      let read: number | null;
      try {
        read = await this.#connection.read(this.#buffer.subarray(this.#end));
      } catch {
        // A reset connection and one closed from here are both the end of the stream.
        return null;
      }
      if (read === null) return null;
      this.#end += read;
    }
    const bytes = this.#buffer.slice(this.#start, this.#start + count);
    this.#start += count;
    return bytes;
  }

  #makeRoom(count: number): void {
    const held = this.#buffer.subarray(this.#start, this.#end);
    if (this.#buffer.length >= this.#start + count && this.#end < this.#buffer.length) return;
    const target = this.#buffer.length >= count && held.length < this.#buffer.length
      ? this.#buffer
      : new Uint8Array(Math.max(count, 2 * this.#buffer.length));
    target.set(held, 0);
    this.#buffer = target;
    this.#start = 0;
    this.#end = held.length;
  }

  #write(bytes: Uint8Array): Promise<void> {
    const turn = this.#writing.then(async () => {
      for (let sent = 0; sent < bytes.length;) {
        sent += await this.#connection.write(bytes.subarray(sent));
      }
    });
    this.#writing = turn.catch(() => {});
    return turn;
  }
}

function framed(body: Uint8Array, flags: number): Uint8Array {
  const long = body.length > SHORT_FRAME_BYTES;
  const head = new Uint8Array(long ? 9 : 2);
  head[0] = flags | (long ? FLAG_LONG : 0);
  if (long) new DataView(head.buffer).setBigUint64(1, BigInt(body.length));
  else head[1] = body.length;
  return joined([head, body]);
}

function property(name: string, value: string): Uint8Array[] {
  const length = new Uint8Array(4);
  new DataView(length.buffer).setUint32(0, value.length);
  return [encoder.encode(String.fromCharCode(name.length) + name), length, encoder.encode(value)];
}

function commandName(body: Uint8Array): string {
  return new TextDecoder().decode(body.subarray(1, 1 + (body[0] ?? 0)));
}

function joined(parts: readonly Uint8Array[]): Uint8Array {
  const whole = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
}
