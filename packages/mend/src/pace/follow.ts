import { type Curve, type RotationTrack, playAs, replaceTrack } from '@slewcurve/core';
import type { Step } from '../step.js';
import type { EditResult, Repaced } from '../verb.js';
import { backwards } from './backwards.js';
import { stored } from './new-keys.js';
import { checkRoom, pacedResult } from './store-paced.js';
import { scaleTangents } from './scale-tangents.js';

/** A track that goes by another one's new clock: its keys travel, its values stay, and under CUBICSPLINE each segment plays the path that it played. */
export function follow(track: RotationTrack, { retiming, acted }: Repaced, step: Step): EditResult {
  const { turnsBack } = retiming;
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
  return pacedResult(
    track,
    after,
    [],
    acted,
    { orientation },
    retiming,
    { ...step, with: 'track' },
    turnsBack,
  );
}
