import { dirname, isAbsolute, join } from "node:path";
import type { RevisionHandover } from "./handover.ts";
import { InputError } from "./problem.ts";
import { readRevision } from "./revision.ts";

/**
 * Reads a revision file and the card it names.
 *
 * @param path where the revision is
 * @param options `name`: how messages name the file, the path itself unless given
 * @throws {InputError} when a file cannot be read or the revision names no card
 */
export async function readInputs(
  path: string,
  { name = path }: { readonly name?: string } = {},
): Promise<RevisionHandover> {
  const revisionText = await readText(path, { file: name, line: 1, column: 1 });
  const file = readRevision(revisionText, name);
  const { card } = file.revision;
  // Without a card nothing else can be said, so everything wrong with the revision is said now.
  if (card === "") throw new InputError(file.problems);
  const at = file.problemAt(["card"], "");
  const cardPath = isAbsolute(card) ? card : join(dirname(path), card);
  const cardFile = isAbsolute(card) ? card : join(dirname(name), card);
  return { revisionText, revisionFile: name, cardText: await readText(cardPath, at), cardFile };
}

async function readText(
  path: string,
  at: { readonly file: string; readonly line: number; readonly column: number },
): Promise<string> {
  try {
    return await Deno.readTextFile(path);
  } catch (error) {
    const why = error instanceof Deno.errors.NotFound
      ? "there is no such file"
      : error instanceof Deno.errors.IsADirectory
      ? "it is a folder"
      : error instanceof Deno.errors.PermissionDenied || error instanceof Deno.errors.NotCapable
      ? "reading it is not allowed"
      : undefined;
    if (why === undefined) throw error;
    throw new InputError([{
      file: at.file,
      line: at.line,
      column: at.column,
      message: `cannot read ${path}: ${why}`,
    }]);
  }
}
