// @ts-types="./_markdown_it.d.ts"
import MarkdownIt from "markdown-it";
import { texToMathML } from "../kernel/show/formula.ts";
import { escapeText, type Markup, raw } from "../kernel/show/markup.ts";
import { cleanMarkup, type CleanMarkupOptions, slug } from "./page_markup.ts";

/** Options of {@linkcode markdownMarkup}. */
export interface MarkdownOptions extends CleanMarkupOptions {
  /** Leave out the first heading: the page has put it above the section. */
  readonly skipFirstHeading?: boolean;
}

/** Inline mathematics as in Jupyter: `$...$` within a line, `$$...$$` set apart. */
const MATH = /^(\$\$?)((?:\\.|[^$\\])+?)\1/;

const markdown = new MarkdownIt("commonmark", { html: false }).enable("table");
markdown.inline.ruler.before("escape", "mathematics", (state, silent) => {
  if (state.src[state.pos] !== "$") return false;
  const found = MATH.exec(state.src.slice(state.pos));
  if (found === null) return false;
  const [whole, fence, tex] = found as unknown as [string, string, string];
  // "$5 and $6" is money: mathematics touches its dollar signs.
  if (
    fence === "$" && (/^\s|\s$/.test(tex) || /\d/.test(state.src[state.pos + whole.length] ?? ""))
  ) {
    return false;
  }
  if (!silent) {
    const token = state.push("mathematics", "math", 0);
    token.content = tex;
    token.info = fence;
  }
  state.pos += whole.length;
  return true;
});
markdown.renderer.rules.mathematics = (tokens, i) => {
  const { content, info } = tokens[i]!;
  try {
    return texToMathML(content, { display: info === "$$" }).text;
  } catch {
    return `<code>${escapeText(content)}</code>`;
  }
};

/** A markdown cell as markup of the page; its headings get ids, so that links between cells hit. */
export function markdownMarkup(
  source: string,
  { skipFirstHeading = false, ...options }: MarkdownOptions,
): Markup {
  const tokens = markdown.parse(source, {});
  if (skipFirstHeading) {
    const first = tokens.findIndex(({ type }) => type === "heading_open");
    if (first >= 0) tokens.splice(first, 3);
  }
  tokens.forEach((token, i) => {
    if (token.type === "heading_open") token.attrSet("id", slug(tokens[i + 1]!.content));
  });
  const text = markdown.renderer.render(tokens, markdown.options, {});
  return raw(cleanMarkup(text, options).markup.text.trim());
}

/** Whether a markdown cell holds a heading. */
export function hasHeading(source: string): boolean {
  return markdown.parse(source, {}).some(({ type }) => type === "heading_open");
}
