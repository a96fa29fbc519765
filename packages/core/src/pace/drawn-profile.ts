import { findSegment } from '../track/find-segment.js';
import type { AngleProfile } from './angle-profile.js';
import { firstNotBelow } from './first-not-below.js';

/** A speed over time as it is drawn: straight between points, jumping where two points have one time. Seconds, rad/s, from time 0. */
export interface DrawnSpeed {
  /** Ascending; 0 first. */
  readonly times: ArrayLike<number>;
  /** None negative. */
  readonly speeds: ArrayLike<number>;
}

/** Angle under a drawn speed, radians: trapezoids, so exact. */
export function areaUnder({ times, speeds }: DrawnSpeed): number {
  let area = 0;
  for (let i = 1; i < times.length; i++)
    area += ((times[i] - times[i - 1]) * (speeds[i] + speeds[i - 1])) / 2;
  return area;
}

/**
 * The profile of a drawn speed, scaled so that its area is `angle`.
 *
 * @param knots times at which it is not smooth, 0 and the last one included; default all
 */
export function drawnProfile(
  drawn: DrawnSpeed,
  angle: number,
  knots: readonly number[] = [...new Set(Array.from(drawn.times))],
): AngleProfile {
  const times = Float64Array.from(drawn.times);
  const area = areaUnder(drawn);
  const speeds = Float64Array.from(drawn.speeds, (speed) => (area > 0 ? speed * (angle / area) : 0));
  const last = times.length - 1;
  const angles = new Float64Array(times.length);
  for (let i = 1; i <= last; i++)
    angles[i] = angles[i - 1] + ((times[i] - times[i - 1]) * (speeds[i] + speeds[i - 1])) / 2;
  /** The piece that owns a time, and how far into it. */
  const piece = (t: number): { i: number; past: number; slope: number } => {
    const i = Math.max(0, Math.min(last - 1, findSegment(times, t)));
    const gap = times[i + 1] - times[i];
    return { i, past: t - times[i], slope: gap > 0 ? (speeds[i + 1] - speeds[i]) / gap : 0 };
  };
  return {
    seconds: times[last],
    knots,
    continuity: times.some((time, i) => i > 0 && time === times[i - 1] && speeds[i] !== speeds[i - 1])
      ? 0
      : 1,
    angleAt(t) {
      if (t >= times[last]) return angle;
      const { i, past, slope } = piece(Math.max(0, t));
      return Math.min(angle, angles[i] + past * (speeds[i] + (past * slope) / 2));
    },
    timeOf(wanted) {
      if (!(wanted > 0)) return 0;
      const i = Math.max(0, firstNotBelow(angles, wanted) - 1);
      const gap = times[i + 1] - times[i];
      const slope = gap > 0 ? (speeds[i + 1] - speeds[i]) / gap : 0;
      const left = Math.max(0, wanted - angles[i]);
      // Root of v·x + a·x²/2 = left, in the form that loses no digits.
      const root = Math.sqrt(Math.max(0, speeds[i] ** 2 + 2 * slope * left));
      const past = left === 0 ? 0 : (2 * left) / (speeds[i] + root);
      return Math.min(times[i + 1], times[i] + past);
    },
    speedAt(t) {
      const { i, past, slope } = piece(t);
      return speeds[i] + past * slope;
    },
    accelerationAt: (t) => piece(t).slope,
  };
}
