import { basename, dirname, isAbsolute, join, relative } from "node:path";
import { KernelError } from "../kernel/run/kernel.ts";
import { NotebookError } from "../kernel/run/notebook.ts";
import { TemplateError } from "../kernel/run/template_error.ts";
import { perhaps } from "../kernel/sheet/_nearest.ts";
import { InputError } from "../kernel/sheet/problem.ts";
import { begin, FIRST_REVISION } from "./begin.ts";
import { EXIT, type ExitStatus, OutputError, TemplateFailure, UsageError } from "./exit_status.ts";
import { EXAMPLE_REVISION, TEMPLATES, VERSION } from "./house.ts";
import { progressTo } from "./progress.ts";
import { makeReport } from "./report.ts";
import type { ReportSection } from "./report_data.ts";
import { verdictLines } from "./verdict_lines.ts";

/** Where a command runs and where its words go. */
export interface CommandContext {
  /** Folder that relative paths count from. */
  readonly cwd: string;
  /** Takes what the person asked for. */
  readonly write: (text: string) => void;
  /** Takes progress and errors. */
  readonly writeError: (text: string) => void;
  /** True when errors go to a terminal, where progress rewrites one line. */
  readonly terminal: boolean;
  readonly signal?: AbortSignal;
  /** Folder of the notebooks. @default the shipped ones */
  readonly templates?: string;
  /** Technology card that `begin` copies. @default the shipped example card */
  readonly card?: string;
  /** Time limit of one cell [s]. @default 120 */
  readonly cellTimeout?: number;
}

/** The person stopped the command. */
export class Stopped extends Error {
  override readonly name = "Stopped";
}

const USAGE = `Tankwright ${VERSION}

  deno task report [REVISION] [--out FOLDER]
      Checks a revision, runs its templates and writes index.html and results.json.
      REVISION  a revision file; without one, the shipped example
      --out     where the report goes; without it, out/<design folder>/<revision file>

  deno task begin FOLDER [TEMPLATE ...]
      Starts a design in FOLDER: a first revision to fill in, its schema for editors, and a copy of the
      example technology card. Without a TEMPLATE, all templates.

  --help      shows this text
  --version   shows the version

Exit status of report: 0 every verdict met, thin or validly waived; 1 one missed, not run, or waived past
its date; 2 the input is wrong or the output cannot be written; 3 a template failed to run.
`;

/** Runs one command line, the words after the program's name, and says how it went. */
export async function command(
  words: readonly string[],
  context: CommandContext,
): Promise<ExitStatus> {
  try {
    const [name, ...rest] = words;
    if (words.some((word) => word === "--help" || word === "-h") || name === "help") {
      context.write(USAGE);
      return EXIT.allMet;
    }
    if (name === "--version") {
      context.write(`tankwright ${VERSION}\n`);
      return EXIT.allMet;
    }
    if (name === "report") return await reportCommand(rest, context);
    if (name === "begin") return await beginCommand(rest, context);
    if (name === undefined) throw new UsageError("a command is missing: report or begin");
    throw new UsageError(`there is no command "${name}"${perhaps(name, ["report", "begin"])}`);
  } catch (error) {
    return explain(error, context);
  }
}

async function reportCommand(
  words: readonly string[],
  context: CommandContext,
): Promise<ExitStatus> {
  const { plain, options } = split(words, ["--out"]);
  if (plain.length > 1) {
    throw new UsageError(`report takes one revision, got ${plain.length}: ${plain.join(", ")}`);
  }
  const revision = plain[0] === undefined
    ? join(context.templates ?? TEMPLATES, EXAMPLE_REVISION)
    : at(context.cwd, plain[0]);
  const revisionName = plain[0] ?? nearName(context.cwd, revision);
  const outName = options.get("--out") ??
    join("out", basename(dirname(revision)), basename(revision).replace(/\.[^.]*$/, ""));
  const progress = progressTo(context.writeError, context);
  try {
    const { data, status } = await makeReport({
      revision,
      revisionName,
      out: at(context.cwd, outName),
      ...taken(context),
      onProgress: (event) => progress.show(event),
    });
    progress.end();
    const lines = [
      ...verdictLines(data.sections),
      "",
      summary(data.sections),
      `Report:  ${join(outName, "index.html")}`,
      `Results: ${join(outName, "results.json")}`,
    ];
    context.write(`${lines.join("\n")}\n`);
    return status;
  } finally {
    progress.end();
  }
}

async function beginCommand(
  words: readonly string[],
  context: CommandContext,
): Promise<ExitStatus> {
  const { plain: [folder, ...templates] } = split(words, []);
  if (folder === undefined) throw new UsageError("begin needs a folder for the design");
  const progress = progressTo(context.writeError, { terminal: context.terminal });
  try {
    const { signal, card } = context;
    const begun = await begin({
      folder: at(context.cwd, folder),
      ...(templates.length === 0 ? {} : { templates }),
      ...(context.templates === undefined ? {} : { notebooks: context.templates }),
      ...(card === undefined ? {} : { card }),
      ...(signal === undefined ? {} : { signal }),
      onProgress: (event) => context.terminal && progress.show(event),
    });
    progress.end();
    const revision = join(folder, FIRST_REVISION);
    context.write(
      `Wrote ${begun.files.map((name) => join(folder, name)).join(", ")}\n\n` +
        "Next:\n" +
        `  1. Fill in ${revision}: author, review date and ${begun.choices} choices.\n` +
        "  2. The card is a copy of the example, with invented figures: put in your process's own.\n" +
        `  3. deno task report ${revision}\n`,
    );
    return EXIT.allMet;
  } finally {
    progress.end();
  }
}

function taken({ signal, templates, cellTimeout }: CommandContext) {
  return {
    ...(signal === undefined ? {} : { signal }),
    ...(templates === undefined ? {} : { templates }),
    ...(cellTimeout === undefined ? {} : { cellTimeout }),
  };
}

/** Words apart from options that take a value, as `--out FOLDER` or `--out=FOLDER`. */
function split(words: readonly string[], known: readonly string[]) {
  const plain: string[] = [];
  const options = new Map<string, string>();
  for (let i = 0; i < words.length; i++) {
    const word = words[i]!;
    if (!word.startsWith("-") || word === "-") {
      plain.push(word);
      continue;
    }
    const [name, inline] = word.split(/=(.*)/s) as [string, string | undefined];
    if (!known.includes(name)) {
      throw new UsageError(`unknown option ${name}${perhaps(name, [...known, "--help"])}`);
    }
    if (options.has(name)) throw new UsageError(`${name} is given twice`);
    const value = inline ?? words[++i];
    if (value === undefined || value === "" || (inline === undefined && value.startsWith("-"))) {
      throw new UsageError(`${name} needs a value, as in ${name} some_folder`);
    }
    options.set(name, value);
  }
  return { plain, options };
}

function at(cwd: string, path: string): string {
  return isAbsolute(path) ? path : join(cwd, path);
}

/** A path as seen from `cwd` when it lies below it, else the path. */
function nearName(cwd: string, path: string): string {
  const near = relative(cwd, path);
  return near.startsWith("..") || isAbsolute(near) ? path : near;
}

function summary(sections: readonly ReportSection[]): string {
  const states = sections.flatMap(({ verdicts }) => verdicts.map(({ state }) => state));
  const counts = (["met", "thin", "missed", "waived", "not run"] as const).flatMap((state) => {
    const count = states.filter((one) => one === state).length;
    return count === 0 ? [] : [`${count} ${state}`];
  });
  return `${states.length} ${states.length === 1 ? "verdict" : "verdicts"}: ${counts.join(", ")}`;
}

function explain(error: unknown, { writeError }: CommandContext): ExitStatus {
  if (error instanceof UsageError) {
    writeError(`${error.message}\nSee deno task report --help\n`);
    return EXIT.wrongInput;
  }
  if (error instanceof InputError || error instanceof OutputError) {
    writeError(`${error.message}\n`);
    return EXIT.wrongInput;
  }
  if (
    error instanceof TemplateError || error instanceof TemplateFailure ||
    error instanceof NotebookError || error instanceof KernelError
  ) {
    writeError(`${error.message}\nNo report was written; a previous one is as it was\n`);
    return EXIT.templateFailed;
  }
  if (error instanceof Stopped) {
    writeError("Stopped. No report was written; a previous one is as it was\n");
    return EXIT.stopped;
  }
  throw error;
}
