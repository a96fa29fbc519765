import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/**
 * The turn by `angle` radians about `axis`, as a quaternion `[x, y, z, w]`. `axis` need not be unit; an axis of no length gives
 * the identity. `out` may be `axis`. Never throws.
 */
export function fromAxisAngle<T extends NumberStore>(out: T, axis: ReadonlyNumberStore, angle: number): T {
  const x = axis[0],
    y = axis[1],
    z = axis[2];
  const length = Math.hypot(x, y, z);
  const sine = length > 0 ? Math.sin(angle / 2) / length : 0;
  out[0] = x * sine;
  out[1] = y * sine;
  out[2] = z * sine;
  out[3] = length > 0 ? Math.cos(angle / 2) : 1;
  return out;
}

/**
 * The turn's angle, 0 to π radians, with its unit axis in `outAxis` (length 3; own and parent components are the same). The
 * angle comes from atan2, so it is good to the last digits at every size; `q` need not be unit. No turn has the axis x. `outAxis`
 * may be `q`. Never throws.
 */
export function toAxisAngle(outAxis: NumberStore, q: ReadonlyNumberStore): number {
  const x = q[0],
    y = q[1],
    z = q[2],
    w = q[3];
  const length = Math.hypot(x, y, z);
  const scale = length > 0 ? (w < 0 ? -1 : 1) / length : 0;
  outAxis[0] = length > 0 ? x * scale : 1;
  outAxis[1] = y * scale;
  outAxis[2] = z * scale;
  return 2 * Math.atan2(length, Math.abs(w));
}
