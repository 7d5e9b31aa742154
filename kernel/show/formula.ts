import temml from "temml";
import { type DocumentElement, type DocumentNode, parseDocument } from "./_document.ts";
import { type Markup, markup, raw } from "./markup.ts";
import { Showable } from "./showable.ts";

/** Options of {@linkcode formula}. */
export interface FormulaOptions {
  /** Each symbol (TeX) with its meaning: `{ "R": "parallel loss resistance, 612 ohm" }`. */
  readonly where?: Readonly<Record<string, string>>;
}

/**
 * A formula from TeX as MathML, with what its symbols mean; the plain text is readable mathematics.
 *
 * @throws {SyntaxError} when the TeX cannot be read
 */
export function formula(tex: string, { where = {} }: FormulaOptions = {}): Showable {
  const meanings = Object.entries(where).map(([symbol, meaning]) => ({
    symbol: texToMathML(symbol),
    meaning,
  }));
  const display = texToMathML(tex, { display: true });
  const plain = [
    mathText(display),
    ...meanings.map(({ symbol, meaning }) => `  ${mathText(symbol)}: ${meaning}`),
  ];
  return new Showable({
    "text/plain": plain.join("\n"),
    "text/html":
      markup`<div class="formula">${display}${
        meanings.length > 0 && markup`<ul>${
          meanings.map(({ symbol, meaning }) => markup`<li>${symbol}: ${meaning}</li>`)
        }</ul>`
      }</div>`.text,
    "text/latex": `$$${tex}$$`,
  });
}

/**
 * TeX as MathML.
 *
 * @throws {SyntaxError} when the TeX cannot be read
 */
export function texToMathML(tex: string, { display = false }: { display?: boolean } = {}): Markup {
  try {
    return raw(temml.renderToString(tex, { displayMode: display, throwOnError: true }));
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    throw new SyntaxError(`Cannot read the formula "${tex}": ${reason}`);
  }
}

/** MathML as one line of readable text: fractions with a slash, roots, powers and subscripts by sign. */
export function mathText(mathml: Markup): string {
  return nodesText(parseDocument(mathml.text).body.childNodes).replace(/\s+/g, " ").replace(
    / (?=[)\]|])/g,
    "",
  ).trim();
}

const INVISIBLE = /[\u2061-\u2064\u200b\ufe0e\ufe0f]/g;
/** Operators that stand between two operands with a space on each side. */
const SPACED =
  /^[=<>\u2248\u2264\u2265\u226a\u226b+\u2212\u00b1\u00d7\u00b7\u22c5\u2243\u221d\u2192]$/;

function nodesText(nodes: Iterable<DocumentNode>): string {
  let text = "";
  for (const node of nodes) {
    const piece = nodeText(node);
    // Letters of neighbouring symbols would run together into a word.
    if (/[\p{L}\p{N})]$/u.test(text) && /^[\p{L}\p{N}\u221a]/u.test(piece)) text += " ";
    text += piece;
  }
  return text;
}

function nodeText(node: DocumentNode): string {
  if (node.nodeType === 3) return node.textContent ?? "";
  if (node.nodeType !== 1) return "";
  const element = node as DocumentElement;
  const parts = [...element.childNodes].filter((child) => child.nodeType === 1).map(nodeText);
  switch (element.localName.toLowerCase()) {
    case "mfrac":
      return `${grouped(parts[0] ?? "")}/${grouped(parts[1] ?? "")} `;
    case "msqrt":
      return `\u221a(${nodesText(element.childNodes)})`;
    case "msub":
      return `${parts[0]}_${grouped(parts[1] ?? "")}`;
    case "msup":
      return `${parts[0]}^${grouped(parts[1] ?? "")}`;
    case "msubsup":
      return `${parts[0]}_${grouped(parts[1] ?? "")}^${grouped(parts[2] ?? "")}`;
    case "munder":
    case "mover":
      return parts[0] ?? "";
    case "munderover":
      return `${parts[0]}[${parts[1]} .. ${parts[2]}] `;
    case "annotation":
      return "";
    case "mspace":
      return " ";
    case "mo": {
      const sign = (element.textContent ?? "").replace(INVISIBLE, "").trim();
      return SPACED.test(sign) ? ` ${sign} ` : sign;
    }
    case "mi":
    case "mn":
    case "mtext":
      return (element.textContent ?? "").normalize("NFKC").replace(INVISIBLE, "");
    default:
      return nodesText(element.childNodes);
  }
}

/** In parentheses when it is more than one symbol or number. */
function grouped(text: string): string {
  const trimmed = text.trim();
  return /^[\p{L}\p{N}._^]*$/u.test(trimmed) ? trimmed : `(${trimmed})`;
}
