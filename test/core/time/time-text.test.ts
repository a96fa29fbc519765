import { FRAME_RATES, SlewcurveError, TIME_FORMS, exactRate, readTime, sayTime } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 6 });

const SHORT = exactRate(29.97);

function codeOf(call: () => unknown): string | undefined {
  try {
    call();
  } catch (error) {
    if (error instanceof SlewcurveError) return error.code;
    throw error;
  }
  return undefined;
}

describe('times as text', () => {
  test('are seconds, frames or timecode; without a grid always seconds', () => {
    expect(TIME_FORMS.map((form) => sayTime(1.5, form, 30))).toEqual(['1.500 s', 'frame 45', '00:00:01:15']);
    expect(TIME_FORMS.map((form) => sayTime(1.5, form))).toEqual(['1.500 s', '1.500 s', '1.500 s']);
    expect(sayTime(1.508, 'frames', 30)).toBe('frame 45.24');
    expect(sayTime(1.508, 'timecode', 30)).toBe('00:00:01:15.24');
    expect(sayTime(-1.5, 'timecode', 30)).toBe('-00:00:01:15');
    expect(sayTime(3723.5, 'timecode', 24)).toBe('01:02:03:12');
    expect(sayTime(Number.NaN, 'frames', 24)).toBe('NaN s');
  });

  // SMPTE ST 12-1, from memory: of every minute but each tenth the labels ;00 and ;01 are left out.
  test.each([
    [0, '00:00:00;00'],
    [1799, '00:00:59;29'],
    [1800, '00:01:00;02'],
    [3597, '00:01:59;29'],
    [3598, '00:02:00;02'],
    [17981, '00:09:59;29'],
    [17982, '00:10:00;00'],
    [17982 + 1800, '00:11:00;02'],
    [107892, '01:00:00;00'],
    [24 * 107892, '24:00:00;00'],
  ])('at 29.97 frame %i is %s, and back', (frame, label) => {
    expect(sayTime(frame / SHORT, 'timecode', 29.97)).toBe(label);
    expect(readTime(label, 29.97) * SHORT).toBeCloseTo(frame, 6);
  });

  test('at 59.94 four labels are left out: frame 3600 is 00:01:00;04, 35964 is 00:10:00;00', () => {
    const rate = exactRate(59.94);
    expect(sayTime(3600 / rate, 'timecode', 59.94)).toBe('00:01:00;04');
    expect(sayTime(35964 / rate, 'timecode', 59.94)).toBe('00:10:00;00');
  });

  test('drop-frame labels keep to the clock: after an hour within a frame, over a day within 0.1 s; 23.976 falls behind by 3.6 s an hour', () => {
    expect(readTime('01:00:00;00', 29.97)).toBeCloseTo(3600, 1);
    expect(Math.abs(readTime('24:00:00;00', 29.97) - 86400)).toBeLessThan(0.1);
    expect(readTime('01:00:00:00', 23.976)).toBeCloseTo(3603.6, 6);
    expect(readTime('01:00:00:00', 29.97)).toBeCloseTo(3603.6, 6);
  });

  test('what is said is read back, to half of the last digit', () => {
    const times = fc.double({ min: -1e5, max: 1e5, noNaN: true });
    fc.assert(
      fc.property(
        times,
        fc.constantFrom(...FRAME_RATES),
        fc.constantFrom(...TIME_FORMS),
        (time, fps, form) => {
          const off = Math.abs(readTime(sayTime(time, form, fps), fps) - time);
          // Half of 0.001 s, or of 0.01 of a frame, and the rounding of a sum of 1e5 s.
          expect(off).toBeLessThanOrEqual(form === 'seconds' ? 5.01e-4 : 0.00501 / fps + 1e-9);
        },
      ),
      { numRuns: 500 },
    );
  });

  test('every frame of ten minutes at every rate has one label, later ones later, and none that is dropped', () => {
    for (const fps of [23.976, 25, 29.97]) {
      const rate = exactRate(fps);
      const labels = Array.from({ length: 600 * Math.round(fps) }, (_, frame) =>
        sayTime(frame / rate, 'timecode', fps),
      );
      expect(labels.filter((label, frame) => frame > 0 && !(label > (labels[frame - 1] ?? '')))).toEqual([]);
      expect(labels.filter((label) => /:\d[1-9]:00;0[01]$/.test(label))).toEqual([]);
    }
  });

  test.each([
    ['1.5', 1.5],
    [' 1.5 s ', 1.5],
    ['1e-3 seconds', 0.001],
    ['.5s', 0.5],
    ['frame 45', 1.5],
    ['45 f', 1.5],
    ['45 frames', 1.5],
    ['0:0:1:15', 1.5],
    ['00:00:01:15.5', 1.5 + 0.5 / 30],
    ['-00:00:01:15', -1.5],
  ])('%j at 30 a second is %f s', (text, seconds) => {
    expect(readTime(text, 30)).toBeCloseTo(seconds, 12);
  });

  test.each([
    ['soon', 30, 'time.unreadable'],
    ['', 30, 'time.unreadable'],
    ['1:2', 30, 'time.unreadable'],
    ['00:61:00:00', 30, 'time.unreadable'],
    ['frame 3', undefined, 'time.needs-grid'],
    ['00:00:00:01', 0, 'time.needs-grid'],
    ['00:00:00:30', 30, 'time.no-such-frame'],
    ['00:00:00;03', 30, 'time.no-such-frame'],
    ['00:01:00;01', 29.97, 'time.no-such-frame'],
    ['00:01:00;03', 59.94, 'time.no-such-frame'],
  ])('%j at %s a second is refused: %s', (text, fps, code) => {
    expect(codeOf(() => readTime(text, fps))).toBe(code);
  });
});
