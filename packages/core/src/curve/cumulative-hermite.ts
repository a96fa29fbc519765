import type { ReadonlyNumberStore } from '../number-store.js';
import { conjugate } from '../quaternion/conjugate.js';
import { expMap } from '../quaternion/exp-map.js';
import { logMap } from '../quaternion/log-map.js';
import { multiply } from '../quaternion/multiply.js';
import { normalise } from '../quaternion/normalise.js';
import { relative } from '../quaternion/relative.js';
import type { Curve } from './curve.js';
import { withNumericLength } from './numeric-motion.js';
import { segmentedCurve } from './segmented-curve.js';
import { turnProduct } from './turn-product.js';

/**
 * One smooth turn from `q0` to `q1` that leaves at `rate0` and arrives at `rate1`: cumulative cubic of M.-J. Kim, M.-S. Kim and
 * S. Y. Shin, SIGGRAPH 1995. Rates are rad/s in own axes; `duration` and `start` are seconds. `q0` and `q1` need not be unit and
 * their signs do not matter. Not symmetric in time: played backwards it is another curve with the same ends.
 *
 * q = q₀ Exp(B₁r₁) Exp(B₂r₂) Exp(B₃r₃) with r₁ = hω₀/3, r₃ = hω₁/3, r₂ = Log(Exp(−r₁) q₀⁻¹q₁ Exp(−r₃)), the short way, and
 * B = 1 − (1 − u)³, 3u² − 2u³, u³.
 */
export function cumulativeHermite(
  q0: ReadonlyNumberStore,
  q1: ReadonlyNumberStore,
  rate0: ReadonlyNumberStore,
  rate1: ReadonlyNumberStore,
  duration: number,
  start = 0,
): Curve {
  const h = Math.max(duration, 1e-60);
  const from = normalise(new Float64Array(4), q0);
  const to = normalise(new Float64Array(4), q1);
  const r1 = Float64Array.of(rate0[0] * (h / 3), rate0[1] * (h / 3), rate0[2] * (h / 3));
  const r3 = Float64Array.of(rate1[0] * (h / 3), rate1[1] * (h / 3), rate1[2] * (h / 3));
  const r2 = middleTurn(from, to, r1, r3);
  const product = turnProduct();

  function load(u: number): void {
    const v = 1 - u;
    product.reset(from);
    product.turn(r1, 1 - v * v * v, (3 * v * v) / h, (-6 * v) / h / h);
    product.turn(r2, u * u * (3 - 2 * u), (6 * u * v) / h, (6 - 12 * u) / h / h);
    product.turn(r3, u * u * u, (3 * u * u) / h, (6 * u) / h / h);
  }

  return segmentedCurve({
    times: Float64Array.of(start, start + h),
    breaks: [],
    continuity: 2,
    key: (out, key) => void normalise(out, key === 0 ? from : to),
    motion: withNumericLength(
      {
        orientation(out, _, u) {
          load(u);
          normalise(out, product.orientation);
        },
        rate(out, _, u) {
          load(u);
          for (let axis = 0; axis < 3; axis++) out[axis] = product.rate[axis];
        },
        acceleration(out, _, u) {
          load(u);
          for (let axis = 0; axis < 3; axis++) out[axis] = product.acceleration[axis];
        },
      },
      Float64Array.of(h),
    ),
  });
}

/** Log(Exp(−r₁) q₀⁻¹q₁ Exp(−r₃)), the short way. */
function middleTurn(from: Float64Array, to: Float64Array, r1: Float64Array, r3: Float64Array): Float64Array {
  const turn = relative(new Float64Array(4), from, to);
  const back = new Float64Array(4);
  multiply(turn, conjugate(back, expMap(back, r1)), turn);
  multiply(turn, turn, conjugate(back, expMap(back, r3)));
  return logMap(turn, turn).subarray(0, 3);
}
