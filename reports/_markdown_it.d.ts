/** The part of markdown-it 14 that the page uses; the package ships no types. */

/** A piece of parsed Markdown. */
export interface MarkdownToken {
  readonly type: string;
  content: string;
  info: string;
  attrSet(name: string, value: string): void;
}

/** Where the parser stands within a line of text. */
export interface InlineState {
  readonly src: string;
  pos: number;
  push(type: string, tag: string, nesting: -1 | 0 | 1): MarkdownToken;
}

export default class MarkdownIt {
  constructor(preset: "commonmark", options: { readonly html: boolean });
  readonly options: unknown;
  readonly inline: {
    readonly ruler: {
      before(
        rule: string,
        name: string,
        parse: (state: InlineState, silent: boolean) => boolean,
      ): void;
    };
  };
  readonly renderer: {
    readonly rules: Record<string, (tokens: readonly MarkdownToken[], index: number) => string>;
    render(tokens: readonly MarkdownToken[], options: unknown, env: object): string;
  };
  enable(rule: string): this;
  parse(source: string, env: object): MarkdownToken[];
}
