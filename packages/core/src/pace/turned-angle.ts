import { findSegment } from '../track/find-segment.js';
import type { Curve } from '../curve/curve.js';
import { firstNotBelow } from './first-not-below.js';

/** The angle that a curve has turned by a time, and the other way round. Radians, seconds. */
export interface TurnedAngle {
  /** From start to end. */
  readonly total: number;
  /** Angle turned from the start to `t`. Never falls. */
  angleAt(t: number): number;
  /**
   * The time by which an angle is turned; the first one where the curve rests there. Outside 0 to `total`: the start, or the first time at
   * which all is turned.
   */
  timeAt(angle: number): number;
}

/**
 * s(t) = ∫|ω|dt with its inverse. Lengths are the curve's own: exact for great arcs, else adaptive, so that a speed that touches zero costs
 * time and not digits. The inverse is Newton with the exact speed, kept inside a bracket.
 */
export function turnedAngle(curve: Curve): TurnedAngle {
  const { knots } = curve;
  const sums = new Float64Array(knots.length);
  for (let i = 1; i < knots.length; i++) sums[i] = sums[i - 1] + curve.length(knots[i - 1], knots[i]);
  const total = sums[sums.length - 1];
  const angleAt = (t: number): number => {
    if (!(t > knots[0])) return 0;
    if (t >= knots[knots.length - 1]) return total;
    const i = findSegment(knots, t);
    return Math.min(sums[i + 1], sums[i] + curve.length(knots[i], t));
  };
  return {
    total,
    angleAt,
    timeAt(angle) {
      const wanted = Math.max(0, Math.min(total, angle));
      const i = firstNotBelow(sums, wanted);
      if (i === 0 || sums[i] === wanted) return knots[i];
      return timeWithin(curve, knots[i - 1], knots[i], wanted - sums[i - 1], sums[i] - sums[i - 1]);
    },
  };
}

/** The time between `from` and `to`, over which `whole` is turned, by which `angle` is: 0 < angle < whole. */
export function timeWithin(curve: Curve, from: number, to: number, angle: number, whole: number): number {
  const rate = new Float64Array(3);
  let low = from;
  let high = to;
  // Angle turned from `from` to `low`, kept so that later lengths are short.
  let done = 0;
  curve.rate(rate, from, 'own');
  let t =
    from +
    (to - from) * shareAt(angle / whole, (Math.hypot(rate[0], rate[1], rate[2]) * (to - from)) / whole);
  for (let i = 0; i < 60; i++) {
    const turned = done + curve.length(low, t);
    const miss = turned - angle;
    curve.rate(rate, t, 'own');
    const speed = Math.hypot(rate[0], rate[1], rate[2]);
    // As near as the angle, or the time, can be told in float64, but for a factor of ten.
    if (Math.abs(miss) <= Math.max(4e-15 * angle, Number.EPSILON * Math.abs(t) * speed)) return t;
    if (miss > 0) high = t;
    else {
      low = t;
      done = turned;
    }
    const next = t - miss / speed;
    const after = next > low && next < high ? next : low + (high - low) / 2;
    if (after === t || !(low < after && after < high)) return after;
    t = after;
  }
  return t;
}

/** The share x of a time by which a share of its angle is turned, by the parabola that begins at `speed` times the mean: x·speed + x²(1 − speed). */
function shareAt(wanted: number, speed: number): number {
  const root = Math.sqrt(Math.max(0, speed * speed + 4 * (1 - speed) * wanted));
  const share = (2 * wanted) / (speed + root);
  return share > 0 && share < 1 ? share : wanted;
}
