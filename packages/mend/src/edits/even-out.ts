import { type RotationTrack, SlewcurveError, pace } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { paceSpan } from '../pace/pace-span.js';
import { storePaced } from '../pace/store-paced.js';
import { takeCorners } from '../pace/take-corners.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * One speed along the whole path: t*(S) = T·S/S_tot. A bent path stays bent: see the result's bends. A path's corners stay unless it is to round them.
 */
export const evenOut: Verb = Object.freeze({
  name: 'even out',
  summary: 'Makes the speed of turning constant; the path stays.',
  alsoCalled: ['constant speed', 'retime', 'uniform speed', 'speed ramp', 'arc length'],
  opening: 'Even out',
  reads: ['seconds', 'corners', 'within', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Even out', step),
  apply(track: RotationTrack, step: Step): EditResult {
    const span = paceSpan(track, step);
    const seconds = step.seconds ?? span[1] - span[0];
    if (step.corners === 'stop')
      throw new SlewcurveError(
        'step.corners',
        'One speed does not stop at corners. Round them, or ease in and out at each.',
        placeOf(track),
      );
    const { path, corners } = takeCorners(track, span, step, false);
    const paced = pace(path, { kind: 'constant', seconds, span });
    return storePaced(track, span, paced, step, corners.length > 0 ? 'smooth' : 'steady', corners);
  },
});
