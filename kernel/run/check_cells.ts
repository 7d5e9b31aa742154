import { findSyntaxProblem } from "./cell_lines.ts";
import { type CellModule, cellsAsModule } from "./cells_as_module.ts";
import type { Notebook } from "./notebook.ts";
import { placeOf } from "./template_error.ts";

/** A notebook and the folder it lies in. */
export interface NotebookToCheck {
  readonly notebook: Notebook;
  /** URL of the notebook's folder, ending in "/"; relative imports start from here. */
  readonly base: string;
}

/** What a type check found. */
export interface CellProblem {
  /** Name of the notebook file, or URL of another module an error lies in. */
  readonly file: string;
  /** Position of the cell among all cells, from 1; undefined outside the notebook. */
  readonly cell: number | undefined;
  readonly line: number;
  readonly column: number;
  readonly message: string;
}

/** One error of `deno check`: its text, then the place in the last line. */
const REPORT = /^(?:(?:TS\d+ )?\[ERROR\]|error): ([^]*?)\n {4}at (file:\S+?|\S+?):(\d+):(\d+)$/gm;

/**
 * Type-checks the cells of notebooks with one `deno check`.
 *
 * @param config path of the deno.json whose import map and compiler options hold
 * @throws {Error} when the check itself cannot be run
 */
export async function checkCells(
  notebooks: readonly NotebookToCheck[],
  config: string,
): Promise<readonly CellProblem[]> {
  const problems: CellProblem[] = [];
  const sound = notebooks.filter(({ notebook }) => {
    const found = syntaxProblems(notebook);
    problems.push(...found);
    return found.length === 0;
  });
  if (sound.length === 0) return problems;
  const folder = await Deno.makeTempDir({ prefix: "tankwright-check-" });
  try {
    const modules = new Map<string, { notebook: Notebook; module: CellModule }>();
    for (const [i, { notebook, base }] of sound.entries()) {
      const module = cellsAsModule(notebook.cells, base);
      const file = `${folder}/cells_${i}.ts`;
      await Deno.writeTextFile(file, module.text);
      modules.set(file, { notebook, module });
    }
    const { code, stdout, stderr } = await new Deno.Command(Deno.execPath(), {
      args: ["check", "--quiet", "--config", config, ...modules.keys()],
      env: { NO_COLOR: "1" },
      stdin: "null",
    }).output();
    const decoder = new TextDecoder();
    const text = decoder.decode(stderr) + decoder.decode(stdout);
    if (code === 0) return problems;
    const before = problems.length;
    for (const [, told, url, line, column] of text.matchAll(REPORT)) {
      problems.push(problemAt(modules, { told, url, line: Number(line), column: Number(column) }));
    }
    if (problems.length === before) {
      throw new Error(`Cannot type-check the cells: deno check ended with status ${code}: ${text}`);
    }
    return problems;
  } finally {
    await Deno.remove(folder, { recursive: true });
  }
}

/** "bias_selection.ipynb cell 4 line 3:3: message". */
export function problemText({ file, cell, line, column, message }: CellProblem): string {
  const place = cell === undefined
    ? `${file}:${line}:${column}`
    : placeOf({ file, cell, line, column });
  return `${place}: ${message}`;
}

function syntaxProblems({ name, cells }: Notebook): CellProblem[] {
  return cells.flatMap((cell) => {
    const problem = cell.type === "code" ? findSyntaxProblem(cell.source) : undefined;
    return problem === undefined ? [] : [{ ...problem, file: name, cell: cell.number }];
  });
}

function problemAt(
  modules: ReadonlyMap<string, { notebook: Notebook; module: CellModule }>,
  { told = "", url = "", line, column }: {
    told: string | undefined;
    url: string | undefined;
    line: number;
    column: number;
  },
): CellProblem {
  // Under the message stand the line of source and a row of marks below it.
  const message = told.replace(/\n[^\n]*\n\s*[~^]+\s*$/, "").replace(/\s*\n\s*/g, " ");
  const path = url.startsWith("file://") ? decodeURIComponent(new URL(url).pathname) : url;
  const entry = modules.get(path);
  const place = entry?.module.placeOf(line, column);
  if (entry === undefined || place === undefined) {
    return { file: url, cell: undefined, line, column, message };
  }
  return { file: entry.notebook.name, ...place, message };
}
