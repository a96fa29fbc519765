import { type RotationTrack, SlewcurveError, pace } from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { DEGREES } from '../edit-result.js';
import { paceSpan } from '../pace/pace-span.js';
import { storePaced } from '../pace/store-paced.js';
import { takeCorners } from '../pace/take-corners.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/**
 * Slows down where the path is turned too fast, and nowhere else; time grows. With `acceleration` the bends of the path count too, as a machine or a
 * headset feels them: s̈² + (ṡ²κ)² ≤ a².
 *
 * A path of great arcs has corners, where no speed keeps a limit of acceleration: they are rounded within 0.1°, or what `within` says, which the price
 * tells, or it stops at each; see `takeCorners`.
 */
export const cap: Verb = Object.freeze({
  name: 'cap',
  summary: 'Slows down what turns too fast, down to a limit; the path stays and time grows.',
  alsoCalled: ['speed limit', 'limit speed', 'slow down', 'clamp speed', 'speed ramp', 'time remap'],
  opening: 'Cap the speed of',
  reads: ['rate', 'acceleration', 'corners', 'within', 'with', 'store'] as const,
  needsAllowing: true,
  keysApart: false,
  insertsKeys: true,
  say: (step: Step) => sentenceOf('Cap the speed of', step),
  apply(track: RotationTrack, step: Step): EditResult {
    const span = paceSpan(track, step);
    if (step.rate === undefined)
      throw new SlewcurveError(
        'step.needs-rate',
        'Say the most that it may turn: rate, in deg/s.',
        placeOf(track),
      );
    const limits = {
      rate: step.rate / DEGREES,
      ...(step.acceleration !== undefined && { acceleration: step.acceleration / DEGREES }),
    };
    const isBent = step.acceleration !== undefined;
    const { path, corners, stops } = takeCorners(track, span, step, isBent);
    const paced = pace(path, { kind: 'cap', ...limits, stops, span });
    return storePaced(track, span, paced, step, isBent || corners.length > 0 ? 'smooth' : 'steady', corners);
  },
});
