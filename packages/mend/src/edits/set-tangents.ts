import {
  type RotationTrack,
  SlewcurveError,
  logMapLong,
  multiply,
  conjugate,
  normalise,
  replaceTrack,
} from '@slewcurve/core';
import { actedKeys, placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import type { Step } from '../step.js';
import { isPlayable, playableNeighbour, storedValue, tangentFor } from '../stored-key.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * Lays the tangents of a CUBICSPLINE track anew: ½·q·(ω, 0), ω the secant rate (φ₋ + φ₊)/(h₋ + h₊) in own axes, rad/s; beside a cut and at the ends the rate
 * of the one segment there is. The first in-tangent and the last out-tangent become zero, as glTF 2.0 (Appendix C) wants. Values stay to the bit. The turns
 * are those between the numbers as they stand, as the standard's cubic joins them: a sign that changes is the long way here too.
 */
export const setTangents: Verb = Object.freeze({
  name: 'set tangents',
  summary:
    'Lays the tangents of a cubic track anew from the turns between its keys; no key changes its orientation.',
  alsoCalled: [
    'recompute tangents',
    'auto tangents',
    'rescale tangents',
    'zero end tangents',
    'tangent scale',
    'Catmull-Rom',
  ],
  opening: 'Set the tangents of',
  reads: ['keys', 'tangents'] as const,
  needsAllowing: true,
  keysApart: true,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Set the tangents of', step),
  apply(track: RotationTrack, step: Step): EditResult {
    if (track.interpolation !== 'CUBICSPLINE')
      throw new SlewcurveError(
        'step.needs-tangents',
        `Only CUBICSPLINE tracks have tangents; this one is ${track.interpolation}. Convert it first.`,
        placeOf(track),
      );
    const values = track.values.slice();
    for (const key of actedKeys(track, step)) {
      if (!isPlayable(track, key)) {
        if (step.keys) throw noOrientation(track, key);
        continue;
      }
      const before = playableNeighbour(track, key, -1);
      const next = playableNeighbour(track, key, 1);
      const rate = secantRate(track, before, key, next);
      const tangent = tangentFor(storedValue(track, key), rate);
      const isFirst = playableAnywhere(track, key, -1);
      const isLast = playableAnywhere(track, key, 1);
      if (step.tangents !== 'out') values.set(isFirst ? NONE : tangent, 12 * key);
      if (step.tangents !== 'in') values.set(isLast ? NONE : tangent, 12 * key + 8);
    }
    return editResult(track, replaceTrack(track, { values }));
  },
});

const NONE: readonly number[] = [0, 0, 0, 0];

/** Whether no key that plays lies on this side of `key`. */
function playableAnywhere(track: RotationTrack, key: number, way: 1 | -1): boolean {
  for (let at = key + way; at >= 0 && at < track.times.length; at += way)
    if (isPlayable(track, at)) return false;
  return true;
}

/** Own-frame rate by which the track passes a key, rad/s. */
function secantRate(
  track: RotationTrack,
  before: number | undefined,
  key: number,
  next: number | undefined,
): Float64Array {
  const rate = new Float64Array(3);
  let seconds = 0;
  for (const [from, to] of [
    [before, key],
    [key, next],
  ]) {
    if (from === undefined || to === undefined) continue;
    seconds += track.times[to] - track.times[from];
    const turn = storedTurn(track, from, to);
    for (let i = 0; i < 3; i++) rate[i] += turn[i];
  }
  return seconds > 0 ? rate.map((part) => part / seconds) : rate.fill(0);
}

/** Rotation vector from one stored quaternion to another as their signs stand, radians, under a full turn. */
function storedTurn(track: RotationTrack, from: number, to: number): Float64Array {
  const q = conjugate(new Float64Array(4), storedValue(track, from));
  multiply(q, q, storedValue(track, to));
  return logMapLong(new Float64Array(3), normalise(q, q));
}

function noOrientation(track: RotationTrack, key: number): SlewcurveError {
  return new SlewcurveError(
    'step.no-direction',
    `Key ${key} holds no orientation, so nothing turns through it. Bridge it first.`,
    placeOf(track, key),
  );
}
