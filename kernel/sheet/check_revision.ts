import type { DeclaredField } from "../show/payload.ts";
import type { Declaration } from "./declaration.ts";
import { fillSheet } from "./fill_sheet.ts";
import { perhaps } from "./_nearest.ts";
import { inOrder, type Problem } from "./problem.ts";
import { fieldPath, type RevisionFile } from "./revision.ts";

/**
 * Holds a revision against all its templates at once: what each sheet cannot take, fields that no
 * template declares, fields that two templates declare differently, and waivers of other templates.
 *
 * @returns every problem, those of {@linkcode RevisionFile.problems} included, in order of appearance
 */
export function checkRevision(
  file: RevisionFile,
  declarations: readonly Declaration[],
): readonly Problem[] {
  const problems = [
    ...file.problems,
    ...disagreements(file, declarations),
    ...declarations.flatMap((declaration) => fillSheet(declaration, file).problems),
    ...unknownFields(file, declarations),
    ...strayWaivers(file),
  ];
  return inOrder(withoutRepeats(problems));
}

/** Fields of the revision that none of its templates declares, with the nearest declared name. */
export function unknownFields(
  file: RevisionFile,
  declarations: readonly Declaration[],
): readonly Problem[] {
  const known = [...new Set(declarations.flatMap(({ fields }) => fields.map(({ name }) => name)))];
  return Object.keys(file.revision.fields).filter((name) => !known.includes(name)).map((name) =>
    file.problemAt(fieldPath(name), `unknown field ${name}${perhaps(name, known)}`, "key")
  );
}

function disagreements(file: RevisionFile, declarations: readonly Declaration[]): Problem[] {
  const first = new Map<string, { readonly template: string; readonly field: DeclaredField }>();
  const problems: Problem[] = [];
  for (const { template, fields } of declarations) {
    for (const field of fields) {
      const other = first.get(field.name);
      if (other === undefined) {
        first.set(field.name, { template, field });
      } else if (essence(other.field) !== essence(field)) {
        problems.push(file.problemAt(
          ["templates"],
          `${other.template} declares ${field.name} as ${essence(other.field)}, ` +
            `${template} as ${essence(field)}; they cannot be in one revision`,
        ));
      }
    }
  }
  return problems;
}

/** What two templates must agree on; bounds may differ, each holds. */
function essence({ kind, unit, value }: DeclaredField): string {
  return kind === "fixed" ? `fixed at ${value} [${unit}]` : `a choice [${unit}]`;
}

function strayWaivers(file: RevisionFile): Problem[] {
  const { templates, waivers } = file.revision;
  return waivers.flatMap(({ template }, i) =>
    template === "" || templates.includes(template) ? [] : [file.problemAt(
      ["waivers", i, "template"],
      `waivers: "${template}" is not one of the templates${perhaps(template, templates)}`,
    )]
  );
}

/** Two templates that ask for the same missing choice are one problem to the person. */
function withoutRepeats(problems: readonly Problem[]): Problem[] {
  const seen = new Set<string>();
  return problems.filter(({ line, column, message }) => {
    const key = `${line}:${column}:${message.replace(/ \(asked by .*/s, "")}`;
    if (seen.has(key)) return false;
    seen.add(key);
    return true;
  });
}
