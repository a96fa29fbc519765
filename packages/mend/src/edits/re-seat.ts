import { type RotationTrack, SlewcurveError, expMap, multiply, replaceTrack } from '@slewcurve/core';
import { actedKeys, checkQuaternions, firstKey, placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import { turnBack } from '../shelf-turn.js';
import type { Step } from '../step.js';
import { isPlayable, valueAt } from '../stored-key.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * Turns everything from one key on by one rotation d, so that a shelf before that key closes: q* = d·q (`side` parent, the default) or
 * q·d (own). d is fitted with the shelf; see `shelfTurn`. With `fade`, log d is taken back along the minimum-jerk step
 * m(u) = 10u³ − 15u⁴ + 6u⁵ over so many seconds from the key, and later keys stay as stored.
 *
 * Tangents of a CUBICSPLINE are turned along, and get the fade's own rate: (d·v)′ = d·v′ + d′·v.
 */
export const reSeat: Verb = Object.freeze({
  name: 're-seat',
  summary:
    'Turns all keys after a step by one rotation, so that the step closes and the motion after it stays what it is.',
  alsoCalled: ['offset', 'realign', 'step', 'slip', 'sensor slip', 'continuity offset'],
  opening: 'Re-seat from',
  reads: ['keys', 'side', 'fade'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Re-seat from', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkQuaternions(track);
    const first = firstKey(track, step);
    if (step.keys && step.keys.length > 1)
      throw new SlewcurveError(
        'step.one-key',
        'Re-seat takes one key, the first after the step.',
        placeOf(track, first),
      );
    const side = step.side ?? 'parent';
    const back = turnBack(track, first, side);
    const tail = Array.from({ length: track.times.length - first }, (_, i) => first + i);
    const values = Float64Array.from(track.values);
    for (const key of actedKeys(track, { ...step, keys: tail })) {
      if (!isPlayable(track, key)) continue;
      const { share, slope } = shareLeft(track.times[key] - track.times[first], step.fade);
      if (share > 0) turnKey(values, track, key, side, back, share, slope);
    }
    return editResult(track, replaceTrack(track, { values }));
  },
});

/** Share of log d that is left so many seconds after the key, and its change per second. */
function shareLeft(seconds: number, fade: number | undefined): { share: number; slope: number } {
  if (fade === undefined || seconds <= 0) return { share: 1, slope: 0 };
  const u = seconds / fade;
  if (!(u < 1)) return { share: 0, slope: 0 };
  return { share: 1 - u ** 3 * (10 - 15 * u + 6 * u * u), slope: (-30 * u * u * (1 - u) ** 2) / fade };
}

function turnKey(
  values: Float64Array,
  track: RotationTrack,
  key: number,
  side: 'own' | 'parent',
  back: Float64Array,
  share: number,
  slope: number,
): void {
  const d = expMap(
    new Float64Array(4),
    back.map((angle) => angle * share),
  );
  // d/dt exp(s·r/2) = ½·s′·r·d; r and d turn about one axis, so the order is free.
  const dRate = multiply(new Float64Array(4), [...back.map((angle) => (angle * slope) / 2), 0], d);
  const turned = (by: Float64Array, at: number): Float64Array => {
    const stored = track.values.subarray(at, at + 4);
    return side === 'own'
      ? multiply(new Float64Array(4), stored, by)
      : multiply(new Float64Array(4), by, stored);
  };
  const at = valueAt(track, key);
  values.set(turned(d, at), at);
  if (track.interpolation !== 'CUBICSPLINE') return;
  const ofFade = turned(dRate, at);
  for (const tangentAt of [at - 4, at + 4]) {
    const tangent = turned(d, tangentAt);
    for (let i = 0; i < 4; i++) values[tangentAt + i] = tangent[i] + ofFade[i];
  }
}
