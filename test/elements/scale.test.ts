import {
  linearScale,
  logScale,
  niceStep,
  speedScale,
  speedTicks,
  tickPlaces,
  timeTicks,
} from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';

const positive = fc.double({ min: 1e-4, max: 1e7, noNaN: true });

describe('the scale of speeds', () => {
  test('has its top at or above the peak and at most twice it', () => {
    fc.assert(
      fc.property(positive, (peak) => {
        const { high } = linearScale(peak);
        // 1e-9: the top is trimmed to 12 digits.
        expect(high).toBeGreaterThanOrEqual(peak * (1 - 1e-9));
        expect(high).toBeLessThanOrEqual(peak * 2);
      }),
    );
  });

  test('is undone by its own inverse within its range', () => {
    fc.assert(
      fc.property(positive, fc.double({ min: 0.01, max: 1, noNaN: true }), (peak, share) => {
        for (const scale of [linearScale(peak), logScale(peak)])
          // 1e-12: a multiplication and a logarithm of doubles.
          expect(scale.share(scale.speed(share))).toBeCloseTo(share, 12);
      }),
    );
  });

  test('holds what lies outside at its ends', () => {
    expect(linearScale(10).share(1e9)).toBe(1);
    expect(logScale(10).share(0)).toBe(0);
    expect(linearScale(Number.NaN).share(Number.NaN)).toBe(0);
  });

  test('by powers of ten runs from 0.1 to 10,000 deg/s, and further where it must', () => {
    expect(logScale(50)).toMatchObject({ low: 0.1, high: 10_000 });
    expect(logScale(1_080_000).high).toBe(10_000_000);
    expect(speedTicks(logScale(50))).toEqual([1, 10, 100, 1000, 10_000]);
  });

  test('to the usual speed leaves a pop of twenty times the habit off the paper', () => {
    expect(speedScale('usual', 30, 600).high).toBe(80);
    expect(speedScale('linear', 30, 600).high).toBe(600);
    // Where nothing stands out, both are the same.
    expect(speedScale('usual', 30, 36).high).toBe(speedScale('linear', 30, 36).high);
  });

  test('rules round speeds', () => {
    expect(speedTicks(linearScale(290), 3)).toEqual([100, 200, 300]);
    expect(speedTicks(linearScale(0.8), 4)).toEqual([0.2, 0.4, 0.6, 0.8]);
  });
});

describe('the ticks of time', () => {
  test('stand on round seconds without the dust of 0.1 + 0.2', () => {
    expect(timeTicks(0, 1, 10)).toEqual([0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1]);
    expect(timeTicks(20.3, 21.1, 8)).toEqual([20.3, 20.4, 20.5, 20.6, 20.7, 20.8, 20.9, 21, 21.1]);
  });

  test('lie in the row, ascend, and are at most 2.5 times as many as asked', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e4, max: 1e4, noNaN: true }),
        fc.double({ min: 0.01, max: 1e3, noNaN: true }),
        (from, length) => {
          const ticks = timeTicks(from, from + length, 8);
          expect(ticks.every((t, i) => i === 0 || t > ticks[i - 1])).toBe(true);
          // 1e-6 of a step: where ticks are allowed to lie on a row's border.
          expect(ticks.every((t) => t >= from - length * 1e-6 && t <= from + length * (1 + 1e-6))).toBe(true);
          expect(ticks.length).toBeLessThanOrEqual(20);
        },
      ),
    );
  });

  test('are written with as many places as tell them apart', () => {
    expect([1, 0.5, 0.1, 0.05, 0.002].map(tickPlaces)).toEqual([0, 1, 1, 2, 3]);
  });

  test('step by 1, 2 or 5', () => {
    expect([0.9, 1, 1.1, 3, 6].map(niceStep)).toEqual([1, 1, 2, 5, 10]);
  });
});
