import { angleBetween, rotationSpline, rotationTrack } from '@slewcurve/core';
import { expect, test } from 'vitest';
import { relativeDifference } from '../support/against-samples.js';
import { referenceValues } from '../support/reference-values.js';

// Source: scipy 1.10.1, scipy.spatial.transform.RotationSpline. It stops after ten passes or at 1e-9, hence the tolerances that
// came with the values: angle 1e-9 rad, rate 1e-8, acceleration 1e-7 of the vector's size.

const CASES = referenceValues('scipy-1.10.1.json', 'rotation_spline');

test("the rotation spline with continuous acceleration is scipy's, in orientation, rate and acceleration", () => {
  expect(CASES.length).toBeGreaterThan(0);
  for (const { times, quats, at, expected_quat, expected_rate_body, expected_accel_body } of CASES) {
    const curve = rotationSpline(rotationTrack({ times, values: quats.flat() }), {
      kind: 'c2',
      tolerance: 1e-12,
    });
    expect(curve.convergence.converged).toBe(true);
    at.forEach((t, n) => {
      // The last time stands past the end in the sense that a curve holds there; its derivatives are those of the last segment.
      expect(angleBetween(curve.orientation([], t), expected_quat[n])).toBeLessThan(1e-9);
      expect(relativeDifference(curve.rate([], t, 'own'), expected_rate_body[n])).toBeLessThan(1e-8);
      expect(relativeDifference(curve.acceleration([], t, 'own'), expected_accel_body[n])).toBeLessThan(1e-7);
    });
  }
});
