import type { NumberStore } from '../number-store.js';
import { normalise } from '../quaternion/normalise.js';
import type { Curve } from './curve.js';
import { withNumericLength } from './numeric-motion.js';
import { durations, segmentedCurve } from './segmented-curve.js';

/** Orientation, and rate and acceleration in own axes, at the time that was loaded last. */
export interface MotionState {
  readonly orientation: Float64Array;
  readonly rate: Float64Array;
  readonly acceleration: Float64Array;
}

export interface StateCurveParts {
  /** Key times, seconds, strictly ascending. */
  readonly times: Float64Array;
  readonly continuity: 0 | 1 | 2;
  /** Keys after which nothing is interpolated. */
  readonly breaks: readonly number[];
  /** Writes the unit orientation of a key. */
  key(out: NumberStore, key: number): void;
  /** The motion at the fraction `u` of a segment, `h` seconds long; derivatives by seconds. The state may be one and the same. */
  at(segment: number, u: number, h: number): MotionState;
}

/**
 * The curve of a motion whose orientation, rate and acceleration come out of one calculation. Lengths and peaks are found
 * numerically from the exact rate.
 */
export function stateCurve(parts: StateCurveParts): Curve {
  const { times, continuity, breaks } = parts;
  const gaps = durations(times);
  return segmentedCurve({
    times,
    continuity,
    breaks,
    key: (out, key) => parts.key(out, key),
    motion: withNumericLength(
      {
        orientation: (out, i, u) => void normalise(out, parts.at(i, u, gaps[i]).orientation),
        rate: (out, i, u) => copyVector(out, parts.at(i, u, gaps[i]).rate),
        acceleration: (out, i, u) => copyVector(out, parts.at(i, u, gaps[i]).acceleration),
      },
      gaps,
    ),
  });
}

function copyVector(out: NumberStore, vector: Float64Array): void {
  out[0] = vector[0];
  out[1] = vector[1];
  out[2] = vector[2];
}
