/**
 * Jupyter messages as lists of frames, signed with HMAC-SHA256.
 *
 * Source: Jupyter client documentation, "Messaging in Jupyter", section "The Wire Protocol",
 * protocol version 5.3.
 *
 * @module
 */
import { createHmac, timingSafeEqual } from "node:crypto";

const PROTOCOL_VERSION = "5.3";
const DELIMITER = "<IDS|MSG>";
const encoder = new TextEncoder();
const decoder = new TextDecoder();

/** A received message, as far as a client looks at it. */
export interface WireMessage {
  readonly type: string;
  /** Id of the request this message answers or belongs to; empty when it has none. */
  readonly parentId: string;
  readonly metadata: Readonly<Record<string, unknown>>;
  readonly content: Readonly<Record<string, unknown>>;
}

/** Signs and reads the messages of one session. */
export class Wire {
  readonly #key: string;
  readonly #session = crypto.randomUUID();

  /** @param key the connection file's `key` */
  constructor(key: string) {
    this.#key = key;
  }

  /** A request of `type`: the id that answers will carry, and the frames to send. */
  request(type: string, content: unknown): { readonly id: string; readonly frames: Uint8Array[] } {
    const id = crypto.randomUUID();
    const header = {
      msg_id: id,
      session: this.#session,
      username: "tankwright",
      date: new Date().toISOString(),
      msg_type: type,
      version: PROTOCOL_VERSION,
    };
    const parts = [header, {}, {}, content].map((part) => encoder.encode(JSON.stringify(part)));
    return {
      id,
      frames: [encoder.encode(DELIMITER), encoder.encode(this.#signature(parts)), ...parts],
    };
  }

  /**
   * Reads a received message.
   *
   * @throws {SyntaxError} when it is malformed or its signature is wrong
   */
  read(frames: readonly Uint8Array[]): WireMessage {
    // Routing ids and a topic may stand before the delimiter.
    const at = frames.findIndex((frame) => decoder.decode(frame) === DELIMITER);
    const signature = frames[at + 1];
    const parts = frames.slice(at + 2, at + 6);
    if (at < 0 || signature === undefined || parts.length < 4) {
      throw new SyntaxError("Cannot read a message of the kernel: frames are missing");
    }
    const expected = encoder.encode(this.#signature(parts));
    if (signature.length !== expected.length || !timingSafeEqual(signature, expected)) {
      throw new SyntaxError("Cannot read a message of the kernel: its signature is wrong");
    }
    const [header, parent, metadata, content] = parts.map((part) =>
      JSON.parse(decoder.decode(part)) as Record<string, unknown>
    );
    return {
      type: String(header?.msg_type ?? ""),
      parentId: String(parent?.msg_id ?? ""),
      metadata: metadata ?? {},
      content: content ?? {},
    };
  }

  #signature(parts: readonly Uint8Array[]): string {
    const hmac = createHmac("sha256", this.#key);
    for (const part of parts) hmac.update(part);
    return hmac.digest("hex");
  }
}
