import { type RotationTrack, SlewcurveError, dot, keyOrientation, logMap, relative } from '@slewcurve/core';
import { checkQuaternions, placeOf } from './acted-keys.js';
import { isPlayable } from './stored-key.js';

/**
 * Checks that a track plays turns at every key, as edits that look at many keys at once need.
 *
 * @param what the edit in a few words: "smooth"
 * @throws SlewcurveError `step.needs-quaternions`, `step.plays-no-turn`, `step.no-direction`, `step.time-order`
 */
export function checkTurning(track: RotationTrack, what: string): void {
  checkQuaternions(track);
  if (track.interpolation === 'STEP')
    throw new SlewcurveError(
      'step.plays-no-turn',
      `A STEP track holds each pose until the next, so there is no turn to ${what}. Convert it to LINEAR first.`,
      placeOf(track),
    );
  track.times.forEach((time, key) => {
    if (!isPlayable(track, key))
      throw new SlewcurveError(
        'step.no-direction',
        `Key ${key} holds no orientation. Bridge it first.`,
        placeOf(track, key),
      );
    if (key > 0 && !(time > track.times[key - 1]))
      throw new SlewcurveError(
        'step.time-order',
        `Key ${key} is not later than the key before it. Put the times in order first.`,
        placeOf(track, key),
      );
  });
}

/** Unit orientations of all keys, four numbers each, every one on the side of the one before. */
export function alignedKeys(track: RotationTrack): Float64Array {
  const all = new Float64Array(4 * track.times.length);
  for (let key = 0; key < track.times.length; key++) {
    const q = keyOrientation(all.subarray(4 * key, 4 * key + 4), track, key);
    if (key > 0 && dot(q, all.subarray(4 * key - 4, 4 * key)) < 0) for (let i = 0; i < 4; i++) q[i] = -q[i];
  }
  return all;
}

const from = new Float64Array(4);
const to = new Float64Array(4);

/** log(a⁻¹b) of two of several orientations: rotation vector, own axes of `a`, radians. */
export function turnBetween(
  out: Float64Array,
  orientations: Float64Array,
  a: number,
  b: number,
): Float64Array {
  for (let i = 0; i < 4; i++) {
    from[i] = orientations[4 * a + i];
    to[i] = orientations[4 * b + i];
  }
  return logMap(out, relative(to, from, to));
}
