import { playableTrack } from '../track/playable-track.js';
import type { RotationTrack } from '../track/rotation-track.js';
import type { Curve } from './curve.js';
import { segmentedCurve, still } from './segmented-curve.js';
import { copyKey, unitKeys } from './unit-keys.js';

/**
 * Every key holds until the next: glTF 2.0's STEP. Rate, acceleration and length are zero; the orientation jumps at the keys.
 * Keys that cannot be played are left out (`playableTrack`).
 */
export function stepCurve(track: RotationTrack): Curve {
  const played = playableTrack(track);
  const keys = unitKeys(played);
  return segmentedCurve({
    times: played.times,
    breaks: Array.from(played.times, (_, key) => key),
    continuity: 0,
    key: (out, key) => copyKey(out, keys, key),
    motion: {
      orientation: (out, i) => copyKey(out, keys, i),
      rate: still,
      acceleration: still,
      length: () => 0,
      peakAt: (_, u0) => u0,
    },
  });
}
