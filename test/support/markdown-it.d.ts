// As much of markdown-it as the tests use: it carries no types of its own.
declare module 'markdown-it' {
  interface Token {
    readonly type: string;
    readonly content: string;
    readonly children: readonly Token[] | null;
  }
  export default class MarkdownIt {
    constructor(options?: { readonly html?: boolean });
    parse(text: string, environment: object): Token[];
  }
}
