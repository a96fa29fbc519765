import { type RotationTrack, SlewcurveError, pace, playAs } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { otherTrack } from '../pace/other-track.js';
import { paceSpan } from '../pace/pace-span.js';
import { storePaced } from '../pace/store-paced.js';
import type { Step } from '../step.js';
import type { EditResult, EditScene, Verb } from '../verb.js';

/**
 * Turns at the pace of another track, clip or span: v₂(u) = v₁(u)·(S₂/T₂)/(S₁/T₁) with u the share of the time, S the angles and T the times, so that both
 * odometers over their own totals are one curve. The path and its time stay.
 */
export const copyPace: Verb = Object.freeze({
  name: 'copy pace',
  summary: 'Gives a move the feel of another: the same speeds, to its own angle and time; the path stays.',
  alsoCalled: ['copy easing', 'copy timing', 'transfer timing', 'match timing', 'paste ease'],
  opening: 'Copy the pace onto',
  reads: ['fromTrack', 'fromClip', 'fromSpan', 'seconds', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Copy the pace onto', step),
  apply(track: RotationTrack, step: Step, scene?: EditScene): EditResult {
    const span = paceSpan(track, step);
    if (step.fromTrack === undefined && step.fromClip === undefined && step.fromSpan === undefined)
      throw new SlewcurveError(
        'step.needs-other',
        'Say whose pace: fromTrack, fromClip or fromSpan, or several of them.',
        placeOf(track),
      );
    const other = otherTrack(track, step, scene);
    paceSpan(other, { verb: step.verb, clip: other.clip, track: other.id });
    const of = playAs(other, 'as-written');
    const paced = pace(playAs(track, 'as-written'), {
      kind: 'copy',
      of,
      ...(step.fromSpan && { ofSpan: step.fromSpan }),
      ...(step.seconds !== undefined && { seconds: step.seconds }),
      span,
    });
    return storePaced(track, span, paced, step, 'smooth');
  },
});
