import { keyOrientation } from '../track/key-orientation.js';
import { playableTrack } from '../track/playable-track.js';
import type { RotationTrack } from '../track/rotation-track.js';
import { storedNumbers } from './chord-curve.js';
import { componentCubicMotion, hermiteCoefficients } from './component-cubic.js';
import type { Curve } from './curve.js';
import { durations, segmentedCurve } from './segmented-curve.js';

/**
 * Cubic Hermite of the stored values with tangents by finite differences, (q_{k+1} − q_{k−1})/(t_{k+1} − t_{k−1}), one-sided at
 * both ends and beside breaks, made unit at every time. No care is taken of signs; stored tangents are not looked at. Keys that
 * cannot be played are left out (`playableTrack`).
 */
export function finiteCubicCurve(track: RotationTrack): Curve {
  const played = playableTrack(track);
  const { times, breaks } = played;
  const keys = storedNumbers(played);
  const gaps = durations(times);
  const tangents = differences(keys, times, new Set(breaks));
  const coefficients = new Float64Array(16 * gaps.length);
  const leaving = new Float64Array(4);
  const arriving = new Float64Array(4);
  for (let i = 0; i < gaps.length; i++) {
    const at = 4 * i;
    for (let k = 0; k < 4; k++) {
      leaving[k] = gaps[i] * tangents[at + k];
      arriving[k] = gaps[i] * tangents[at + 4 + k];
    }
    hermiteCoefficients(coefficients, i, keys.subarray(at), leaving, keys.subarray(at + 4), arriving);
  }
  return segmentedCurve({
    times,
    breaks,
    continuity: 1,
    key: (out, key) => void keyOrientation(out, played, key),
    motion: componentCubicMotion(coefficients, gaps),
  });
}

function differences(keys: Float64Array, times: Float64Array, breaks: ReadonlySet<number>): Float64Array {
  const tangents = new Float64Array(keys.length);
  const last = times.length - 1;
  for (let key = 0; key <= last; key++) {
    const before = key === 0 || breaks.has(key - 1) ? key : key - 1;
    const after = key === last || breaks.has(key) ? key : key + 1;
    if (before === after) continue;
    const gap = Math.max(times[after] - times[before], 1e-60);
    for (let k = 0; k < 4; k++) tangents[4 * key + k] = (keys[4 * after + k] - keys[4 * before + k]) / gap;
  }
  return tangents;
}
