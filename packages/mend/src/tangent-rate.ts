import { type RotationTrack, relative } from '@slewcurve/core';
import { storedValue, valueAt } from './stored-key.js';

/** What a tangent of a CUBICSPLINE key plays at its key: ω = 2·(v⁻¹·v′), the vector part. Own frame, rad/s. */
export function tangentRate(track: RotationTrack, key: number, which: 'in' | 'out'): Float64Array {
  const value = storedValue(track, key);
  const at = valueAt(track, key) + (which === 'out' ? 4 : -4);
  const square = value.reduce((sum, component) => sum + component * component, 0);
  return relative(new Float64Array(4), value, track.values.subarray(at, at + 4))
    .subarray(0, 3)
    .map((component) => (2 * component) / square);
}
