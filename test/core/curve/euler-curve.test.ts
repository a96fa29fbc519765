import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  EULER_SEQUENCES,
  fromEuler,
  logMap,
  measure,
  playAs,
  relative,
  rotateVector,
  rotationTrack,
  type Curve,
  type EulerSequence,
} from '@slewcurve/core';

const RADIANS = Math.PI / 180;
const angles = (values: readonly number[], sequence: EulerSequence, times = [0, 0.7, 1.9]): Curve =>
  playAs(rotationTrack({ times, values, interpolation: 'EULER', sequence }), 'as-written');
const size = (vector: readonly number[]): number => Math.hypot(...vector);
const apart = (a: readonly number[], b: readonly number[]): number => size(a.map((part, i) => part - b[i]));

const motion = fc.record({
  sequence: fc.constantFrom(...EULER_SEQUENCES),
  values: fc.array(fc.double({ min: -4, max: 4, noNaN: true }), { minLength: 9, maxLength: 9 }),
});

describe('angles joined as numbers', () => {
  test('pass through the angles between', () => {
    fc.assert(
      fc.property(motion, fc.double({ min: 0, max: 1, noNaN: true }), ({ sequence, values }, u) => {
        const between = [0, 1, 2].map((part) => values[part] + u * (values[3 + part] - values[part]));
        const q = angles(values, sequence).orientation([0, 0, 0, 1], 0.7 * u);
        // Rounding of u and of the angles.
        expect(apart(q, fromEuler([0, 0, 0, 1], between, sequence))).toBeLessThan(1e-14);
      }),
    );
  });

  test('have the rate and acceleration of their own orientations, in both frames', () => {
    fc.assert(
      fc.property(motion, fc.double({ min: 0.001, max: 0.69, noNaN: true }), ({ sequence, values }, t) => {
        const curve = angles(values, sequence);
        const h = 1e-5;
        const at = (time: number): number[] => curve.orientation([0, 0, 0, 1], time);
        const rate = curve.rate([0, 0, 0], t, 'own');
        const chord = logMap([0, 0, 0], relative([0, 0, 0, 1], at(t - h), at(t + h))).map(
          (part) => part / (2 * h),
        );
        const bend = curve
          .rate([0, 0, 0], t + h, 'own')
          .map((part, i) => (part - curve.rate([0, 0, 0], t - h, 'own')[i]) / (2 * h));
        // Central differences: h²·(rate of 30 rad/s)³ over 6, and rounding over h.
        expect(apart(rate, chord)).toBeLessThan(2e-6);
        expect(apart(curve.acceleration([0, 0, 0], t, 'own'), bend)).toBeLessThan(1e-4);
        expect(apart(curve.rate([0, 0, 0], t, 'parent'), rotateVector([0, 0, 0], at(t), rate))).toBeLessThan(
          1e-13,
        );
      }),
    );
  });

  test('have no speed beyond their peak, and a length that is the sum of its parts', () => {
    fc.assert(
      fc.property(motion, ({ sequence, values }) => {
        const curve = angles(values, sequence);
        const peak = curve.peak(0, 1.9);
        let sum = 0;
        for (let i = 0; i < 400; i++) {
          const t = (1.9 * (i + 0.5)) / 400;
          const speed = size(curve.rate([0, 0, 0], t, 'own'));
          // 1e-150: the peak compares squares, and those of speeds below 1e-162 rad/s are no float64.
          expect(speed).toBeLessThanOrEqual(peak.rate * (1 + 1e-12) + 1e-150);
          sum += curve.length((1.9 * i) / 400, (1.9 * (i + 1)) / 400);
        }
        // At a key the rate is the later segment's, and the peak may be the earlier one's.
        const beside = [-1e-9, 0].map((d) => size(curve.rate([0, 0, 0], peak.time + d, 'own')));
        expect(Math.max(...beside)).toBeGreaterThan(peak.rate * (1 - 1e-6) - 1e-12);
        expect(Math.abs(sum - curve.length(0, 1.9))).toBeLessThan(1e-11);
      }),
    );
  });

  test('have the speeds of MATHS: (0,0,0) to (80,85,80) degrees XYZ goes 166.6 degrees at 141 to 181 a second', () => {
    // Worked out for this project in 50 digits (the speeds and the path); no outside source.
    const curve = angles(
      [0, 0, 0, 80, 85, 80].map((x) => x * RADIANS),
      'XYZ',
      [0, 1],
    );
    const { travelled, peakRate } = measure(curve);
    expect(travelled / RADIANS).toBeCloseTo(166.6, 1);
    expect(peakRate / RADIANS).toBeCloseTo(181, 0);
    expect(size(curve.rate([0, 0, 0], 0, 'own')) / RADIANS).toBeCloseTo(141.5, 0);
  });

  test('stand still where the outer turns undo each other', () => {
    // At a pole, first and third angle turn about one axis: equal and opposite turns cancel to rounding.
    const curve = angles(
      [0, -90, 0, 50, -90, 50].map((x) => x * RADIANS),
      'XYZ',
      [0, 1],
    );
    expect(curve.length(0, 1)).toBeLessThan(1e-14);
    expect(curve.peak(0, 1).rate).toBeLessThan(1e-15);
  });
});
