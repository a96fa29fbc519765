import { type RotationTrack, medianGap } from '@slewcurve/core';
import { turnBetween } from '../key-turns.js';

/** deg/s from which motion is guarded unless the step says otherwise: the speed up to which survey can tell noise from motion. */
export const GUARD_RATE = 60;

/** Seconds on either side over which speed is judged, so that noise is not taken for it. */
const JUDGED = 0.05;

/** Keys that turn faster than `rate` deg/s, and those within `margin` seconds of one; 1 for each. */
export function fastKeys(
  track: RotationTrack,
  orientations: Float64Array,
  rate: number,
  margin: number,
): Uint8Array {
  const { times } = track;
  const last = times.length - 1;
  const half = Math.max(1, Math.round(JUDGED / medianGap(track)));
  const isFast = new Uint8Array(times.length);
  const turn = new Float64Array(3);
  for (let key = 0; key <= last; key++) {
    const [from, to] = [Math.max(0, key - half), Math.min(last, key + half)];
    const speed = Math.hypot(...turnBetween(turn, orientations, from, to)) / (times[to] - times[from]);
    if (speed * (180 / Math.PI) > rate) isFast[key] = 1;
  }
  return widened(times, isFast, margin);
}

/** Adds the keys of given spans, seconds. */
export function guardKeys(
  { times }: RotationTrack,
  spans: readonly (readonly [number, number])[],
  isGuarded: Uint8Array,
): void {
  for (const [from, to] of spans)
    times.forEach((time, key) => {
      if (time >= from && time <= to) isGuarded[key] = 1;
    });
}

/** Sigmas on either side over which is asked whether what an average takes off leans one way. */
const LEANS_OVER = 2;

/** Standard deviations an axis beyond which a correction is none of noise: an outlier, a frozen key, for which there are other edits. */
const OUTLYING = 6;

/** Of the usual noise: noise itself leaves a tenth in the mean over so many keys. */
const LEANING = 0.5;

/** What the median length of a normal vector of three is in standard deviations of one part: the chi distribution. */
const MEDIAN_LENGTH = 1.538;

/**
 * Adds the keys at which an average takes off something else than noise: over two sigmas on either side its corrections lean one way by more than half of what
 * noise makes of them, or a key stands further off than noise ever does.
 *
 * @param turns the corrections, three numbers a key; zero where guarded
 */
export function movedKeys(
  { times }: RotationTrack,
  turns: Float64Array,
  sigma: number,
  isGuarded: Uint8Array,
): void {
  const lengths = new Float64Array(times.length);
  let count = 0;
  for (let key = 0; key < times.length; key++)
    if (isGuarded[key] === 0)
      lengths[count++] = Math.hypot(turns[3 * key], turns[3 * key + 1], turns[3 * key + 2]);
  const ascending = lengths.subarray(0, count);
  ascending.sort();
  const noise = (ascending[count >> 1] ?? 0) / MEDIAN_LENGTH;
  const leans = new Uint8Array(times.length);
  const sums = new Float64Array(3);
  let [from, to] = [0, 0];
  for (let key = 0; key < times.length; key++) {
    for (; to < times.length && times[to] <= times[key] + LEANS_OVER * sigma; to++)
      for (let axis = 0; axis < 3; axis++) sums[axis] += turns[3 * to + axis];
    for (; times[from] < times[key] - LEANS_OVER * sigma; from++)
      for (let axis = 0; axis < 3; axis++) sums[axis] -= turns[3 * from + axis];
    const isLeaning = Math.hypot(...sums) > LEANING * noise * (to - from);
    if (isLeaning || Math.hypot(...turns.subarray(3 * key, 3 * key + 3)) > OUTLYING * noise) leans[key] = 1;
  }
  widened(times, leans, sigma).forEach((flag, key) => {
    if (flag !== 0) isGuarded[key] = 1;
  });
}

/** The flags, and those of all keys within `margin` seconds of one. */
function widened(times: Float64Array, flags: Uint8Array, margin: number): Uint8Array {
  const wide = new Uint8Array(flags.length);
  let until = -Infinity;
  for (let key = 0; key < flags.length; key++) {
    if (flags[key] !== 0) until = times[key] + margin;
    if (times[key] <= until) wide[key] = 1;
  }
  let since = Infinity;
  for (let key = flags.length - 1; key >= 0; key--) {
    if (flags[key] !== 0) since = times[key] - margin;
    if (times[key] >= since) wide[key] = 1;
  }
  return wide;
}
