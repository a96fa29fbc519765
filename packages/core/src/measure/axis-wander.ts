import type { Curve, Frame } from '../curve/curve.js';
import { largestOnDiagonal, symmetricEigen } from '../quaternion/symmetric-eigen.js';
import { overSegments } from './over-segments.js';

/** How far a motion's turn axis strays. */
export interface AxisWander {
  /** Unit axis about which most of it turns, of either sign; zero where nothing turns. */
  readonly axis: readonly [number, number, number];
  /** Share of ∫|ω|² that is about that axis: 1 for one axis, 1/3 for none. 1 where nothing turns. */
  readonly concentration: number;
  /** Root mean square angle of the rate from the axis, weighed by |ω|², radians: asin √(1 − concentration). */
  readonly wander: number;
}

/**
 * Axis wander over [t0, t1] (default: all of the curve) from M = ∫ω ωᵀdt and its eigenvalues. In large turns own and parent axes
 * give different answers: say which was asked. Derived for this project.
 */
export function axisWander(
  curve: Curve,
  frame: Frame,
  t0: number = curve.start,
  t1: number = curve.end,
): AxisWander {
  const matrix = new Float64Array(9);
  const vectors = new Float64Array(9);
  const rate = new Float64Array(3);
  overSegments(curve, t0, t1, (time, weight) => {
    curve.rate(rate, time, frame);
    for (let row = 0; row < 3; row++)
      for (let column = 0; column < 3; column++)
        matrix[3 * row + column] += weight * rate[row] * rate[column];
  });
  const trace = matrix[0] + matrix[4] + matrix[8];
  if (!(trace > 0)) return { axis: [0, 0, 0], concentration: 1, wander: 0 };
  symmetricEigen(matrix, vectors, 3);
  const best = largestOnDiagonal(matrix, 3);
  // The rest is added up, not taken from 1: a wander of 1e-9 rad stays readable.
  const rest = [0, 1, 2].reduce((sum, n) => (n === best ? sum : sum + Math.max(0, matrix[4 * n])), 0);
  const [x, y, z] = vectors.subarray(3 * best, 3 * best + 3);
  return {
    axis: [x, y, z],
    concentration: matrix[4 * best] / trace,
    wander: Math.asin(Math.min(1, Math.sqrt(rest / trace))),
  };
}
