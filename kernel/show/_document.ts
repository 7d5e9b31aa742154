import { parseHTML } from "linkedom";

/** A node of a parsed document, as far as the house reads and writes one. */
export interface DocumentNode {
  /** 1 element, 3 text, 8 comment. */
  readonly nodeType: number;
  readonly nodeName: string;
  readonly textContent: string | null;
  readonly childNodes: Iterable<DocumentNode>;
}

/** An element of a parsed document. */
export interface DocumentElement extends DocumentNode {
  readonly localName: string;
  readonly attributes: Iterable<{ readonly name: string; readonly value: string }>;
  readonly outerHTML: string;
  getAttribute(name: string): string | null;
  setAttribute(name: string, value: string): void;
  removeAttribute(name: string): void;
  querySelector(selectors: string): DocumentElement | null;
  querySelectorAll(selectors: string): Iterable<DocumentElement>;
  prepend(...nodes: DocumentNode[]): void;
  remove(): void;
}

/** A document without a browser. */
export interface ParsedDocument {
  readonly body: DocumentElement;
  createElementNS(namespace: string, name: string): DocumentElement & { textContent: string };
}

/** Parses markup into the body of a document of its own; nothing in it runs. */
export function parseDocument(markup: string): ParsedDocument {
  // linkedom's types lean on the browser's, which are not in scope here.
  const { document } = parseHTML(
    `<!doctype html><html><body>${markup}</body></html>`,
  ) as unknown as {
    document: ParsedDocument;
  };
  return document;
}
