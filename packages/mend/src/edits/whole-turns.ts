import {
  LARGEST_STEP,
  type RotationTrack,
  SlewcurveError,
  VALUES_PER_KEY,
  keyOrientation,
  logMap,
  relative,
  replaceTrack,
  turnAboutOwn,
} from '@slewcurve/core';
import { checkQuaternions, firstKey, placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import { stored } from '../pace/new-keys.js';
import type { Step } from '../step.js';
import { isJoined, isPlayable, storedValue } from '../stored-key.js';
import type { EditResult, Verb } from '../verb.js';

/** Turns shorter than this have no axis of their own, radians. */
const NO_AXIS = 1e-6;

/**
 * Turns from key `k - 1` to each listed key `k` by whole turns more than the short way, at constant speed: q(u) = q_a·exp(u(r + 2πN r̂)), with keys put in
 * so that none is more than 120° from the next; two keys alone cannot tell one turn from none. `axis` (own frame of key `k - 1`) says about which
 * way round the turns count; keys that are alike need it. All old keys stay.
 */
export const wholeTurns: Verb = Object.freeze({
  name: 'whole turns',
  summary: 'Adds whole turns between two keys, with as many keys as it takes to hold them.',
  alsoCalled: ['spin', 'revolutions', 'full rotation', '360', 'wheel', 'turntable'],
  opening: 'Add whole turns before',
  reads: ['keys', 'turns', 'axis'] as const,
  needsAllowing: true,
  keysApart: true,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Add whole turns before', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkQuaternions(track);
    const first = firstKey(track, step);
    if (step.turns === undefined || track.interpolation !== 'LINEAR')
      throw new SlewcurveError(
        'step.needs-turns',
        `Say how many: turns, on a LINEAR track; this one is ${track.interpolation}.`,
        placeOf(track, first),
      );
    let after = track;
    const inserted: number[] = [];
    const keys = [...new Set(step.keys)];
    // oxlint-disable-next-line unicorn/no-array-sort -- our own list: sorted where it is, no copy
    for (const key of keys.sort((a, b) => a - b)) {
      const at = key + inserted.length;
      const more = keysBetween(after, at, step.turns, step.axis);
      const values = more.flatMap(({ value }) => [...value]);
      const size = VALUES_PER_KEY.LINEAR;
      after = replaceTrack(after, {
        times: Float64Array.of(
          ...after.times.subarray(0, at),
          ...more.map(({ time }) => time),
          ...after.times.subarray(at),
        ),
        values: Float64Array.of(
          ...after.values.subarray(0, at * size),
          ...values,
          ...after.values.subarray(at * size),
        ),
        breaks: after.breaks.map((broken) => (broken >= at ? broken + more.length : broken)),
      });
      more.forEach((_, i) => inserted.push(at + i));
    }
    return editResult(track, after, { inserted });
  },
});

function keysBetween(
  track: RotationTrack,
  key: number,
  turns: number,
  axis: readonly [number, number, number] | undefined,
): { time: number; value: Float64Array }[] {
  if (key === 0 || !isJoined(track, key - 1) || !isPlayable(track, key) || !isPlayable(track, key - 1))
    throw new SlewcurveError(
      'step.nothing-between',
      `Nothing turns into key ${key}: it is the first, stands after a cut, or one of both keys holds no orientation.`,
      placeOf(track, key),
    );
  const from = keyOrientation(new Float64Array(4), track, key - 1);
  const to = keyOrientation(new Float64Array(4), track, key);
  const short = logMap(new Float64Array(3), relative(to, from, to));
  const angle = Math.hypot(...short);
  if (!axis && angle < NO_AXIS)
    throw new SlewcurveError(
      'step.needs-axis',
      `Keys ${key - 1} and ${key} are alike, so the turns have no axis. Name it: axis, in the own frame of the key before.`,
      placeOf(track, key),
    );
  const own: ArrayLike<number> = angle < NO_AXIS && axis ? axis : short;
  const along = axis ? own[0] * axis[0] + own[1] * axis[1] + own[2] * axis[2] : 1;
  const whole = angle + (along < 0 ? -1 : 1) * 2 * Math.PI * turns;
  const count = Math.ceil(Math.abs(whole) / LARGEST_STEP - 1e-9);
  const [begin, end] = [track.times[key - 1], track.times[key]];
  let before = storedValue(track, key - 1);
  return Array.from({ length: Math.max(0, count - 1) }, (_, i) => {
    const share = (i + 1) / count;
    const value = turnAboutOwn(new Float64Array(4), from, [own[0], own[1], own[2]], share * whole);
    if (value.reduce((sum, part, k) => sum + part * before[k], 0) < 0)
      value.forEach((part, k) => (value[k] = -part));
    before = value;
    return { time: stored(track, begin + share * (end - begin)), value };
  });
}
