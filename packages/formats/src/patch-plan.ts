/** New bytes for `length` old bytes at `at`; the lengths may differ. */
export interface PatchRange {
  readonly at: number;
  readonly length: number;
  readonly bytes: Uint8Array;
  /** What stands there, for the docket: `sampler 4 values`, `JSON /accessors/12/count`, `chunk length`. */
  readonly what: string;
}

/**
 * How to make the new file from the old one: ranges of the old file, ascending and apart, with their new bytes. An appended tail
 * is a range of length 0 at the end. Everything between is copied as it stands.
 */
export interface PatchPlan {
  readonly ranges: readonly PatchRange[];
  /** Size of the new file, bytes. */
  readonly size: number;
}
