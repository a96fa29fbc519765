import type { NumberStore } from '../number-store.js';
import { fromEuler } from '../quaternion/euler/from-euler.js';
import { normalise } from '../quaternion/normalise.js';
import { VALUES_PER_KEY, type RotationTrack } from './rotation-track.js';

/**
 * Unit orientation `[x, y, z, w]`, own to parent, that key number `key` stores, under any interpolation; its sign as stored.
 * Identity where the key's numbers are not finite or have no length, or where there is no such key.
 */
export function keyOrientation<T extends NumberStore>(out: T, track: RotationTrack, key: number): T {
  const { interpolation, values } = track;
  const at = valueOffset(track, key);
  if (interpolation === 'EULER') {
    fromEuler(out, values.subarray(at, at + 3), track.sequence ?? 'XYZ');
  } else {
    for (let i = 0; i < 4; i++) out[i] = values[at + i];
    normalise(out, out);
  }
  if (Number.isFinite(out[0] + out[1] + out[2] + out[3])) return out;
  out[0] = 0;
  out[1] = 0;
  out[2] = 0;
  out[3] = 1;
  return out;
}

/** Where the value of key number `key` begins in `track.values` (after the in-tangent under CUBICSPLINE). */
export function valueOffset(track: RotationTrack, key: number): number {
  return key * VALUES_PER_KEY[track.interpolation] + (track.interpolation === 'CUBICSPLINE' ? 4 : 0);
}
