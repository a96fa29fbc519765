import { angleBetween, type Curve, type Frame, type ReadonlyNumberStore } from '@slewcurve/core';
import type { ReferenceSample } from './reference-values.js';

/** Worst differences of a curve from outside samples: angle in rad; rate and acceleration relative to the vector's size. */
export interface CurveDifferences {
  angle: number;
  rate: number;
  acceleration: number;
}

/** Compares orientation, and rate and acceleration in own axes, at every sample. */
export function againstSamples(curve: Curve, samples: readonly ReferenceSample[]): CurveDifferences {
  const worst = { angle: 0, rate: 0, acceleration: 0 };
  for (const { t, quat, rate_body, accel_body } of samples) {
    worst.angle = Math.max(worst.angle, angleBetween(curve.orientation([], t), quat));
    worst.rate = Math.max(worst.rate, relativeDifference(curve.rate([], t, 'own'), rate_body));
    worst.acceleration = Math.max(
      worst.acceleration,
      relativeDifference(curve.acceleration([], t, 'own'), accel_body),
    );
  }
  return worst;
}

/** |a − b| over |b|, over 1 where b is shorter than that. */
export function relativeDifference(a: ReadonlyNumberStore, b: ReadonlyNumberStore): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]) / Math.max(1, Math.hypot(b[0], b[1], b[2]));
}

/**
 * Largest difference between the curve's rates and accelerations and the five-point differences of its orientations and rates at
 * `t`, with steps of `step` seconds: an independent check of derivatives, good to about step⁴. Same units, in the frame asked.
 */
export function differenceFromSlopes(curve: Curve, t: number, step: number, frame: Frame): number {
  const rate = curve.rate([0, 0, 0], t, frame);
  const acceleration = curve.acceleration([0, 0, 0], t, frame);
  const q = curve.orientation([0, 0, 0, 0], t);
  const slope = [0, 0, 0, 0];
  const bend = [0, 0, 0];
  for (const [offset, weight] of [
    [-2, 1],
    [-1, -8],
    [1, 8],
    [2, -1],
  ]) {
    const near = curve.orientation([0, 0, 0, 0], t + offset * step);
    const sign = near[0] * q[0] + near[1] * q[1] + near[2] * q[2] + near[3] * q[3] < 0 ? -1 : 1;
    const nearRate = curve.rate([0, 0, 0], t + offset * step, frame);
    for (let n = 0; n < 4; n++) slope[n] += (sign * weight * near[n]) / (12 * step);
    for (let n = 0; n < 3; n++) bend[n] += (weight * nearRate[n]) / (12 * step);
  }
  // ω = 2 vec(q* q′) in own axes, 2 vec(q′ q*) in the parent's.
  const [x, y, z, w] = frame === 'own' ? [-q[0], -q[1], -q[2], q[3]] : slope;
  const [a, b, c, d] = frame === 'own' ? slope : [-q[0], -q[1], -q[2], q[3]];
  const numeric = [
    2 * (w * a + x * d + y * c - z * b),
    2 * (w * b + y * d + z * a - x * c),
    2 * (w * c + z * d + x * b - y * a),
  ];
  return Math.max(relativeDifference(rate, numeric), relativeDifference(acceleration, bend));
}
