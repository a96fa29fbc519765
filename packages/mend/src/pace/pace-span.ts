import { type RotationTrack, SlewcurveError, type Span } from '@slewcurve/core';
import { checkQuaternions, placeOf } from '../acted-keys.js';
import type { Step } from '../step.js';

/**
 * The times between which a pace verb acts: the step's span drawn in to keys, so that nothing outside it is touched; the whole track without
 * one.
 *
 * @throws SlewcurveError `step.needs-quaternions`, `step.bad-times`, `step.empty-span`
 */
export function paceSpan(track: RotationTrack, step: Step): Span {
  checkQuaternions(track);
  const { times } = track;
  for (let key = 1; key < times.length; key++)
    if (!(times[key] > times[key - 1]))
      throw new SlewcurveError(
        'step.bad-times',
        `Key ${key} is not later than the one before, so there is no pace to change. Sort the times first.`,
        placeOf(track, key),
      );
  const [from, to] = step.span ?? [-Infinity, Infinity];
  const inside = times.filter((time) => time >= from && time <= to);
  if (inside.length >= 2) return [inside[0], inside[inside.length - 1]];
  throw new SlewcurveError(
    'step.empty-span',
    'A pace needs two keys at least, and the span holds fewer. Widen the span.',
    placeOf(track),
  );
}

/** A stretch of time drawn out to the keys around it. */
export function keysAround({ times }: RotationTrack, [from, to]: Span): Span {
  let first = times.length - 1;
  while (first > 0 && times[first] > from) first--;
  let last = 0;
  while (last < times.length - 1 && times[last] < to) last++;
  return [times[first], times[last]];
}
