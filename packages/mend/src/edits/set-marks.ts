import { type RotationTrack, SlewcurveError, pace, playAs } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { paceSpan } from '../pace/pace-span.js';
import { storePaced } from '../pace/store-paced.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/** Puts what stands at old times at new ones, and runs between them without a jump of the speed and never back. Ends stay where no mark names them. */
export const setMarks: Verb = Object.freeze({
  name: 'set marks',
  summary: 'Puts poses at given times, for music and hits; the path stays.',
  alsoCalled: ['time remap', 'beat', 'sync', 'time warp', 'retime'],
  opening: 'Set marks on',
  reads: ['marks', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Set marks on', step),
  apply(track: RotationTrack, step: Step): EditResult {
    const span = paceSpan(track, step);
    if (!step.marks)
      throw new SlewcurveError(
        'step.needs-marks',
        'Say what is to stand when: marks, pairs of an old time and a new one.',
        placeOf(track),
      );
    const marks = step.marks.map(([old, time]) => ({ old, time }));
    const paced = pace(playAs(track, 'as-written'), { kind: 'marks', marks, span });
    return storePaced(track, span, paced, step, 'smooth');
  },
});
