import { keyOrientation } from '../track/key-orientation.js';
import { playableTrack } from '../track/playable-track.js';
import type { RotationTrack } from '../track/rotation-track.js';
import { componentCubicMotion, hermiteCoefficients } from './component-cubic.js';
import type { Curve } from './curve.js';
import { durations, segmentedCurve } from './segmented-curve.js';

/**
 * Cubic Hermite of the stored values and tangents, made unit at every time: glTF 2.0's CUBICSPLINE (Appendix C). No care is
 * taken of signs, as the text takes none. For CUBICSPLINE tracks alone. Keys that cannot be played are left out
 * (`playableTrack`).
 */
export function storedCubicCurve(track: RotationTrack): Curve {
  const played = playableTrack(track);
  const { times, values, breaks } = played;
  const gaps = durations(times);
  const coefficients = new Float64Array(16 * gaps.length);
  const leaving = new Float64Array(4);
  const arriving = new Float64Array(4);
  for (let i = 0; i < gaps.length; i++) {
    const at = 12 * i;
    for (let k = 0; k < 4; k++) {
      leaving[k] = gaps[i] * values[at + 8 + k];
      arriving[k] = gaps[i] * values[at + 12 + k];
    }
    hermiteCoefficients(
      coefficients,
      i,
      values.subarray(at + 4),
      leaving,
      values.subarray(at + 16),
      arriving,
    );
  }
  return segmentedCurve({
    times,
    breaks,
    continuity: ratesMeet(played) ? 1 : 0,
    key: (out, key) => void keyOrientation(out, played, key),
    motion: componentCubicMotion(coefficients, gaps),
  });
}

/**
 * Whether the rate either side of every inner key is the same to 1e-9 of it. Only the part of a tangent across the value
 * turns: tangents may differ along it.
 */
function ratesMeet({ times, values }: RotationTrack): boolean {
  for (let key = 1; key + 1 < times.length; key++) {
    const at = 12 * key;
    let along = 0;
    let squared = 0;
    let size = 0;
    for (let k = 0; k < 4; k++) {
      const step = values[at + 8 + k] - values[at + k];
      along += step * values[at + 4 + k];
      squared += values[at + 4 + k] ** 2;
      size = Math.max(size, Math.abs(values[at + k]), Math.abs(values[at + 8 + k]));
    }
    for (let k = 0; k < 4; k++) {
      const step = values[at + 8 + k] - values[at + k] - (along / squared) * values[at + 4 + k];
      if (Math.abs(step) > 1e-9 * size) return false;
    }
  }
  return true;
}
