import { greatest } from './greatest.js';
import { integrate } from './integrate.js';
import type { SegmentMotion } from './segmented-curve.js';

/** Radians: less than the rounding of one orientation. */
const ROUNDING = 1e-16;

/**
 * Length and peak of a motion that has closed rates but no closed length: adaptive integration and search of its exact speed, to
 * about 1e-13 of the length and every digit of the peak.
 */
export function withNumericLength(
  motion: Omit<SegmentMotion, 'length' | 'peakAt'>,
  gaps: Float64Array,
): SegmentMotion {
  const now = new Float64Array(3);
  const speed =
    (segment: number) =>
    (u: number): number => {
      motion.rate(now, segment, u);
      return gaps[segment] * Math.sqrt(now[0] ** 2 + now[1] ** 2 + now[2] ** 2);
    };
  return {
    ...motion,
    length: (segment, u0, u1) => integrate(speed(segment), u0, u1, [], ROUNDING),
    peakAt: (segment, u0, u1) => greatest(speed(segment), u0, u1),
  };
}
