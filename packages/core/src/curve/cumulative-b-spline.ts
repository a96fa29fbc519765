import type { ReadonlyNumberStore } from '../number-store.js';
import { normalise } from '../quaternion/normalise.js';
import { cumulativeCubicBasis } from './b-spline-basis.js';
import { controlTurns, type ControlTurns } from './control-turns.js';
import type { Curve } from './curve.js';
import { stateCurve, type MotionState } from './state-curve.js';
import { turnProduct } from './turn-product.js';

/**
 * The cumulative cubic B-spline of four or more control orientations (`[x, y, z, w]`, not necessarily unit, signs do not matter),
 * `gap` seconds apart: n controls make n − 3 segments. It follows the controls without passing through them and has continuous
 * acceleration. Played backwards it is another curve. For a spline near a track's keys see `rotationSpline`, kind `b-spline`.
 *
 * q = c₀ Π Exp(B_k(t) r_k), r_k = Log(c_{k−1}⁻¹c_k): M.-J. Kim, M.-S. Kim and S. Y. Shin, SIGGRAPH 1995.
 *
 * @throws SlewcurveError `curve.too-few-controls`, `curve.bad-control`
 */
export function cumulativeBSpline(
  controls: readonly ReadonlyNumberStore[],
  gap: number = 1,
  start: number = 0,
): Curve {
  const legs = controlTurns(controls, 4);
  const segments = controls.length - 3;
  const at = bSplineMotion(legs, (n) => start + n * gap);
  return stateCurve({
    times: Float64Array.from({ length: segments + 1 }, (_, n) => start + n * gap),
    continuity: 2,
    breaks: [],
    key(out, key) {
      const segment = Math.min(key, segments - 1);
      normalise(out, at(segment, key - segment).orientation);
    },
    at,
  });
}

/**
 * The motion whose segment i is under the controls i to i + 3, by the fraction `u` of the segment; `knot(n)` gives the knots,
 * segment i lying between knot i and knot i + 1.
 * @internal
 */
export function bSplineMotion(
  { controls, turns }: ControlTurns,
  knot: (n: number) => number,
): (segment: number, u: number) => MotionState {
  const product = turnProduct();
  const basis = new Float64Array(9);
  const legs = Array.from({ length: turns.length / 3 }, (_, k) => turns.subarray(3 * k, 3 * k + 3));
  return (segment, u) => {
    const t = knot(segment) + u * (knot(segment + 1) - knot(segment));
    cumulativeCubicBasis(basis, knot, segment, t);
    product.reset(controls.subarray(4 * segment, 4 * segment + 4));
    for (let k = 0; k < 3; k++)
      product.turn(legs[segment + k], basis[3 * k], basis[3 * k + 1], basis[3 * k + 2]);
    return product;
  };
}
