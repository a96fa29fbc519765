import type { NumberStore, ReadonlyNumberStore } from '../number-store.js';
import { unitScaleOf } from './unit-scale.js';

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
 * Between the ends, the short way: with Ω the angle between the two quaternions, h = Ω/2 and k = 2t − 1 the orientation is
 * `cos(hk)·(a + b)/(2 cos h) + sin(hk)·(b − a)/(2 sin h)`, K. Shoemake's two sines (SIGGRAPH 1985) by the sine of a sum over that
 * of a double angle; 2 sin h is the length of b − a. Everywhere else: `a·(n sin tΩ, cos tΩ)` with `(n sin Ω, cos Ω) = a⁻¹b`. Neither
 * divides by sin Ω alone, so no small-angle branch is needed and no digit is lost however far `t` runs past the ends.
 */
function turnAlong<T extends NumberStore>(
  out: T,
  a: ReadonlyNumberStore,
  b: ReadonlyNumberStore,
  t: number,
  short: boolean,
): T {
  const ka = unitScaleOf(a);
  const kb = unitScaleOf(b);
  const ax = a[0] * ka,
    ay = a[1] * ka,
    az = a[2] * ka,
    aw = ka === 0 ? 1 : a[3] * ka;
  let bx = b[0] * kb,
    by = b[1] * kb,
    bz = b[2] * kb,
    bw = kb === 0 ? 1 : b[3] * kb;
  let dot = ax * bx + ay * by + az * bz + aw * bw;
  let side = 1;
  if (short && dot < 0) {
    side = -1;
    bx = -bx;
    by = -by;
    bz = -bz;
    bw = -bw;
    dot = -dot;
  }
  if (t === 0) return scaled(out, a, ka, 1);
  if (t === 1) return scaled(out, b, kb, side);
  let dx = bx - ax,
    dy = by - ay,
    dz = bz - az,
    dw = bw - aw;
  const s = (dx * dx + dy * dy + dz * dz + dw * dw) / 4;
  if (s === 0) return scaled(out, a, ka, 1);
  let angle: number;
  let even = 1;
  let odd: number;
  if (dot >= 0 && t > 0 && t < 1) {
    const sine = Math.sqrt(s);
    angle = Math.asin(sine) * (2 * t - 1);
    even = 0.5 / Math.sqrt(1 - s);
    odd = 0.5 / sine;
    bx += ax;
    by += ay;
    bz += az;
    bw += aw;
  } else {
    let nx = aw * bx - ax * bw - (ay * bz - az * by);
    const ny = aw * by - ay * bw - (az * bx - ax * bz);
    const nz = aw * bz - az * bw - (ax * by - ay * bx);
    let sine = Math.sqrt(nx * nx + ny * ny + nz * nz);
    angle = Math.atan2(sine, dot) * Math.max(-1e300, Math.min(1e300, t));
    // b = -a: about a's own x axis.
    if (sine === 0) nx = sine = 1;
    odd = 1 / sine;
    bx = ax;
    by = ay;
    bz = az;
    bw = aw;
    dx = aw * nx + ay * nz - az * ny;
    dy = aw * ny + az * nx - ax * nz;
    dz = aw * nz + ax * ny - ay * nx;
    dw = -ax * nx - ay * ny - az * nz;
  }
  even *= Math.cos(angle);
  odd *= Math.sin(angle);
  const x = even * bx + odd * dx;
  const y = even * by + odd * dy;
  const z = even * bz + odd * dz;
  const w = even * bw + odd * dw;
  // One Newton step towards unit length takes the rounding away.
  const unit = 1.5 - 0.5 * (x * x + y * y + z * z + w * w);
  // Written here: numbers handed to a call that is not inlined may be boxed, and boxes are allocation.
  out[0] = x * unit;
  out[1] = y * unit;
  out[2] = z * unit;
  out[3] = w * unit;
  return out;
}

/** `q` times its `unitScale`, on a side; identity where it has no length. */
function scaled<T extends NumberStore>(out: T, q: ReadonlyNumberStore, scale: number, side: number): T {
  const by = scale * side;
  out[0] = q[0] * by;
  out[1] = q[1] * by;
  out[2] = q[2] * by;
  out[3] = scale === 0 ? side : q[3] * by;
  return out;
}
