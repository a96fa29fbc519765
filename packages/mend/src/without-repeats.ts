import {
  type RotationTrack,
  SlewcurveError,
  VALUES_PER_KEY,
  angleFloor,
  exactRate,
  replaceTrack,
  segmentAngle,
} from '@slewcurve/core';
import { placeOf } from './acted-keys.js';
import type { Step } from './step.js';

/**
 * A track whose frames were repeated to fill a faster grid, as it was before: repeats dropped, the other keys at frames of `source` a second. A rest of more
 * than one frame stays a rest. LINEAR, STEP and angle tracks.
 *
 * @throws SlewcurveError `step.no-repeats` where the track is CUBICSPLINE
 */
export function withoutRepeats(track: RotationTrack, source: NonNullable<Step['source']>): RotationTrack {
  if (track.interpolation === 'CUBICSPLINE')
    throw new SlewcurveError(
      'step.no-repeats',
      'Frames are repeated on tracks that are read frame by frame; this one is CUBICSPLINE. Leave source out.',
      placeOf(track),
    );
  const rate = exactRate(source);
  const { times } = track;
  const same = 2 * angleFloor(track.storage, track.interpolation) + 1e-12;
  const keys: { old: number; frame: number }[] = [{ old: 0, frame: 0 }];
  for (let key = 1; key < times.length; key++) {
    if (segmentAngle(track, key - 1) <= same && key + 1 < times.length) continue;
    const before = keys[keys.length - 1];
    const frame = Math.max(before.frame + 1, Math.floor((times[key] - times[0]) * rate + 1e-6));
    // After a rest the key before it is held until the frame before this one.
    if (frame > before.frame + 1 && key - 1 > before.old) keys.push({ old: key - 1, frame: frame - 1 });
    keys.push({ old: key, frame });
  }
  const size = VALUES_PER_KEY[track.interpolation];
  const values = new Float64Array(size * keys.length);
  keys.forEach(({ old }, i) => values.set(track.values.subarray(old * size, (old + 1) * size), i * size));
  const cuts = new Set(track.breaks);
  return replaceTrack(track, {
    times: Float64Array.from(keys, ({ frame }) => times[0] + frame / rate),
    values,
    breaks: keys.flatMap(({ old }, i) => (cuts.has(old) ? [i] : [])),
  });
}
