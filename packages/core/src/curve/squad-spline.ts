import { expMap } from '../quaternion/exp-map.js';
import { multiply } from '../quaternion/multiply.js';
import type { Curve } from './curve.js';
import { keyRate, type KeyRates } from './key-rate.js';
import type { SplineKeys } from './spline-keys.js';
import { squadCurve, type SquadParts } from './squad-curve.js';
import { copyKey } from './unit-keys.js';

/**
 * Spherical quadrangles with two inner points a key, so that one rate holds on both sides of it at uneven times too (M. Geier,
 * "splines", "Squad, non-uniform", for the three-point rule; the rest derived): a_i = q_i Exp((h_iω_i − φ_i)/2),
 * b_{i+1} = q_{i+1} Exp((φ_i − h_iω_{i+1})/2). `uniform` takes K. Shoemake's own points, Exp((φ₋ − φ₊)/4) on both sides.
 */
export function squadSpline(spline: SplineKeys, rates: KeyRates): Curve {
  return squadCurve(squadParts(spline, rates));
}

/** Keys and inner points of `squadSpline`. */
export function squadParts(spline: SplineKeys, rates: KeyRates): SquadParts {
  const { times, breaks, keys, gaps, turns, before, after } = spline;
  const leaving = new Float64Array(4 * gaps.length);
  const arriving = new Float64Array(4 * gaps.length);
  const point = new Float64Array(4);
  const bow = new Float64Array(4);
  for (let i = 0; i < gaps.length; i++) {
    copyKey(point, keys, i);
    bowAt(before[i], i, i, 1);
    leaving.set(multiply(point, point, expMap(bow, bow)), 4 * i);
    copyKey(point, keys, i + 1);
    bowAt(i, after[i], i, -1);
    arriving.set(multiply(point, point, expMap(bow, bow)), 4 * i);
  }

  /** Rotation vector from a key to the inner point of segment `own` there: past the key (side 1) or before it (side −1). */
  function bowAt(from: number, to: number, own: number, side: 1 | -1): void {
    if (rates === 'uniform' && from >= 0 && to >= 0) {
      for (let k = 0; k < 3; k++) bow[k] = (turns[3 * from + k] - turns[3 * to + k]) / 4;
      return;
    }
    keyRate(bow, spline, from, to, rates);
    for (let k = 0; k < 3; k++) bow[k] = (side / 2) * (gaps[own] * bow[k] - turns[3 * own + k]);
  }

  const even = gaps.every((gap) => Math.abs(gap - gaps[0]) <= 1e-9 * gaps[0]);
  const continuity = rates === 'uniform' && !even ? 0 : 1;
  return { times, breaks, keys, leaving, arriving, continuity };
}
