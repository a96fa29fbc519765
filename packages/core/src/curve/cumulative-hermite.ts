import type { ReadonlyNumberStore } from '../number-store.js';
import { normalise } from '../quaternion/normalise.js';
import type { Curve } from './curve.js';
import { hermiteSpline } from './hermite-spline.js';

/**
 * One smooth turn from `q0` to `q1` that leaves at `rate0` and arrives at `rate1` (see `hermiteSpline` for formula and source).
 * Rates are rad/s in own axes; `duration` and `start` are seconds. `q0` and `q1` need not be unit and their signs do not matter.
 * Not symmetric in time: played backwards it is another curve with the same ends.
 */
export function cumulativeHermite(
  q0: ReadonlyNumberStore,
  q1: ReadonlyNumberStore,
  rate0: ReadonlyNumberStore,
  rate1: ReadonlyNumberStore,
  duration: number,
  start: number = 0,
): Curve {
  const keys = new Float64Array(8);
  normalise(keys.subarray(0, 4), q0);
  normalise(keys.subarray(4), q1);
  return hermiteSpline({
    times: Float64Array.of(start, start + Math.max(duration, 1e-60)),
    breaks: [],
    keys,
    leaving: Float64Array.of(rate0[0], rate0[1], rate0[2]),
    arriving: Float64Array.of(rate1[0], rate1[1], rate1[2]),
    continuity: 2,
  });
}
