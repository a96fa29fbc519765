/** Numbers by index that are only read: a `number[]`, a typed array, a `subarray`, a gl-matrix quaternion or vector. */
export interface ReadonlyNumberStore extends Iterable<number> {
  readonly length: number;
  readonly [index: number]: number;
}

/** Numbers by index that are written: where a function puts its answer. */
export interface NumberStore extends Iterable<number> {
  readonly length: number;
  [index: number]: number;
}
