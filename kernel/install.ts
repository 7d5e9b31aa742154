/**
 * Tells Jupyter about this Deno's kernel: `deno task jupyter [--prefix DIR | --dir DIR]`. Touches no
 * network; run it again after Deno has moved.
 *
 * @module
 */

/** Name of the folder under `kernels/`, which is the kernel's name in a notebook's metadata. */
export const KERNEL_NAME = "tankwright";
/** What Jupyter's menus call it. */
export const KERNEL_TITLE = "Tankwright (Deno)";

const USAGE = `Usage: deno task jupyter [--prefix DIR | --dir DIR]
  (nothing)      for this user
  --prefix DIR   under DIR/share/jupyter, as for a virtual environment
  --dir DIR      under DIR itself, a folder that JUPYTER_PATH names`;

/** The kernel could not be installed; the message says why and what to do. */
export class InstallError extends Error {
  override readonly name = "InstallError";
}

/** What a kernel.json of ours says. */
export function kernelspec(denoPath: string) {
  return {
    argv: [denoPath, "jupyter", "--kernel", "--conn", "{connection_file}"],
    display_name: KERNEL_TITLE,
    language: "typescript",
    // By signal, which is Jupyter's default, an interrupt would end the kernel.
    interrupt_mode: "message",
    env: { NO_COLOR: "1" },
  };
}

/** Where Jupyter looks for data of this user, by its own rules. */
export function jupyterDataFolder(
  { os, env }: { readonly os: string; readonly env: (name: string) => string | undefined },
): string {
  const given = env("JUPYTER_DATA_DIR");
  if (given) return given;
  if (os === "windows") {
    const folder = env("APPDATA");
    if (!folder) throw new InstallError("Cannot find Jupyter's folder: APPDATA is not set");
    return `${folder}\\jupyter`;
  }
  const home = env("HOME");
  if (os !== "darwin" && env("XDG_DATA_HOME")) return `${env("XDG_DATA_HOME")}/jupyter`;
  if (!home) throw new InstallError("Cannot find Jupyter's folder: HOME is not set, use --dir DIR");
  return os === "darwin" ? `${home}/Library/Jupyter` : `${home}/.local/share/jupyter`;
}

/** Which data folder the command line asks for; undefined for the user's own. */
export function folderFromArguments(args: readonly string[]): string | undefined {
  if (args.length === 0) return undefined;
  const [option, folder, ...rest] = args;
  if ((option !== "--prefix" && option !== "--dir") || !folder || rest.length > 0) {
    throw new InstallError(`Cannot install the kernel with ${args.join(" ")}\n${USAGE}`);
  }
  return option === "--prefix" ? `${folder}/share/jupyter` : folder;
}

/**
 * Writes the kernelspec into Jupyter's data folder `folder`.
 *
 * @returns the file written
 * @throws {InstallError} when it cannot be written
 */
export function installKernel(folder: string, denoPath: string): string {
  const target = `${folder}/kernels/${KERNEL_NAME}`;
  const file = `${target}/kernel.json`;
  // Written aside and renamed, so that Jupyter never reads half of it.
  const draft = `${target}/kernel.json.tmp`;
  try {
    Deno.mkdirSync(target, { recursive: true });
    Deno.writeTextFileSync(draft, JSON.stringify(kernelspec(denoPath), null, 2) + "\n");
    Deno.renameSync(draft, file);
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    throw new InstallError(
      `Cannot write ${file}: ${reason}; choose a folder you may write to with --dir DIR, ` +
        "and start Jupyter with JUPYTER_PATH=DIR",
    );
  }
  return file;
}

if (import.meta.main) {
  try {
    if (Deno.args.includes("--help")) {
      console.log(USAGE);
      Deno.exit(0);
    }
    const asked = folderFromArguments(Deno.args);
    const folder = asked ?? jupyterDataFolder({ os: Deno.build.os, env: (n) => Deno.env.get(n) });
    const file = installKernel(folder, Deno.execPath());
    const notebooks = decodeURIComponent(new URL("../notebooks", import.meta.url).pathname);
    const path = Deno.args[0] === "--dir" ? `JUPYTER_PATH=${Deno.realPathSync(folder)} ` : "";
    console.log(`Wrote ${file}
It starts ${Deno.execPath()}

Start Jupyter:   cd ${notebooks} && ${path}jupyter notebook      (or jupyter lab)
Kernel to pick:  ${KERNEL_TITLE}`);
  } catch (error) {
    if (!(error instanceof InstallError)) throw error;
    console.error(error.message);
    Deno.exit(1);
  }
}
