import { type Curve, type RotationTrack, SlewcurveError, playAs, replaceTrack } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { editResult } from '../edit-result.js';
import { TELLS, gridRate, meanFrame } from '../grid-rate.js';
import { stored } from '../pace/new-keys.js';
import { scaleTangents } from '../pace/scale-tangents.js';
import { pacedResult } from '../pace/store-paced.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';
import { checkSound, refuseParts } from '../whole-track.js';

/** Share of a frame within which the first key is taken to stand on the grid that begins at 0 s. */
const AT_FRAME = 0.25;

/**
 * Sets key times to the frames that they were rounded from: i/fps, frames counted gap by gap so that a clock that drifts is set right too. Values stay to the
 * bit; tangents, which are per second, are scaled so that each segment plays its path. Whatever else moves the node goes along (`with`).
 */
export const reTimeToGrid: Verb = Object.freeze({
  name: 're-time to grid',
  summary: 'Sets rounded key times to the frames that they belong to; no value changes.',
  alsoCalled: ['snap to frames', 'frame rate', 'rounded times', 'conform', 'quantise times', 'fps'],
  opening: 'Re-time to the grid',
  reads: ['fps', 'with'] as const,
  needsAllowing: false,
  keysApart: false,
  insertsKeys: false,
  movesTimes: true,
  say: (step: Step) => sentenceOf('Re-time to the grid', step),
  apply(track: RotationTrack, step: Step): EditResult {
    refuseParts(track, step, ['span', 'keep']);
    if (track.times.length < 2) return editResult(track, track);
    checkSound(track);
    const olds = track.times;
    const news = gridTimes(track, gridRate(track, step));
    if (news.every((time, key) => time === olds[key])) return editResult(track, track);
    const values = track.values.slice();
    if (track.interpolation === 'CUBICSPLINE') scaleTangents(values, olds, news);
    const after = replaceTrack(track, { times: news, values });
    const clock = {
      oldTime: (t: number) => across(news, olds, t),
      newTime: (old: number) => across(olds, news, old),
    };
    const path = playAs(track, 'as-written');
    const orientation: Curve['orientation'] = (out, t) => path.orientation(out, clock.oldTime(t));
    return pacedResult(track, after, [], [olds[0], olds[olds.length - 1]], { orientation }, clock, step);
  },
});

function gridTimes(track: RotationTrack, rate: number): Float64Array {
  const { times } = track;
  const frame = meanFrame(track);
  // Keys far apart tell their own frames badly; those of a dense track tell the clock that they were written by.
  const clock = frame > 0 && Math.abs(frame * rate - 1) < 0.05 ? frame : 1 / rate;
  const first = times[0] * rate;
  const onGrid = Math.abs(first - Math.round(first)) <= AT_FRAME;
  const news = new Float64Array(times.length);
  let count = onGrid ? Math.round(first) : 0;
  const start = onGrid ? 0 : times[0];
  news[0] = stored(track, start + count / rate);
  for (let key = 1; key < times.length; key++) {
    const frames = (times[key] - times[key - 1]) / clock;
    const whole = Math.round(frames);
    if (whole < 1 || Math.abs(frames - whole) > TELLS) throw offGrid(track, key, frames, rate);
    count += whole;
    news[key] = stored(track, start + count / rate);
  }
  return news;
}

/** Time on one clock as time on the other: a straight line from key to key, and on at the same pace beyond them. */
function across(from: Float64Array, into: Float64Array, t: number): number {
  const last = from.length - 1;
  if (t <= from[0]) return into[0] + (t - from[0]);
  if (t >= from[last]) return into[last] + (t - from[last]);
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (from[middle] <= t) low = middle;
    else high = middle;
  }
  if (t === from[low]) return into[low];
  return into[low] + ((t - from[low]) / (from[high] - from[low])) * (into[high] - into[low]);
}

function offGrid(track: RotationTrack, key: number, frames: number, rate: number): SlewcurveError {
  return new SlewcurveError(
    'step.off-grid',
    `Key ${key} comes ${frames.toFixed(2)} frames after the one before at ${Number(rate.toFixed(3))} frames a second, so which frame it belongs to can't be told. Say another fps, or re-grid instead.`,
    placeOf(track, key),
  );
}
