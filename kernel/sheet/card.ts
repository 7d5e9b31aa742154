import { Ajv, type ErrorObject } from "ajv";
import { parseQuantity } from "../../lib/quantity/parse_quantity.ts";
import { type TechnologyCard, technologyCardFrom } from "../../lib/device/technology_card.ts";
import schema from "../../notebooks/cards/technology_card.schema.json" with { type: "json" };
import { perhaps } from "./_nearest.ts";
import { InputError, type Problem } from "./problem.ts";
import { type Path, readYaml, type YamlSource } from "./yaml_source.ts";

/**
 * Reads a technology card's YAML text.
 *
 * @param text the card
 * @param file how messages name it
 * @throws {InputError} with every problem at its line and column
 */
export function readCard(text: string, file: string): TechnologyCard {
  const source = readYaml(text, file);
  if (source.problems.length > 0) throw new InputError(source.problems);
  const data = source.data();
  refuse(schemaProblems(data, source));
  const problems: Problem[] = [];
  let card: TechnologyCard | undefined;
  try {
    card = technologyCardFrom(data, (written, unit, path) => {
      try {
        return parseQuantity(written, unit);
      } catch (error) {
        if (!(error instanceof Error)) throw error;
        problems.push(source.problemAt(pathOf(path), `${path}: ${error.message}`));
        // Any number in range lets reading go on, so that every wrong quantity is found at once.
        return 1;
      }
    });
  } catch (error) {
    if (!(error instanceof RangeError || error instanceof TypeError)) throw error;
    // What fails after a quantity could not be read may fail because of that.
    if (problems.length === 0) problems.push(contentProblem(error, source));
  }
  refuse(problems);
  return card!;
}

/** Puts what the card's reader found at the field that it names. */
function contentProblem({ message }: Error, source: YamlSource): Problem {
  const named = /^Cannot read the technology card: (([a-z0-9_.[\]]+): .*)$/s.exec(message);
  if (named === null) return source.problemAt([], message);
  return source.problemAt(pathOf(named[2]!), named[1]!);
}

function refuse(problems: readonly Problem[]): void {
  if (problems.length > 0) throw new InputError(problems);
}

let validate: ReturnType<Ajv["compile"]> | undefined;

function schemaProblems(data: unknown, source: YamlSource): Problem[] {
  validate ??= new Ajv({ allErrors: true, verbose: true }).compile(schema);
  if (validate(data)) return [];
  return (validate.errors ?? []).map((error) => schemaProblem(error, source));
}

function schemaProblem(error: ErrorObject, source: YamlSource): Problem {
  const path = pathOf(error.instancePath);
  const where = path.length === 0 ? "" : `${dotted(path)}: `;
  switch (error.keyword) {
    case "additionalProperties": {
      const name = String(error.params.additionalProperty);
      const known = Object.keys((error.parentSchema as { properties?: object }).properties ?? {});
      const hint = perhaps(name, known) || `; known are ${known.join(", ")}`;
      return source.problemAt([...path, name], `${where}unknown key "${name}"${hint}`, "key");
    }
    case "required":
      return source.problemAt(path, `${where}${error.params.missingProperty} is missing`, "key");
    case "enum":
      return source.problemAt(
        path,
        `${where}expected one of ${error.params.allowedValues.join(", ")}, got ${shown(error)}`,
      );
    case "type":
      return source.problemAt(
        path,
        `${where}expected ${TYPE_WORDS[error.params.type as string]}, got ${shown(error)}`,
      );
    default:
      return source.problemAt(path, `${where}${error.message}, got ${shown(error)}`);
  }
}

/** JSON Schema's types in plain words. */
const TYPE_WORDS: Readonly<Record<string, string>> = {
  object: "named fields",
  array: "a list",
  string: "a text in quotes",
  number: "a number",
  integer: "a whole number",
  boolean: "true or false",
  null: "nothing",
};

/** "transistors[0].kind". */
function dotted(path: Path): string {
  return path.map((step) => (/^\d+$/.test(String(step)) ? `[${step}]` : `.${step}`)).join("")
    .replace(/^\./, "");
}

function shown(error: ErrorObject): string {
  const text = JSON.stringify(error.data) ?? "nothing";
  return text.length > 60 ? `${text.slice(0, 57)}...` : text;
}

/** Steps of a JSON pointer (`/a/0/b`) or of a dotted path (`a.0.b`, `a[0].b`). */
function pathOf(text: string): Path {
  if (text.startsWith("/")) {
    return text.slice(1).split("/").map((step) => step.replaceAll("~1", "/").replaceAll("~0", "~"));
  }
  return text.split(/[.[\]]+/).filter((step) => step !== "");
}
