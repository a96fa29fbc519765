import {
  cumulativeHermite,
  expMap,
  measure,
  playAs,
  replaceTrack,
  rotationSpline,
  rotationTrack,
} from '@slewcurve/core';
import { describe, expect, test } from 'vitest';

/** About x at the angles given (rad), keys at the times given (s). */
function aboutX(times: readonly number[], angles: readonly number[]): ReturnType<typeof rotationTrack> {
  return rotationTrack({ times, values: angles.flatMap((angle) => expMap<number[]>([], [angle, 0, 0])) });
}

describe('measures of great arcs', () => {
  // Rates 1, 2, −1 rad/s over gaps of 1, 0.5 and 1 s.
  const track = aboutX([0, 1, 1.5, 2.5], [0, 1, 2, 1]);
  const figures = measure(playAs(track, 'as-written'));

  test('name the step acceleration 2|ω₊ − ω₋|/(h₋ + h₊), and where', () => {
    expect(figures.accelerationIs).toBe('step');
    expect(figures.worstRateJump).toBeCloseTo(3, 12);
    expect(figures.worstRateJumpAt).toBe(1.5);
    expect(figures.peakAcceleration).toBeCloseTo(3 / 0.75, 12);
    expect(figures.peakAccelerationAt).toBe(1.5);
    // (1/0.75)² and (3/0.75)² over 0.75 s each, of 2.5 s.
    expect(figures.rmsAcceleration).toBeCloseTo(Math.sqrt((((1 / 0.75) ** 2 + 4 ** 2) * 0.75) / 2.5), 12);
  });

  test('take the median over segments, each once, and the greatest speed of all', () => {
    expect(figures.medianRate).toBeCloseTo(1, 12);
    expect(figures.peakRate).toBeCloseTo(2, 12);
    expect(figures.peakAt).toBe(1);
    expect(figures.travelled).toBeCloseTo(3, 12);
  });

  test('leave a declared cut out: neither its hold nor its jump counts', () => {
    const cut = measure(playAs(replaceTrack(track, { breaks: [1] }), 'as-written'));
    expect(cut.worstRateJump).toBe(0);
    expect(cut.peakAcceleration).toBe(0);
    expect(cut.travelled).toBeCloseTo(2, 12);
  });
});

test('a smooth curve gives its exact acceleration, inside the segment too', () => {
  // About one axis: the cubic from 0 to 1 rad in 1 s at rest at both ends, speed 6u(1 − u), acceleration 6 − 12u.
  const figures = measure(cumulativeHermite([0, 0, 0, 1], expMap([], [1, 0, 0]), [0, 0, 0], [0, 0, 0], 1));
  expect(figures.accelerationIs).toBe('exact');
  expect(figures.worstRateJump).toBe(0);
  expect(figures.peakRate).toBeCloseTo(1.5, 12);
  expect(figures.peakAt).toBeCloseTo(0.5, 6);
  expect(figures.peakAcceleration).toBeCloseTo(6, 9);
  // ∫(6 − 12u)² du = 12
  expect(figures.rmsAcceleration).toBeCloseTo(Math.sqrt(12), 9);
  expect(figures.travelled).toBeCloseTo(1, 12);
});

test('a steady turn has no acceleration, whatever plays it smoothly', () => {
  const track = aboutX([0, 1, 1.5, 3.5], [0, 1, 1.5, 3.5]);
  for (const rates of ['secant', 'three-point'] as const) {
    const figures = measure(rotationSpline(track, { kind: 'squad', rates }));
    expect(figures.peakAcceleration).toBeLessThan(1e-12);
    expect(figures.peakRate).toBeCloseTo(1, 12);
  }
});

test('held keys and tracks of no and one key measure nothing (B21, B22)', () => {
  const nothing = {
    peakRate: 0,
    worstRateJump: 0,
    peakAcceleration: 0,
    rmsAcceleration: 0,
    medianRate: 0,
    travelled: 0,
  };
  expect(measure(playAs(aboutX([0, 1, 2], [0, 1, 3]), 'step'))).toMatchObject(nothing);
  expect(measure(playAs(aboutX([], []), 'as-written'))).toMatchObject(nothing);
  expect(measure(playAs(aboutX([4], [1]), 'as-written'))).toMatchObject({ ...nothing, peakAt: 4 });
});
