import { join } from "node:path";
import { readCard } from "../kernel/sheet/card.ts";
import { checkRevision } from "../kernel/sheet/check_revision.ts";
import { fillSheet } from "../kernel/sheet/fill_sheet.ts";
import type { RevisionHandover } from "../kernel/sheet/handover.ts";
import { perhaps } from "../kernel/sheet/_nearest.ts";
import { InputError, type Problem } from "../kernel/sheet/problem.ts";
import { readInputs } from "../kernel/sheet/read_inputs.ts";
import { readRevision, type RevisionFile } from "../kernel/sheet/revision.ts";
import { applyWaivers } from "./apply_waivers.ts";
import { EXIT, type ExitStatus } from "./exit_status.ts";
import { LIBRARIES, templateNames, TEMPLATES, VERSION } from "./house.ts";
import { inputHash, textHash } from "./input_hash.ts";
import { renderPage } from "./page.ts";
import type { ProgressEvent } from "./progress.ts";
import type { ReportData, ReportSection } from "./report_data.ts";
import { resultsOf, resultsText } from "./results.ts";
import { declarationOfRun, TemplateRun } from "./template_run.ts";
import { validateResults } from "./validate_results.ts";
import { checkFolder, writeFiles } from "./write_files.ts";

/** Options of {@linkcode makeReport}. */
export interface ReportOptions {
  /** Path of the revision file. */
  readonly revision: string;
  /** How messages name the revision file. @default its path */
  readonly revisionName?: string;
  /** Folder that index.html and results.json go to. */
  readonly out: string;
  /** Folder of the notebooks. @default the shipped ones */
  readonly templates?: string;
  /** Time limit of one cell [s]. @default 120 */
  readonly cellTimeout?: number;
  /** Time limit of all cells of one template [s]. @default 600 */
  readonly notebookTimeout?: number;
  /** Aborting ends the kernels; the report throws the signal's reason and writes nothing. */
  readonly signal?: AbortSignal;
  readonly onProgress?: (event: ProgressEvent) => void;
}

/** A written report. */
export interface WrittenReport {
  readonly data: ReportData;
  readonly status: ExitStatus;
}

const CELL_TIMEOUT = 120;
const NOTEBOOK_TIMEOUT = 600;

/**
 * Reads a revision, holds it against its templates, runs them and writes the report. On any error the
 * previous report stays as it was.
 *
 * @throws {InputError} when the revision or its card is wrong: everything at once
 * @throws {TemplateError | TemplateFailure | NotebookError | KernelError} when a template fails
 * @throws {OutputError} when the folder cannot be written
 */
export async function makeReport(options: ReportOptions): Promise<WrittenReport> {
  const { revision, revisionName = revision, out, templates: folder = TEMPLATES } = options;
  const { cellTimeout = CELL_TIMEOUT, notebookTimeout = NOTEBOOK_TIMEOUT } = options;
  const { signal, onProgress } = options;
  await checkFolder(out);
  const inputs = await readInputs(revision, { name: revisionName });
  const file = readRevision(inputs.revisionText, revisionName);
  const known = await templateNames(folder);
  const missing = unknownTemplates(file, known);
  const early = [...missing, ...cardProblems(inputs)];
  // What a template that does not exist would declare cannot be known, nor what it would not.
  if (missing.length > 0) throw new InputError([...file.problems, ...early]);
  await using runs = new AsyncDisposableStack();
  const opened: TemplateRun[] = [];
  for (const template of file.revision.templates) {
    signal?.throwIfAborted();
    const run = await TemplateRun.open(template, {
      folder,
      handover: inputs,
      cellTimeout,
      notebookTimeout,
      ...(signal === undefined ? {} : { signal }),
      ...(onProgress === undefined ? {} : { onProgress }),
    });
    opened.push(runs.use(run));
  }
  const declarations = opened.map(declarationOfRun);
  const problems = [...early, ...checkRevision(file, declarations)];
  if (problems.length > 0) throw new InputError(problems);
  const sections: ReportSection[] = [];
  for (const [i, run] of opened.entries()) {
    await run.finish();
    const { verdicts, figures, stresses } = run.collect();
    sections.push({
      template: run.template,
      title: run.title,
      cells: run.cells,
      fields: fillSheet(declarations[i]!, file).filled,
      verdicts,
      figures,
      stresses,
    });
  }
  const { design, revision: letter, author, reviewDate, waivers } = file.revision;
  const { name, note } = readCard(inputs.cardText, inputs.cardFile);
  const data: ReportData = {
    design,
    revision: letter,
    author,
    reviewDate,
    card: { name, note },
    sections: applyWaivers(sections, file),
    waivers,
    provenance: await provenanceOf({ inputs, file, folder, cellTimeout, notebookTimeout }),
  };
  const results = resultsOf(data);
  validateResults(results);
  signal?.throwIfAborted();
  await writeFiles(out, [
    { name: "results.json", text: resultsText(results) },
    { name: "index.html", text: renderPage(data) },
  ]);
  return { data, status: statusOf(data.sections) };
}

/** 0 when every verdict is met, thin or validly waived, else 1. */
export function statusOf(sections: readonly ReportSection[]): ExitStatus {
  const good = sections.every(({ verdicts }) =>
    verdicts.every(({ state }) => state !== "missed" && state !== "not run")
  );
  return good ? EXIT.allMet : EXIT.missed;
}

function unknownTemplates(file: RevisionFile, known: readonly string[]): Problem[] {
  return [...file.templateIndex].filter(([template]) => !known.includes(template)).map(
    ([template, i]) =>
      file.problemAt(
        ["templates", i],
        `templates: there is no template "${template}"${perhaps(template, known)}; known are ${
          known.join(", ") || "none"
        }`,
      ),
  );
}

function cardProblems({ cardText, cardFile }: RevisionHandover): readonly Problem[] {
  try {
    readCard(cardText, cardFile);
    return [];
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return error.problems;
  }
}

async function provenanceOf(
  { inputs, file, folder, cellTimeout, notebookTimeout }: {
    readonly inputs: RevisionHandover;
    readonly file: RevisionFile;
    readonly folder: string;
    readonly cellTimeout: number;
    readonly notebookTimeout: number;
  },
): Promise<ReportData["provenance"]> {
  const files = [
    { file: baseName(inputs.revisionFile), text: inputs.revisionText },
    { file: baseName(inputs.cardFile), text: inputs.cardText },
    ...await Promise.all(
      file.revision.templates.map(async (template) => ({
        file: `${template}.ipynb`,
        text: await Deno.readTextFile(join(folder, `${template}.ipynb`)),
      })),
    ),
  ];
  return {
    version: VERSION,
    inputHash: await inputHash(VERSION, files.map(({ text }) => text)),
    inputs: await Promise.all(
      files.map(async ({ file, text }) => ({ file, sha256: await textHash(text) })),
    ),
    settings: [
      { name: "Deno", value: Deno.version.deno },
      { name: "V8", value: Deno.version.v8 },
      { name: "TypeScript", value: Deno.version.typescript },
      ...Object.entries(LIBRARIES).map(([name, value]) => ({ name, value })),
      { name: "time limit of a cell", value: `${cellTimeout} s` },
      { name: "time limit of a template", value: `${notebookTimeout} s` },
    ],
  };
}

function baseName(path: string): string {
  return path.split(/[\\/]/).at(-1)!;
}
