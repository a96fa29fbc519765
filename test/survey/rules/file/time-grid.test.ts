import { describe, expect, test } from 'vitest';
import { applySteps } from '@slewcurve/mend';
import { rateFloor, segmentAngle, storedTrack } from '@slewcurve/core';
import { surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

function grid(time: (key: number) => number, count: number) {
  const turn = turningTrack((key) => key, count);
  const times = turn.times.map((_, key) => time(key));
  return surveyTrack({ ...turn, times }).find(({ rule }) => rule === 'file.time-grid');
}

const decimals =
  (places: number, rate: number) =>
  (key: number): number =>
    Number((key / rate).toFixed(places));

describe('file.time-grid', () => {
  // Speeds read off by the same shares: 3 decimals at 60 a second −2.0…+4.2 %, 2 decimals −17…+67 %.
  test('times of three decimals at 60 a second are a warning, of two an error', () => {
    expect(grid(decimals(3, 60), 200)).toMatchObject({ level: 'warning', unit: 's', count: 1 });
    expect(grid(decimals(3, 60), 200)!.value).toBeCloseTo(0.000667, 4);
    expect(grid(decimals(2, 60), 200)).toMatchObject({ level: 'error' });
  });

  test.each([
    [0.0333, 5400, 0.18],
    [0.033, 5400, 1.8],
  ])('a frame time of %f s drifts over %i frames by %f s', (frame, count, drift) => {
    const finding = grid((key) => frame * key, count)!;
    expect(finding).toMatchObject({ level: 'warning', keys: [count - 1] });
    expect(Math.abs(finding.value - drift)).toBeLessThan(0.001 * drift);
    expect(finding.message).toContain('a rounded frame of 30 a second');
  });

  test.each([decimals(3, 60), decimals(2, 60), (key: number) => 0.033 * key])(
    're-timing to the grid is proposed and clears the finding, values to the bit',
    (time) => {
      const turn = turningTrack((key) => key, 2000);
      const track = { ...turn, times: turn.times.map((_, key) => time(key)) };
      const { remedy } = surveyTrack(track).find(({ rule }) => rule === 'file.time-grid')!;
      expect(remedy?.verb).toBe('re-time to grid');
      const [after] = applySteps([track], [remedy!]).tracks;
      expect(after.values).toEqual(track.values);
      expect(surveyTrack(after).filter(({ rule }) => rule === 'file.time-grid')).toEqual([]);
    },
  );

  test('exact times, float32 times of ten minutes, and stamps that no rounding explains are clean', () => {
    expect(grid((key) => key / 60, 200)).toBeUndefined();
    // NEEDS A25.
    expect(grid((key) => Math.fround(key / 60), 36_000)).toBeUndefined();
    expect(grid((key) => 0.0083333 * key, 2752)).toBeUndefined();
    expect(grid((key) => key / 50, 2250)).toBeUndefined();
    expect(grid((key) => key / 60 + 0.001 * Math.sin(key), 200)).toBeUndefined();
    expect(grid((key) => 0.0333 * key, 200)).toBeUndefined();
  });

  // NEEDS A25: ten minutes at 60 keys a second, times and values in float32.
  test('a steady spin of ten minutes in float32 ripples within its noise floor, and nothing is found', () => {
    const exact = turningTrack((key) => key / 2, 36_000, 60);
    const track = storedTrack({
      ...exact,
      times: exact.times.map(Math.fround),
      values: exact.values.map(Math.fround),
      storage: { component: 'float32', timeComponent: 'float32' },
    });
    let ripple = 0;
    let outside = 0;
    for (let key = 0; key + 1 < track.times.length; key++) {
      const rate = segmentAngle(track, key) / (track.times[key + 1] - track.times[key]);
      const off = Math.abs(rate - Math.PI / 6);
      ripple = Math.max(ripple, off);
      if (off > rateFloor(track, key)) outside++;
    }
    expect(outside).toBe(0);
    // Float32 times at 600 s lie 6.1e-5 s apart: half of that at both ends of 1/60 s is 0.37 %.
    expect(ripple / (Math.PI / 6)).toBeGreaterThan(0.002);
    expect(surveyTrack(track)).toEqual([]);
  });
});
