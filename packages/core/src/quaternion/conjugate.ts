import { quat } from 'gl-matrix';
import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/** The turn back: `[-x, -y, -z, w]`, the inverse of a unit quaternion. `out` may be `q`. */
export function conjugate<T extends NumberStore>(out: T, q: ReadonlyNumberStore): T {
  quat.conjugate(out, q);
  return out;
}
