import {
  EASES,
  cubicBezierEase,
  cumulativeHermite,
  pace,
  playAs,
  rotationSpline,
  rotationTrack,
  type Curve,
  type Ease,
} from '@slewcurve/core';
import { describe, expect, test } from 'vitest';
import { againstSamples } from '../support/against-samples.js';
import { referenceValues, type ReferenceSample } from '../support/reference-values.js';

// Source: 50-digit arithmetic with mpmath 1.2.1, rates by numerical differentiation, independent of the closed forms here. The
// tolerances came with the values: angle 1e-12 rad, rate 1e-11 and acceleration 1e-10 of the vector's size.

/** Worst difference over all cases, in tolerances: below 1 is within all three. */
function worstInTolerances(cases: readonly (readonly [Curve, readonly ReferenceSample[]])[]): number {
  if (cases.length === 0) return Infinity;
  return Math.max(
    ...cases.map(([curve, samples]) => {
      const { angle, rate, acceleration } = againstSamples(curve, samples);
      return Math.max(angle / 1e-12, rate / 1e-11, acceleration / 1e-10);
    }),
  );
}

test('chords made unit (nlerp) meet the 50-digit values in orientation, rate and acceleration', () => {
  const cases = referenceValues('fifty-digit.json', 'nlerp').map(({ q0, q1, h, samples }) => {
    const track = rotationTrack({ times: [0, h], values: [...q0, ...q1] });
    return [playAs(track, 'chord'), samples] as const;
  });
  expect(worstInTolerances(cases)).toBeLessThan(1);
});

describe.each([
  ['uniform-shoemake', 'uniform'],
  ['secant', 'secant'],
  ['bessel', 'three-point'],
] as const)('squad by the %s rule', (rule, rates) => {
  test('meets the 50-digit values in orientation, rate and acceleration', () => {
    const cases = referenceValues('fifty-digit.json', 'squad')
      .filter((each) => each.rule === rule)
      .map(({ times, quats, samples }) => {
        const track = rotationTrack({ times, values: quats.flat() });
        return [rotationSpline(track, { kind: 'squad', rates }), samples] as const;
      });
    expect(worstInTolerances(cases)).toBeLessThan(1);
  });
});

test("stored cubics meet the 50-digit values of glTF 2.0's CUBICSPLINE (B16: tangents in, value, tangent out)", () => {
  const cases = referenceValues('fifty-digit.json', 'gltf_cubicspline').map(
    ({ v0, out_tangent0, v1, in_tangent1, td, samples }) => {
      const none = [0, 0, 0, 0];
      const values = [none, v0, out_tangent0, in_tangent1, v1, none].flat();
      const track = rotationTrack({ times: [0, td], values, interpolation: 'CUBICSPLINE' });
      return [playAs(track, 'stored-cubic'), samples] as const;
    },
  );
  expect(worstInTolerances(cases)).toBeLessThan(1);
});

test('cumulative Hermite curves meet the 50-digit values in orientation, rate and acceleration', () => {
  const cases = referenceValues('fifty-digit.json', 'cumulative_hermite').map(
    ({ q0, q1, rate0_body, rate1_body, h, samples }) =>
      [cumulativeHermite(q0, q1, rate0_body, rate1_body, h), samples] as const,
  );
  expect(worstInTolerances(cases)).toBeLessThan(1);
});

test('the angle turned along a curve meets the 50-digit arc lengths to 1e-11 of it, near-stops included', () => {
  const cases = referenceValues('fifty-digit.json', 'arc_length');
  expect(cases.length).toBeGreaterThan(0);
  for (const { q0, q1, rate0_body, rate1_body, total_turned_angle_rad } of cases) {
    const curve = cumulativeHermite(q0, q1, rate0_body, rate1_body, 1);
    // A speed that nearly touches zero is the hard case: adaptive halving stops at 1e-13 of the sum a cell.
    expect(Math.abs(curve.length(0, 1) / total_turned_angle_rad - 1)).toBeLessThan(1e-11);
  }
});

/** The reference's names of easing laws; the two Bezier ones are CSS's `ease` and `ease-in-out`. */
const EASE_OF: Readonly<Record<string, Ease>> = {
  smoothstep: EASES.cubic,
  quintic: EASES['minimum-jerk'],
  'half-cosine': EASES['half-cosine'],
  'cubic-bezier(.25,.1,.25,1)': cubicBezierEase(0.25, 0.1, 0.25, 1),
  'cubic-bezier(.42,0,.58,1)': cubicBezierEase(0.42, 0, 0.58, 1),
};

test('slerps under an easing law meet the 50-digit values in orientation, rate and acceleration', () => {
  const cases = referenceValues('fifty-digit.json', 'eased_slerp').map(({ ease, q0, q1, h, samples }) => {
    const turn = playAs(rotationTrack({ times: [0, h], values: [...q0, ...q1] }), 'short-way');
    return [pace(turn, { kind: 'ease', ease: EASE_OF[ease] }), samples] as const;
  });
  expect(worstInTolerances(cases)).toBeLessThan(1);
});
