/** Where a fault lies, as far as it is known. Keys are zero-based, times are seconds of the file's own clock. */
export interface ErrorPlace {
  readonly file?: string;
  readonly clip?: string;
  readonly track?: string;
  readonly node?: number;
  readonly key?: number;
  readonly time?: number;
  /** JSON pointer into the file's JSON, as RFC 6901 writes it. */
  readonly pointer?: string;
  /** Byte offset into the file. */
  readonly byte?: number;
  /** Line of a text file, counted from 1. */
  readonly line?: number;
}

/**
 * The one error that the packages throw on purpose. `code` is stable, dotted and lower-case (`track.bad-length`,
 * `gltf.truncated`); the message says what, where and what to do, and may change.
 */
export class SlewcurveError extends Error {
  override readonly name = 'SlewcurveError';
  readonly code: string;
  readonly place: ErrorPlace;

  constructor(code: string, message: string, place: ErrorPlace = {}, options?: ErrorOptions) {
    super(message, options);
    this.code = code;
    this.place = place;
  }
}
