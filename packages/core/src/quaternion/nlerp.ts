import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import { unitScale, unitScaleOf } from './unit-scale.js';

/**
 * The chord between two orientations, made unit: the path of `slerp`, faster in the middle than at the ends. `t` is any finite
 * number (|t| beyond 1e300 counts as 1e300). Sign-safe: the short way, on the side of `a`; half a turn apart (a·b = 0 in float64) the
 * signs as they stand tell the way. Exact to the bit at `t = 0` and, but for the sign, at `t = 1`. Inputs that are not unit are
 * made unit first; one of no length counts as identity. `out` may be `a` or `b`.
 */
export function nlerp<T extends NumberStore>(
  out: T,
  a: ReadonlyNumberStore,
  b: ReadonlyNumberStore,
  t: number,
): T {
  const ka = unitScaleOf(a);
  const kb = unitScaleOf(b);
  const ax = a[0] * ka,
    ay = a[1] * ka,
    az = a[2] * ka,
    aw = ka === 0 ? 1 : a[3] * ka;
  const bx = b[0] * kb,
    by = b[1] * kb,
    bz = b[2] * kb,
    bw = kb === 0 ? 1 : b[3] * kb;
  const along = Math.max(-1e300, Math.min(1e300, t));
  const wa = 1 - along;
  const wb = ax * bx + ay * by + az * bz + aw * bw < 0 ? -along : along;
  const x = wa * ax + wb * bx;
  const y = wa * ay + wb * by;
  const z = wa * az + wb * bz;
  const w = wa * aw + wb * bw;
  const scale = unitScale(x, y, z, w);
  out[0] = x * scale;
  out[1] = y * scale;
  out[2] = z * scale;
  out[3] = w * scale;
  return out;
}
