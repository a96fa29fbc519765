import { conjugate } from '../quaternion/conjugate.js';
import { expMap } from '../quaternion/exp-map.js';
import { multiply } from '../quaternion/multiply.js';
import { normalise } from '../quaternion/normalise.js';
import type { Curve } from './curve.js';
import { bSplineMotion } from './cumulative-b-spline.js';
import { segmentTurns } from './slerp-curve.js';
import { splineRuns, type SplineKeys, type SplineRun } from './spline-keys.js';
import { stateCurve, type MotionState } from './state-curve.js';
import { copyKey } from './unit-keys.js';

/**
 * The cumulative cubic B-spline whose controls are the keys, with the key times as knots: smooth to the acceleration, near the
 * keys and not through them, but for the first and last key of every run between breaks. Past an end the knots and the end turn
 * are mirrored, which is what makes it pass there; a loop goes on round the seam instead.
 */
export function keyBSpline(spline: SplineKeys): Curve {
  const { times, breaks, keys, gaps } = spline;
  const motions: (((u: number) => MotionState) | undefined)[] = Array.from({ length: gaps.length });
  for (const run of splineRuns(spline)) {
    const motion = runMotion(spline, run);
    for (let i = run.first; i < run.last; i++) motions[i] = (u) => motion(i - run.first, u);
  }
  const atRest: MotionState = {
    orientation: new Float64Array(4),
    rate: new Float64Array(3),
    acceleration: new Float64Array(3),
  };
  return stateCurve({
    times,
    breaks,
    continuity: 2,
    key(out, key) {
      const now = motions[key]?.(0) ?? motions[key - 1]?.(1);
      if (now === undefined) copyKey(out, keys, key);
      else normalise(out, now.orientation);
    },
    at: (i, u) => motions[i]?.(u) ?? atRest,
  });
}

function runMotion(
  spline: SplineKeys,
  { first, last }: SplineRun,
): (segment: number, u: number) => MotionState {
  const { keys, times, loop } = spline;
  const count = last - first;
  const controls = new Float64Array(4 * (count + 3));
  controls.set(keys.subarray(4 * first, 4 * last + 4), 4);
  const turns = spline.turns.subarray(3 * first, 3 * last);
  extend(controls, turns, loop ? count - 1 : 0, 0);
  extend(controls, turns, loop ? 0 : count - 1, count + 1);
  return bSplineMotion(
    { controls, turns: segmentTurns(controls) },
    runKnots(times.subarray(first, last + 1), loop),
  );
}

/** The knots of a run by number: its key times, and past its ends these mirrored, or gone round again in a loop. */
function runKnots(times: Float64Array, loop: boolean): (n: number) => number {
  const count = times.length - 1;
  const span = times[count] - times[0];
  return function knot(n: number): number {
    if (n >= 0 && n <= count) return times[n];
    if (loop) return n < 0 ? knot(n + count) - span : knot(n - count) + span;
    // A run of one segment has no second gap to mirror: its own counts again.
    if (n < 0) return 2 * times[0] - (-n <= count ? times[-n] : times[count] + span);
    return 2 * times[count] - (n <= 2 * count ? times[2 * count - n] : times[0] - span);
  };
}

/** Puts a control beside the first (`at` 0) or the last: its neighbour turned back, or on, by the turn of segment `segment`. */
function extend(controls: Float64Array, turns: Float64Array, segment: number, at: number): void {
  const turn = new Float64Array(4);
  const beside = new Float64Array(4);
  const outside = at === 0 ? 0 : at + 1;
  copyKey(beside, controls, at === 0 ? 1 : at);
  expMap(turn, turns.subarray(3 * segment, 3 * segment + 3));
  if (at === 0) conjugate(turn, turn);
  controls.set(normalise(beside, multiply(beside, beside, turn)), 4 * outside);
}
