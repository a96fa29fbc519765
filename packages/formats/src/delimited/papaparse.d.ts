/**
 * What is used of papaparse, which brings no types; those published apart from it would bring Node's.
 * @see https://www.papaparse.com/docs
 */
declare module 'papaparse' {
  interface Parsed {
    readonly data: readonly (readonly string[])[];
    readonly errors: readonly { readonly type: string; readonly message: string; readonly row?: number }[];
  }
  interface Papaparse {
    parse(
      text: string,
      options: { readonly delimiter: string; readonly newline: string; readonly quoteChar: string },
    ): Parsed;
  }
  const papaparse: Papaparse;
  export default papaparse;
}
