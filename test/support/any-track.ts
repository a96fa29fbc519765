import {
  expMap,
  fromAxisAngle,
  multiply,
  rotationTrack,
  type Curve,
  type RotationTrack,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { anyQuaternion, anyVector } from './any-quaternion.js';

/**
 * LINEAR tracks of 2 to 7 keys: steps of up to `largest` radians about any axes, gaps of 0.2 to 2 s, signs at random.
 */
export function anyTrack(largest: number): fc.Arbitrary<RotationTrack> {
  const step = fc.record({
    turn: anyVector(largest),
    gap: fc.double({ min: 0.2, max: 2, noNaN: true }),
    sign: fc.constantFrom(-1, 1),
  });
  return fc.tuple(anyQuaternion, fc.array(step, { minLength: 1, maxLength: 6 })).map(([first, steps]) => {
    const q = [...first];
    const times = [0.5];
    const values = [...q];
    for (const { turn, gap, sign } of steps) {
      multiply(q, q, expMap<number[]>([], turn));
      times.push(times[times.length - 1] + gap);
      values.push(...q.map((part) => sign * part));
    }
    return rotationTrack({ times, values });
  });
}

/** The same keys at mirrored times, from last to first. */
export function reversed(track: RotationTrack): RotationTrack {
  const last = track.times.length - 1;
  const sum = track.times[0] + track.times[last];
  return rotationTrack({
    times: Array.from(track.times, (_, n) => sum - track.times[last - n]),
    values: Array.from(track.times).flatMap((_, n) => keyOf(track, last - n)),
  });
}

/** The track with every key q made `left` · q · `right`. */
export function multiplied(
  track: RotationTrack,
  left: readonly number[],
  right: readonly number[],
): RotationTrack {
  const values = Array.from(track.times).flatMap((_, n) =>
    multiply<number[]>([], left, multiply<number[]>([], keyOf(track, n), right)),
  );
  return rotationTrack({ times: track.times, values });
}

export function keyOf(track: RotationTrack, key: number): number[] {
  return Array.from(track.values.subarray(4 * key, 4 * key + 4));
}

/** A LINEAR track about z through `degrees`. */
export function oneAxisTrack(times: readonly number[], degrees: readonly number[]): RotationTrack {
  const values = degrees.flatMap((angle) => fromAxisAngle<number[]>([], [0, 0, 1], (angle * Math.PI) / 180));
  return rotationTrack({ times, values });
}

/**
 * Largest difference of rate (rad/s) and acceleration (rad/s²) between 1e-9 s before an inner knot and the knot; the rate carried
 * on to the knot by its acceleration.
 */
export function jumpsAtKnots(curve: Curve): { rate: number; acceleration: number } {
  const worst = { rate: 0, acceleration: 0 };
  for (const t of curve.knots.subarray(1, -1)) {
    const slope = curve.acceleration([0, 0, 0], t - 1e-9, 'own');
    const bend = curve.acceleration([0, 0, 0], t, 'own').map((part, n) => part - slope[n]);
    const before = curve.rate([0, 0, 0], t - 1e-9, 'own');
    const jump = curve.rate([0, 0, 0], t, 'own').map((part, n) => part - before[n] - 1e-9 * slope[n]);
    worst.rate = Math.max(worst.rate, Math.hypot(...jump));
    worst.acceleration = Math.max(worst.acceleration, Math.hypot(...bend));
  }
  return worst;
}
