import { installKernel } from "../../kernel/install.ts";

const root = decodeURIComponent(new URL("../../", import.meta.url).pathname).replace(/\/$/, "");

/** A copy of one notebook in surroundings like the project's, for programs that save notebooks. */
export interface Stage extends AsyncDisposable {
  /** Temporary folder of everything. */
  readonly folder: string;
  /** Folder the notebook lies in, below a deno.json as in the project. */
  readonly notebooks: string;
  /** The notebook's copy. */
  readonly path: string;
  /** Environment in which Jupyter finds our kernel and keeps its own files here. */
  readonly env: Readonly<Record<string, string>>;
}

/** Sets up a stage for notebooks/`name`: links to the project's files, and a copy of the notebook. */
export async function setStage(name: string): Promise<Stage> {
  const folder = await Deno.makeTempDir({ prefix: "tankwright-stage-" });
  const project = `${folder}/project`;
  const notebooks = `${project}/notebooks`;
  await Deno.mkdir(notebooks, { recursive: true });
  await link(root, project, ["notebooks", ".git"]);
  await link(`${root}/notebooks`, notebooks, [name]);
  await Deno.copyFile(`${root}/notebooks/${name}`, `${notebooks}/${name}`);
  installKernel(`${folder}/jupyter`, Deno.execPath());
  return {
    folder,
    notebooks,
    path: `${notebooks}/${name}`,
    env: {
      JUPYTER_PATH: `${folder}/jupyter`,
      JUPYTER_CONFIG_DIR: `${folder}/config`,
      JUPYTER_RUNTIME_DIR: `${folder}/runtime`,
      JUPYTER_DATA_DIR: `${folder}/data`,
      IPYTHONDIR: `${folder}/ipython`,
    },
    async [Symbol.asyncDispose]() {
      await Deno.remove(folder, { recursive: true });
    },
  };
}

async function link(from: string, to: string, except: readonly string[]): Promise<void> {
  for await (const { name } of Deno.readDir(from)) {
    if (!except.includes(name)) await Deno.symlink(`${from}/${name}`, `${to}/${name}`);
  }
}
