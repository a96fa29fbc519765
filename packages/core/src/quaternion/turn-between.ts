import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/**
 * The smallest turn that takes the direction `from` to the direction `to` (three numbers each, any length but 0), as a unit
 * quaternion. Opposite directions turn half round about an axis square to `from` that lies in the plane of z and
 * of x or y, whichever `from` has more of; a direction of no length gives the identity. Good to the last digits near 0 and near 180°: the half angle's sine and cosine
 * come from the difference and the sum of the directions. `out` may be an input. Never throws.
 */
export function turnBetween<T extends NumberStore>(
  out: T,
  from: ReadonlyNumberStore,
  to: ReadonlyNumberStore,
): T {
  const fromLength = Math.hypot(from[0], from[1], from[2]);
  const toLength = Math.hypot(to[0], to[1], to[2]);
  const meant = fromLength > 0 && toLength > 0;
  const ax = meant ? from[0] / fromLength : 1,
    ay = meant ? from[1] / fromLength : 0,
    az = meant ? from[2] / fromLength : 0;
  const bx = meant ? to[0] / toLength : 1,
    by = meant ? to[1] / toLength : 0,
    bz = meant ? to[2] / toLength : 0;
  let x = ay * bz - az * by,
    y = az * bx - ax * bz,
    z = ax * by - ay * bx;
  const cosine = Math.hypot(ax + bx, ay + by, az + bz) / 2;
  const sine = Math.hypot(ax - bx, ay - by, az - bz) / 2;
  if (x === 0 && y === 0 && z === 0) {
    const alongX = Math.abs(ax) > Math.abs(ay);
    x = alongX ? -az : 0;
    y = alongX ? 0 : az;
    z = alongX ? ax : -ay;
  }
  const scale = sine / Math.hypot(x, y, z);
  out[0] = x * scale;
  out[1] = y * scale;
  out[2] = z * scale;
  out[3] = cosine;
  return out;
}
