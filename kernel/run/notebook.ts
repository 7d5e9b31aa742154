/** One cell of a notebook file. */
export interface NotebookCell {
  readonly id: string;
  readonly type: "markdown" | "code" | "raw";
  readonly source: string;
  /** Position among all cells of the notebook, from 1. */
  readonly number: number;
}

/** A notebook as far as running it needs it. */
export interface Notebook {
  /** The file's name without its folder. */
  readonly name: string;
  readonly cells: readonly NotebookCell[];
}

/** A file that is no notebook of the wanted kind. */
export class NotebookError extends Error {
  override readonly name = "NotebookError";

  constructor(readonly file: string, reason: string) {
    super(`Cannot read notebook ${file}: ${reason}`);
  }
}

/**
 * Reads a notebook file of format 4.5.
 *
 * @throws {NotebookError} when it is missing, unreadable or malformed
 */
export async function readNotebook(file: string): Promise<Notebook> {
  let text: string;
  try {
    text = await Deno.readTextFile(file);
  } catch (error) {
    throw new NotebookError(file, reasonOf(error));
  }
  return parseNotebook(text, file);
}

/**
 * Reads the text of a notebook of format 4.5 (nbformat 4, minor 5: cells carry ids).
 *
 * @param file the file's name, for messages
 * @throws {NotebookError} when it is malformed
 */
export function parseNotebook(text: string, file: string): Notebook {
  let json: unknown;
  try {
    json = JSON.parse(text);
  } catch (error) {
    throw new NotebookError(
      file,
      `the file is not JSON (${error instanceof Error ? error.message : String(error)})`,
    );
  }
  if (!isRecord(json)) throw new NotebookError(file, "it must be a JSON object");
  const { nbformat, nbformat_minor: minor, cells } = json;
  if (nbformat !== 4 || !(typeof minor === "number" && minor >= 5)) {
    throw new NotebookError(
      file,
      `its format must be 4.5 or a later 4, got ${nbformat ?? "none"}.${minor ?? "none"}`,
    );
  }
  const language = languageOf(json.metadata);
  if (language !== undefined && language !== "typescript") {
    throw new NotebookError(file, `its language must be typescript, got ${language}`);
  }
  if (!Array.isArray(cells)) throw new NotebookError(file, "cells must be a list");
  const ids = new Map<string, number>();
  const read = cells.map((cell: unknown, i): NotebookCell => {
    const number = i + 1;
    const fail = (reason: string) => new NotebookError(file, `cell ${number}: ${reason}`);
    if (!isRecord(cell)) throw fail("it must be a JSON object");
    const { id, cell_type: type } = cell;
    if (type !== "markdown" && type !== "code" && type !== "raw") {
      throw fail(`cell_type must be "markdown", "code" or "raw", got ${JSON.stringify(type)}`);
    }
    if (typeof id !== "string" || !/^[a-zA-Z0-9_-]{1,64}$/.test(id)) {
      throw fail(
        `id must be 1 to 64 letters, digits, "-" or "_", got ${JSON.stringify(id) ?? "none"}`,
      );
    }
    const earlier = ids.get(id);
    if (earlier !== undefined) throw fail(`id "${id}" is also the id of cell ${earlier}`);
    ids.set(id, number);
    return { id, type, source: sourceOf(cell.source, fail), number };
  });
  return { name: file.split(/[\\/]/).at(-1)!, cells: read }; // split gives at least one piece
}

function sourceOf(source: unknown, fail: (reason: string) => NotebookError): string {
  if (typeof source === "string") return source;
  if (Array.isArray(source) && source.every((line) => typeof line === "string")) {
    return source.join("");
  }
  throw fail("source must be a text or a list of lines");
}

function languageOf(metadata: unknown): string | undefined {
  if (!isRecord(metadata)) return undefined;
  const { kernelspec, language_info: info } = metadata;
  const language = isRecord(info) ? info.name : isRecord(kernelspec) ? kernelspec.language : "";
  return typeof language === "string" && language !== "" ? language.toLowerCase() : undefined;
}

function reasonOf(error: unknown): string {
  if (error instanceof Deno.errors.NotFound) return "there is no such file";
  if (error instanceof Deno.errors.PermissionDenied) return "no permission to read it";
  if (error instanceof Deno.errors.IsADirectory) return "it is a folder";
  return error instanceof Error ? error.message : String(error);
}

function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}
