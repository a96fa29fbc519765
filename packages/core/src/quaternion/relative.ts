import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/**
 * `a⁻¹b` for unit quaternions: the turn from `a` to `b`, written in the own axes of `a`. The vector part is exactly zero where
 * `b` is `a` or `-a`. Nothing is normalised: the length is the product of the lengths. `out` may be `a` or `b`.
 */
export function relative<T extends NumberStore>(out: T, a: ReadonlyNumberStore, b: ReadonlyNumberStore): T {
  const ax = a[0],
    ay = a[1],
    az = a[2],
    aw = a[3];
  const bx = b[0],
    by = b[1],
    bz = b[2],
    bw = b[3];
  // Paired so that equal products cancel to zero before anything is rounded.
  out[0] = aw * bx - ax * bw - (ay * bz - az * by);
  out[1] = aw * by - ay * bw - (az * bx - ax * bz);
  out[2] = aw * bz - az * bw - (ax * by - ay * bx);
  out[3] = ax * bx + ay * by + az * bz + aw * bw;
  return out;
}
