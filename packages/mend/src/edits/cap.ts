import {
  type Curve,
  type RotationTrack,
  SlewcurveError,
  pace,
  playAs,
  regime,
  rotationSpline,
} from '@slewcurve/core';
import { placeOf } from '../acted-keys.js';
import { sentenceOf } from '../clauses.js';
import { DEGREES } from '../edit-result.js';
import { departure } from '../pace/departure.js';
import { paceSpan } from '../pace/pace-span.js';
import { storePaced } from '../pace/store-paced.js';
import type { Step } from '../step.js';
import type { EditResult, Verb } from '../verb.js';

/** How far corners may be rounded, degrees, where a limit of acceleration needs a path without any. */
const ROUNDING = 0.1;

/**
 * Slows down where the path is turned too fast, and nowhere else; time grows. With `acceleration` the bends of the path count too, as a machine or a
 * headset feels them: s̈² + (ṡ²κ)² ≤ a².
 *
 * A path of great arcs has corners, where no speed keeps a limit of acceleration. Densely keyed ones are taken by the smooth spline through their keys,
 * if that stays within 0.1° of them (the departure stands in the price); others are refused.
 */
export const cap: Verb = Object.freeze({
  name: 'cap',
  summary: 'Slows down what turns too fast, down to a limit; the path stays and time grows.',
  alsoCalled: ['speed limit', 'limit speed', 'slow down', 'clamp speed', 'speed ramp', 'time remap'],
  opening: 'Cap the speed of',
  reads: ['rate', 'acceleration', 'with', 'store'] as const,
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
    const path = step.acceleration === undefined ? playAs(track, 'as-written') : pathWithoutCorners(track);
    const paced = pace(path, { kind: 'cap', ...limits, span });
    return storePaced(track, span, paced, step, step.acceleration === undefined ? 'steady' : 'smooth');
  },
});

/** @throws SlewcurveError `step.corners` */
function pathWithoutCorners(track: RotationTrack): Curve {
  const path = playAs(track, 'as-written');
  if (path.continuity >= 1) return path;
  const smooth = rotationSpline(track, { kind: 'c2' });
  const off = departure(path, smooth);
  if (regime(track) === 'dense' && off <= ROUNDING) return smooth;
  throw new SlewcurveError(
    'step.corners',
    `At each key the path turns a corner, where no speed keeps a limit of acceleration, and the smooth path through the keys is ${off.toFixed(3)}° off it (at most ${ROUNDING}° is rounded). Ease through first, then cap.`,
    placeOf(track),
  );
}
