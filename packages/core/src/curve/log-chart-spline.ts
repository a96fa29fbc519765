import type { ReadonlyNumberStore } from '../number-store.js';
import { logMap } from '../quaternion/log-map.js';
import { mean } from '../quaternion/mean.js';
import { normalise } from '../quaternion/normalise.js';
import { relative } from '../quaternion/relative.js';
import { chartCubicMotion } from './chart-cubic.js';
import type { Curve } from './curve.js';
import { keyRate, type KeyRates } from './key-rate.js';
import type { SplineKeys } from './spline-keys.js';
import { stateCurve } from './state-curve.js';
import { copyKey } from './unit-keys.js';

/**
 * Cubics through the keys' rotation vectors about a reference orientation: q = q_ref Exp(r(t)), r of cubics by key rates.
 * The answer depends on the reference (default: the mean of the keys): motion across the vector is slowed by 2 sin(|r|/2)/|r|, 5 % at 60° from
 * it, 17 % at 120°; good near the reference alone. Played backwards it is the same curve.
 */
export function logChartSpline(spline: SplineKeys, rates: KeyRates, reference?: ReadonlyNumberStore): Curve {
  const { times, breaks, keys, gaps } = spline;
  const origin = normalise(new Float64Array(4), reference ?? mean([0, 0, 0, 1], keys));
  const vectors = chartVectors(keys, origin);
  const turns = Float64Array.from({ length: 3 * gaps.length }, (_, n) => vectors[n + 3] - vectors[n]);
  const slopes = chartSlopes(spline, vectors, turns, rates);
  const motion = chartCubicMotion({ from: vectors, chords: turns, slopes });
  return stateCurve({
    times,
    breaks,
    continuity: 1,
    key: (out, key) => copyKey(out, keys, key),
    at: (segment, u, h) => motion(origin, segment, u, h),
  });
}

/** Log(q_ref⁻¹q) of every key, each carried past half a turn where that lies nearer to the one before. */
function chartVectors(keys: Float64Array, origin: Float64Array): Float64Array {
  const vectors = new Float64Array((3 * keys.length) / 4);
  const q = new Float64Array(4);
  for (let key = 0; 4 * key < keys.length; key++) {
    copyKey(q, keys, key);
    logMap(q, relative(q, origin, q));
    const angle = Math.hypot(q[0], q[1], q[2]);
    const before = 3 * Math.max(0, key - 1);
    const along = q[0] * vectors[before] + q[1] * vectors[before + 1] + q[2] * vectors[before + 2];
    const more = angle > 0 && key > 0 ? Math.round((along / angle - angle) / (2 * Math.PI)) : 0;
    const scale = more === 0 ? 1 : 1 + (2 * Math.PI * more) / angle;
    for (let k = 0; k < 3; k++) vectors[3 * key + k] = q[k] * scale;
  }
  return vectors;
}

/**
 * r′ at the first and at the last key of every segment, six numbers a segment. Round the seam of a loop it is one only where the
 * vectors come back to themselves, without a whole turn more.
 */
function chartSlopes(
  spline: SplineKeys,
  vectors: Float64Array,
  turns: Float64Array,
  rates: KeyRates,
): Float64Array {
  const { gaps, before, after } = spline;
  const slopes = new Float64Array(6 * gaps.length);
  const segments = { turns, gaps };
  const end = vectors.length - 3;
  const returns = [0, 1, 2].every((k) => Math.abs(vectors[end + k] - vectors[k]) < 1e-6);
  for (let i = 0; i < gaps.length; i++) {
    const joinsBefore = before[i] < i || returns;
    const joinsAfter = after[i] > i || returns;
    keyRate(slopes.subarray(6 * i, 6 * i + 3), segments, joinsBefore ? before[i] : -1, i, rates);
    keyRate(slopes.subarray(6 * i + 3, 6 * i + 6), segments, i, joinsAfter ? after[i] : -1, rates);
  }
  return slopes;
}
