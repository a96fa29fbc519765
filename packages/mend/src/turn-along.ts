import { type RotationTrack, chartToRate, expMap, multiply, replaceTrack } from '@slewcurve/core';
import { storedValue, tangentFor, valueAt } from './stored-key.js';

/** How the tangents of a CUBICSPLINE go along when its keys are turned. Three numbers a key, own axes. */
export interface AlongTangents {
  /** How the turns change, rad/s: tangents are turned along and get the turn's own rate, (v·e)′ = v′·e + v·e′. */
  readonly slopes?: Float64Array;
  /** Wanted rates, rad/s: tangents become ½·v·(ω, 0). */
  readonly rates?: Float64Array;
}

/**
 * The track with each key q turned to q·exp(r), r a rotation vector in the key's own axes, radians. Sign and length stay as stored; a key whose turn is zero
 * keeps its bytes. A first in-tangent or last out-tangent of zero stays zero, as glTF 2.0 wants.
 *
 * @param turns three numbers a key
 */
export function turnAlong(
  track: RotationTrack,
  turns: Float64Array,
  { slopes, rates }: AlongTangents = {},
): RotationTrack {
  const values = Float64Array.from(track.values);
  const e = new Float64Array(4);
  for (let key = 0; key < track.times.length; key++) {
    const turn = turns.subarray(3 * key, 3 * key + 3);
    const slope = slopes?.subarray(3 * key, 3 * key + 3) ?? new Float64Array(3);
    if (isZero(turn) && isZero(slope)) continue;
    expMap(e, turn);
    const value = storedValue(track, key, values);
    const stored = Float64Array.from(value);
    if (!isZero(turn)) multiply(value, stored, e);
    if (track.interpolation !== 'CUBICSPLINE') continue;
    const at = valueAt(track, key);
    if (rates) {
      const tangent = tangentFor(value, rates.subarray(3 * key, 3 * key + 3));
      setTangents(values, track, key, [tangent, tangent]);
      continue;
    }
    const [x, y, z] = chartToRate(new Float64Array(3), turn, slope);
    const ofTurn = multiply(new Float64Array(4), value, [x / 2, y / 2, z / 2, 0]);
    const along = [at - 4, at + 4].map((tangentAt) =>
      multiply(new Float64Array(4), values.subarray(tangentAt, tangentAt + 4), e).map(
        (part, i) => part + ofTurn[i],
      ),
    );
    setTangents(values, track, key, [along[0], along[1]]);
  }
  return replaceTrack(track, { values });
}

function setTangents(
  values: Float64Array,
  track: RotationTrack,
  key: number,
  [before, after]: readonly [Float64Array, Float64Array],
): void {
  const at = valueAt(track, key);
  const isUnused = (edge: boolean, tangentAt: number): boolean =>
    edge && isZero(values.subarray(tangentAt, tangentAt + 4));
  if (!isUnused(key === 0, at - 4)) values.set(before, at - 4);
  if (!isUnused(key === track.times.length - 1, at + 4)) values.set(after, at + 4);
}

function isZero(vector: Float64Array): boolean {
  return vector.every((part) => part === 0);
}
