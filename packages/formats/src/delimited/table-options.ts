/** What a table of text does not say of itself. */
export interface TableOptions {
  /** A name for every column, in the place of the file's own; names that mean nothing are passed over. */
  readonly columns?: readonly string[];
  /** Sequence of the angles: upper case intrinsic, lower case extrinsic. */
  readonly euler?: string;
  /** Unit of angles whose names don't say it. */
  readonly unit?: AngleUnit;
}

/** Unit of angles in text. */
export type AngleUnit = 'deg' | 'rad';
