import { angleBetween, keyOrientation, type RotationTrack } from '@slewcurve/core';

const DEGREES = 180 / Math.PI;

/** Angle from the last key to the first, degrees. */
export function seamOf(track: RotationTrack): number {
  const first = keyOrientation(new Float64Array(4), track, 0);
  return angleBetween(first, keyOrientation(new Float64Array(4), track, track.times.length - 1)) * DEGREES;
}
