import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/**
 * The angle, radians in (-π, π], that `q` turns about the unit vector `axis`: the twist of q = swing · twist, where the twist
 * comes first, about an own axis, and the swing then tips that axis over. Where the swing is a half turn the twist is not
 * defined, and 0. `q` need not be unit. Never throws.
 */
export function twistAngle(q: ReadonlyNumberStore, axis: ReadonlyNumberStore): number {
  const along = q[0] * axis[0] + q[1] * axis[1] + q[2] * axis[2];
  return q[3] < 0 ? 2 * Math.atan2(-along, -q[3]) : 2 * Math.atan2(along, q[3]);
}

/** The twist alone (see `twistAngle`), as a unit quaternion with w ≥ 0. `out` may be `q` or `axis`. Never throws. */
export function twist<T extends NumberStore>(out: T, q: ReadonlyNumberStore, axis: ReadonlyNumberStore): T {
  const x = axis[0],
    y = axis[1],
    z = axis[2];
  const half = twistAngle(q, axis) / 2;
  const sine = Math.sin(half);
  out[0] = sine * x;
  out[1] = sine * y;
  out[2] = sine * z;
  out[3] = Math.cos(half);
  return out;
}

/**
 * The swing alone: `q` · twist⁻¹, whose axis is square to `axis` (a unit vector). As long as `q` is. `out` may be `q` or `axis`.
 * Never throws.
 */
export function swing<T extends NumberStore>(out: T, q: ReadonlyNumberStore, axis: ReadonlyNumberStore): T {
  const x = q[0],
    y = q[1],
    z = q[2],
    w = q[3];
  const half = twistAngle(q, axis) / 2;
  const sine = Math.sin(half);
  const cosine = Math.cos(half);
  const tx = sine * axis[0],
    ty = sine * axis[1],
    tz = sine * axis[2];
  out[0] = x * cosine - w * tx - (y * tz - z * ty);
  out[1] = y * cosine - w * ty - (z * tx - x * tz);
  out[2] = z * cosine - w * tz - (x * ty - y * tx);
  out[3] = w * cosine + x * tx + y * ty + z * tz;
  return out;
}
