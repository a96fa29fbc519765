import {
  type Curve,
  type RotationTrack,
  SlewcurveError,
  VALUES_PER_KEY,
  dot,
  medianGap,
  playAs,
  replaceTrack,
} from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { anglesOf } from '../angles-in.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import { gridRate } from '../grid-rate.js';
import { lowPassed } from '../low-passed.js';
import { departure } from '../pace/departure.js';
import { stored } from '../pace/new-keys.js';
import type { Step } from '../step.js';
import { tangentFor } from '../stored-key.js';
import type { EditResult, Verb } from '../verb.js';
import { checkSound, refuseParts } from '../whole-track.js';
import { withoutRepeats } from '../without-repeats.js';

/** Nearer than this share of a frame to the end there is no frame beside it. */
const AT_END = 0.01;
/** More keys than anybody has: a day at 115 frames a second. */
const MOST_KEYS = 1e7;
/** A grid whose gap is longer than the keys' by this factor is coarser: what it can't hold is filtered out first. */
const COARSER = 1.25;

/**
 * Reads the motion at frames of another rate, from the first key on, the last key included. `playback` says whose motion is read. On a coarser grid it is
 * first averaged over a raised cosine one new gap to each side, which leaves steady motion as it is and is zero at the new frame rate, so that nothing faster
 * comes back as a slow wobble. `source`: frames were repeated to fill the grid; they are dropped, and the others set to that rate, before anything is
 * read. With `within` the edit is refused where the new keys play more degrees off.
 */
export const reGrid: Verb = Object.freeze({
  name: 're-grid',
  summary: 'Reads the motion at another frame rate, without comb and without aliases.',
  alsoCalled: [
    'resample',
    'bake',
    'frame-rate conversion',
    'comb',
    'repeated frames',
    'pulldown',
    'change fps',
  ],
  opening: 'Re-grid',
  reads: ['fps', 'source', 'playback', 'within'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  movesTimes: true,
  say: (step: Step) => sentenceOf('Re-grid', step),
  apply(track: RotationTrack, step: Step): EditResult {
    refuseParts(track, step, ['span', 'keep']);
    if (track.times.length < 2) return editResult(track, track);
    checkSound(track);
    const rate = gridRate(track, step);
    const base = step.source === undefined ? track : withoutRepeats(track, step.source);
    const played = playAs(base, step.playback ?? 'as-written');
    const coarser = 1 / rate > COARSER * medianGap(base) && track.interpolation !== 'STEP';
    const curve = coarser ? lowPassed(played, base, 1 / rate) : played;
    const times = gridTimes(track, rate);
    const after = sampled(track, curve, times);
    if (step.within !== undefined)
      checkWithin(track, departure(played, playAs(after, 'as-written')), step.within);
    return editResult(track, after, { oldKeys: oldKeysOf(track, after) });
  },
});

function gridTimes(track: RotationTrack, rate: number): Float64Array {
  const start = track.times[0];
  const end = track.times[track.times.length - 1];
  if (!((end - start) * rate <= MOST_KEYS))
    throw new SlewcurveError(
      'step.too-many-frames',
      `${Number((end - start).toPrecision(6))} s at ${rate} frames a second are more than ${MOST_KEYS} keys. Mend the times first, or take fewer frames a second.`,
      placeOf(track),
    );
  const times = [start];
  for (let frame = 1; (end - start) * rate - frame > AT_END; frame++)
    times.push(stored(track, start + frame / rate));
  times.push(end);
  return Float64Array.from(times);
}

function sampled(track: RotationTrack, curve: SampledCurve, times: Float64Array): RotationTrack {
  const { interpolation, sequence = 'XYZ' } = track;
  const turns = new Float64Array(4 * times.length);
  times.forEach((time, key) => {
    const q = turns.subarray(4 * key, 4 * key + 4);
    curve.orientation(q, time);
    if (key > 0 && dot(q, turns.subarray(4 * key - 4, 4 * key)) < 0) q.forEach((part, i) => (q[i] = -part));
  });
  const breaks = breaksOn(track, times);
  if (interpolation === 'EULER')
    return replaceTrack(track, { times, breaks, values: anglesOf(turns, sequence) });
  if (interpolation !== 'CUBICSPLINE') return replaceTrack(track, { times, breaks, values: turns });
  const values = new Float64Array(VALUES_PER_KEY.CUBICSPLINE * times.length);
  const last = times.length - 1;
  times.forEach((time, key) => {
    const q = turns.slice(4 * key, 4 * key + 4);
    const tangent = (t: number): Float64Array => tangentFor(q, curve.rate(new Float64Array(3), t, 'own'));
    if (key > 0) values.set(tangent(time - 1e-9 * (time - times[key - 1])), 12 * key);
    values.set(q, 12 * key + 4);
    if (key < last) values.set(tangent(time), 12 * key + 8);
  });
  return replaceTrack(track, { times, breaks, values });
}

type SampledCurve = Pick<Curve, 'orientation' | 'rate'>;

/** A cut between two old keys stands after the last new key before the second of them. */
function breaksOn(track: RotationTrack, times: Float64Array): number[] {
  const broken = track.breaks
    .filter((key) => key + 1 < track.times.length)
    .map((key) => times.findLastIndex((time) => time < track.times[key + 1]));
  return [...new Set(broken)].filter((key) => key >= 0 && key + 1 < times.length);
}

function oldKeysOf(track: RotationTrack, after: RotationTrack): number[] {
  const known = new Map(Array.from(track.times, (time, key) => [time, key]));
  return Array.from(after.times, (time) => known.get(time) ?? -1);
}

function checkWithin(track: RotationTrack, apart: number, within: number): void {
  if (apart <= within) return;
  throw new SlewcurveError(
    'step.beyond-tolerance',
    `On that grid it would play up to ${apart.toPrecision(3)}° off (limit ${within}°). Take more frames a second, or allow more.`,
    placeOf(track),
  );
}
