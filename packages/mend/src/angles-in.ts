import { type RotationTrack, fromEuler, replaceTrack, toEuler, unwrapEuler } from '@slewcurve/core';

/** An EULER track with its angles in another sequence, each key nearest to the one before; any other track as it is. Orientations stay. */
export function anglesIn(track: RotationTrack, sequence: string | undefined): RotationTrack {
  const { interpolation, sequence: now = 'XYZ', values } = track;
  if (interpolation !== 'EULER' || sequence === undefined || sequence === now) return track;
  const q = new Float64Array(4);
  const angles = new Float64Array(values.length);
  for (let at = 0; at < values.length; at += 3)
    toEuler(angles.subarray(at, at + 3), fromEuler(q, values.subarray(at, at + 3), now), sequence);
  return replaceTrack(track, { sequence, values: unwrapEuler(angles, angles, sequence) });
}

/** Angles in `sequence` of orientations, four numbers each, each nearest to the one before. */
export function anglesOf(orientations: Float64Array, sequence: string): Float64Array {
  const angles = new Float64Array((orientations.length / 4) * 3);
  for (let key = 0; 4 * key < orientations.length; key++)
    toEuler(angles.subarray(3 * key, 3 * key + 3), orientations.subarray(4 * key, 4 * key + 4), sequence);
  return unwrapEuler(angles, angles, sequence);
}
