import type { ReadonlyNumberStore } from '../number-store.js';

/**
 * What a quaternion's numbers are multiplied by to make it unit: 1 where its squared length is 1 to within the rounding of
 * float64 (its numbers are then used as they stand, so that end points stay exact to the bit), 0 where it has no length.
 * Shorter than 1e-300 counts as no length: its reciprocal is not a float64.
 */
export function unitScale(x: number, y: number, z: number, w: number): number {
  const squared = x * x + y * y + z * z + w * w;
  const over = squared - 1;
  // 6 eps: a quaternion that was made unit and rounded is off by at most 4.5 (root, quotient, product, this sum of squares).
  if (Math.abs(over) <= 6 * Number.EPSILON) return 1;
  // Float32 quaternions: the root's series, whose next term is below 4e-19, is quicker.
  if (Math.abs(over) < 1e-6) return 1 - over * (0.5 - 0.375 * over);
  if (squared > 1e-200 && squared < 1e200) return 1 / Math.sqrt(squared);
  const largest = Math.max(Math.abs(x), Math.abs(y), Math.abs(z), Math.abs(w));
  if (largest < 1e-300) return 0;
  return 1 / largest / Math.hypot(x / largest, y / largest, z / largest, w / largest);
}

/** `unitScale` of a quaternion where it lies: numbers handed to a call that is not inlined may be boxed, a store never is. */
export function unitScaleOf(q: ReadonlyNumberStore): number {
  const over = q[0] * q[0] + q[1] * q[1] + q[2] * q[2] + q[3] * q[3] - 1;
  return Math.abs(over) <= 6 * Number.EPSILON ? 1 : unitScale(q[0], q[1], q[2], q[3]);
}
