import { type RotationTrack, rotationTrack } from '@slewcurve/core';

const RADIANS = Math.PI / 180;

/**
 * CUBICSPLINE keys about y at `angles` degrees, each left and reached at `slopes` deg/s. The first in-tangent and the last out-tangent
 * are zero.
 */
export function cubicTrack(
  times: readonly number[],
  angles: readonly number[],
  slopes: readonly number[],
): RotationTrack {
  const last = times.length - 1;
  const values = angles.flatMap((angle, key) => {
    const [half, slope] = [(angle * RADIANS) / 2, (slopes[key] * RADIANS) / 2];
    // The derivative of (0, sin a/2, 0, cos a/2).
    const tangent = [0, Math.cos(half) * slope, 0, -Math.sin(half) * slope];
    const none = [0, 0, 0, 0];
    const value = [0, Math.sin(half), 0, Math.cos(half)];
    return [...(key === 0 ? none : tangent), ...value, ...(key === last ? none : tangent)];
  });
  return rotationTrack({ times, values, interpolation: 'CUBICSPLINE', id: 'Arm', clip: 'Wave' });
}

/** Slopes of finite differences, as if all keys were `gap` seconds apart; left out: weighted by their times. */
export function differences(times: readonly number[], angles: readonly number[], gap?: number): number[] {
  return angles.map((_, key) => {
    const [before, after] = [Math.max(0, key - 1), Math.min(angles.length - 1, key + 1)];
    const seconds = gap === undefined ? times[after] - times[before] : gap * (after - before);
    return (angles[after] - angles[before]) / seconds;
  });
}
