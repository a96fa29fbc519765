import {
  angleBetween,
  cumulativeBezier,
  cumulativeBSpline,
  cumulativeHermite,
  logMap,
  nestedBezier,
  relative,
  slerpTurns,
  tensionContinuityBiasRates,
} from '@slewcurve/core';
import { expect, test } from 'vitest';
import { againstSamples, relativeDifference } from '../support/against-samples.js';
import { referenceValues } from '../support/reference-values.js';

// Source: 50-digit arithmetic with mpmath 1.2.1, rates by numerical differentiation, independent of the closed forms here. The
// tolerances came with the values: angle 1e-12 rad, rate 1e-11 and acceleration 1e-10 of the vector's size.

test.each([
  ['cumulative_bezier', cumulativeBezier],
  ['cumulative_bspline', cumulativeBSpline],
  ['slerp_de_casteljau', nestedBezier],
] as const)('%s meets the 50-digit values in orientation, rate and acceleration', (group, curve) => {
  const cases = referenceValues('fifty-digit.json', group);
  expect(cases.length).toBeGreaterThan(0);
  for (const { control, samples } of cases) {
    const worst = againstSamples(curve(control), samples);
    expect(worst.angle).toBeLessThan(1e-12);
    expect(worst.rate).toBeLessThan(1e-11);
    expect(worst.acceleration).toBeLessThan(1e-10);
  }
});

test('slerpTurns winds whole turns as the 50-digit values do, to 1e-12 rad', () => {
  const cases = referenceValues('fifty-digit.json', 'multi_turn');
  expect(cases.length).toBeGreaterThan(0);
  for (const { q0, q1, extra_turns, samples } of cases)
    for (const { u, quat } of samples)
      expect(angleBetween(slerpTurns([], q0, q1, u, extra_turns), quat)).toBeLessThan(1e-12);
});

test('rates by tension, continuity and bias meet the 50-digit values, 1e-11 of their size', () => {
  const cases = referenceValues('fifty-digit.json', 'kochanek_bartels_rates');
  expect(cases.length).toBeGreaterThan(0);
  for (const shape of cases) {
    const before = logMap([0, 0, 0], relative([], shape.prev, shape.key));
    const after = logMap([0, 0, 0], relative([], shape.key, shape.next));
    const [arriving, leaving] = [
      [0, 0, 0],
      [0, 0, 0],
    ];
    tensionContinuityBiasRates(arriving, leaving, before, shape.h_prev, after, shape.h_next, shape);
    expect(relativeDifference(arriving, shape.incoming_rate_body)).toBeLessThan(1e-11);
    expect(relativeDifference(leaving, shape.outgoing_rate_body)).toBeLessThan(1e-11);
  }
});

test('the angle turned along a cumulative Hermite curve meets the 50-digit arc length, to 1e-12 rad', () => {
  const cases = referenceValues('fifty-digit.json', 'arc_length');
  expect(cases.length).toBeGreaterThan(0);
  for (const { q0, q1, rate0_body, rate1_body, total_turned_angle_rad, geodesic_angle_rad } of cases) {
    const curve = cumulativeHermite(q0, q1, rate0_body, rate1_body, 1);
    expect(Math.abs(curve.length(0, 1) - total_turned_angle_rad)).toBeLessThan(1e-12);
    expect(Math.abs(angleBetween(q0, q1) - geodesic_angle_rad)).toBeLessThan(1e-12);
  }
});
