import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import { unitScaleOf } from './unit-scale.js';

/**
 * Rotation vector of `q`, the short way: axis times full angle, radians, at most π long, in own and in parent axes alike (a turn
 * leaves its own axis fixed). `q` and `-q` give the same vector, but at exactly half a turn (w = 0) the stored sign tells which
 * of the two ways is meant. Not unit is allowed; no length gives zero. Writes three numbers; `out` may be `q`.
 *
 * r = 2·atan2(|v|, w)·v/|v|, the sign first made w ≥ 0.
 */
export function logMap<T extends NumberStore>(out: T, q: ReadonlyNumberStore): T {
  return rotationVector(out, q, q[3] < 0 ? -1 : 1);
}

/**
 * Rotation vector of `q` with its sign taken as it stands: less than 2π long, past π where w < 0. Exactly `-1` gives 2π about x.
 * Everything else as `logMap`.
 */
export function logMapLong<T extends NumberStore>(out: T, q: ReadonlyNumberStore): T {
  return rotationVector(out, q, 1);
}

function rotationVector<T extends NumberStore>(out: T, q: ReadonlyNumberStore, sign: number): T {
  const scale = sign * unitScaleOf(q);
  const x = q[0] * scale,
    y = q[1] * scale,
    z = q[2] * scale,
    w = q[3] * scale;
  const sine = Math.sqrt(x * x + y * y + z * z);
  // Below 1e-150 the squares leave float64; there atan2(s, w)/s is 1/w to every digit, as it is from 1e-8 down.
  const longer = sine > 1e-150 ? (2 * Math.atan2(sine, w)) / sine : w > 0 ? 2 / w : 0;
  out[0] = sine <= 1e-150 && w < 0 ? 2 * Math.PI : x * longer;
  out[1] = y * longer;
  out[2] = z * longer;
  return out;
}
