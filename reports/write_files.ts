import { dirname, join } from "node:path";
import { OutputError } from "./exit_status.ts";

/** One file to write. */
export interface NewFile {
  readonly name: string;
  readonly text: string;
}

/**
 * Checks, before any work is done, that a folder can take files; makes nothing and changes nothing.
 *
 * @throws {OutputError} when it cannot
 */
export async function checkFolder(folder: string): Promise<void> {
  let at = folder;
  for (;;) {
    const info = await statOrNothing(at);
    if (info?.isDirectory) break;
    if (info !== undefined) throw new OutputError(`Cannot write to ${folder}: ${at} is a file`);
    if (dirname(at) === at) break;
    at = dirname(at);
  }
  const probe = await attempt(() => Deno.makeTempFile({ dir: at, prefix: ".report-" }), folder);
  await Deno.remove(probe);
}

/**
 * Writes files into a folder, all or none: each goes to a temporary file first, then all are renamed in
 * order; when a rename fails, the files already renamed get their previous text back. Other files of the
 * folder are left alone.
 *
 * @throws {OutputError} when the folder cannot be written; the previous files are then as before
 */
export async function writeFiles(folder: string, files: readonly NewFile[]): Promise<void> {
  await attempt(() => Deno.mkdir(folder, { recursive: true }), folder);
  const temporary: string[] = [];
  const replaced: { readonly path: string; readonly previous: Uint8Array | undefined }[] = [];
  try {
    for (const { name, text } of files) {
      const path = await attempt(
        () => Deno.makeTempFile({ dir: folder, prefix: `.${name}-`, suffix: ".tmp" }),
        folder,
      );
      temporary.push(path);
      await attempt(() => Deno.writeTextFile(path, text), folder);
      // A temporary file is made for its owner alone; a report is for its readers.
      if (Deno.build.os !== "windows") await Deno.chmod(path, 0o644);
    }
    for (const [i, { name }] of files.entries()) {
      const path = join(folder, name);
      const previous = await attempt(() => readOrNothing(path), folder);
      await attempt(() => Deno.rename(temporary[i]!, path), folder);
      replaced.push({ path, previous });
    }
  } catch (error) {
    for (const { path, previous } of replaced) {
      if (previous === undefined) await Deno.remove(path);
      else await Deno.writeFile(path, previous);
    }
    throw error;
  } finally {
    for (const path of temporary) await Deno.remove(path).catch(() => {});
  }
}

async function statOrNothing(path: string): Promise<Deno.FileInfo | undefined> {
  try {
    return await Deno.stat(path);
  } catch {
    return undefined;
  }
}

async function readOrNothing(path: string): Promise<Uint8Array | undefined> {
  try {
    return await Deno.readFile(path);
  } catch (error) {
    if (error instanceof Deno.errors.NotFound) return undefined;
    throw error;
  }
}

async function attempt<T>(action: () => Promise<T>, folder: string): Promise<T> {
  try {
    return await action();
  } catch (error) {
    if (!(error instanceof Error)) throw error;
    throw new OutputError(`Cannot write to ${folder}: ${reasonOf(error)}`);
  }
}

/** The system's reason without its path and number, in words where the class names it. */
function reasonOf(error: Error): string {
  if (error instanceof Deno.errors.PermissionDenied) return "permission denied";
  if (error instanceof Deno.errors.IsADirectory) return "a folder stands where a file belongs";
  return error.message.replace(/ \(os error \d+\).*$/s, "");
}
