/** What a kernel is told to listen on: five free ports of this machine and a random key. */
export interface Connection {
  /** The connection file, alone in a temporary folder of its own. */
  readonly file: string;
  readonly key: string;
  readonly shellPort: number;
  readonly controlPort: number;
  readonly iopubPort: number;
  /** Removes the folder; may be called twice. */
  remove(): void;
}

/** Picks ports and key and writes the connection file, readable by this user only. */
export function writeConnection(): Connection {
  const ports = freePorts();
  const key = crypto.randomUUID();
  const folder = Deno.makeTempDirSync({ prefix: "tankwright-kernel-" });
  const file = `${folder}/connection.json`;
  const text = JSON.stringify({
    transport: "tcp",
    ip: "127.0.0.1",
    shell_port: ports[0],
    control_port: ports[1],
    iopub_port: ports[2],
    stdin_port: ports[3],
    hb_port: ports[4],
    signature_scheme: "hmac-sha256",
    key,
  });
  Deno.writeTextFileSync(file, text, { mode: 0o600 });
  return {
    file,
    key,
    shellPort: ports[0],
    controlPort: ports[1],
    iopubPort: ports[2],
    remove() {
      try {
        Deno.removeSync(folder, { recursive: true });
      } catch (error) {
        if (!(error instanceof Deno.errors.NotFound)) throw error;
      }
    },
  };
}

/**
 * Five ports nobody listens on now. Another process may take one before the kernel does; the kernel
 * then ends at once and the caller tries again.
 */
function freePorts(): [number, number, number, number, number] {
  const listeners = Array.from(
    { length: 5 },
    () => Deno.listen({ hostname: "127.0.0.1", port: 0, transport: "tcp" }),
  );
  // All five are held until the last is known, so that they differ.
  const ports = listeners.map((listener) => listener.addr.port);
  for (const listener of listeners) listener.close();
  return ports as [number, number, number, number, number];
}
