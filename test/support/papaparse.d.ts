// As much of papaparse as the tests use: it carries no types of its own.
declare module 'papaparse' {
  interface Parsed {
    readonly data: Record<string, string>[];
    readonly errors: readonly { readonly message: string }[];
  }
  const papaparse: {
    parse(
      text: string,
      options: {
        readonly header: true;
        readonly delimiter: string;
        readonly newline: string;
        readonly skipEmptyLines: 'greedy';
      },
    ): Parsed;
  };
  export default papaparse;
}
