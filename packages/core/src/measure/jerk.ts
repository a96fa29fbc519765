import type { Curve, Frame } from '../curve/curve.js';
import type { NumberStore } from '../number-store.js';
import { findSegment } from '../track/find-segment.js';
import { overSegments } from './over-segments.js';

/** Step of the differences, in parts of the segment. */
const STEP = 1 / 512;

/**
 * Angular jerk, rad/s³, at `t`: the derivative of the components of the acceleration in the axes of `frame`. The two frames differ
 * by more than a turn: d²Ω/dt² = R(ω″ + ω × ω′). Five-point differences of the exact acceleration inside the segment, never across a
 * knot: good to about 1e-9 of the acceleration over the segment's duration. 0 outside the curve. Writes three numbers.
 */
export function jerk<T extends NumberStore>(out: T, curve: Curve, t: number, frame: Frame): T {
  const { knots } = curve;
  out[0] = 0;
  out[1] = 0;
  out[2] = 0;
  if (!(t >= curve.start && t <= curve.end) || knots.length < 2) return out;
  const segment = Math.min(findSegment(knots, t), knots.length - 2);
  const step = (knots[segment + 1] - knots[segment]) * STEP;
  // The middle stays so far inside that no difference reaches a knot, whose acceleration is the next segment's.
  const middle = Math.max(knots[segment] + 2.5 * step, Math.min(knots[segment + 1] - 2.5 * step, t));
  const s = (t - middle) / step;
  const now: [number, number, number] = [0, 0, 0];
  for (let n = -2; n <= 2; n++) {
    curve.acceleration(now, middle + n * step, frame);
    const weight = slopeWeight(n, s) / step;
    for (let axis = 0; axis < 3; axis++) out[axis] += weight * now[axis];
  }
  return out;
}

/** Derivative at `s` of the quartic that is 1 at `n` and 0 at the other four of −2 … 2 (J. L. Lagrange). */
function slopeWeight(n: number, s: number): number {
  const cube = 4 * s ** 3;
  const square = s * s;
  if (n === 0) return (cube - 10 * s) / 4;
  const sign = Math.sign(n);
  return Math.abs(n) === 1
    ? -(cube + sign * 3 * square - 8 * s - sign * 4) / 6
    : (cube + sign * 6 * square - 2 * s - sign * 2) / 24;
}

/** Jerk of a curve inside its segments. */
export interface JerkMeasures {
  /** Root of the mean square of the jerk over the curve's time, rad/s³. */
  readonly rmsJerk: number;
  /** Greatest jerk at the 64 places a segment that are looked at, rad/s³, and when. */
  readonly peakJerk: number;
  readonly peakJerkAt: number;
  /** Whether the acceleration is continuous; where it is not, jerk at knots has no bound and counts for nothing here. */
  readonly accelerationContinuous: boolean;
}

/** Measures the jerk of a curve in the axes of `frame`. Zeros at its start for a curve of no time. */
export function measureJerk(curve: Curve, frame: Frame): JerkMeasures {
  const now = new Float64Array(3);
  let squares = 0;
  let peakJerk = 0;
  let peakJerkAt = curve.start;
  overSegments(curve, curve.start, curve.end, (time, weight) => {
    jerk(now, curve, time, frame);
    const size = Math.hypot(now[0], now[1], now[2]);
    squares += weight * size * size;
    if (size <= peakJerk) return;
    peakJerk = size;
    peakJerkAt = time;
  });
  const duration = curve.end - curve.start;
  const rmsJerk = duration > 0 ? Math.sqrt(squares / duration) : 0;
  return { rmsJerk, peakJerk, peakJerkAt, accelerationContinuous: curve.continuity === 2 };
}
