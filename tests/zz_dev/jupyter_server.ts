import type { Stage } from "./stage.ts";

/** How long Jupyter gets to answer [ms]. */
const START_LIMIT = 60_000;

/** A running Jupyter Notebook. */
export interface JupyterServer extends AsyncDisposable {
  /** Address of a notebook's page. */
  pageOf(name: string): string;
}

/** Starts Jupyter Notebook for the stage's notebooks and waits until it answers. */
export async function startJupyter(program: string, stage: Stage): Promise<JupyterServer> {
  const listener = Deno.listen({ hostname: "127.0.0.1", port: 0 });
  const { port } = listener.addr;
  listener.close();
  const token = crypto.randomUUID();
  const log = await Deno.open(`${stage.folder}/jupyter.log`, { create: true, write: true });
  const child = new Deno.Command(program, {
    args: [
      "--no-browser",
      "--allow-root",
      "--ip=127.0.0.1",
      `--port=${port}`,
      "--port-retries=0",
      `--NotebookApp.token=${token}`,
      `--notebook-dir=${stage.notebooks}`,
    ],
    cwd: stage.notebooks,
    env: { ...stage.env },
    stdin: "null",
    stdout: "null",
    stderr: "piped",
  }).spawn();
  const logging = child.stderr.pipeTo(log.writable);
  let ended = false;
  child.status.then(() => ended = true);
  const server: JupyterServer = {
    pageOf: (name) => `http://127.0.0.1:${port}/notebooks/${name}?token=${token}`,
    async [Symbol.asyncDispose]() {
      // On SIGTERM it ends its kernels, then itself.
      if (!ended) child.kill("SIGTERM");
      await child.status;
      await logging;
    },
  };
  const deadline = performance.now() + START_LIMIT;
  while (!await answers(`http://127.0.0.1:${port}/api/status?token=${token}`)) {
    if (!ended && performance.now() < deadline) {
      await new Promise((resolve) => setTimeout(resolve, 100));
      continue;
    }
    await server[Symbol.asyncDispose]();
    const told = await Deno.readTextFile(`${stage.folder}/jupyter.log`);
    throw new Error(`Jupyter Notebook did not start: ${told.slice(-2000)}`);
  }
  return server;
}

async function answers(url: string): Promise<boolean> {
  try {
    const response = await fetch(url);
    await response.body?.cancel();
    return response.ok;
  } catch {
    return false;
  }
}
