import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import { slerpAsStored } from './slerp.js';

// Written before it is read in every call: `out` may be an input, and a kernel allocates nothing.
const outer = new Float64Array(4);
const inner = new Float64Array(4);

/**
 * Spherical quadrangle from `a` to `b` with the inner points `innerA` and `innerB`:
 * `slerp(slerp(a, b; t), slerp(innerA, innerB; t); 2t(1 − t))`, K. Shoemake, "Quaternion Calculus and Fast Animation", SIGGRAPH
 * course notes 10, 1987 (as quoted). No hemisphere is chosen inside: the four must already be on one side of each other, as
 * `alignSigns` leaves a track; a short-way slerp in here would go wrong by up to 90° once the inner points are over half a turn
 * apart. `t` in 0 to 1 is the curve; any finite number is allowed. Unit result; `out` may be any input.
 */
export function squad<T extends NumberStore>(
  out: T,
  a: ReadonlyNumberStore,
  innerA: ReadonlyNumberStore,
  innerB: ReadonlyNumberStore,
  b: ReadonlyNumberStore,
  t: number,
): T {
  slerpAsStored(outer, a, b, t);
  slerpAsStored(inner, innerA, innerB, t);
  return slerpAsStored(out, outer, inner, 2 * t * (1 - t));
}
