import type { ReadonlyNumberStore } from '../number-store.js';
import { normalise } from '../quaternion/normalise.js';
import { controlTurns } from './control-turns.js';
import type { Curve } from './curve.js';
import { stateCurve } from './state-curve.js';
import { turnProduct } from './turn-product.js';

/**
 * The cumulative Bezier curve of two or more control orientations (`[x, y, z, w]`, not necessarily unit, signs do not matter):
 * from the first to the last in `duration` seconds, leaving and arriving along the first and last leg. Derivatives of every
 * order exist. Played backwards it is another curve with the same ends.
 *
 * q = c₀ Π Exp(B_k(u) r_k), r_k = Log(c_{k−1}⁻¹c_k), B_k = Σ_{j≥k} of the Bernstein polynomials: M.-J. Kim, M.-S. Kim and
 * S. Y. Shin, SIGGRAPH 1995.
 *
 * @throws SlewcurveError `curve.too-few-controls`, `curve.bad-control`
 */
export function cumulativeBezier(
  controls: readonly ReadonlyNumberStore[],
  duration: number = 1,
  start: number = 0,
): Curve {
  const { controls: units, turns } = controlTurns(controls, 2);
  const degree = controls.length - 1;
  const product = turnProduct();
  const first = units.subarray(0, 4);
  const legs = Array.from({ length: degree }, (_, k) => turns.subarray(3 * k, 3 * k + 3));
  return stateCurve({
    times: Float64Array.of(start, start + duration),
    continuity: 2,
    breaks: [],
    key: (out, key) => void normalise(out, key === 0 ? first : units.subarray(4 * degree)),
    at(_, u, h) {
      product.reset(first);
      let sum = 1;
      for (let k = 1; k <= degree; k++) {
        sum -= bernstein(degree, k - 1, u);
        // The sum's derivatives telescope to single polynomials of lower degree.
        const slope = degree * bernstein(degree - 1, k - 1, u);
        const bend =
          degree * (degree - 1) * (bernstein(degree - 2, k - 2, u) - bernstein(degree - 2, k - 1, u));
        product.turn(legs[k - 1], sum, slope / h, bend / h / h);
      }
      return product;
    },
  });
}

/** The Bernstein polynomial C(n, k) uᵏ(1 − u)ⁿ⁻ᵏ; 0 outside 0 ≤ k ≤ n. */
function bernstein(n: number, k: number, u: number): number {
  if (k < 0 || k > n) return 0;
  let choose = 1;
  for (let j = 1; j <= k; j++) choose = (choose * (n - k + j)) / j;
  return choose * u ** k * (1 - u) ** (n - k);
}
