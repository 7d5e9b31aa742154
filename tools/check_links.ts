/**
 * Checks the pages written in Markdown, and the Markdown cells of the notebooks: every internal link meets a
 * file or heading, every path in code quotes exists, and every `deno task` that is named is one.
 */
import MarkdownIt from "markdown-it";
import { finish, projectRoot } from "./findings.ts";
import { listFiles } from "./structure/source_tree.ts";

/** The part of a Markdown token used here; the package carries no types. */
interface Token {
  readonly type: string;
  readonly content: string;
  readonly children: readonly Token[] | null;
  attrGet(name: string): string | null;
}

const markdown: { parse(text: string, environment: object): Token[] } = new MarkdownIt();
const PATH_IN_CODE =
  /^(?:lib|kernel|reports|notebooks|tests|tools|bench|\.ci)\/[\w./-]*$|^(?:[\w-]+\.md|deno\.(?:json|lock))$/;

/** Every broken link, path and task in the pages of the tree at `root`. */
export function checkLinks(root: string): string[] {
  const config: { tasks?: Record<string, string> } = JSON.parse(
    Deno.readTextFileSync(`${root}/deno.json`),
  );
  const tasks = new Set(Object.keys(config.tasks ?? {}));
  return listFiles(root, ".").sort().flatMap((path) => {
    const text = readMarkdown(root, path);
    return text === undefined ? [] : checkPage(root, path, text, tasks);
  });
}

function readMarkdown(root: string, path: string): string | undefined {
  if (path.endsWith(".md")) return Deno.readTextFileSync(`${root}/${path}`);
  if (!path.endsWith(".ipynb")) return undefined;
  const notebook: { cells: { cell_type: string; source: string | string[] }[] } = JSON.parse(
    Deno.readTextFileSync(`${root}/${path}`),
  );
  return notebook.cells.filter((cell) => cell.cell_type === "markdown")
    .map((cell) => [cell.source].flat().join("")).join("\n\n");
}

function checkPage(
  root: string,
  path: string,
  text: string,
  tasks: ReadonlySet<string>,
): string[] {
  const findings: string[] = [];
  const report = (fault: string) => findings.push(`${path}: ${fault}`);
  const here = new URL(path, "file:///");
  for (const link of linksIn(text)) {
    if (/^[a-z]+:/i.test(link)) continue;
    const target = new URL(link, here);
    const file = decodeURIComponent(target.pathname).slice(1);
    const page = readOrMissing(root, file);
    if (page === undefined) report(`link to ${link}: there is no such file`);
    else if (target.hash !== "" && !headingsIn(page).has(target.hash.slice(1))) {
      report(`link to ${link}: there is no such heading`);
    }
  }
  for (const code of codeQuotesIn(text)) {
    if (PATH_IN_CODE.test(code) && !exists(`${root}/${code}`)) report(`${code} does not exist`);
  }
  for (const [, task = ""] of text.matchAll(/\b(?:deno(?:@[\d.]+)?) task ([a-z_]+)/g)) {
    if (!tasks.has(task)) report(`deno.json has no task ${task}`);
  }
  return findings;
}

function linksIn(text: string): string[] {
  return inlineTokens(text).flatMap((token) => {
    const link = token.attrGet("href") ?? token.attrGet("src");
    return link === null ? [] : [link];
  });
}

function codeQuotesIn(text: string): string[] {
  return inlineTokens(text).filter((token) => token.type === "code_inline").map((token) =>
    token.content
  );
}

function inlineTokens(text: string): Token[] {
  return markdown.parse(text, {}).flatMap((token) => token.children ?? []);
}

/** The anchors under which a page's headings are reached: lower case, words joined by hyphens. */
function headingsIn(text: string): ReadonlySet<string> {
  const tokens = markdown.parse(text, {});
  return new Set(
    tokens.filter((_, index) => tokens[index - 1]?.type === "heading_open").map((token) =>
      token.content.toLowerCase().replace(/[^\p{L}\p{N}\s_-]/gu, "").trim().replace(/\s/g, "-")
    ),
  );
}

/** Text of a file, empty for a folder, undefined when there is neither. */
function readOrMissing(root: string, path: string): string | undefined {
  if (!exists(`${root}/${path}`)) return undefined;
  return Deno.statSync(`${root}/${path}`).isFile ? Deno.readTextFileSync(`${root}/${path}`) : "";
}

function exists(path: string): boolean {
  try {
    Deno.statSync(path);
    return true;
  } catch {
    return false;
  }
}

if (import.meta.main) finish(checkLinks(projectRoot()));
