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
} from '@slewcurve/core';
import { placeOf } from './acted-keys.js';
import { isPlayable, playableNeighbour } from './stored-key.js';

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

/** The turn that takes a shelf's tail back: d of `d·q` (`side` parent) or of `q·d` (own), as a rotation vector, radians. */
export function turnBack(track: RotationTrack, key: number, side: 'own' | 'parent'): Float64Array {
  const back = shelfTurn(track, key).map((angle) => -angle);
  if (side === 'own') return back;
  const pose = keyOrientation(new Float64Array(4), track, key);
  const turn = multiply(
    new Float64Array(4),
    multiply(new Float64Array(4), pose, expMap(new Float64Array(4), back)),
    conjugate(new Float64Array(4), pose),
  );
  return logMap(new Float64Array(3), turn);
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
