import { type RotationTrack, replaceTrack } from '@slewcurve/core';
import { backwards } from './backwards.js';
import { type NewKey, stored } from './new-keys.js';

/** A track that plays to its last key and back again, with its keys: the old ones, then all but the last mirrored about the last one's time. */
export function thereAndBackKeys(track: RotationTrack): {
  readonly after: RotationTrack;
  readonly keys: NewKey[];
} {
  const { times, values, breaks, interpolation } = track;
  const last = times.length - 1;
  const there = Array.from(times, (time, old): NewKey => ({ time, old }));
  const back = Array.from({ length: last }, (_, i): NewKey => ({
    time: stored(track, 2 * times[last] - times[last - 1 - i]),
  }));
  const keys = [...there, ...back];
  const doubled = Float64Array.of(...values, ...backwards(track, 0, last - 1));
  // At the turn it leaves by the way it came.
  if (interpolation === 'CUBICSPLINE')
    for (let i = 0; i < 4; i++) doubled[12 * last + 8 + i] = -doubled[12 * last + i];
  const mirrored = breaks.map((_, i) => 2 * last - 1 - breaks[breaks.length - 1 - i]);
  const after = replaceTrack(track, {
    times: Float64Array.from(keys, ({ time }) => time),
    values: doubled,
    breaks: [...breaks, ...mirrored].filter((key) => key < keys.length - 1),
  });
  return { after, keys };
}
