import type { ReadonlyNumberStore } from '../number-store.js';

/** Sum of the four products: for unit quaternions the cosine of half the angle between them, negative across a sign change. */
export function dot(a: ReadonlyNumberStore, b: ReadonlyNumberStore): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2] + a[3] * b[3];
}
