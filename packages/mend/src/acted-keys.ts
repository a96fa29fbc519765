import { type RotationTrack, SlewcurveError } from '@slewcurve/core';
import type { Step } from './step.js';

/**
 * The keys that a step may change: those it lists (left out: all), without those it keeps and those outside its span. Ascending, each
 * once.
 *
 * @throws SlewcurveError `step.bad-key` where a listed key does not exist, `step.nothing-left` where no key is left
 */
export function actedKeys(track: RotationTrack, step: Step): number[] {
  const listed = step.keys ?? Array.from(track.times.keys());
  for (const key of listed) checkKeyNumber(track, key);
  const kept = new Set(step.keep);
  const left = [...new Set(listed)].filter((key) => !kept.has(key) && isInSpan(track, step, key));
  left.sort((a, b) => a - b);
  if (left.length > 0 || listed.length === 0) return left;
  throw new SlewcurveError(
    'step.nothing-left',
    'Every key that this step acts on is kept or lies outside its span. Take keys out of keep, or widen the span.',
    placeOf(track, listed[0]),
  );
}

/** Whether neither the step's span nor its keep list forbids to change a key. */
export function mayChange(track: RotationTrack, step: Step, key: number): boolean {
  return step.keep?.includes(key) !== true && isInSpan(track, step, key);
}

function isInSpan(track: RotationTrack, { span }: Step, key: number): boolean {
  return !span || !(track.times[key] < span[0] || track.times[key] > span[1]);
}

/** @throws SlewcurveError `step.needs-keys` where the step names no key, `step.bad-key` */
export function firstKey(track: RotationTrack, step: Step): number {
  const key = step.keys?.[0];
  if (key === undefined)
    throw new SlewcurveError('step.needs-keys', 'This edit needs to be told its key.', placeOf(track));
  checkKeyNumber(track, key);
  return key;
}

/** @throws SlewcurveError `step.needs-quaternions` for angle channels */
export function checkQuaternions(track: RotationTrack): void {
  if (track.interpolation !== 'EULER') return;
  throw new SlewcurveError(
    'step.needs-quaternions',
    'This track stores angles; the edit works on quaternions. Convert the track first.',
    placeOf(track),
  );
}

/** Where in the work an error belongs. */
export function placeOf(
  track: RotationTrack,
  key?: number,
): { clip: string; track: string; key?: number; time?: number } {
  const place = { clip: track.clip, track: track.id };
  return key === undefined ? place : { ...place, key, time: track.times[key] };
}

function checkKeyNumber(track: RotationTrack, key: number): void {
  if (Number.isInteger(key) && key >= 0 && key < track.times.length) return;
  throw new SlewcurveError(
    'step.bad-key',
    `There is no key ${key}; the track has ${track.times.length} keys, the first is key 0.`,
    { ...placeOf(track), key },
  );
}
