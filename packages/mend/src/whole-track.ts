import { type RotationTrack, SlewcurveError } from '@slewcurve/core';
import { placeOf } from './acted-keys.js';
import type { Step } from './step.js';
import { isPlayable } from './stored-key.js';

/** @throws SlewcurveError `step.whole-track` where a step that is about a track as a whole names a part of it */
export function refuseParts(
  track: RotationTrack,
  step: Step,
  parts: readonly ('keys' | 'span' | 'keep')[],
): void {
  const named = parts.filter((part) => step[part] !== undefined);
  if (named.length === 0) return;
  throw new SlewcurveError(
    'step.whole-track',
    `"${step.verb}" is about the track as a whole. Leave ${named.join(' and ')} out.`,
    placeOf(track),
  );
}

/** @throws SlewcurveError `step.faulty-keys` where a key holds no orientation or is not later than the one before */
export function checkSound(track: RotationTrack): void {
  const { times } = track;
  const faulty = times.findIndex(
    (time, key) => !isSound(track, key) || (key > 0 && !(time > times[key - 1])),
  );
  if (faulty < 0) return;
  throw new SlewcurveError(
    'step.faulty-keys',
    `Key ${faulty} holds no orientation, or its time is not later than that of the key before. Bridge it or sort the times first.`,
    placeOf(track, faulty),
  );
}

function isSound(track: RotationTrack, key: number): boolean {
  if (track.interpolation !== 'EULER') return isPlayable(track, key);
  return (
    Number.isFinite(track.times[key]) && track.values.subarray(3 * key, 3 * key + 3).every(Number.isFinite)
  );
}
