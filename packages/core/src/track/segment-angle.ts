import { angleBetween } from '../quaternion/angle-between.js';
import { keyOrientation } from './key-orientation.js';
import type { RotationTrack } from './rotation-track.js';

// Written before they are read in every call.
const from = new Float64Array(4);
const to = new Float64Array(4);

/** Shortest angle from key number `key` to the next, radians, 0 to π. */
export function segmentAngle(track: RotationTrack, key: number): number {
  return angleBetween(keyOrientation(from, track, key), keyOrientation(to, track, key + 1));
}
