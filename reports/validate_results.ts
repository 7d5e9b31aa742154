import { Ajv } from "ajv";
import { TemplateFailure } from "./exit_status.ts";
import type { Results } from "./results.ts";
import schema from "./results.schema.json" with { type: "json" };

/**
 * Holds the results against their schema before anything is written: a template may hand over what a
 * cell's types did not promise.
 *
 * @throws {TemplateFailure} naming the first entry that does not fit
 */
export function validateResults(results: Results): void {
  const validate = new Ajv().compile(schema);
  if (validate(results)) return;
  const { instancePath = "", message } = validate.errors?.[0] ?? {};
  const [list = "", index = "", ...rest] = instancePath.slice(1).split("/");
  const entry =
    (results as unknown as Readonly<Record<string, Readonly<Record<string, Entry>>>>)[list]
      ?.[index];
  const what = `${KINDS[list] ?? list} "${entry?.name ?? entry?.device ?? ""}"`;
  throw new TemplateFailure(
    entry?.template ?? "report",
    `hands over the ${what}, whose ${rest.join(".") || "content"} ${message}`,
  );
}

interface Entry {
  readonly template?: string;
  readonly name?: string;
  readonly device?: string;
}

const KINDS: Readonly<Record<string, string>> = {
  verdicts: "verdict",
  figures: "figure",
  stresses: "stress of",
};
