import { dimensionlessJerk, logDimensionlessJerk, spectralArcLength } from '@slewcurve/core';
import { describe, expect, test } from 'vitest';

/** `shape(u)` over `duration` seconds at 100 samples a second. */
function profile(duration: number, shape: (u: number) => number, rate = 100): number[] {
  const steps = Math.round(duration * rate);
  return Array.from({ length: steps + 1 }, (_, n) => shape(n / steps));
}
const minimumJerk = (u: number): number => 30 * u * u * (1 - u) ** 2;

describe('the published example v = exp(−5t²), t = −1 … 0.99 s by 0.01 s', () => {
  // Source: S. Balasubramanian et al., J. NeuroEng. Rehabil. 12:112, 2015, the authors' own printed figures.
  const example = Array.from({ length: 200 }, (_, n) => Math.exp(-5 * (-1 + n * 0.01) ** 2));

  test('has the spectral arc length −1.41403', () => {
    expect(spectralArcLength(example, 100).toFixed(5)).toBe('-1.41403');
  });
  test('has the dimensionless jerk −335.74684', () => {
    expect(dimensionlessJerk(example, 100).toFixed(5)).toBe('-335.74684');
  });
  test('has the log dimensionless jerk −5.81636', () => {
    expect(logDimensionlessJerk(example, 100).toFixed(5)).toBe('-5.81636');
  });
});

test('closed forms: a minimum-jerk speed has −5.3220, a cycloid −5.272, within the 0.5 % of 2,000 samples', () => {
  // 720/1.875² = 204.8 and 2π⁴ = 194.82, derived; the authors' T is one sample longer than the motion: 3/2000 of T³.
  expect(logDimensionlessJerk(profile(20, minimumJerk), 100)).toBeCloseTo(-Math.log(204.8), 2);
  expect(
    logDimensionlessJerk(
      profile(20, (u) => 1 - Math.cos(2 * Math.PI * u)),
      100,
    ),
  ).toBeCloseTo(-Math.log(2 * Math.PI ** 4), 2);
});

test('neither size nor duration matters, and two bumps are less smooth than one', () => {
  const one = profile(1, minimumJerk);
  const large = one.map((speed) => 30 * speed);
  expect(dimensionlessJerk(large, 100)).toBeCloseTo(dimensionlessJerk(one, 100), 8);
  expect(spectralArcLength(large, 100)).toBeCloseTo(spectralArcLength(one, 100), 12);
  // The same samples at half the rate: the same motion twice as slow.
  expect(dimensionlessJerk(one, 50)).toBeCloseTo(dimensionlessJerk(one, 100), 8);
  // −1.406 at 0.5 s to 2 s by our own earlier computation.
  for (const duration of [0.5, 1, 2])
    expect(spectralArcLength(profile(duration, minimumJerk), 100)).toBeCloseTo(-1.406, 2);
  const two = profile(2, (u) => minimumJerk((2 * u) % 1));
  expect(spectralArcLength(two, 100)).toBeLessThan(-2);
  expect(logDimensionlessJerk(two, 100)).toBeLessThan(logDimensionlessJerk(one, 100) - 2);
});

test('options move the cut: a lower highest frequency or a higher threshold shortens the length', () => {
  const speeds = profile(2, (u) => minimumJerk((2 * u) % 1));
  expect(spectralArcLength(speeds, 100, { highest: 0.5 })).toBeGreaterThan(spectralArcLength(speeds, 100));
  expect(spectralArcLength(speeds, 100, { threshold: 0.9 })).toBeGreaterThan(spectralArcLength(speeds, 100));
  // More padding samples the same spectrum finer: the cut moves by a fraction of a bin, and corners are followed better.
  const finer = spectralArcLength(speeds, 100, { padding: 6 });
  expect(finer).toBeLessThan(spectralArcLength(speeds, 100));
  expect(finer).toBeGreaterThan(spectralArcLength(speeds, 100) - 0.1);
});

test('what does not move gives 0, and nothing gives 0', () => {
  for (const speeds of [[], [0], [0, 0, 0, 0]]) {
    expect(spectralArcLength(speeds, 100)).toBe(0);
    expect(dimensionlessJerk(speeds, 100) + 0).toBe(0);
  }
});
