import {
  type DeclaredField,
  type Figure,
  type Payload,
  PAYLOAD_MIME,
  type Stress,
  type Verdict,
} from "../kernel/show/payload.ts";
import type { Declaration } from "../kernel/sheet/declaration.ts";
import { TemplateFailure } from "./exit_status.ts";
import type { CellOutput } from "./report_data.ts";

/** Everything that a template's cells handed over. */
export interface Collected {
  readonly declaration: Declaration | undefined;
  readonly verdicts: readonly Verdict[];
  readonly figures: readonly Figure[];
  readonly stresses: readonly Stress[];
}

/**
 * Gathers the payloads of a template's outputs, in order.
 *
 * @throws {TemplateFailure} when a payload has no known kind, or a verdict's or figure's name is used
 *   twice: the report could not tell the two apart
 */
export function collectPayloads(template: string, outputs: readonly CellOutput[]): Collected {
  let declaration: Declaration | undefined;
  const verdicts: Verdict[] = [];
  const figures: Figure[] = [];
  const stresses: Stress[] = [];
  for (const payload of payloadsOf(outputs)) {
    switch (payload.kind) {
      case "sheet":
        if (declaration !== undefined) {
          throw new TemplateFailure(
            template,
            "declares its sheet twice; one sheet(...) is expected",
          );
        }
        declaration = declared(template, payload);
        break;
      case "verdict": {
        const { kind: _, ...verdict } = payload;
        addOnce(verdicts, verdict, { template, what: "verdict" });
        break;
      }
      case "figure": {
        const { kind: _, ...figure } = payload;
        addOnce(figures, figure, { template, what: "figure" });
        break;
      }
      case "stress":
        stresses.push(...payload.rows);
        break;
      default:
        throw new TemplateFailure(
          template,
          `hands over an unknown kind of payload "${(payload as { kind?: unknown }).kind}"`,
        );
    }
  }
  return { declaration, verdicts, figures, stresses };
}

function payloadsOf(outputs: readonly CellOutput[]): Payload[] {
  return outputs.flatMap((output) => {
    if (output.type !== "display" || !(PAYLOAD_MIME in output.data)) return [];
    const data = output.data[PAYLOAD_MIME];
    return [(typeof data === "string" ? JSON.parse(data) : data) as Payload];
  });
}

function declared(
  template: string,
  payload: { readonly template: string; readonly fields: readonly DeclaredField[] },
): Declaration {
  if (payload.template !== template) {
    throw new TemplateFailure(
      template,
      `its sheet is declared as "${payload.template}", expected template: "${template}"`,
    );
  }
  return { template, fields: payload.fields };
}

function addOnce<T extends { readonly name: string }>(
  list: T[],
  item: T,
  { template, what }: { readonly template: string; readonly what: string },
): void {
  if (list.some(({ name }) => name === item.name)) {
    throw new TemplateFailure(
      template,
      `shows two ${what}s named "${item.name}"; each ${what} needs a name of its own`,
    );
  }
  list.push(item);
}
