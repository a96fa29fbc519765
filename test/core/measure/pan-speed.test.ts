import { panPixelsPerFrame, panWidthsPerSecond, sweepRate } from '@slewcurve/core';
import { expect, test } from 'vitest';

const DEGREES = 180 / Math.PI;
/** Horizontal view angle of a frame 36 mm wide. */
const view = (focal: number): number => 2 * Math.atan(36 / (2 * focal));

// Source: one picture width in 7 s at 24 frames a second, a camera maker's rule of thumb (red.com/red-101/camera-panning-speed);
// the degrees follow from W/(7f) at the centre of a rectilinear frame.
test.each([
  [18, 16.4],
  [24, 12.3],
  [35, 8.42],
  [50, 5.89],
  [85, 3.47],
  [100, 2.95],
  [135, 2.18],
  [200, 1.47],
])('at %i mm, %d degrees a second are one picture width in 7 s, to the digits printed', (focal, degrees) => {
  const rate = degrees / DEGREES;
  const digits = degrees >= 10 ? 1 : 2;
  const exact = (DEGREES * (2 * Math.tan(view(focal) / 2))) / 7;
  expect(Math.round(exact * 10 ** digits) / 10 ** digits).toBe(degrees);
  expect(panWidthsPerSecond(rate, view(focal)) * 7).toBeCloseTo(degrees / exact, 12);
});

test('one width in 7 s at 24 frames a second is 11.4 pixels a frame of 1,920 and 24.4 of 4,096', () => {
  const rate = (2 * Math.tan(0.4)) / 7;
  expect(panPixelsPerFrame(rate, 0.8, 1920, 24).toFixed(1)).toBe('11.4');
  expect(panPixelsPerFrame(rate, 0.8, 4096, 24).toFixed(1)).toBe('24.4');
});

test('roll about the view does not sweep the picture; pan and tilt do together', () => {
  expect(sweepRate([0, 0, 5])).toBe(0);
  expect(sweepRate([3, -4, 12])).toBe(5);
});
