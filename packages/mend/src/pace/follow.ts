import { type Curve, type RotationTrack, SlewcurveError, playAs, replaceTrack } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import type { Step } from '../step.js';
import type { EditResult, Repaced } from '../verb.js';
import { backwards } from './backwards.js';
import { stored } from './new-keys.js';
import { checkRoom, pacedResult } from './store-paced.js';
import { scaleTangents } from './scale-tangents.js';
import { thereAndBackKeys } from './there-and-back-keys.js';

/** A track that goes by another one's new clock: its keys travel, its values stay, and under CUBICSPLINE each segment plays the path that it played. */
export function follow(track: RotationTrack, { retiming, acted }: Repaced, step: Step): EditResult {
  const { turnsBack, turnsAt } = retiming;
  if (turnsAt !== undefined) return followBack(track, { retiming, acted }, turnsAt, step);
  const last = track.times.length - 1;
  const moved = track.times.map((time) => stored(track, retiming.newTime(time)));
  const times = turnsBack ? moved.map((_, key) => moved[last - key]) : moved;
  checkRoom(
    track,
    Array.from(times, (time, key) => ({ time, old: turnsBack ? last - key : key })),
  );
  const values = turnsBack ? backwards(track, 0, last) : track.values.slice();
  if (!turnsBack && track.interpolation === 'CUBICSPLINE') scaleTangents(values, track.times, times);
  const { breaks } = track;
  const after = replaceTrack(track, {
    times,
    values,
    breaks: turnsBack
      ? breaks.map((_, i) => last - 1 - breaks[breaks.length - 1 - i]).filter((key) => key >= 0)
      : breaks,
  });
  const path = playAs(track, 'as-written');
  const orientation: Curve['orientation'] = (out, t) => path.orientation(out, retiming.oldTime(t));
  // Whom it takes along in its turn is nobody.
  return pacedResult(track, after, [], acted, { orientation }, retiming, { ...step, with: 'track' });
}

/** @throws SlewcurveError `step.ends-apart` where the track ends at another time than the one it goes along with */
function followBack(
  track: RotationTrack,
  { retiming, acted }: Pick<Repaced, 'retiming' | 'acted'>,
  turnsAt: number,
  step: Step,
): EditResult {
  if (track.times[track.times.length - 1] !== turnsAt || track.interpolation === 'STEP')
    throw new SlewcurveError(
      'step.ends-apart',
      `It would turn back at ${turnsAt} s with the others, and its own last key is elsewhere, or it is STEP. Trim or convert it first.`,
      placeOf(track),
    );
  const { after, keys } = thereAndBackKeys(track);
  const path = playAs(track, 'as-written');
  const orientation: Curve['orientation'] = (out, t) => path.orientation(out, retiming.oldTime(t));
  return pacedResult(track, after, keys, acted, { orientation }, retiming, { ...step, with: 'track' });
}
