import type { NumberStore } from '../number-store.js';
import { keyOrientation } from '../track/key-orientation.js';
import type { RotationTrack } from '../track/rotation-track.js';

/** Unit orientations of every key, four numbers a key, signs as stored. */
export function unitKeys(track: RotationTrack): Float64Array {
  const keys = new Float64Array(4 * track.times.length);
  const key = new Float64Array(4);
  for (let i = 0; i < track.times.length; i++) keys.set(keyOrientation(key, track, i), 4 * i);
  return keys;
}

/** Copies four numbers from `keys`, times `scale`. */
export function copyKey(out: NumberStore, keys: Float64Array, key: number, scale = 1): void {
  const at = 4 * key;
  out[0] = keys[at] * scale;
  out[1] = keys[at + 1] * scale;
  out[2] = keys[at + 2] * scale;
  out[3] = keys[at + 3] * scale;
}
