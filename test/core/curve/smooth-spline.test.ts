import { rotationSpline, rotationTrack } from '@slewcurve/core';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';
import { anyTrack, oneAxisTrack } from '../../support/any-track.js';

const DEGREES = 180 / Math.PI;

test('about one axis the c2 spline is the ordinary cubic spline clamped to its end chords', () => {
  // Keys 0, 0, 90 at even seconds, ends at 0 and 90 deg/s: 0 + 8ω + 2·90 = 6·90, ω = 45 deg/s.
  const curve = rotationSpline(oneAxisTrack([0, 1, 2], [0, 0, 90]), { kind: 'c2' });
  expect(curve.rate([0, 0, 0], 1, 'own')[2] * DEGREES).toBeCloseTo(45, 10);
});

test('the c2 spline says how it converged, and that it did not within too few passes', () => {
  const values = [
    0, 0, 0, 1, 0.7, 0.1, 0.1, 0.4, 0.2, -0.8, 0.5, 0.1, 0.5, 0.5, -0.6, 0.4, -0.1, 0.9, 0.3, 0.2,
  ];
  const wild = rotationTrack({ times: [0, 1, 2, 3, 4], values });
  const { convergence } = rotationSpline(wild, { kind: 'c2', tolerance: 1e-11 });
  expect(convergence.converged).toBe(true);
  expect(convergence.change).toBeLessThanOrEqual(1e-11);
  expect(convergence.passes).toBeGreaterThan(5);
  const short = rotationSpline(wild, { kind: 'c2', tolerance: 1e-11, passes: 3 }).convergence;
  expect(short).toMatchObject({ converged: false, passes: 3 });
  expect(short.change).toBeGreaterThan(1e-11);
});

test('the c2 spline settles within 40 passes for steps up to 170° about any axes', () => {
  fc.assert(
    fc.property(anyTrack(170 / DEGREES), (track) => {
      expect(rotationSpline(track, { kind: 'c2' }).convergence.converged).toBe(true);
    }),
    { seed: 17 },
  );
});
