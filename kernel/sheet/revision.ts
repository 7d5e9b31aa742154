import { isMap, isScalar, isSeq } from "yaml";
import type { Node } from "yaml";
import { isIsoDate } from "./iso_date.ts";
import { perhaps } from "./_nearest.ts";
import { inOrder, type Problem } from "./problem.ts";
import { entries, type Entry, type Path, readYaml, type YamlSource } from "./yaml_source.ts";

/** What a revision says about one field, as written. */
export interface RevisionField {
  /** "1.2 nH", or a word. */
  readonly value: string;
  /** Empty when the person gave none. */
  readonly reason: string;
  readonly estimate?: string;
}

/** A verdict the lead lets pass, until a date. */
export interface Waiver {
  readonly template: string;
  readonly verdict: string;
  readonly reason: string;
  readonly by: string;
  /** ISO date, the last day on which it holds. */
  readonly expires: string;
}

/** One filled sheet file. */
export interface Revision {
  readonly design: string;
  readonly revision: string;
  readonly author: string;
  /** ISO date; the clock of the whole report. */
  readonly reviewDate: string;
  /** Path of the technology card, relative to the revision file. */
  readonly card: string;
  readonly templates: readonly string[];
  readonly fields: Readonly<Record<string, RevisionField>>;
  readonly waivers: readonly Waiver[];
}

/** A revision as read; it is complete only when `problems` is empty. */
export interface RevisionFile {
  readonly file: string;
  readonly revision: Revision;
  readonly problems: readonly Problem[];
  /** Where each template stands in the file's list, from 0. */
  readonly templateIndex: ReadonlyMap<string, number>;
  /** Makes a problem at a place of the file. */
  readonly problemAt: YamlSource["problemAt"];
}

const TEXT_KEYS = ["design", "revision", "author", "review_date", "card"] as const;
const KEYS = [...TEXT_KEYS, "templates", "fields", "waivers"] as const;
const FIELD_KEYS = ["value", "reason", "estimate"] as const;
const WAIVER_KEYS = ["template", "verdict", "reason", "by", "expires"] as const;
const EXAMPLES: Readonly<Record<string, string>> = {
  design: "Surface buoy oscillator",
  revision: "a",
  author: "your name",
  review_date: "2026-11-16",
  card: "card.yaml",
};

/** Names of templates and fields: lower case words joined by underscores. */
export const NAME = /^[a-z][a-z0-9]*(?:_[a-z0-9]+)*$/;

/**
 * Reads a revision file's text. What is wrong is collected, not thrown: every problem names file, line
 * and column. Whether the fields suit the templates is for `fillSheet` and `checkRevision`.
 */
export function readRevision(text: string, file: string): RevisionFile {
  const source = readYaml(text, file);
  const problems = [...source.problems];
  const reader: Reader = {
    source,
    report: (node, message) => void problems.push(source.problem(node, message)),
  };
  const root = source.resolve(source.root);
  if (source.problems.length === 0 && !isMap(root)) {
    reader.report(root, 'expected a revision: a line such as "design: Surface buoy oscillator"');
  }
  const given = keyed(root, { reader, known: KEYS, what: "" });
  const required = isMap(root);
  const texts = Object.fromEntries(TEXT_KEYS.map((key) => {
    const read = scalarText(given.get(key), { reader, what: key });
    if (read === undefined && required) {
      reader.report(
        given.get(key)?.key ?? root,
        `${key} is missing: write ${key}: ${EXAMPLES[key]}`,
      );
    }
    return [key, read ?? ""];
  })) as Record<typeof TEXT_KEYS[number], string>;
  checkDate(given.get("review_date"), { reader, text: texts.review_date, what: "review_date" });
  const templateIndex = readTemplates(given.get("templates"), { reader, root, required });
  const revision: Revision = {
    design: texts.design,
    revision: texts.revision,
    author: texts.author,
    reviewDate: texts.review_date,
    card: texts.card,
    templates: [...templateIndex.keys()],
    fields: readFields(given.get("fields"), { reader, root, required }),
    waivers: readWaivers(given.get("waivers"), { reader }),
  };
  return {
    file,
    revision,
    problems: inOrder(problems),
    templateIndex,
    problemAt: source.problemAt,
  };
}

interface Reader {
  readonly source: YamlSource;
  report(node: unknown, message: string): void;
}

interface Required {
  readonly reader: Reader;
  readonly root: Node | undefined;
  readonly required: boolean;
}

/** Entries by name; reports the unknown ones with the nearest known name. */
function keyed(
  node: unknown,
  { reader, known, what }: {
    readonly reader: Reader;
    readonly known: readonly string[];
    readonly what: string;
  },
): Map<string, Entry> {
  const found = new Map<string, Entry>();
  for (const entry of entries(node)) {
    if (known.includes(entry.name)) {
      found.set(entry.name, entry);
      continue;
    }
    const hint = perhaps(entry.name, known) || `; known are ${known.join(", ")}`;
    reader.report(entry.key, `${what}unknown key "${entry.name}"${hint}`);
  }
  return found;
}

/** A scalar as the person wrote it, trimmed; undefined when absent or empty. */
function scalarText(
  entry: Entry | undefined,
  { reader, what }: { readonly reader: Reader; readonly what: string },
): string | undefined {
  const node = reader.source.resolve(entry?.value);
  if (node === undefined) return undefined;
  if (!isScalar(node)) {
    reader.report(node, `${what}: expected a text, got a ${isSeq(node) ? "list" : "map"}`);
    return "";
  }
  if (node.value === null) return undefined;
  // The source keeps "1.0" from turning into 1.
  const text = typeof node.value === "string" ? node.value : node.source ?? String(node.value);
  return text.trim() === "" ? undefined : text.trim();
}

function checkDate(
  entry: Entry | undefined,
  { reader, text, what }: { readonly reader: Reader; readonly text: string; readonly what: string },
): void {
  if (text === "" || isIsoDate(text)) return;
  reader.report(
    entry?.value,
    `${what}: expected a date of the calendar such as 2026-11-16, got "${text}"`,
  );
}

function readTemplates(
  entry: Entry | undefined,
  { reader, root, required }: Required,
): ReadonlyMap<string, number> {
  const node = reader.source.resolve(entry?.value);
  const found = new Map<string, number>();
  const empty = node === undefined || (isScalar(node) && node.value === null) ||
    (isSeq(node) && node.items.length === 0);
  if (empty) {
    if (required) {
      reader.report(
        entry?.key ?? root,
        "templates is missing: name at least one, as in templates: [bias_selection]",
      );
    }
    return found;
  }
  if (!isSeq(node)) {
    reader.report(node, "templates: expected a list, as in templates: [bias_selection]");
    return found;
  }
  for (const [i, item] of node.items.entries()) {
    const scalar = reader.source.resolve(item);
    const name = isScalar(scalar) ? String(scalar.value) : "";
    if (!NAME.test(name)) {
      reader.report(
        item,
        `templates: expected a template's name such as bias_selection, got "${name}"`,
      );
    } else if (found.has(name)) {
      reader.report(item, `templates: "${name}" is named twice`);
    } else found.set(name, i);
  }
  return found;
}

function readFields(
  entry: Entry | undefined,
  { reader, root, required }: Required,
): Readonly<Record<string, RevisionField>> {
  if (entry === undefined && required) {
    reader.report(root, "fields is missing: write fields: and under it one line for each choice");
  }
  const node = reader.source.resolve(entry?.value);
  if (node !== undefined && !isMap(node) && !(isScalar(node) && node.value === null)) {
    reader.report(
      node,
      'fields: expected lines such as supply_voltage: { value: "1.0 V", reason: "..." }',
    );
  }
  const fields: [string, RevisionField][] = [];
  for (const { name, key, value } of entries(node)) {
    const field = reader.source.resolve(value);
    if (!isMap(field)) {
      const written = isScalar(field) && field.value !== null ? String(field.source) : "...";
      reader.report(
        key,
        `${name}: expected a value with its reason, as in ${name}: ` +
          `{ value: "${written}", reason: "..." }`,
      );
      continue;
    }
    const given = keyed(field, { reader, known: FIELD_KEYS, what: `${name}: ` });
    const text = (part: typeof FIELD_KEYS[number]) =>
      scalarText(given.get(part), { reader, what: `${name}: ${part}` });
    const estimate = text("estimate");
    const written = text("value");
    if (written === undefined) reader.report(key, `${name}: value is missing`);
    fields.push([name, {
      value: written ?? "",
      reason: text("reason") ?? "",
      ...(estimate === undefined ? {} : { estimate }),
    }]);
  }
  return Object.fromEntries(fields);
}

function readWaivers(
  entry: Entry | undefined,
  { reader }: { readonly reader: Reader },
): readonly Waiver[] {
  const node = reader.source.resolve(entry?.value);
  if (node === undefined || (isScalar(node) && node.value === null)) return [];
  if (!isSeq(node)) {
    reader.report(node, `waivers: expected a list of { ${WAIVER_KEYS.join(", ")} }`);
    return [];
  }
  return node.items.map((item) => {
    const map = reader.source.resolve(item);
    if (!isMap(map)) reader.report(item, `waivers: expected { ${WAIVER_KEYS.join(", ")} }`);
    const given = keyed(map, { reader, known: WAIVER_KEYS, what: "waivers: " });
    const texts = Object.fromEntries(WAIVER_KEYS.map((key) => {
      const read = scalarText(given.get(key), { reader, what: `waivers: ${key}` });
      if (read === undefined && isMap(map)) {
        reader.report(given.get(key)?.key ?? map, `waivers: ${key} is missing`);
      }
      return [key, read ?? ""];
    })) as unknown as Waiver;
    checkDate(given.get("expires"), { reader, text: texts.expires, what: "waivers: expires" });
    return texts;
  });
}

/** Where a field stands in a revision file. */
export function fieldPath(name: string, part?: typeof FIELD_KEYS[number]): Path {
  return part === undefined ? ["fields", name] : ["fields", name, part];
}
