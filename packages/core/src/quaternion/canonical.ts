import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';

/**
 * The one of `q` and `-q` with w > 0; where w is 0, with its first component that is not 0 positive. For comparing or storing
 * single poses. Never for a track: a turn through 180° changes sides, and the track would jump from `q` to `-q` there; a track's
 * signs are `alignSigns`' matter. `out` may be `q`. Never throws.
 */
export function canonical<T extends NumberStore>(out: T, q: ReadonlyNumberStore): T {
  const x = q[0],
    y = q[1],
    z = q[2],
    w = q[3];
  const sign = (w || x || y || z) < 0 ? -1 : 1;
  out[0] = sign * x;
  out[1] = sign * y;
  out[2] = sign * z;
  out[3] = sign * w;
  return out;
}
