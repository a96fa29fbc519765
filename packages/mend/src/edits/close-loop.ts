import { EASES, type RotationTrack, SlewcurveError, dot, replaceTrack } from '@slewcurve/core';
import { mayChange, placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import { alignedKeys, checkTurning, turnBetween } from '../key-turns.js';
import { endRates } from '../loop-rates.js';
import type { Step } from '../step.js';
import { storedValue } from '../stored-key.js';
import { turnAlong } from '../turn-along.js';
import type { EditResult, Verb } from '../verb.js';

const MINIMUM_JERK = EASES['minimum-jerk'];

/** Share of the clip over which the gap is spread where nothing is said: common practice, 10 to 30 %. */
const TAIL = 0.25;

/** Radians (170°): from here on the keys don't tell which way round a gap closes. */
const FAR = (17 / 18) * Math.PI;

/** A last step slower than this share of the usual one beside it repeats the key before; as survey's `seam.doubled-end`. */
const STALL = 0.1;
const BESIDE = 3;

/** Fewer changed keys than this leave no room for a rate. */
const ROOM = 3;

/**
 * Makes the last pose the first one: q* = q·exp(f(t)·log(q_T⁻¹q_0)), f from 0 to 1. `spread: "tail"` (default): over the last quarter of the clip, or from
 * the span's start on, along the minimum-jerk step; every key before stays to the byte. `evenly`: in proportion to time over the whole clip, or the
 * span; right for a steady drift. Whole turns within the loop stay: the gap is closed the short way round.
 *
 * On dense keys and under CUBICSPLINE the rate at the end is led into that of the start as well, over the same tail: dense keys by the parabola through
 * three of them, cubics by their tangents, which are turned along. Sparse LINEAR keys turn corners at every key, so there the pose alone is closed.
 *
 * A last key that merely repeats the one before, in a motion that would go on to the first pose, becomes that pose, and nothing else changes.
 *
 * Kept keys stay, and the gap is spread behind the last of them.
 */
export const closeLoop: Verb = Object.freeze({
  name: 'close loop',
  summary: 'Spreads the gap of a loop so that it ends in the pose and at the rate in which it starts.',
  alsoCalled: ['loop', 'cycle', 'walk cycle', 'seamless', 'seamless loop', 'make cyclic', 'loop seam'],
  opening: 'Close the loop of',
  reads: ['spread'] as const,
  needsAllowing: false,
  keysApart: false,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Close the loop of', step),
  apply(track: RotationTrack, step: Step): EditResult {
    checkTurning(track, 'close a loop with');
    const last = track.times.length - 1;
    checkEnds(track, step);
    const gap = turnBetween(new Float64Array(3), alignedKeys(track), last, 0);
    checkGap(track, gap);
    const first = firstChanged(track, step, gap);
    const turned = (rate: Float64Array): RotationTrack => closed(track, step, first, gap, rate);
    const rate = new Float64Array(3);
    let after = turned(rate);
    if (last + 1 - first < ROOM) return editResult(track, after);
    // What three keys or a product of turns make of the added rate is not quite it: each pass leaves a tenth or less.
    for (let pass = 0; pass < 16; pass++) {
      const rates = endRates(after);
      if (!rates) break;
      const missing = rates.start.map((part, axis) => part - rates.end[axis]);
      const most = Math.max(Math.hypot(...rates.start), Math.hypot(...rates.end));
      if (Math.hypot(...missing) <= 1e-6 * most) break;
      for (let axis = 0; axis < 3; axis++) rate[axis] += missing[axis];
      after = turned(rate);
    }
    return editResult(track, after);
  },
});

/** @throws SlewcurveError `step.too-few-keys`, `step.nothing-left` */
function checkEnds(track: RotationTrack, step: Step): void {
  const last = track.times.length - 1;
  if (last < 2)
    throw new SlewcurveError(
      'step.too-few-keys',
      `A loop needs three keys or more; this track has ${last + 1}.`,
      placeOf(track),
    );
  if (mayChange(track, step, last)) return;
  throw new SlewcurveError(
    'step.nothing-left',
    `The loop closes at its last key, ${last}, and that one is kept or lies outside the span. Free it, or let the span end at ${track.times[last]} s.`,
    placeOf(track, last),
  );
}

/** @throws SlewcurveError `step.too-far` */
function checkGap(track: RotationTrack, gap: Float64Array): void {
  if (Math.hypot(...gap) <= FAR) return;
  throw new SlewcurveError(
    'step.too-far',
    `The loop ends half a turn from its start, so its keys don't tell which way round it should close. Put in a key that does, or leave the loop open.`,
    placeOf(track, track.times.length - 1),
  );
}

/**
 * The first key that may turn.
 *
 * @throws SlewcurveError `step.doubled-end` where the clip is one key too long
 */
function firstChanged(track: RotationTrack, step: Step, gap: Float64Array): number {
  const { times } = track;
  const last = times.length - 1;
  const usual = usualStep(track);
  const keys = alignedKeys(track);
  const stepTo = (a: number, b: number): number =>
    Math.hypot(...turnBetween(new Float64Array(3), keys, a, b));
  if (usual > 0 && stepTo(last - 1, last) < STALL * usual) {
    const onward = stepTo(last - 1, 0);
    if (onward < STALL * usual)
      throw new SlewcurveError(
        'step.doubled-end',
        `Keys ${last - 1} and ${last} both are the first pose already: the clip is one key too long. Trim key ${last}.`,
        placeOf(track, last),
      );
    if (onward < 2 * usual && Math.hypot(...gap) > 0) return last;
  }
  const from =
    step.span?.[0] ?? (step.spread === 'evenly' ? times[0] : times[last] - TAIL * (times[last] - times[0]));
  let first = 1;
  while (first < last && times[first] <= from) first++;
  return Math.max(first, ...(step.keep ?? []).filter((key) => key < last).map((key) => key + 1));
}

/** Median turn of the steps on both sides of the seam, the last one left out; 0 where there are too few. Radians. */
function usualStep(track: RotationTrack): number {
  const last = track.times.length - 1;
  if (last <= 2 * BESIDE) return 0;
  const keys = alignedKeys(track);
  const turns = Array.from({ length: 2 * BESIDE }, (_, i) => {
    const key = i < BESIDE ? i : last - 2 - (i - BESIDE);
    return Math.hypot(...turnBetween(new Float64Array(3), keys, key, key + 1));
  }).toSorted((a, b) => a - b);
  return (turns[BESIDE - 1] + turns[BESIDE]) / 2;
}

/** The track with its gap spread from key `first` on, and its rate at the end changed by `rate`, rad/s. */
function closed(
  track: RotationTrack,
  step: Step,
  first: number,
  gap: Float64Array,
  rate: Float64Array,
): RotationTrack {
  const { times } = track;
  const last = times.length - 1;
  const [from, to] = [times[first - 1], times[last]];
  const isEven = step.spread === 'evenly' && first < last;
  // The rate is led over within a tail, however the gap is spread.
  const tail = isEven ? Math.max(from, to - TAIL * (to - from)) : from;
  const turns = new Float64Array(3 * times.length);
  const slopes = new Float64Array(3 * times.length);
  for (let key = first; key <= last; key++) {
    const seconds = times[key] - from;
    const u = seconds / (to - from);
    const v = Math.max(0, (times[key] - tail) / (to - tail));
    for (let axis = 0; axis < 3; axis++) {
      const [share, slope] = isEven ? [u, 1] : [MINIMUM_JERK.position(u), MINIMUM_JERK.speed(u)];
      turns[3 * key + axis] = gap[axis] * share + rate[axis] * (to - tail) * bulge(v);
      slopes[3 * key + axis] = (gap[axis] * slope) / (to - from) + rate[axis] * bulgeSlope(v);
    }
  }
  return endingAsItStarts(turnAlong(track, turns, { slopes }));
}

/** The last key with the very numbers of the first, on the side on which it stands. */
function endingAsItStarts(track: RotationTrack): RotationTrack {
  const values = Float64Array.from(track.values);
  const first = storedValue(track, 0);
  const last = storedValue(track, track.times.length - 1, values);
  const side = dot(first, last) < 0 ? -1 : 1;
  for (let i = 0; i < 4; i++) last[i] = side * first[i];
  return replaceTrack(track, { values });
}

/** The quintic that is level and unbent at 0, and at 1 is 0 again, unbent, with slope 1: quintic Hermite's basis of the end's slope. */
function bulge(u: number): number {
  return u ** 3 * (-4 + u * (7 - 3 * u));
}

function bulgeSlope(u: number): number {
  return u * u * (-12 + u * (28 - 15 * u));
}
