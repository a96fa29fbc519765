import {
  angleBetween,
  expMap,
  logMap,
  multiply,
  playAs,
  relative,
  rotateVector,
  rotationTrack,
  slerp,
} from '@slewcurve/core';
import { expect, test } from 'vitest';
import { referenceValues } from '../support/reference-values.js';

// Source of every number here: scipy 1.10.1, scipy.spatial.transform. Its slerp lies within 9.9e-16 rad of 50-digit values, so
// that 1.2e-15 rad is what two correct float64 calculations may differ by.

const KINDS = [...new Set(referenceValues('scipy-1.10.1.json', 'slerp').map(({ kind }) => kind))];

test.each(KINDS)(
  'slerp gives the orientations that scipy gives, kind %s, to 1.2e-15 rad (B7, B13)',
  (kind) => {
    const cases = referenceValues('scipy-1.10.1.json', 'slerp').filter((each) => each.kind === kind);
    for (const { times, quats, at, expected } of cases)
      for (const [i, t] of at.entries()) {
        const segment = Math.max(
          0,
          times.findLastIndex((time, k) => time <= t && k < times.length - 1),
        );
        const u = (t - times[segment]) / (times[segment + 1] - times[segment]);
        expect(angleBetween(slerp([], quats[segment], quats[segment + 1], u), expected[i])).toBeLessThan(
          1.2e-15,
        );
      }
  },
);

test('the playback by great arcs gives what slerp gives, at keys too', () => {
  for (const { times, quats, at, expected } of referenceValues('scipy-1.10.1.json', 'slerp')) {
    const curve = playAs(rotationTrack({ times, values: quats.flat() }), 'as-written');
    for (const [i, t] of at.entries())
      expect(angleBetween(curve.orientation([], t), expected[i])).toBeLessThan(1.2e-15);
  }
});

test('rotation vectors and quaternions turn into each other as in scipy, to 1e-15 of the angle', () => {
  const cases = referenceValues('scipy-1.10.1.json', 'rotvec');
  expect(cases.length).toBeGreaterThan(0);
  for (const { rotvec, quat, principal_rotvec, angle_rad } of cases) {
    const size = Math.max(angle_rad, Number.MIN_VALUE);
    expect(angleBetween(expMap([], rotvec), quat)).toBeLessThan(1e-15 * Math.max(1, Math.hypot(...rotvec)));
    const r = logMap([], quat);
    const apart = (sign: number): number =>
      Math.hypot(...principal_rotvec.map((part, k) => part - sign * r[k]));
    // At half a turn either sign is principal.
    const worst = angle_rad > Math.PI - 1e-9 ? Math.min(apart(1), apart(-1)) : apart(1);
    expect(worst).toBeLessThan(2e-15 * size + 1e-300);
  }
});

test('products, quotients, angles and turned vectors are those of scipy, to 2e-15', () => {
  const cases = referenceValues('scipy-1.10.1.json', 'product');
  expect(cases.length).toBeGreaterThan(0);
  for (const each of cases) {
    const { a, b } = each;
    expect(angleBetween(multiply([], a, b), each.a_times_b)).toBeLessThan(2e-15);
    expect(angleBetween(relative([], a, b), each.a_inverse_times_b)).toBeLessThan(2e-15);
    expect(Math.abs(angleBetween(a, b) - each.angle_between_rad)).toBeLessThan(2e-15);
    const turned = rotateVector([], a, each.vector);
    for (let k = 0; k < 3; k++)
      expect(Math.abs(turned[k] - each.a_applied_to_vector[k])).toBeLessThan(
        2e-15 * Math.hypot(...each.vector),
      );
  }
});
