import { conjugate } from '../quaternion/conjugate.js';
import { expMap } from '../quaternion/exp-map.js';
import { logMap } from '../quaternion/log-map.js';
import { multiply } from '../quaternion/multiply.js';
import { relative } from '../quaternion/relative.js';
import type { Curve } from './curve.js';
import { durations } from './segmented-curve.js';
import { stateCurve } from './state-curve.js';
import { turnProduct } from './turn-product.js';
import { copyKey } from './unit-keys.js';

export interface HermiteSplineParts {
  readonly times: Float64Array;
  readonly breaks: readonly number[];
  /** Unit orientations, four numbers a key. */
  readonly keys: Float64Array;
  /** Rate by which each segment leaves its first key, rad/s, own axes; three numbers a segment. */
  readonly leaving: Float64Array;
  /** Rate by which each segment arrives at its last key. */
  readonly arriving: Float64Array;
  readonly continuity: 0 | 1 | 2;
}

/**
 * Cumulative cubics through the keys with given rates at both ends of every segment: M.-J. Kim, M.-S. Kim and S. Y. Shin,
 * SIGGRAPH 1995. Not symmetric in time: played backwards it is another curve through the same keys.
 *
 * q = q₀ Exp(B₁r₁) Exp(B₂r₂) Exp(B₃r₃) with r₁ = hω₀/3, r₃ = hω₁/3, r₂ = Log(Exp(−r₁) q₀⁻¹q₁ Exp(−r₃)), the short way, and
 * B = 1 − (1 − u)³, 3u² − 2u³, u³.
 */
export function hermiteSpline(parts: HermiteSplineParts): Curve {
  const { times, breaks, keys, continuity } = parts;
  const legs = segmentLegs(parts);
  const product = turnProduct();
  const from = new Float64Array(4);
  return stateCurve({
    times,
    breaks,
    continuity,
    key: (out, key) => copyKey(out, keys, key),
    at(i, u, h) {
      const v = 1 - u;
      copyKey(from, keys, i);
      product.reset(from);
      product.turn(legs[3 * i], 1 - v * v * v, (3 * v * v) / h, (-6 * v) / h / h);
      product.turn(legs[3 * i + 1], u * u * (3 - 2 * u), (6 * u * v) / h, (6 - 12 * u) / h / h);
      product.turn(legs[3 * i + 2], u * u * u, (3 * u * u) / h, (6 * u) / h / h);
      return product;
    },
  });
}

/** r₁, r₂ and r₃ of every segment. */
function segmentLegs({ times, keys, leaving, arriving }: HermiteSplineParts): Float64Array[] {
  const legs: Float64Array[] = [];
  const from = new Float64Array(4);
  const turn = new Float64Array(4);
  const back = new Float64Array(4);
  durations(times).forEach((h, i) => {
    const first = leaving.slice(3 * i, 3 * i + 3).map((rate) => rate * (h / 3));
    const last = arriving.slice(3 * i, 3 * i + 3).map((rate) => rate * (h / 3));
    copyKey(from, keys, i);
    copyKey(turn, keys, i + 1);
    relative(turn, from, turn);
    multiply(turn, conjugate(back, expMap(back, first)), turn);
    multiply(turn, turn, conjugate(back, expMap(back, last)));
    legs.push(first, logMap(turn, turn).slice(0, 3), last);
  });
  return legs;
}
