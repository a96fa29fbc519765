import { type RotationTrack, SlewcurveError, pace } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { easeOf } from '../pace/ease-of.js';
import { paceSpan } from '../pace/pace-span.js';
import { storePaced } from '../pace/store-paced.js';
import { takeCorners } from '../pace/take-corners.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * Starts from rest and comes to rest. Without shoulders the whole span goes by one law, S*(t) = S_tot·m(t/T), minimum jerk if none is named. With
 * shoulders only that many old seconds at its ends (or at one, `which`) are ramps, and the pace between them stays; they take twice their time,
 * which the rest makes up for unless time may run.
 */
export const easeInOut: Verb = Object.freeze({
  name: 'ease in/out',
  summary: 'Starts and stops softly; the path stays.',
  alsoCalled: [
    'easing',
    'slow in',
    'slow out',
    'cubic-bezier',
    'soft start',
    'soft stop',
    'ease in',
    'ease out',
  ],
  opening: 'Ease in and out',
  reads: ['ease', 'seconds', 'which', 'ends', 'corners', 'within', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Ease in and out', step),
  apply(track: RotationTrack, step: Step): EditResult {
    const span = paceSpan(track, step);
    const old = span[1] - span[0];
    if (step.ends === 'go')
      throw new SlewcurveError(
        'step.bad-ends',
        'Easing keeps the angle. Keep the same ends, or let time run.',
        placeOf(track),
      );
    const { path, corners, stops } = takeCorners(track, span, step, false);
    if (step.shoulders === undefined || step.shoulders === 0) {
      const ease = easeOf(step.ease ?? 'minimum-jerk');
      const paced = pace(path, { kind: 'ease', ease, seconds: step.seconds ?? old, stops, span });
      return storePaced(track, span, paced, step, 'smooth', corners);
    }
    if (step.corners === 'stop')
      throw new SlewcurveError(
        'step.corners',
        'Ramps in the shoulders alone leave no time to stop at corners. Leave the shoulders out, or round the corners.',
        placeOf(track),
      );
    const most = step.which === undefined ? old / 2 : old;
    const ramp = Math.min(step.shoulders, most);
    const seconds = step.seconds ?? (step.ends === 'run' ? undefined : old);
    const paced = pace(path, {
      kind: 'ramps',
      rise: step.which === 'out' ? 0 : ramp,
      fall: step.which === 'in' ? 0 : ramp,
      span,
      ...(seconds !== undefined && { seconds }),
    });
    return storePaced(track, span, paced, step, 'smooth', corners);
  },
});
