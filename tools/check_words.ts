/** Checks for words and text that must not be in the tree. */
import { finish, projectRoot } from "./findings.ts";
import { listFiles } from "./structure/source_tree.ts";

/** This file and its test must spell the words they look for. */
const EXEMPT = new Set(["tools/check_words.ts", "tests/tools/check_words_test.ts"]);
const TEXT_FILE = /(\.(ts|md|json|ya?ml|ipynb|css|html|svg|csv|s\dp)|\/run|LICENSE)$/;

interface Rule {
  readonly pattern: RegExp;
  readonly reason: string;
  /** Which files it holds for. @default all */
  readonly files?: RegExp;
}

const CODE = /\.ts$/;

const RULES: readonly Rule[] = [
  { pattern: /\/(home|tmp|work|root|Users)\//, reason: "a path of one machine" },
  { pattern: /\b(TODO|FIXME|XXX|HACK)\b/, reason: "open work belongs in an issue" },
  {
    pattern: /\b(lecture(?! notes in )|transcript|coursework|slide deck)/i,
    reason: "cite the published source",
  },
  {
    pattern: /\b(language model|LLM|chatbot|AI[- ](generated|assistant)|sub-?agent)\b/i,
    reason: "not about the product",
  },
  {
    pattern: /^\s*\/\/\s*((console|Deno)\.|(const|let|return|import|export|await|throw)\s.*;\s*$)/,
    reason: "commented-out code",
    files: CODE,
  },
  { pattern: /^\s*Deno\.test\.(only|ignore)\b/, reason: "a test is run or removed", files: CODE },
];

/** Every forbidden word in the text of one file, one line each. */
export function findForbiddenWords(path: string, text: string): string[] {
  const rules = RULES.filter((rule) => !rule.files || rule.files.test(path));
  return text.split("\n").flatMap((line, index) =>
    rules.filter((rule) => rule.pattern.test(line)).map((rule) =>
      `${path}:${index + 1}: "${rule.pattern.exec(line)?.[0].trim()}": ${rule.reason}`
    )
  );
}

/** Every forbidden word in the files of the tree at `root`. */
export function checkWords(root: string): string[] {
  return listFiles(root, ".").sort()
    .filter((path) => TEXT_FILE.test(path) && !EXEMPT.has(path))
    .flatMap((path) => findForbiddenWords(path, Deno.readTextFileSync(`${root}/${path}`)));
}

if (import.meta.main) finish(checkWords(projectRoot()));
