import { isAlias, isMap, isPair, isScalar, isSeq, LineCounter, parseDocument } from "yaml";
import type { Document, Node, Pair, YAMLMap } from "yaml";
import { inOrder, type Problem } from "./problem.ts";

/** Way to a node: map keys and list indices from the root. */
export type Path = readonly (string | number)[];

/** A YAML text with the place of everything in it. */
export interface YamlSource {
  readonly file: string;
  /** What is wrong with the text as YAML, in order. */
  readonly problems: readonly Problem[];
  /** The root node; undefined when the text is empty or unreadable. */
  readonly root: Node | undefined;
  /** Plain data; scalars typed by YAML 1.2. */
  data(): unknown;
  /** The node that an alias stands for, else the node itself. */
  resolve(node: unknown): Node | undefined;
  /** Makes a problem at a node, or at the start of the text. */
  problem(node: unknown, message: string): Problem;
  /**
   * Makes a problem at the deepest node that exists on `path`; at the key of the last step rather than
   * its value when `at` is "key".
   */
  problemAt(path: Path, message: string, at?: "key" | "value"): Problem;
}

/** A YAML map entry whose key is a plain word. */
export interface Entry {
  readonly name: string;
  readonly key: Node;
  readonly value: Node | undefined;
}

/** Reads a YAML text; never throws for what is in the text. */
export function readYaml(text: string, file: string): YamlSource {
  const lineCounter = new LineCounter();
  const document = parseDocument(text, { lineCounter, prettyErrors: false });
  const problemAtOffset = (offset: number, message: string): Problem => {
    const { line, col } = lineCounter.linePos(Math.min(offset, text.length));
    // An empty text has no line for the counter to find.
    return { file, line: Math.max(line, 1), column: Math.max(col, 1), message };
  };
  const resolve = (node: unknown): Node | undefined => {
    if (isAlias(node)) return node.resolve(document as Document) as Node | undefined;
    return (node ?? undefined) as Node | undefined;
  };
  const problem = (node: unknown, message: string): Problem => {
    const range = (node as Node | undefined)?.range;
    return problemAtOffset(range?.[0] ?? 0, message);
  };
  const faults = [...document.errors, ...document.warnings];
  return {
    file,
    problems: inOrder(
      faults.map((fault) =>
        problemAtOffset(fault.pos[0], `cannot read as YAML: ${oneLine(fault)}`)
      ),
    ),
    root: document.errors.length > 0 ? undefined : (document.contents ?? undefined) as Node,
    data: () => document.toJS() as unknown,
    resolve,
    problem,
    problemAt: (path, message, at = "value") =>
      problem(nodeAt(document as Document, path, { resolve, at }), message),
  };
}

/** Entries of a map node in order; none for any other node. */
export function entries(node: unknown): Entry[] {
  if (!isMap(node)) return [];
  return (node as YAMLMap).items.map((pair: Pair) => ({
    name: isScalar(pair.key) ? String(pair.key.value) : String(pair.key),
    key: pair.key as Node,
    value: (pair.value ?? undefined) as Node | undefined,
  }));
}

function nodeAt(
  document: Document,
  path: Path,
  { resolve, at }: {
    readonly resolve: (node: unknown) => Node | undefined;
    readonly at: "key" | "value";
  },
): unknown {
  let node: unknown = document.contents;
  for (const [i, step] of path.entries()) {
    const parent = resolve(node);
    let next: unknown;
    if (isMap(parent)) {
      const pair = parent.items.find((item) => isScalar(item.key) && item.key.value === step);
      const wanted = at === "key" && i === path.length - 1 ? pair?.key : pair?.value;
      next = wanted ?? pair?.key;
    } else if (isSeq(parent)) {
      const item = parent.items[Number(step)];
      next = isPair(item) ? item.key : item;
    }
    if (next === undefined || next === null) return node;
    node = next;
  }
  return node;
}

function oneLine(error: Error): string {
  return error.message.split("\n")[0]!.replace(/[.:]\s*$/, "").trim();
}
