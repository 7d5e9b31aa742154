import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { command, type CommandContext } from "../../reports/command.ts";

const data = fileURLToPath(new URL("./data/", import.meta.url));

/** Folders of the tests' own notebooks. */
export const TEMPLATES = join(data, "templates");
export const FAULTY = join(data, "faulty");

/** The example revision of the tests' own notebooks, and the shipped card that it names. */
export const EXAMPLE = Deno.readTextFileSync(join(data, "example.yaml"));
export const CARD = Deno.readTextFileSync(
  new URL("../../notebooks/cards/illustrative_65nm.yaml", import.meta.url),
);

/** A revision of one faulty template. */
export function faultyRevision(template: string): string {
  return EXAMPLE.replace("[swing, quality]", `[${template}]`).replace(/ {2}quality_factor.*\n/, "")
    .replace(/ {2}topology.*\n/, "");
}

/** What a command said, and its exit status. */
export interface CommandRun {
  readonly status: number;
  readonly out: string;
  readonly err: string;
}

/** Runs a command line in this process, with the tests' own notebooks. */
export async function run(
  words: readonly string[],
  context: Partial<CommandContext> & { readonly cwd: string },
): Promise<CommandRun> {
  let out = "";
  let err = "";
  const status = await command(words, {
    templates: TEMPLATES,
    terminal: false,
    write: (text) => out += text,
    writeError: (text) => err += text,
    ...context,
  });
  return { status, out, err };
}

/** Runs `action` in a new folder that holds a revision, `rev.yaml`, and its card; then removes it. */
export async function inFolder(
  revision: string,
  action: (folder: string) => Promise<void>,
): Promise<void> {
  const folder = await Deno.makeTempDir({ prefix: "tankwright-test-" });
  try {
    await Deno.writeTextFile(join(folder, "rev.yaml"), withLocalCard(revision));
    await Deno.writeTextFile(join(folder, "card.yaml"), CARD);
    await action(folder);
  } finally {
    await Deno.remove(folder, { recursive: true });
  }
}

function withLocalCard(revision: string): string {
  return revision.replace(/^card: .*$/m, "card: card.yaml");
}

/** A report that was there before. */
export async function writePrevious(folder: string): Promise<void> {
  await Deno.mkdir(join(folder, "out"));
  for (const name of ["index.html", "results.json", "notes.txt"]) {
    await Deno.writeTextFile(join(folder, "out", name), `previous ${name}`);
  }
}

/** True when exactly the previous report is in the folder, without a temporary file beside it. */
export async function previousIntact(folder: string): Promise<boolean> {
  const names: string[] = [];
  for await (const { name } of Deno.readDir(join(folder, "out"))) {
    names.push(name);
    if (await Deno.readTextFile(join(folder, "out", name)) !== `previous ${name}`) return false;
  }
  return names.length === 3;
}
