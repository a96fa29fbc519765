import {
  axisWander,
  cumulativeHermite,
  fromAxisAngle,
  jerk,
  meanRate,
  measureJerk,
  pathEfficiency,
  playAs,
  ratePercentile,
  rotationSpline,
  rotationTrack,
  speedProfile,
  spinTrack,
  type Curve,
} from '@slewcurve/core';
import { describe, expect, test } from 'vitest';
import { multiplyAll } from '../../support/closed-motions.js';

/** A curve about one axis through `angles` at even seconds. */
function oneAxis(angles: readonly number[], kind: 'squad' | 'c2' = 'squad'): Curve {
  const values = angles.flatMap((angle) => fromAxisAngle<number[]>([], [0, 0, 1], angle));
  return rotationSpline(rotationTrack({ times: angles.map((_, n) => n), values }), { kind });
}

const radian = (axis: number[]): number[] => fromAxisAngle([0, 0, 0, 0], axis, 1);

describe('axis wander', () => {
  test('is 0 for one axis, at any speed, and names it', () => {
    const { axis, concentration, wander } = axisWander(oneAxis([0, 0.4, 1.9, 2]), 'own');
    expect(Math.abs(axis[2])).toBeCloseTo(1, 12);
    expect(concentration).toBeCloseTo(1, 14);
    // Rates across the axis are roundings, 1e-16 of the whole.
    expect(wander).toBeLessThan(1e-14);
  });

  test('of two square axes by turns is 45°, of three equal ones asin √(2/3)', () => {
    const x = radian([1, 0, 0]);
    const xy = multiplyAll(x, radian([0, 1, 0]));
    const xyz = multiplyAll(xy, radian([0, 0, 1]));
    const two = playAs(rotationTrack({ times: [0, 1, 2], values: [0, 0, 0, 1, ...x, ...xy] }), 'short-way');
    const three = playAs(
      rotationTrack({ times: [0, 1, 2, 3], values: [0, 0, 0, 1, ...x, ...xy, ...xyz] }),
      'short-way',
    );
    expect(axisWander(two, 'own').wander).toBeCloseTo(Math.PI / 4, 12);
    expect(axisWander(two, 'own').concentration).toBeCloseTo(1 / 2, 12);
    expect(axisWander(three, 'own').wander).toBeCloseTo(Math.asin(Math.sqrt(2 / 3)), 12);
    // Over the first second alone there is one axis.
    expect(axisWander(two, 'parent', 0, 1).wander).toBeLessThan(1e-14);
  });

  test('of a small wobble reads it: 1 mrad across 1 rad/s is 1 mrad', () => {
    const steady = cumulativeHermite(
      [0, 0, 0, 1],
      fromAxisAngle([], [0.001, 0, 1], 1),
      [0.001, 0, 1],
      [0.001, 0, 1],
      1,
    );
    const found = axisWander(steady, 'own');
    expect(found.wander).toBeLessThan(1e-7);
    expect(Math.abs(found.axis[0] / found.axis[2])).toBeCloseTo(0.001, 6);
  });

  test('of what does not turn is 0', () => {
    expect(axisWander(oneAxis([1, 1]), 'own')).toEqual({ axis: [0, 0, 0], concentration: 1, wander: 0 });
  });
});

test('path efficiency is 1 for a great arc, 1/3 for there and back and there, toward 0 for whole turns', () => {
  expect(
    pathEfficiency(playAs(spinTrack({ axis: [1, 2, 3], angle: 2, duration: 1 }), 'short-way')),
  ).toBeCloseTo(1, 14);
  const there = playAs(
    rotationTrack({
      times: [0, 1, 2, 3],
      values: [0, 1, 0, 1].flatMap((a) => fromAxisAngle<number[]>([], [0, 1, 0], a)),
    }),
    'short-way',
  );
  expect(pathEfficiency(there)).toBeCloseTo(1 / 3, 14);
  expect(pathEfficiency(there, 0, 1)).toBeCloseTo(1, 14);
  expect(
    pathEfficiency(playAs(spinTrack({ axis: [0, 0, 1], angle: 4 * Math.PI, duration: 1 }), 'short-way')),
  ).toBeLessThan(1e-14);
  expect(pathEfficiency(oneAxis([1, 1]))).toBe(1);
});

test('mean rate is angle over time, and percentiles follow the time spent at each speed', () => {
  const curve = playAs(
    rotationTrack({
      times: [0, 3, 4],
      values: [0, 3, 6].flatMap((a) => fromAxisAngle<number[]>([], [0, 1, 0], a / 2)),
    }),
    'short-way',
  );
  expect(meanRate(curve)).toBeCloseTo(3 / 4, 14);
  expect(meanRate(curve, 3, 4)).toBeCloseTo(1.5, 14);
  expect(meanRate(curve, 1, 1)).toBe(0);
  // Three radians of the time at 0.5 rad/s, one at 1.5.
  expect(ratePercentile(curve, 50)).toBeCloseTo(0.5, 14);
  expect(ratePercentile(curve, 74)).toBeCloseTo(0.5, 14);
  expect(ratePercentile(curve, 76)).toBeCloseTo(1.5, 14);
  expect(ratePercentile(curve, 100)).toBeCloseTo(1.5, 14);
});

test('percentiles of a triangle of speed are those of its closed form, to the 1/64 of a segment that is asked', () => {
  // Angle t²/2 over 2 s: speed t, so p per cent of the time lies below 2p/100 rad/s.
  const ramp = cumulativeHermite([0, 0, 0, 1], fromAxisAngle([], [0, 0, 1], 2), [0, 0, 0], [0, 0, 2], 2);
  for (const percent of [10, 50, 95])
    expect(Math.abs(ratePercentile(ramp, percent) - percent / 50)).toBeLessThan(2 / 64);
  for (const percent of [10, 50, 95])
    expect(Math.abs(ratePercentile(ramp, percent, 1000) - percent / 50)).toBeLessThan(2 / 1000);
});

describe('jerk', () => {
  test('of a cubic angle is its third derivative, at every time, also beside the knots', () => {
    // Cubic from 0 to 1 rad with zero end rates over 2 s: θ‴ = −12/8.
    const curve = cumulativeHermite([0, 0, 0, 1], fromAxisAngle([], [0, 1, 0], 1), [0, 0, 0], [0, 0, 0], 2);
    for (const t of [0, 0.001, 0.7, 1, 1.999, 2]) {
      const [x, y, z] = jerk([0, 0, 0], curve, t, 'own');
      expect(y).toBeCloseTo(-1.5, 9);
      expect(Math.hypot(x, z)).toBeLessThan(1e-9);
    }
    expect(jerk([9, 9, 9], curve, 2.1, 'own')).toEqual([0, 0, 0]);
    const measured = measureJerk(curve, 'own');
    expect(measured.rmsJerk).toBeCloseTo(1.5, 9);
    expect(measured.peakJerk).toBeCloseTo(1.5, 8);
  });

  test('in parent axes is the own one turned, and ω × ω′ more', () => {
    const curve = cumulativeHermite(
      [0, 0, 0, 1],
      fromAxisAngle([], [1, 2, -1], 1.2),
      [1, 0, 2],
      [-1, 3, 0],
      1.5,
    );
    for (const t of [0.1, 0.75, 1.4]) {
      const own = jerk([0, 0, 0], curve, t, 'own');
      const rate = curve.rate([0, 0, 0], t, 'own');
      const acceleration = curve.acceleration([0, 0, 0], t, 'own');
      const parent = jerk([0, 0, 0], curve, t, 'parent');
      const more = [
        own[0] + rate[1] * acceleration[2] - rate[2] * acceleration[1],
        own[1] + rate[2] * acceleration[0] - rate[0] * acceleration[2],
        own[2] + rate[0] * acceleration[1] - rate[1] * acceleration[0],
      ];
      // Lengths do not depend on axes. Differences of accelerations near 10 rad/s² are good to some 1e-9.
      expect(Math.hypot(...parent)).toBeCloseTo(Math.hypot(...more), 6);
    }
  });

  test("says where it has no bound: squad's acceleration jumps at keys, the c2 spline's does not", () => {
    expect(measureJerk(oneAxis([0, 1, 0, 2]), 'own').accelerationContinuous).toBe(false);
    expect(measureJerk(oneAxis([0, 1, 0, 2], 'c2'), 'own').accelerationContinuous).toBe(true);
  });
});

test('a speed profile asks the exact speed at even times, both ends with it', () => {
  const ramp = cumulativeHermite([0, 0, 0, 1], fromAxisAngle([], [0, 0, 1], 2), [0, 0, 0], [0, 0, 2], 2, 5);
  const speeds = speedProfile(ramp, 10);
  expect(speeds.length).toBe(21);
  speeds.forEach((speed, n) => expect(speed).toBeCloseTo(n / 10, 12));
  expect(speedProfile(ramp, 10, 6, 6.3)).toHaveLength(4);
});
