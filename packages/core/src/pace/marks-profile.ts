import type { AngleProfile } from './angle-profile.js';
import { firstNotBelow } from './first-not-below.js';
import { findSegment } from '../track/find-segment.js';

/**
 * Turns by given angles at given times, without a jump of the speed and never back: cubic Hermite with slopes of F. N. Fritsch and J. Butland (SIAM J.
 * Sci. Stat. Comput. 5 (1984) 300–304, from memory): the weighted harmonic mean of both mean speeds, which keeps it monotone. Ends take the
 * parabola's slope, limited to three times the mean speed.
 *
 * @param times seconds, strictly ascending, 0 first
 * @param angles radians, never falling, 0 first
 */
export function marksProfile(times: readonly number[], angles: readonly number[]): AngleProfile {
  const gaps = times.slice(1).map((time, i) => time - times[i]);
  const means = gaps.map((gap, i) => (angles[i + 1] - angles[i]) / gap);
  const slopes = times.map((_, i) => slopeAt(gaps, means, i));
  const last = gaps.length - 1;
  const seconds = times[times.length - 1];
  const piece = (t: number): { i: number; u: number; h: number } => {
    const i = Math.min(last, findSegment(times, t));
    return { i, u: Math.max(0, Math.min(1, (t - times[i]) / gaps[i])), h: gaps[i] };
  };
  const angleIn = (i: number, u: number): number => {
    const rise = angles[i + 1] - angles[i];
    const [a, b] = [slopes[i] * gaps[i], slopes[i + 1] * gaps[i]];
    return angles[i] + u * (a + u * (3 * rise - 2 * a - b + u * (a + b - 2 * rise)));
  };
  return {
    seconds,
    knots: times,
    continuity: 1,
    angleAt(t) {
      if (t >= seconds) return angles[angles.length - 1];
      const { i, u } = piece(t);
      return angleIn(i, u);
    },
    timeOf(wanted) {
      if (!(wanted > 0)) return 0;
      const i = Math.max(0, firstNotBelow(angles, wanted) - 1);
      let low = 0;
      let high = 1;
      for (let round = 0; round < 60; round++) {
        const middle = (low + high) / 2;
        if (angleIn(i, middle) < wanted) low = middle;
        else high = middle;
      }
      return times[i] + high * gaps[i];
    },
    speedAt(t) {
      const { i, u } = piece(t);
      const [a, b] = [slopes[i], slopes[i + 1]];
      return Math.max(0, a + u * (6 * means[i] - 4 * a - 2 * b + u * (3 * a + 3 * b - 6 * means[i])));
    },
    accelerationAt(t) {
      const { i, u, h } = piece(t);
      const [a, b] = [slopes[i], slopes[i + 1]];
      return (6 * means[i] - 4 * a - 2 * b + u * (6 * a + 6 * b - 12 * means[i])) / h;
    },
  };
}

function slopeAt(gaps: readonly number[], means: readonly number[], i: number): number {
  if (gaps.length === 1) return means[0];
  if (i === 0) return endSlope(gaps[0], gaps[1], means[0], means[1]);
  const last = gaps.length - 1;
  if (i > last) return endSlope(gaps[last], gaps[last - 1], means[last], means[last - 1]);
  const [before, after] = [means[i - 1], means[i]];
  if (!(before > 0 && after > 0)) return 0;
  const [w0, w1] = [2 * gaps[i] + gaps[i - 1], gaps[i] + 2 * gaps[i - 1]];
  return (w0 + w1) / (w0 / before + w1 / after);
}

function endSlope(h0: number, h1: number, mean0: number, mean1: number): number {
  const slope = ((2 * h0 + h1) * mean0 - h0 * mean1) / (h0 + h1);
  return Math.max(0, Math.min(3 * mean0, slope));
}
