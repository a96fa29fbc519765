import {
  type RotationTrack,
  SlewcurveError,
  conjugate,
  expMap,
  keyOrientation,
  localRoughness,
  logMap,
  multiply,
  playableTrack,
  relative,
  replaceTrack,
} from '@slewcurve/core';
import { placeOf } from './acted-keys.js';
import { isPlayable, playableNeighbour, storedValue } from './stored-key.js';

/** Where the shelf's vector lies among those of a local roughness fit: lone key, shelf, corner. */
const SHELF_AT = 3;

/**
 * By how much the motion stands off from key `key` on: the vector that survey fits with a shelf (1, −3, 3, −1 by least squares over
 * RULES' local roughness), own axes of the key, radians. Too near an end or a cut for that fit: what the step into the key is beyond the
 * mean rate of the segments beside it.
 *
 * @throws SlewcurveError `step.no-direction` where the key or the one before can't be played, `step.nothing-between` where no motion
 * runs into the key
 */
export function shelfTurn(track: RotationTrack, key: number): Float64Array {
  if (!isPlayable(track, key))
    throw new SlewcurveError(
      'step.no-direction',
      `Key ${key} holds no orientation. Bridge it first.`,
      placeOf(track, key),
    );
  const before = playableNeighbour(track, key, -1);
  if (before === undefined)
    throw new SlewcurveError(
      'step.nothing-between',
      `No motion runs into key ${key}, so it stands off from nothing.`,
      placeOf(track, key),
    );
  const playable = playableTrack(track);
  const roughness = localRoughness(playable);
  const at = playable === track ? key : playable.times.indexOf(track.times[key]);
  if (at >= 0 && roughness.fit(at)) return roughness.vectors.slice(SHELF_AT, SHELF_AT + 3);
  return stepBeyondRates(track, before, key);
}

/**
 * The turn that takes a shelf's tail back: d of `d·q` (`side` parent) or of `q·d` (own), as a rotation vector, radians. The fit is
 * repeated on the track so turned until no shelf is left: one fit is exact to first order alone, as its axes are those of one key.
 */
export function turnBack(track: RotationTrack, key: number, side: 'own' | 'parent'): Float64Array {
  const stood = keyOrientation(new Float64Array(4), track, key);
  const pose = Float64Array.from(stood);
  const turn = new Float64Array(4);
  let seated = track;
  // Each pass leaves the last one's rest times the turn of a few keys; eight passes end at float64's own step.
  for (let pass = 0; pass < 8; pass++) {
    const rest = shelfTurn(seated, key).map((angle) => -angle);
    multiply(pose, pose, expMap(new Float64Array(4), rest));
    if (side === 'own') relative(turn, stood, pose);
    else multiply(turn, pose, conjugate(new Float64Array(4), stood));
    if (Math.hypot(...rest) < 1e-14) break;
    seated = withTailTurned(track, key, side, turn);
  }
  return logMap(new Float64Array(3), turn);
}

function withTailTurned(
  track: RotationTrack,
  first: number,
  side: 'own' | 'parent',
  turn: Float64Array,
): RotationTrack {
  const values = Float64Array.from(track.values);
  for (let key = first; key < track.times.length; key++) {
    const value = storedValue(track, key, values);
    if (side === 'own') multiply(value, value, turn);
    else multiply(value, turn, value);
  }
  return replaceTrack(track, { values });
}

function stepBeyondRates(track: RotationTrack, before: number, key: number): Float64Array {
  const seconds = track.times[key] - track.times[before];
  const step = turnOf(track, before, key);
  const earlier = playableNeighbour(track, before, -1);
  const later = playableNeighbour(track, key, 1);
  const rates = [
    ...(earlier === undefined ? [] : [rateOf(track, earlier, before)]),
    ...(later === undefined ? [] : [rateOf(track, key, later)]),
  ];
  return step.map(
    (angle, axis) =>
      angle -
      (rates.length === 0 ? 0 : (rates.reduce((sum, rate) => sum + rate[axis], 0) / rates.length) * seconds),
  );
}

function rateOf(track: RotationTrack, from: number, to: number): Float64Array {
  const seconds = track.times[to] - track.times[from];
  return turnOf(track, from, to).map((angle) => angle / seconds);
}

/** Rotation vector between two keys, own axes of the earlier; a turn leaves its own axis, so those of the later too. */
function turnOf(track: RotationTrack, from: number, to: number): Float64Array {
  const turn = relative(
    new Float64Array(4),
    keyOrientation(new Float64Array(4), track, from),
    keyOrientation(new Float64Array(4), track, to),
  );
  return logMap(new Float64Array(3), turn);
}
