/** Runs a template of notebooks/ on one of the example revisions, as the report would. */
import { runNotebook } from "../../kernel/run/run_notebook.ts";
import { type Payload, PAYLOAD_MIME } from "../../kernel/show/payload.ts";

const NOTEBOOKS = new URL("../../notebooks/", import.meta.url);

export interface TemplateOutcome {
  /** State of each verdict by its name. */
  readonly verdicts: Readonly<Record<string, string>>;
  /** Value of each figure by its name, in SI. */
  readonly figures: Readonly<Record<string, number>>;
  /** Plain text of everything shown. */
  readonly text: string;
}

/** @param revision file in notebooks/designs/, such as `surface_buoy/rev_b.yaml` */
export async function outcomeOf(template: string, revision: string): Promise<TemplateOutcome> {
  const path = (name: string) => decodeURIComponent(new URL(name, NOTEBOOKS).pathname);
  const revisionFile = path(`designs/${revision}`);
  const cardFile = path("cards/illustrative_65nm.yaml");
  const cells = await runNotebook(path(`${template}.ipynb`), {
    cwd: path(""),
    handover: {
      revisionFile,
      revisionText: await Deno.readTextFile(revisionFile),
      cardFile,
      cardText: await Deno.readTextFile(cardFile),
    },
  });
  const shown = cells.flatMap(({ outputs }) => outputs).flatMap((output) =>
    output.type === "display" ? [output.data] : []
  );
  const payloads = shown.flatMap((data) => {
    const payload = data[PAYLOAD_MIME] as Payload | undefined;
    return payload === undefined ? [] : [payload];
  });
  return {
    verdicts: Object.fromEntries(
      payloads.flatMap((payload) =>
        payload.kind === "verdict" ? [[payload.name, payload.state]] : []
      ),
    ),
    figures: Object.fromEntries(
      payloads.flatMap((payload) =>
        payload.kind === "figure" ? [[payload.name, payload.value]] : []
      ),
    ),
    text: shown.map((data) => String(data["text/plain"] ?? "")).join("\n"),
  };
}
