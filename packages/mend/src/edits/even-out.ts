import { type RotationTrack, pace, playAs } from '@slewcurve/core';
import { sentenceOf } from '../clauses.js';
import { paceSpan } from '../pace/pace-span.js';
import { storePaced } from '../pace/store-paced.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/** One speed along the whole path: t*(S) = T·S/S_tot. A bent path stays bent: see the result's bends. */
export const evenOut: Verb = Object.freeze({
  name: 'even out',
  summary: 'Makes the speed of turning constant; the path stays.',
  alsoCalled: ['constant speed', 'retime', 'uniform speed', 'speed ramp', 'arc length'],
  opening: 'Even out',
  reads: ['seconds', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Even out', step),
  apply(track: RotationTrack, step: Step): EditResult {
    const span = paceSpan(track, step);
    const seconds = step.seconds ?? span[1] - span[0];
    const paced = pace(playAs(track, 'as-written'), { kind: 'constant', seconds, span });
    return storePaced(track, span, paced, step, 'steady');
  },
});
