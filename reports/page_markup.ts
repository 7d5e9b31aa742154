import {
  type DocumentElement,
  type DocumentNode,
  parseDocument,
} from "../kernel/show/_document.ts";
import { escapeText, type Markup, raw } from "../kernel/show/markup.ts";

/** Options of {@linkcode cleanMarkup}. */
export interface CleanMarkupOptions {
  /** Put before every id of the markup and every reference to one, so that no two outputs share any. */
  readonly idPrefix: string;
  /** Level of a heading on the page, 1 to 6, from its level in the markup. */
  readonly headingLevel: (level: number) => number;
}

/** Markup that is safe on the page, and what had to be left out of it. */
export interface CleanedMarkup {
  readonly markup: Markup;
  /** Names of elements and attributes that were left out, each once, in order. */
  readonly removed: readonly string[];
}

const words = (text: string): ReadonlySet<string> => new Set(text.trim().split(/\s+/));

/** Elements that stay. Nothing is on the list that runs, loads, navigates or asks for input. */
const HTML_ELEMENTS = words(`
  a abbr b blockquote br caption cite code col colgroup dd del details dfn div dl dt em figcaption
  figure h1 h2 h3 h4 h5 h6 hr i img ins kbd li mark ol p pre q s samp small span strong sub summary sup
  table tbody td tfoot th thead time tr u ul var`);
const VOID_ELEMENTS = words("br col hr img");
const SVG_ELEMENTS = words(`
  svg g path rect circle ellipse line polyline polygon text tspan title desc defs clipPath
  linearGradient radialGradient stop pattern marker mask symbol use`);
const MATH_ELEMENTS = words(`
  math menclose merror mfrac mi mmultiscripts mn mo mover mpadded mphantom mprescripts mroot mrow ms
  mspace msqrt mstyle msub msubsup msup mtable mtd mtext mtr munder munderover none semantics`);
/** Elements whose content goes with them; any other unknown element only loses its tags. */
const DROPPED_WHOLE = words(`
  script style iframe frame frameset noframes object embed applet template noscript noembed textarea
  select option button input link meta base head title audio video source track canvas plaintext xmp
  portal foreignobject annotation annotation-xml animate animatemotion animatetransform set image math-a`);

const HTML_ATTRIBUTES = words(`
  class title lang dir role scope headers colspan rowspan span start reversed value datetime open cite
  width height alt download`);
/** An attribute name of SVG or MathML that could not be a handler or an address. */
const PLAIN_ATTRIBUTE = /^(?!on)(?!.*href$)(?!src$)(?!.*:)[a-z][a-z0-9-]*$/i;
/** Style properties that stay: none takes text out of its place in the page. */
const STYLE_PROPERTY =
  /^(?:align-items|background-color|border(?:-[a-z]+)*|color|display|fill(?:-[a-z]+)?|flex(?:-[a-z]+)?|font(?:-[a-z]+)*|gap|height|justify-content|letter-spacing|line-height|list-style(?:-[a-z]+)?|margin(?:-[a-z]+)?|math-[a-z]+|max-height|max-width|min-width|opacity|overflow(?:-[xy])?|padding(?:-[a-z]+)?|stroke(?:-[a-z]+)?|text-(?:align|anchor|decoration|indent)|vertical-align|white-space|width)$/;
const UNSAFE_STYLE_VALUE = /url\(|expression|image|[\\@<>{}]|-\d*\.?\d+\w*\s*$|fixed/i;
const SAFE_LINK = /^(?:https?:|mailto:)/i;
const SAFE_DOWNLOAD = /^data:text\/(?:csv|plain)[;,]/i;
const SAFE_IMAGE = /^data:image\/(?:png|jpeg|gif|webp|svg\+xml)[;,]/i;
const REFERENCES = words("aria-labelledby aria-describedby aria-controls headers for");

const CANONICAL_NAMES = new Map(
  [...HTML_ELEMENTS, ...SVG_ELEMENTS, ...MATH_ELEMENTS].map((name) => [name.toLowerCase(), name]),
);

/**
 * Takes markup that a cell made and writes it again from what is allowed: no script, handler, frame,
 * form, style sheet or outside address survives, and ids are made unique to the page.
 */
export function cleanMarkup(text: string, options: CleanMarkupOptions): CleanedMarkup {
  const writer = new Writer(options);
  writer.nodes(parseDocument(text).body.childNodes);
  return { markup: raw(writer.text), removed: [...writer.removed] };
}

class Writer {
  text = "";
  readonly removed = new Set<string>();
  readonly #options: CleanMarkupOptions;
  readonly #ids = new Set<string>();

  constructor(options: CleanMarkupOptions) {
    this.#options = options;
  }

  nodes(nodes: Iterable<DocumentNode>, inGraphic = false): void {
    for (const node of nodes) {
      if (node.nodeType === 3) this.text += escapeText(node.textContent ?? "");
      else if (node.nodeType === 1) this.#element(node as DocumentElement, inGraphic);
    }
  }

  #element(element: DocumentElement, inGraphic: boolean): void {
    const lower = element.localName.toLowerCase();
    const name = CANONICAL_NAMES.get(lower);
    const graphic = inGraphic || lower === "svg" || lower === "math";
    const known = name !== undefined &&
      (graphic ? SVG_ELEMENTS.has(name) || MATH_ELEMENTS.has(name) : HTML_ELEMENTS.has(name));
    if (!known) {
      // A drawing's title names it; the title of a document inside an output does not belong here.
      if (DROPPED_WHOLE.has(lower)) {
        if (!lower.startsWith("annotation")) this.removed.add(`<${lower}>`);
      } else this.nodes(element.childNodes, graphic);
      return;
    }
    const tag = /^h[1-6]$/.test(name) ? `h${this.#options.headingLevel(Number(name[1]))}` : name;
    this.text += `<${tag}${this.#attributes(element, graphic)}>`;
    if (VOID_ELEMENTS.has(name)) return;
    this.nodes(element.childNodes, graphic);
    this.text += `</${tag}>`;
  }

  #attributes(element: DocumentElement, graphic: boolean): string {
    let text = "";
    for (const { name, value } of element.attributes) {
      const kept = this.#attribute(element, { name: name.toLowerCase(), value, graphic });
      if (kept === undefined) {
        if (!name.startsWith("xmlns")) this.removed.add(name.toLowerCase());
      } else if (kept !== "") {
        text += ` ${graphic ? name : name.toLowerCase()}="${escapeText(kept)}"`;
      }
    }
    return text;
  }

  /** The attribute's value on the page; undefined when it must not stay, "" when it says nothing. */
  #attribute(
    element: DocumentElement,
    { name, value, graphic }: {
      readonly name: string;
      readonly value: string;
      readonly graphic: boolean;
    },
  ): string | undefined {
    const { idPrefix } = this.#options;
    if (name === "id") return this.#uniqueId(value);
    if (name === "style") return cleanStyle(value);
    if (REFERENCES.has(name)) {
      return value.trim().split(/\s+/).map((id) => idPrefix + slug(id)).join(" ");
    }
    if (name === "href" || name === "xlink:href") {
      const address = withoutSpace(value);
      if (address.startsWith("#")) return `#${idPrefix}${slug(address.slice(1))}`;
      if (graphic) return undefined;
      if (SAFE_LINK.test(address)) return address;
      return SAFE_DOWNLOAD.test(address) && element.getAttribute("download") !== null
        ? address
        : undefined;
    }
    if (name === "src") {
      return element.localName.toLowerCase() === "img" && SAFE_IMAGE.test(withoutSpace(value))
        ? value
        : undefined;
    }
    if (/^aria-[a-z]+$/.test(name)) return value;
    if (!graphic) return HTML_ATTRIBUTES.has(name) ? value : undefined;
    if (!PLAIN_ATTRIBUTE.test(name)) return undefined;
    const local = value.replace(
      /url\(\s*["']?#([^"')]+)["']?\s*\)/g,
      (_, id: string) => `url(#${idPrefix}${slug(id)})`,
    );
    return /url\((?!#)|javascript:/i.test(local) ? undefined : local;
  }

  #uniqueId(id: string): string {
    const base = this.#options.idPrefix + slug(id);
    let unique = base;
    for (let k = 2; this.#ids.has(unique); k++) unique = `${base}-${k}`;
    this.#ids.add(unique);
    return unique;
  }
}

/** Style declarations that only shape what they stand on. */
function cleanStyle(value: string): string {
  return value.split(";").flatMap((declaration) => {
    const [property, ...rest] = declaration.split(":");
    const [name, setting] = [property!.trim().toLowerCase(), rest.join(":").trim()];
    const safe = STYLE_PROPERTY.test(name) && setting !== "" && !UNSAFE_STYLE_VALUE.test(setting);
    return safe ? [`${name}:${setting}`] : [];
  }).join(";");
}

/** Browsers skip control characters and white space in addresses; so must the check. */
function withoutSpace(address: string): string {
  return [...address].filter((character) => character > " " && character !== "\x7f").join("");
}

/** A text as part of an id: lower case, words joined by hyphens. */
export function slug(text: string): string {
  return text.toLowerCase().normalize("NFKC").replace(/[^\p{L}\p{N}_]+/gu, "-")
    .replace(/^-+|-+$/g, "") || "part";
}
