import { EASES, type RotationTrack } from '@slewcurve/core';
import { mayChange } from '../acted-keys.js';
import type { Step } from '../step.js';

const MINIMUM_JERK = EASES['minimum-jerk'];

/**
 * How much of an edit each key takes, 0 to 1: nothing at kept keys, in guards and outside the span, all of it `shoulders` seconds away from those, and
 * between them along the minimum-jerk step. A border of the span that lies on the track's own end needs no shoulder.
 *
 * @param isGuarded one number a key, not 0 where the key must stay
 */
export function sharesOf(
  track: RotationTrack,
  step: Step,
  isGuarded: Uint8Array,
  shoulders: number,
): Float64Array {
  const { times } = track;
  const last = times.length - 1;
  const distance = new Float64Array(times.length).fill(Infinity);
  const isFixed = (key: number): boolean => isGuarded[key] !== 0 || !mayChange(track, step, key);
  let before = step.span && step.span[0] > times[0] ? step.span[0] : -Infinity;
  for (let key = 0; key <= last; key++) {
    if (isFixed(key)) before = times[key];
    distance[key] = times[key] - before;
  }
  let after = step.span && step.span[1] < times[last] ? step.span[1] : Infinity;
  for (let key = last; key >= 0; key--) {
    if (isFixed(key)) after = times[key];
    distance[key] = Math.min(distance[key], after - times[key]);
  }
  return distance.map((seconds, key) => {
    if (isFixed(key)) return 0;
    return shoulders > 0 ? MINIMUM_JERK.position(Math.min(1, seconds / shoulders)) : 1;
  });
}
