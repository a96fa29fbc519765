import { angleBetween, fromEuler, rotationSpline, rotationTrack, toEuler } from '@slewcurve/core';
import { expect, test } from 'vitest';
import example from '../data/reference/scipy-documentation-example.json' with { type: 'json' };
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
      expect(angleBetween(curve.orientation([], t), expected_quat[n])).toBeLessThan(1e-9);
      expect(relativeDifference(curve.rate([], t, 'own'), expected_rate_body[n])).toBeLessThan(1e-8);
      expect(relativeDifference(curve.acceleration([], t, 'own'), expected_accel_body[n])).toBeLessThan(1e-7);
    });
  }
});

test("the example of scipy's documentation comes out as scipy has it, in angles, rates and accelerations", () => {
  // Source: docstring of scipy.spatial.transform.RotationSpline; numbers by scipy 1.17.1, which stops at 1e-9.
  const radians = Math.PI / 180;
  const values = example.angles_deg.flatMap((angles) =>
    fromEuler<number[]>(
      [],
      angles.map((angle) => angle * radians),
      example.seq,
    ),
  );
  const curve = rotationSpline(rotationTrack({ times: example.times, values }), {
    kind: 'c2',
    tolerance: 1e-12,
  });
  example.at.forEach((t, n) => {
    const q = curve.orientation<number[]>([], t);
    expect(angleBetween(q, example.expected_quat[n])).toBeLessThan(1e-9);
    toEuler([0, 0, 0], q, example.seq).forEach((angle, part) =>
      expect(angle / radians).toBeCloseTo(example.expected_angles_deg[n][part], 7),
    );
    expect(relativeDifference(curve.rate([], t, 'own'), example.expected_rate_body[n])).toBeLessThan(1e-8);
    expect(relativeDifference(curve.acceleration([], t, 'own'), example.expected_accel_body[n])).toBeLessThan(
      1e-7,
    );
  });
});
