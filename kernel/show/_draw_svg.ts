import * as Plot from "@observablehq/plot";
import { type DocumentElement, parseDocument } from "./_document.ts";
import type { DrawingText } from "./chart_parts.ts";

const SVG_NAMESPACE = "http://www.w3.org/2000/svg";
/** Attributes that carry coordinates; a thousandth of a pixel is as fine as anyone sees. */
const COORDINATES = ["d", "transform", "x", "y", "x1", "y1", "x2", "y2", "cx", "cy", "r", "width"];
const LONG_DECIMAL = /-?\d+\.\d{4,}(?:e-?\d+)?|-?\d+e-\d+/g;

/** Size of a drawing's text [px] in its own 600 px wide frame. */
export const FONT_SIZE = 13;

/** A finished drawing: its markup and the scales it was drawn with. */
export interface Drawing {
  readonly svg: string;
  readonly scale: (name: "x" | "y") => { readonly domain?: readonly unknown[] } | undefined;
}

/**
 * Draws a plot without a browser into one `<svg role="img">`: transparent ground, `currentColor` ink,
 * no style sheet, no identifier that depends on what was drawn before. Same options, same bytes.
 *
 * @throws {TypeError} when the plot asks for a legend or title of Plot's own, which are not SVG
 */
export function drawSvg(options: Plot.PlotOptions, text: DrawingText): Drawing {
  const document = parseDocument("");
  const plot = Plot.plot(
    { ...options, document: document as unknown as NonNullable<Plot.PlotOptions["document"]> },
  );
  const svg = plot as unknown as DocumentElement;
  if (svg.localName !== "svg") {
    throw new TypeError(
      `Cannot draw "${text.title}": the plot must be a single drawing without Plot's own title, ` +
        `caption or legend, got a <${svg.localName}>`,
    );
  }
  svg.querySelector("style")?.remove();
  svg.removeAttribute("class");
  for (const warning of svg.querySelectorAll("text[font-family=initial]")) warning.remove();
  for (const element of svg.querySelectorAll("*")) roundCoordinates(element);
  renameIds(svg, text.title);
  svg.setAttribute("xmlns", SVG_NAMESPACE);
  svg.setAttribute("role", "img");
  svg.setAttribute("font-size", String(FONT_SIZE));
  svg.setAttribute("style", "display:block;max-width:100%;height:auto");
  for (const [name, content] of [["desc", text.description], ["title", text.title]] as const) {
    const element = document.createElementNS(SVG_NAMESPACE, name);
    element.textContent = content;
    svg.prepend(element);
  }
  return { svg: svg.outerHTML, scale: (name) => plot.scale(name) };
}

function roundCoordinates(element: DocumentElement): void {
  for (const name of COORDINATES) {
    const value = element.getAttribute(name);
    if (value === null) continue;
    const rounded = value.replace(LONG_DECIMAL, (n) => String(Number(Number(n).toFixed(3)) + 0));
    if (rounded !== value) element.setAttribute(name, rounded);
  }
}

/** Plot numbers its clip paths over the life of the process; here they are numbered per drawing. */
function renameIds(svg: DocumentElement, title: string): void {
  const names = new Map<string, string>();
  for (const element of svg.querySelectorAll("[id]")) {
    const name = `drawing-${contentHash(title)}-${names.size + 1}`;
    names.set(element.getAttribute("id")!, name);
    element.setAttribute("id", name);
  }
  if (names.size === 0) return;
  for (const element of svg.querySelectorAll("*")) {
    for (const { name, value } of [...element.attributes]) {
      const renamed = value.replace(/url\(#([^)]+)\)|^#(.+)$/g, (whole, inUrl, bare) => {
        const id = names.get(inUrl ?? bare);
        if (id === undefined) return whole;
        return inUrl === undefined ? `#${id}` : `url(#${id})`;
      });
      if (renamed !== value) element.setAttribute(name, renamed);
    }
  }
}

/** FNV-1a, 32 bits (G. Fowler, L. C. Noll, K.-P. Vo): short and stable, not for security. */
function contentHash(text: string): string {
  let hash = 0x811c9dc5;
  for (const byte of new TextEncoder().encode(text)) {
    hash = Math.imul(hash ^ byte, 0x01000193) >>> 0;
  }
  return hash.toString(16).padStart(8, "0");
}
