import { describe, expect, test } from 'vitest';
import { rotationTrack, type RotationTrack } from '@slewcurve/core';
import { applySteps } from '@slewcurve/mend';
import { surveyTrack } from '@slewcurve/survey';
import { grid, keyed } from '../../../support/smooth-track.js';

const MOTION = { spin: [0, 20, 0], swing: [8, 0, 4], hertz: 0.4, phase: 1 } as const;
const cubic = keyed(MOTION, grid(40, 5), 'CUBICSPLINE');
const isUnused = (i: number): boolean => i < 4 || i >= 12 * 39 + 8;

const isValue = (i: number): boolean => i % 12 >= 4 && i % 12 < 8;

/** The track with its tangents scaled, those that are not used set to zero. */
function scaled(factor: number): RotationTrack {
  return rotationTrack({
    ...cubic,
    values: cubic.values.map((value, i) => (isValue(i) ? value : isUnused(i) ? 0 : factor * value)),
  });
}

const found = (track: RotationTrack, rule: string) => surveyTrack(track).find((one) => one.rule === rule);

describe('tangents of cubic tracks', () => {
  test.each([
    [100, 5],
    [0.1, 0.2],
  ])('tangents %f times as long are named with that factor', (factor, limit) => {
    const finding = found(scaled(factor), 'pace.tangent-scale')!;
    expect(finding).toMatchObject({ level: 'warning', unit: 'times', limit, keys: [] });
    // The chord of a curved way is a little shorter than its tangent: 2 % at these keys.
    expect(Math.abs(finding.value / factor - 1)).toBeLessThan(0.05);
  });

  test('true tangents are clean, twice as long ones too, and so is a LINEAR track', () => {
    expect(found(scaled(1), 'pace.tangent-scale')).toBeUndefined();
    expect(found(scaled(2), 'pace.tangent-scale')).toBeUndefined();
    expect(found(keyed(MOTION, grid(40, 5), 'LINEAR'), 'pace.tangent-scale')).toBeUndefined();
  });

  test('tangents beyond both ends are two notes; with zeros there are none', () => {
    expect(found(cubic, 'pace.end-tangent')).toMatchObject({ level: 'note', count: 2 });
    expect(found(scaled(1), 'pace.end-tangent')).toBeUndefined();
  });

  test('the identity in place of tangents is told', () => {
    const values = cubic.values.map((value, i) => (i % 12 >= 4 && i % 12 < 8 ? value : Number(i % 4 === 3)));
    const finding = found(rotationTrack({ ...cubic, values }), 'pace.end-tangent')!;
    expect(finding.count).toBe(40);
    expect(finding.message).toContain('the identity (0, 0, 0, 1)');
  });

  test('setting tangents is proposed, clears the finding and keeps every value to the bit', () => {
    for (const [track, rule, kept] of [
      [scaled(100), 'pace.tangent-scale', isValue],
      [cubic, 'pace.end-tangent', () => true],
    ] as const) {
      const steps = found(track, rule)!.occurrences.map(({ remedy }) => remedy!);
      const [after] = applySteps([track], steps).tracks;
      expect(found(after, rule)).toBeUndefined();
      // Beyond the ends no tangent is played: zeros there, as the standard has it, and all else as it was.
      const wanted = track.values.map((value, i) => (isUnused(i) && !isValue(i) ? 0 : value));
      expect(after.values.filter((_, i) => kept(i))).toEqual(wanted.filter((_, i) => kept(i)));
    }
  });
});
