import { basename, join } from "node:path";
import { blankRevision } from "../kernel/sheet/blank_revision.ts";
import type { Declaration } from "../kernel/sheet/declaration.ts";
import { perhaps } from "../kernel/sheet/_nearest.ts";
import { openChoices, revisionSchema } from "../kernel/sheet/revision_schema.ts";
import { OutputError, UsageError } from "./exit_status.ts";
import { EXAMPLE_CARD, templateNames, TEMPLATES } from "./house.ts";
import type { ProgressEvent } from "./progress.ts";
import { declarationOfRun, TemplateRun } from "./template_run.ts";
import { checkFolder, type NewFile, writeFiles } from "./write_files.ts";

/** Options of {@linkcode begin}. */
export interface BeginOptions {
  /** Folder of the design, anywhere on disk; made when it does not exist. */
  readonly folder: string;
  /** Templates to fill. @default all of `notebooks` */
  readonly templates?: readonly string[];
  /** Folder of the notebooks. @default the shipped ones */
  readonly notebooks?: string;
  /** Technology card to copy. @default the shipped example card */
  readonly card?: string;
  readonly signal?: AbortSignal;
  readonly onProgress?: (event: ProgressEvent) => void;
}

/** What {@linkcode begin} wrote. */
export interface Begun {
  /** Names of the new files. */
  readonly files: readonly string[];
  /** Number of choices to fill in. */
  readonly choices: number;
  readonly templates: readonly string[];
}

/** Names of what a new design's folder gets. */
export const FIRST_REVISION = "rev_a.yaml";
const SCHEMA = "revision.schema.json";

/** Time limits while only a first cell is run [s]. */
const TIMEOUT = 60;

/**
 * Starts a design: writes the first revision, to be filled in, its schema for editors, and a copy of
 * the example card for the person to edit. Nothing that exists is overwritten.
 *
 * @throws {UsageError} when a template is unknown
 * @throws {OutputError} when the folder has a first revision already or cannot be written
 * @throws {TemplateError | TemplateFailure | NotebookError | KernelError} when a template fails
 */
export async function begin(options: BeginOptions): Promise<Begun> {
  const { folder, notebooks = TEMPLATES, signal, onProgress } = options;
  const card = options.card ?? join(TEMPLATES, EXAMPLE_CARD);
  const known = await templateNames(notebooks);
  const templates = options.templates ?? known;
  if (templates.length === 0) throw new UsageError(`there is no template in ${notebooks}`);
  for (const template of templates) {
    if (!known.includes(template)) {
      throw new UsageError(
        `there is no template "${template}"${perhaps(template, known)}; known are ${
          known.join(", ")
        }`,
      );
    }
  }
  await checkFolder(folder);
  if (await exists(join(folder, FIRST_REVISION))) {
    throw new OutputError(
      `Cannot begin in ${folder}: ${FIRST_REVISION} is there already; copy it to the next revision`,
    );
  }
  const declarations: Declaration[] = [];
  for (const template of templates) {
    await using run = await TemplateRun.open(template, {
      folder: notebooks,
      handover: { declareOnly: true },
      cellTimeout: TIMEOUT,
      notebookTimeout: TIMEOUT,
      ...(signal === undefined ? {} : { signal }),
      ...(onProgress === undefined ? {} : { onProgress }),
    });
    if (run.firstCellError !== undefined && !run.declaredOnly) throw run.firstCellError;
    declarations.push(declarationOfRun(run));
  }
  const cardName = basename(card);
  const files: NewFile[] = [
    {
      name: FIRST_REVISION,
      text: blankRevision(declarations, {
        design: designName(folder),
        revision: "a",
        card: cardName,
        schema: SCHEMA,
      }),
    },
    { name: SCHEMA, text: `${JSON.stringify(revisionSchema(declarations), undefined, 2)}\n` },
    { name: cardName, text: await Deno.readTextFile(card) },
  ];
  const fresh: NewFile[] = [];
  for (const file of files) if (!await exists(join(folder, file.name))) fresh.push(file);
  await writeFiles(folder, fresh);
  return {
    files: fresh.map(({ name }) => name),
    choices: openChoices(declarations).length,
    templates,
  };
}

/** "surface_buoy" becomes "Surface buoy". */
function designName(folder: string): string {
  const words = basename(folder).replaceAll(/[_-]+/g, " ").trim();
  return words === "" ? "Oscillator" : words[0]!.toUpperCase() + words.slice(1);
}

async function exists(path: string): Promise<boolean> {
  try {
    await Deno.lstat(path);
    return true;
  } catch (error) {
    if (error instanceof Deno.errors.NotFound) return false;
    throw error;
  }
}
