import { quat } from 'gl-matrix';
import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/**
 * Hamilton product `ab`: the turn `b` first, then `a`. `[x, y, z, w]`; the length is the product of the lengths. `out` may be
 * `a` or `b`.
 */
export function multiply<T extends NumberStore>(out: T, a: ReadonlyNumberStore, b: ReadonlyNumberStore): T {
  quat.multiply(out, a, b);
  return out;
}
