import { EASES, type RotationTrack, SlewcurveError } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import { alignedKeys, checkTurning, turnBetween } from '../key-turns.js';
import type { Step } from '../step.js';
import { mayChange } from '../acted-keys.js';
import { turnAlong } from '../turn-along.js';
import type { EditResult, Verb } from '../verb.js';

const MINIMUM_JERK = EASES['minimum-jerk'];

/** Share of the span over which a drift is paid back, and the most of it, seconds. */
const SHOULDER = 0.2;
const LONGEST_SHOULDER = 2;

/** A key further from the middle of the span than this, radians (170°), leaves no line to be drawn. */
const FAR = (17 / 18) * Math.PI;

/**
 * Takes a steady slow turn off what should stand still: q* = q·exp(−u·r), r the turn of the straight line through the logarithms of the span's keys (least
 * squares, so that noise on single keys does not tilt it), u 0 to 1 over the span. Net turn is left where the keys themselves stray from the line, no more.
 *
 * What lies outside the span stays to the byte, so where motion goes on there the drift is paid back within the span: over `shoulders` seconds at that
 * end. `anchor` says which end's pose the span keeps: `start`, `end`, or `both`, which stands in the middle and pays half at each end. Left out: the end
 * beside which motion goes on, both where it does on both sides, and the start where the span is the whole track.
 */
export const takeOutDrift: Verb = Object.freeze({
  name: 'take out drift',
  summary: 'Takes a steady slow turn off a stretch that should stand still; what lies outside stays.',
  alsoCalled: ['drift', 'gyro drift', 'heading drift', 'sensor bias', 'creep', 'detrend', 'slow slide'],
  opening: 'Take the drift out of',
  reads: ['anchor'] as const,
  needsAllowing: false,
  keysApart: false,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Take the drift out of', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkTurning(track, 'take drift from');
    const { times } = track;
    const keys = Array.from(times.keys()).filter((key) => isInSpan(track, step, key));
    const [first, last] = [keys[0], keys[keys.length - 1]];
    if (keys.length < 2)
      throw new SlewcurveError(
        'step.nothing-left',
        'The span holds fewer than two keys, so nothing drifts in it. Widen the span.',
        placeOf(track, first),
      );
    const rate = lineThrough(track, keys);
    const [from, to] = [times[first], times[last]];
    const shares = paidBack(step, {
      from,
      to,
      goesOnBefore: first > 0,
      goesOnAfter: last + 1 < times.length,
    });
    const turns = new Float64Array(3 * times.length);
    const slopes = new Float64Array(3 * times.length);
    for (const key of keys) {
      if (!mayChange(track, step, key)) continue;
      const { share, slope } = shares(times[key]);
      for (let axis = 0; axis < 3; axis++) {
        turns[3 * key + axis] = rate[axis] * (share * (to - from) - (times[key] - from));
        slopes[3 * key + axis] = rate[axis] * (slope * (to - from) - 1);
      }
    }
    return editResult(track, turnAlong(track, turns, { slopes }));
  },
});

function isInSpan({ times }: RotationTrack, { span }: Step, key: number): boolean {
  return !span || (times[key] >= span[0] && times[key] <= span[1]);
}

/**
 * Slope of the straight line through the logarithms of some keys, against the one in the middle; own axes, rad/s.
 *
 * @throws SlewcurveError `step.too-far`
 */
function lineThrough(track: RotationTrack, keys: readonly number[]): Float64Array {
  const all = alignedKeys(track);
  const middle = keys[keys.length >> 1];
  const mean = keys.reduce((sum, key) => sum + track.times[key], 0) / keys.length;
  const slope = new Float64Array(3);
  const turn = new Float64Array(3);
  let square = 0;
  for (const key of keys) {
    turnBetween(turn, all, middle, key);
    if (Math.hypot(...turn) > FAR)
      throw new SlewcurveError(
        'step.too-far',
        `Key ${key} lies half a turn from the middle of the span: that is a motion, no drift. Narrow the span.`,
        placeOf(track, key),
      );
    const seconds = track.times[key] - mean;
    square += seconds * seconds;
    for (let axis = 0; axis < 3; axis++) slope[axis] += seconds * turn[axis];
  }
  return slope.map((sum) => sum / square);
}

/** How much of the line each time keeps, 0 at the first key and 1 at the last where motion goes on beyond them, and its change per second. */
function paidBack(
  step: Step,
  at: {
    readonly from: number;
    readonly to: number;
    readonly goesOnBefore: boolean;
    readonly goesOnAfter: boolean;
  },
): (time: number) => { share: number; slope: number } {
  const { from, to, goesOnBefore, goesOnAfter } = at;
  const anchor = step.anchor ?? (goesOnBefore && goesOnAfter ? 'both' : goesOnAfter ? 'end' : 'start');
  const still = anchor === 'start' ? 0 : anchor === 'end' ? 1 : 0.5;
  const usual = Math.min(LONGEST_SHOULDER, SHOULDER * (to - from));
  const shoulder = Math.min((to - from) / 2, step.shoulders ?? usual);
  const [atStart, atEnd] = [
    goesOnBefore || anchor === 'both' ? still : 0,
    goesOnAfter || anchor === 'both' ? 1 - still : 0,
  ];
  return (time) => {
    const [since, left] = [time - from, to - time];
    let share = still;
    let slope = 0;
    if (shoulder > 0 ? since < shoulder : since === 0) {
      share -= atStart * (1 - eased(since / shoulder));
      slope += (atStart * MINIMUM_JERK.speed(since / shoulder)) / shoulder;
    }
    if (shoulder > 0 ? left < shoulder : left === 0) {
      share += atEnd * (1 - eased(left / shoulder));
      slope += (atEnd * MINIMUM_JERK.speed(left / shoulder)) / shoulder;
    }
    return { share, slope: Number.isFinite(slope) ? slope : 0 };
  };
}

function eased(u: number): number {
  return Number.isFinite(u) ? MINIMUM_JERK.position(Math.min(1, u)) : 0;
}
