import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import { unitScale } from './unit-scale.js';

/**
 * Great-arc interpolation, the short way, at constant angular speed. `t` is any finite number: past 0 and 1 the turn goes on at
 * the same speed (|t| beyond 1e300 counts as 1e300). Units: quaternions `[x, y, z, w]`; the result is unit.
 *
 * - `q` and `-q` play the same; the result lies on the side of `a`, so that `t = 0` gives `a` to the bit and `t = 1` gives `b`
 *   to the bit, negated where a·b < 0.
 * - Half a turn apart (a·b = 0 in float64) both ways are as short: the turn goes about the axis of `a⁻¹b` as the signs stand.
 * - Inputs that are not unit are made unit first; one of no length counts as identity.
 * - `out` may be `a` or `b`.
 */
export function slerp<T extends NumberStore>(
  out: T,
  a: ReadonlyNumberStore,
  b: ReadonlyNumberStore,
  t: number,
): T {
  return turnAlong(out, a, b, t, true);
}

/**
 * As `slerp`, but the signs as they stand tell the way: a·b < 0 goes the long way, up to a full turn. Exactly `b = -a` is a full
 * turn about `a`'s own x axis. `t = 1` gives `b` itself.
 */
export function slerpAsStored<T extends NumberStore>(
  out: T,
  a: ReadonlyNumberStore,
  b: ReadonlyNumberStore,
  t: number,
): T {
  return turnAlong(out, a, b, t, false);
}

/**
 * `a·(n sin tΩ, cos tΩ)` with `(n sin Ω, cos Ω) = a⁻¹b`. The same curve as K. Shoemake's two sines (SIGGRAPH 1985), but nothing
 * is divided by sin Ω alone, so no small-angle branch is needed and no digit is lost however far `t` runs past the ends.
 */
function turnAlong<T extends NumberStore>(
  out: T,
  a: ReadonlyNumberStore,
  b: ReadonlyNumberStore,
  t: number,
  short: boolean,
): T {
  const ka = unitScale(a[0], a[1], a[2], a[3]);
  const kb = unitScale(b[0], b[1], b[2], b[3]);
  const ax = a[0] * ka,
    ay = a[1] * ka,
    az = a[2] * ka,
    aw = ka === 0 ? 1 : a[3] * ka;
  let bx = b[0] * kb,
    by = b[1] * kb,
    bz = b[2] * kb,
    bw = kb === 0 ? 1 : b[3] * kb;
  let cosine = ax * bx + ay * by + az * bz + aw * bw;
  if (short && cosine < 0) {
    bx = -bx;
    by = -by;
    bz = -bz;
    bw = -bw;
    cosine = -cosine;
  }
  let nx = aw * bx - ax * bw - (ay * bz - az * by);
  let ny = aw * by - ay * bw - (az * bx - ax * bz);
  let nz = aw * bz - az * bw - (ax * by - ay * bx);
  const sine = Math.sqrt(nx * nx + ny * ny + nz * nz);
  if (t === 0 || (sine === 0 && cosine > 0)) return write(out, ax, ay, az, aw);
  if (t === 1) return write(out, bx, by, bz, bw);
  const half = Math.atan2(sine, cosine) * Math.max(-1e300, Math.min(1e300, t));
  if (sine === 0 && cosine < 0) nx = 1;
  else if (sine > 0) {
    nx /= sine;
    ny /= sine;
    nz /= sine;
  }
  const s = Math.sin(half);
  const c = Math.cos(half);
  const x = ax * c + s * (aw * nx + ay * nz - az * ny);
  const y = ay * c + s * (aw * ny + az * nx - ax * nz);
  const z = az * c + s * (aw * nz + ax * ny - ay * nx);
  const w = aw * c - s * (ax * nx + ay * ny + az * nz);
  // One Newton step towards unit length takes the rounding of the product away.
  const unit = 1.5 - 0.5 * (x * x + y * y + z * z + w * w);
  return write(out, x * unit, y * unit, z * unit, w * unit);
}

function write<T extends NumberStore>(out: T, x: number, y: number, z: number, w: number): T {
  out[0] = x;
  out[1] = y;
  out[2] = z;
  out[3] = w;
  return out;
}
