import { VALUES_PER_KEY, type RotationTrack } from '@slewcurve/core';

/** Key numbers in the stored track of the keys that its playable part kept, in order. */
export function keptKeys(stored: RotationTrack, playable: RotationTrack): Int32Array {
  const size = VALUES_PER_KEY[stored.interpolation];
  const keys = new Int32Array(playable.times.length);
  let at = 0;
  for (let key = 0; key < keys.length; key++, at++) {
    while (at < stored.times.length && !sameKey(stored, at, playable, key, size)) at++;
    keys[key] = at;
  }
  return keys;
}

function sameKey(a: RotationTrack, i: number, b: RotationTrack, j: number, size: number): boolean {
  if (a.times[i] !== b.times[j]) return false;
  for (let n = 0; n < size; n++) if (!Object.is(a.values[i * size + n], b.values[j * size + n])) return false;
  return true;
}
