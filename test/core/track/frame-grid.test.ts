import { describe, expect, test } from 'vitest';
import { FRAME_RATES, frameGrid } from '@slewcurve/core';

const clock = (rate: number, count: number, start = 0): number[] =>
  Array.from({ length: count }, (_, frame) => start + frame / rate);

describe('frameGrid', () => {
  test.each(FRAME_RATES)('finds %d frames a second, in float64 and float32, from any start', (rate) => {
    expect(frameGrid([clock(rate, 40)])).toBe(rate);
    expect(frameGrid([clock(rate, 40, 1.25)])).toBe(rate);
    expect(frameGrid([Float32Array.from(clock(rate, 40))])).toBe(rate);
    expect(frameGrid([Float32Array.from(clock(rate, 400, 30))])).toBe(rate);
  });

  test('takes 1/120 s written as 0.0083333 for 120, over 23 s', () => {
    expect(frameGrid([Array.from({ length: 2752 }, (_, frame) => frame * 0.0083333)])).toBe(120);
  });

  test('passes over a stray key, one in twenty', () => {
    const times = clock(30, 40);
    times[20] += 0.011;
    expect(frameGrid([times])).toBe(30);
  });

  test('claims nothing where the keys say nothing', () => {
    expect(frameGrid([])).toBeUndefined();
    expect(frameGrid([[0.5]])).toBeUndefined();
    // A second apart: 24, 25 and 30 fit alike.
    expect(frameGrid([[0, 1, 2, 3]])).toBeUndefined();
    expect(frameGrid([[0, Number.NaN, Infinity]])).toBeUndefined();
    expect(frameGrid([clock(285.7, 200)])).toBeUndefined();
  });
});
