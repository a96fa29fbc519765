import type { RotationTrack } from './rotation-track.js';

/** Dense keys are redundant, so that outliers can be told from intent; sparse keys are each a decision. */
export type Regime = 'dense' | 'sparse';

/** Keys per second from which a track counts as dense whatever its grid. */
const DENSE_RATE = 20;
/** Frames of the clip's grid up to which a median gap counts as dense. */
const DENSE_FRAMES = 1.5;

/**
 * Dense where the median gap between keys is at most one and a half frames of the clip's grid, or where there are 20 keys a second or
 * more; sparse otherwise, and with fewer than two keys.
 *
 * @param frameRate frames per second of the clip's grid, where it has one
 */
export function regime(track: RotationTrack, frameRate?: number): Regime {
  const gap = medianGap(track);
  if (!(gap > 0)) return 'sparse';
  // A float32 clock may put a gap a hair past the bound.
  const slack = 1 + 1e-6;
  const dense = frameRate !== undefined && gap <= (DENSE_FRAMES / frameRate) * slack;
  return dense || gap <= (1 / DENSE_RATE) * slack ? 'dense' : 'sparse';
}

const known = new WeakMap<Float64Array, number>();

/** Median time between neighbouring keys, seconds; the lower of the middle two. NaN gaps are left out; 0 without gaps. */
export function medianGap({ times }: RotationTrack): number {
  // Asked for by many measures of one track, and tracks of a clip often share their times.
  const before = known.get(times);
  if (before !== undefined) return before;
  const gaps = new Float64Array(Math.max(0, times.length - 1));
  let count = 0;
  for (let key = 0; key + 1 < times.length; key++) {
    const gap = times[key + 1] - times[key];
    if (!Number.isNaN(gap)) gaps[count++] = gap;
  }
  const sorted = gaps.subarray(0, count);
  sorted.sort();
  const median = count === 0 ? 0 : sorted[(count - 1) >> 1];
  known.set(times, median);
  return median;
}
