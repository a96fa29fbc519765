import { rateFloor } from '@slewcurve/core';
import { median } from '../../median.js';
import { everyRole, type Limits, type Place, type Remedy, type Rule, type TrackContext } from '../../rule.js';
import { sayRate } from '../../say-number.js';
import { angleApart, rateOf, segmentsOf, type Segments } from '../../segments.js';
import { addressOf } from './try-remedy.js';

const DEGREES = 180 / Math.PI;
/** Segments on each side that say how fast it moves. */
const BESIDE = 6;
/** Degrees: what two equal keys may seem to turn by the rounding of a product. */
const EQUAL = 1e-9;
/** Degrees: what leaps off further from where the motion went does not make up for it. */
const ONWARD = 60;
/** Repeats in a row that make a freeze. */
const LEAST = 2;

/** Frames that repeat inside a motion, and the leap that makes up for them. */
export const freeze: Rule = Object.freeze({
  id: 'jump.freeze',
  family: 'jump',
  level: 'warning',
  unit: 'deg/s',
  alsoCalled: [
    'stutter',
    'dropped frames',
    'freeze',
    'duplicate frames',
    'hitch',
    'late stream',
    'lag spike',
  ],
  summary: 'A moving track stands still for a few keys and then leaps to catch up.',
  limits: everyRole({ times: 2, moving: 2 }),
  reads: 'track',
  untouched: 'all keys but those that repeat, byte for byte',
  excusedBy: ['whips'] as const,
  find(context: TrackContext, limits: Limits): readonly Place[] {
    if (context.regime !== 'dense' || context.played.every(({ holds }) => holds)) return [];
    const segments = segmentsOf(context);
    const { turns } = segments;
    const places: Place[] = [];
    for (let k = 1; k < turns.length; k++) {
      if (!isStill(turns[k])) continue;
      let end = k;
      while (end < turns.length && isStill(turns[end])) end++;
      const place = end - k >= LEAST ? placeOf(context, segments, k, end, limits) : undefined;
      if (place !== undefined) places.push(place);
      k = end;
    }
    return places;
  },
  remedy(context: TrackContext, { keys }: Place): Remedy | undefined {
    if (context.track.interpolation === 'EULER') return undefined;
    return { step: { verb: 'bridge', ...addressOf(context), keys } };
  },
  message({ keys, value, limit }: Place): string {
    const [first = 0] = keys;
    return `keys ${first} to ${keys.at(-1)} repeat key ${first - 1} in the middle of a motion, then it leaps on at ${sayRate(value)} (limit ${sayRate(limit)}, twice the speed around)`;
  },
  page: {
    what: 'Frames that were dropped or came late and were filled with the last one that was there: of a tracker, a stream, a slow machine at a bake.',
    trace: 'Zero for a few frames, then one tall step.',
    standard: 'glTF 2.0 says nothing about it: the file is valid, and a validator is silent.',
    programs: 'Every program plays it as it stands.',
    people: 'A stutter. On a motorised head a stop and a jerk.',
    test: 'In a dense track two or more equal keys in a row after the first, faster than 2 deg/s in the median of the six steps before and of the six after, and the step out of them faster than twice the median of all twelve and than twice the step after it. The step into the freeze must not be slower than half the median before it, and the leap must go on about the same axis, to 60°.',
    source: 'Common practice, no source.',
    spares:
      'Holds that are eased into, that end without a leap or with the start of a fast or another move, keys that repeat because their storage is coarse, STEP tracks, declared cuts and whips.',
    remedy: '`bridge` lays the repeated keys anew between the sound ones on both sides.',
  },
});

function isStill(turn: number | undefined): boolean {
  return turn !== undefined && turn < EQUAL;
}

/** The freeze of segments `from` to before `end`; undefined where it is a hold that is meant. */
function placeOf(
  { track }: TrackContext,
  segments: Segments,
  from: number,
  end: number,
  { times: leap = 0, moving = 0 }: Limits,
): Place | undefined {
  const { speeds } = segments;
  const before = speeds.subarray(Math.max(0, from - BESIDE), from);
  const after = speeds.subarray(end + 1, end + 1 + BESIDE);
  const limit = leap * median([...before, ...after]);
  const value = speeds[end] ?? 0;
  const least = Math.max(moving, 2 * rateFloor(track, from) * DEGREES);
  const isInMotion = median(before) > least && median(after) > least;
  if (!(isInMotion && value > limit && goesOn(segments, from, end))) return undefined;
  const [last, next] = [track.times[from] ?? 0, track.times[end + 1] ?? 0];
  const keys = Array.from({ length: end - from }, (_, i) => from + 1 + i);
  return { keys, time: next, span: [last, next], value, limit, level: 'warning' };
}

/** A hold is eased into, and may start a fast move elsewhere; a freeze stops at once and makes up for it in one tall step. */
function goesOn(segments: Segments, from: number, end: number): boolean {
  const { speeds } = segments;
  const before = median(speeds.subarray(Math.max(0, from - BESIDE), from));
  const isTall = (speeds[end + 1] ?? 0) <= (speeds[end] ?? 0) / 2;
  const isSudden = (speeds[from - 1] ?? 0) >= before / 2;
  return isTall && isSudden && angleApart(rateOf(segments, from - 1), rateOf(segments, end)) <= ONWARD;
}
