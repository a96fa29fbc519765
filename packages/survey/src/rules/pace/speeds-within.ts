import type { Curve } from '@slewcurve/core';

const DEGREES = 180 / Math.PI;

/** Angular speed at `count` even moments strictly inside a stretch of time, deg/s. */
export function speedsWithin(curve: Curve, from: number, to: number, count: number): Float64Array {
  const rate = new Float64Array(3);
  return Float64Array.from({ length: count }, (_, i) => {
    curve.rate(rate, from + ((to - from) * (i + 0.5)) / count, 'own');
    return Math.hypot(...rate) * DEGREES;
  });
}
