/**
 * Checks every notebook in notebooks/: that it is clean source, and that its cells are formatted and type-check.
 * With `--write` it makes them clean source first.
 *
 * deno run -A tools/check_cells.ts [--write]
 */
import { checkCells, type NotebookToCheck, problemText } from "../kernel/run/check_cells.ts";
import { NotebookError, parseNotebook } from "../kernel/run/notebook.ts";
import { madeUpIds, notebookSource } from "../kernel/run/notebook_source.ts";

const root = new URL("../", import.meta.url);
const folder = new URL("notebooks/", root);
const write = Deno.args.includes("--write");

const problems: string[] = [];
const toCheck: NotebookToCheck[] = [];
for (const { name, isFile } of Deno.readDirSync(folder)) {
  if (!isFile || !name.endsWith(".ipynb")) continue;
  const file = new URL(name, folder);
  const text = Deno.readTextFileSync(file);
  try {
    const notebook = parseNotebook(text, name);
    toCheck.push({ notebook, base: folder.href });
    const source = notebookSource(text);
    if (source !== text) {
      if (write) Deno.writeTextFileSync(file, source);
      else {
        const line = firstDifference(text, source);
        problems.push(
          `${name}:${line}: not clean source (outputs, counts, metadata, key order, indent 1); ` +
            "run deno run -A tools/check_cells.ts --write",
        );
      }
    }
    for (const id of madeUpIds(notebook.cells)) {
      problems.push(`${name}: cell id "${id}" was made up by an editor; give the cell a name`);
    }
  } catch (error) {
    if (!(error instanceof NotebookError)) throw error;
    problems.push(error.message);
  }
}
if (toCheck.length + problems.length === 0) problems.push("notebooks/: holds no notebook");
toCheck.sort((a, b) => a.notebook.name < b.notebook.name ? -1 : 1);
const config = decodeURIComponent(new URL("deno.json", root).pathname);
problems.push(...(await checkCells(toCheck, config)).map(problemText));
problems.push(...await unformattedCells());

for (const problem of problems) console.error(problem);
console.log(`notebooks: ${toCheck.length}, problems: ${problems.length}`);
Deno.exit(problems.length === 0 ? 0 : 1);

function firstDifference(a: string, b: string): number {
  const [left, right] = [a.split("\n"), b.split("\n")];
  const at = left.findIndex((line, i) => line !== right[i]);
  return (at < 0 ? left.length : at) + 1;
}

/** `deno fmt --check` refuses every notebook it has not seen before, so the code cells are formatted as files. */
async function unformattedCells(): Promise<string[]> {
  const scratch = Deno.makeTempDirSync();
  try {
    const cells = toCheck.flatMap(({ notebook }, n) =>
      notebook.cells.filter(({ type }) => type === "code").map(({ id, source }, k) => {
        const path = `${scratch}/${n}_${k}.ts`;
        const text = `${source}\n`;
        Deno.writeTextFileSync(path, text);
        return { name: notebook.name, id, text, path };
      })
    );
    const { code, stderr } = await new Deno.Command(Deno.execPath(), {
      args: ["fmt", "--quiet", "--config", config, scratch],
    }).output();
    if (code !== 0) return [new TextDecoder().decode(stderr)];
    return cells.filter(({ path, text }) => Deno.readTextFileSync(path) !== text)
      .map(({ name, id }) => `${name}: cell "${id}" is not formatted; run deno fmt`);
  } finally {
    Deno.removeSync(scratch, { recursive: true });
  }
}
