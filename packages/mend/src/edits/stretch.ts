import { type RotationTrack, SlewcurveError, pace, playAs } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { paceSpan } from '../pace/pace-span.js';
import { storePaced } from '../pace/store-paced.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/** Makes the span last longer: every speed in it falls by one factor. What follows is shifted. */
export const stretch: Verb = Object.freeze({
  name: 'stretch',
  summary: 'Makes a move last longer, all of it by one factor.',
  alsoCalled: ['slow down by', 'lengthen', 'time stretch', 'retime'],
  opening: 'Stretch',
  reads: ['seconds', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Stretch', step),
  apply: (track: RotationTrack, step: Step): EditResult => scaled(track, step, (ratio) => ratio > 1),
});

/** Makes the span last less long: every speed in it rises by one factor. What follows is shifted. */
export const shrink: Verb = Object.freeze({
  name: 'shrink',
  summary: 'Makes a move last less long, all of it by one factor.',
  alsoCalled: ['speed up', 'shorten', 'time compress', 'retime'],
  opening: 'Shrink',
  reads: ['seconds', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Shrink', step),
  apply: (track: RotationTrack, step: Step): EditResult => scaled(track, step, (ratio) => ratio < 1),
});

function scaled(track: RotationTrack, step: Step, fits: (ratio: number) => boolean): EditResult {
  const span = paceSpan(track, step);
  const old = span[1] - span[0];
  if (step.seconds === undefined || !fits(step.seconds / old))
    throw new SlewcurveError(
      'step.bad-length',
      `Say how long it is to last: seconds, ${step.verb === 'shrink' ? 'less' : 'more'} than the ${old} s that it lasts now.`,
      placeOf(track),
    );
  const paced = pace(playAs(track, 'as-written'), { kind: 'stretch', seconds: step.seconds, span });
  return storePaced(track, span, paced, { ...step, store: step.store ?? 'move' }, 'steady');
}
