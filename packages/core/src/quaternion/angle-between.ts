import type { ReadonlyNumberStore } from '../number-store.js';
import { unitScaleOf } from './unit-scale.js';

/**
 * Shortest angle between two orientations, radians, 0 to π. `q` and `-q` are the same orientation; inputs need not be unit; one
 * of no length counts as identity. Exactly 0 for equal inputs.
 *
 * θ = 4·atan2(|a − b|, |a + b|) after a·b ≥ 0: W. Kahan's form of the angle between vectors (from memory), doubled. It keeps
 * every digit at 0 and at π, where arc cosines lose half of them.
 */
export function angleBetween(a: ReadonlyNumberStore, b: ReadonlyNumberStore): number {
  const ka = unitScaleOf(a);
  const kb = unitScaleOf(b);
  let ax = a[0] * ka;
  let ay = a[1] * ka;
  let az = a[2] * ka;
  let aw = ka === 0 ? 1 : a[3] * ka;
  let bx = b[0] * kb;
  let by = b[1] * kb;
  let bz = b[2] * kb;
  let bw = kb === 0 ? 1 : b[3] * kb;
  // Each times the other's length: what rounding left of a difference in length must not count as an angle.
  const la = Math.sqrt(ax * ax + ay * ay + az * az + aw * aw);
  const lb =
    Math.sqrt(bx * bx + by * by + bz * bz + bw * bw) * (ax * bx + ay * by + az * bz + aw * bw < 0 ? -1 : 1);
  ax *= lb;
  ay *= lb;
  az *= lb;
  aw *= lb;
  bx *= la;
  by *= la;
  bz *= la;
  bw *= la;
  const apart = (ax - bx) ** 2 + (ay - by) ** 2 + (az - bz) ** 2 + (aw - bw) ** 2;
  const along = (ax + bx) ** 2 + (ay + by) ** 2 + (az + bz) ** 2 + (aw + bw) ** 2;
  return 4 * Math.atan2(Math.sqrt(apart), Math.sqrt(along));
}
