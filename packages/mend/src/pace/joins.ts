import { type Curve, type RotationTrack, type Span, findSegment } from '@slewcurve/core';
import { DEGREES } from '../edit-result.js';
import type { Meeting } from '../verb.js';

/** Share of a gap by which the side before a time is looked at. */
const BEFORE = 1e-6;

/** Where the two sides of a join end and begin: one time, but for a cut, before which a pose is held, and for the seam of a loop. */
export interface Join {
  readonly before: number;
  readonly after: number;
}

/** The join at a time: at the track's own start or end the seam of its loop, at a declared cut both its sides. */
export function joinAt({ times, breaks }: RotationTrack, at: number): Join {
  const last = times.length - 1;
  if (at <= times[0] || at >= times[last]) return { before: times[last], after: times[0] };
  const key = findSegment(times, at);
  const held = times[key] === at && !breaks.includes(key) ? key - 1 : key;
  return breaks.includes(held) ? { before: times[held], after: times[held + 1] } : { before: at, after: at };
}

/** Own-axis rates just before and just after a join, rad/s. */
export function ratesAt(curve: Curve, { before, after }: Join): readonly [Float64Array, Float64Array] {
  const { knots } = curve;
  const at = knots.findLastIndex((knot) => knot < before);
  const gap = before - (at < 0 ? before - 1 : knots[at]);
  return [
    curve.rate(new Float64Array(3), before - BEFORE * gap, 'own'),
    curve.rate(new Float64Array(3), after, 'own'),
  ];
}

/** What two rates are to one another. */
export function meetingOf([before, after]: readonly [Float64Array, Float64Array]): Meeting {
  const [x, y, z] = [0, 1, 2].map((i) => {
    const [j, k] = [(i + 1) % 3, (i + 2) % 3];
    return before[j] * after[k] - before[k] * after[j];
  });
  const along = before.reduce((sum, part, i) => sum + part * after[i], 0);
  return {
    before: Math.hypot(...before) * DEGREES,
    after: Math.hypot(...after) * DEGREES,
    axis: Math.atan2(Math.hypot(x, y, z), along) * DEGREES,
  };
}

/** How far a side may be shaped without leaving the span, or meeting the other side across a seam. */
export function roomAt({ before, after }: Join, [from, to]: Span): number {
  return after < before ? (to - from) / 2 : Infinity;
}
