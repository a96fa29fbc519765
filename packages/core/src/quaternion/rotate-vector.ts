import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/**
 * The vector `v` turned by the unit quaternion `q`: from own axes to parent's. Three numbers in, three out; a `q` that is not
 * unit scales the turned part. `out` may be `v`.
 *
 * v + 2w(u×v) + 2u×(u×v) with u = (x, y, z), from qvq* by expansion.
 */
export function rotateVector<T extends NumberStore>(
  out: T,
  q: ReadonlyNumberStore,
  v: ReadonlyNumberStore,
): T {
  const x = q[0],
    y = q[1],
    z = q[2],
    w = q[3];
  const vx = v[0],
    vy = v[1],
    vz = v[2];
  const cx = 2 * (y * vz - z * vy);
  const cy = 2 * (z * vx - x * vz);
  const cz = 2 * (x * vy - y * vx);
  out[0] = vx + w * cx + (y * cz - z * cy);
  out[1] = vy + w * cy + (z * cx - x * cz);
  out[2] = vz + w * cz + (x * cy - y * cx);
  return out;
}
