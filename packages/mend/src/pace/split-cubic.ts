import { type PacedCurve, type RotationTrack, dot, replaceTrack } from '@slewcurve/core';
import { tangentFor } from '../stored-key.js';
import type { NewKey } from './new-keys.js';

/** How far beside a key its side is looked at: a share of the gap, and as much of the time as float32 may have rounded it by. */
const [ASIDE, ROUNDED] = [1e-6, 2 ** -23];

/** What a segment's pace may be off through rounding. */
const SAME = 1e-4;

/**
 * A CUBICSPLINE track whose old keys travel with their numbers, tangents scaled by how much faster each segment runs, and whose other keys are read off the
 * curve with its own tangents. Two keys for one old one are a rest between them.
 */
export function splitCubic(
  track: RotationTrack,
  paced: PacedCurve,
  keys: readonly NewKey[],
  breaks: readonly number[],
): RotationTrack {
  const values = new Float64Array(12 * keys.length);
  keys.forEach(({ time, old }, key) => {
    const at = values.subarray(12 * key, 12 * key + 12);
    const value = at.subarray(4, 8);
    if (old !== undefined) {
      at.set(track.values.subarray(12 * old, 12 * old + 12));
      if (key > 0) scale(at.subarray(0, 4), pacing(paced, keys[key - 1].time, time));
      if (key + 1 < keys.length) scale(at.subarray(8), pacing(paced, time, keys[key + 1].time));
      return;
    }
    paced.orientation(value, time);
    if (key > 0 && dot(value, values.subarray(12 * key - 8, 12 * key - 4)) < 0) scale(value, -1);
    const beside = (other: number): Float64Array => {
      const t = time + ASIDE * (other - time) + Math.sign(other - time) * ROUNDED * Math.abs(time);
      return tangentFor(value, paced.rate(new Float64Array(3), t, 'own'));
    };
    if (key > 0) at.set(beside(keys[key - 1].time));
    if (key + 1 < keys.length) at.set(beside(keys[key + 1].time), 8);
  });
  return replaceTrack(track, {
    times: Float64Array.from(keys, ({ time }) => time),
    values,
    breaks: [...breaks],
  });
}

/** Old seconds a new second: 0 in a rest, exactly 1 where the pace is as it was. */
function pacing({ retiming }: PacedCurve, from: number, to: number): number {
  const ratio = (retiming.oldTime(to) - retiming.oldTime(from)) / (to - from);
  const whole = Math.round(ratio);
  return whole <= 1 && Math.abs(ratio - whole) < SAME ? whole : ratio;
}

function scale(parts: Float64Array, by: number): void {
  for (let i = 0; i < parts.length; i++) parts[i] *= by;
}
