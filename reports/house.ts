import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import project from "../deno.json" with { type: "json" };

/** Tankwright's version. */
export const VERSION: string = project.version;

/** General-purpose libraries and their pinned versions, as deno.json names them. */
export const LIBRARIES: Readonly<Record<string, string>> = Object.fromEntries(
  Object.entries(project.imports).flatMap(([name, source]) => {
    const pinned = /^npm:.*@([^@]+)$/.exec(source)?.[1];
    return pinned === undefined ? [] : [[name, pinned]];
  }),
);

const root = dirname(dirname(fileURLToPath(import.meta.url)));

/** Folder of the shipped templates, whatever folder the command is called from. */
export const TEMPLATES = join(root, "notebooks");

/** The shipped example revision, relative to {@linkcode TEMPLATES}. */
export const EXAMPLE_REVISION = join("designs", "surface_buoy", "rev_b.yaml");

/** The shipped example card, relative to {@linkcode TEMPLATES}. */
export const EXAMPLE_CARD = join("cards", "illustrative_65nm.yaml");

/** Names of the templates in a folder, sorted. */
export async function templateNames(folder: string): Promise<readonly string[]> {
  const names: string[] = [];
  for await (const { name, isFile } of Deno.readDir(folder)) {
    if (isFile && name.endsWith(".ipynb")) names.push(name.slice(0, -".ipynb".length));
  }
  return names.sort();
}
