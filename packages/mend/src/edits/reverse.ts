import { type Curve, type RotationTrack, SlewcurveError, playAs, replaceTrack } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { backwards } from '../pace/backwards.js';
import { stored } from '../pace/new-keys.js';
import { paceSpan } from '../pace/pace-span.js';
import { pacedResult } from '../pace/store-paced.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/** Plays the whole track from its end to its start, in the same time: q*(t) = q(T − t). */
export const reverse: Verb = Object.freeze({
  name: 'reverse',
  summary: 'Plays a track backwards.',
  alsoCalled: ['backwards', 'play backwards', 'invert time', 'rewind'],
  opening: 'Reverse',
  reads: ['with'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: false,
  say: (step: Step) => sentenceOf('Reverse', step),
  apply(track: RotationTrack, step: Step): EditResult {
    const span = paceSpan(track, step);
    const { times } = track;
    const last = times.length - 1;
    if (span[0] !== times[0] || span[1] !== times[last])
      throw new SlewcurveError(
        'step.whole-track',
        'Turned round in its middle a track would jump at both ends of the span. Leave the span out, or split the clip first.',
        placeOf(track),
      );
    if (track.interpolation === 'STEP')
      throw new SlewcurveError(
        'step.no-reverse',
        'A STEP track holds each key until the next, and backwards it would hold the wrong ones. Convert it first.',
        placeOf(track),
      );
    if (step.keep?.some((key) => key * 2 !== last))
      throw new SlewcurveError(
        'step.kept-in-the-way',
        'Every key but the middle one changes its place. Take the keys out of keep.',
        placeOf(track),
      );
    const sum = times[0] + times[last];
    const news = Float64Array.from(times, (_, key) =>
      key === 0 || key === last ? times[key] : stored(track, sum - times[last - key]),
    );
    const { breaks } = track;
    const after = replaceTrack(track, {
      times: news,
      values: backwards(track, 0, last),
      breaks: breaks.map((_, i) => last - 1 - breaks[breaks.length - 1 - i]).filter((key) => key >= 0),
    });
    const path = playAs(track, 'as-written');
    const clock = { oldTime: (t: number) => sum - t, newTime: (old: number) => sum - old, turnsBack: true };
    const orientation: Curve['orientation'] = (out, t) => path.orientation(out, sum - t);
    return pacedResult(track, after, [], span, { orientation }, clock, step);
  },
});
