import { type RotationTrack, VALUES_PER_KEY } from '@slewcurve/core';

/**
 * The numbers of keys `last` to `first`, in that order: what a track plays backwards. Under CUBICSPLINE the tangents of a key change places and sign.
 */
export function backwards(track: RotationTrack, first: number, last: number): Float64Array {
  const size = VALUES_PER_KEY[track.interpolation];
  const values = new Float64Array(size * (last - first + 1));
  for (let key = last; key >= first; key--) {
    const at = (last - key) * size;
    const from = track.values.subarray(key * size, key * size + size);
    values.set(from, at);
    if (size !== 12) continue;
    for (let i = 0; i < 4; i++) {
      values[at + i] = -from[8 + i];
      values[at + 8 + i] = -from[i];
    }
  }
  return values;
}
