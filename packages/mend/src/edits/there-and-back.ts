import { type Curve, type RotationTrack, SlewcurveError, playAs } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { paceSpan } from '../pace/pace-span.js';
import { checkRoom, pacedResult } from '../pace/store-paced.js';
import { thereAndBackKeys } from '../pace/there-and-back-keys.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/** Plays the whole track to its end and then backwards to its start: twice the time. The old keys stay. */
export const thereAndBack: Verb = Object.freeze({
  name: 'there and back',
  summary: 'Plays a track to its end and back again.',
  alsoCalled: ['ping-pong', 'bounce', 'back and forth', 'mirror in time'],
  opening: 'Play there and back',
  reads: ['with'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Play there and back', step),
  apply(track: RotationTrack, step: Step): EditResult {
    const span = paceSpan(track, step);
    const { times } = track;
    const end = times[times.length - 1];
    if (span[0] !== times[0] || span[1] !== end || track.interpolation === 'STEP')
      throw new SlewcurveError(
        'step.whole-track',
        'Only a whole track plays there and back, and not a STEP one, which would hold the wrong keys. Leave the span out, or convert it first.',
        placeOf(track),
      );
    const { after, keys } = thereAndBackKeys(track);
    checkRoom(track, keys);
    const clock = {
      oldTime: (t: number) => (t > end ? 2 * end - t : t),
      newTime: (old: number) => old,
      turnsBack: false,
      turnsAt: end,
    };
    const path = playAs(track, 'as-written');
    const orientation: Curve['orientation'] = (out, t) => path.orientation(out, clock.oldTime(t));
    return pacedResult(track, after, keys, span, { orientation }, clock, step);
  },
});
