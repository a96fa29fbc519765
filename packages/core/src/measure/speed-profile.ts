import type { Curve } from '../curve/curve.js';

/** Angular speed of a curve, rad/s, from `t0` to `t1` seconds at `rate` samples a second, the first at `t0`. */
export function speedProfile(
  curve: Curve,
  rate: number,
  t0: number = curve.start,
  t1: number = curve.end,
): Float64Array {
  const now = new Float64Array(3);
  // A whole number of steps may come out a rounding short.
  const count = t1 >= t0 ? Math.floor((t1 - t0) * rate + 1e-9) + 1 : 0;
  return Float64Array.from({ length: count }, (_, n) => {
    curve.rate(now, Math.min(t1, t0 + n / rate), 'own');
    return Math.hypot(now[0], now[1], now[2]);
  });
}
