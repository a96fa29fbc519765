import { type PacedCurve, type RotationTrack, SlewcurveError, pace, playAs, regime } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { type NewKey, frameKeys, movedKeys, stored } from '../pace/new-keys.js';
import { keysAround, paceSpan } from '../pace/pace-span.js';
import { storeKeys } from '../pace/store-paced.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * Stands still at one time for so long; what follows comes later. With shoulders it slows down over that many old seconds and gets going again over as
 * many, at the frames; without, it stops dead. Both ends of the rest get a key of their own.
 */
export const hold: Verb = Object.freeze({
  name: 'hold',
  summary: 'Stands still for a while; what follows comes later.',
  alsoCalled: ['pause', 'rest', 'freeze frame', 'stepped', 'dwell'],
  opening: 'Hold',
  reads: ['at', 'seconds', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Hold', step),
  apply(track: RotationTrack, step: Step): EditResult {
    const span = paceSpan(track, step);
    const { at, seconds, shoulders = 0 } = step;
    if (at === undefined || seconds === undefined || !(at >= span[0] && at <= span[1]))
      throw new SlewcurveError(
        'step.needs-hold',
        `Say when, between ${span[0]} s and ${span[1]} s, and for how long: at and seconds.`,
        placeOf(track),
      );
    const paced = pace(playAs(track, 'as-written'), { kind: 'hold', at, seconds, shoulders, span });
    const isDense = regime(track) === 'dense';
    const store = step.store ?? (shoulders > 0 ? 'frames' : 'move');
    const around = [Math.max(span[0], at - shoulders), Math.min(span[1], at + shoulders)] as const;
    const keys =
      store === 'move'
        ? movedKeys(track, paced)
        : frameKeys(track, keysAround(track, around), paced, isDense, step.keep);
    return storeKeys(track, span, paced, step, store, withRest(track, keys, at, paced, seconds));
  },
});

/** The keys with one at each end of the rest. A key that stands where it begins is its beginning. */
function withRest(
  track: RotationTrack,
  keys: readonly NewKey[],
  at: number,
  { retiming }: PacedCurve,
  seconds: number,
): NewKey[] {
  const begins = stored(track, retiming.newTime(at));
  const ends = stored(track, begins + seconds);
  const old = track.times.indexOf(at);
  const outside = keys.filter(({ time }) => time < begins || time > ends);
  const rest = [begins, ends].map((time): NewKey => (old < 0 ? { time } : { time, old }));
  return [
    ...outside.filter(({ time }) => time < begins),
    ...rest,
    ...outside.filter(({ time }) => time > ends),
  ];
}
