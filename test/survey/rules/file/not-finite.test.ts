import { describe, expect, test } from 'vitest';
import { storedTrack, type RotationTrack } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { surveyTrack } from '@slewcurve/survey';
import { grid, keyed, turned } from '../../../support/smooth-track.js';

const MOTION = { spin: [0, 20, 0], swing: [8, 0, 4], hertz: 0.4, phase: 1 } as const;
const CLEAN = keyed(MOTION, grid(60), 'LINEAR');

/** The track with some of its numbers set. */
function spoilt(track: RotationTrack, numbers: Readonly<Record<number, number>>): RotationTrack {
  const values = Float64Array.from(track.values);
  for (const [at, value] of Object.entries(numbers)) values[Number(at)] = value;
  return storedTrack({ ...track, values });
}

describe('file.not-finite', () => {
  test('NaN and infinity are errors with key and count; the clean track has none', () => {
    expect(surveyTrack(CLEAN)).toEqual([]);
    const [finding, ...rest] = surveyTrack(spoilt(CLEAN, { 80: Number.NaN, 81: Infinity, 120: -Infinity }));
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({
      rule: 'file.not-finite',
      level: 'error',
      keys: [20],
      value: 2,
      count: 2,
    });
    expect(finding.message).toBe("key 20 holds 2 numbers that are not finite, so the key can't be played");
    expect(JSON.parse(JSON.stringify(finding))).toEqual(finding);
  });

  test('the bridge proposed lays the key anew, and nothing is left to find', () => {
    const track = spoilt(CLEAN, { 80: Number.NaN });
    const { remedy } = surveyTrack(track)[0];
    const mended = verbNamed('bridge').apply(track, remedy!).track;
    expect(surveyTrack(mended)).toEqual([]);
  });

  test('a lost time is found, with a time of its neighbours and no remedy', () => {
    const times = CLEAN.times.map((time, key) => (key === 7 ? Number.NaN : time));
    const [finding] = surveyTrack(storedTrack({ ...CLEAN, times }));
    expect(finding).toMatchObject({ rule: 'file.not-finite', keys: [7], time: 6 / 30 });
    expect(finding.remedy).toBeUndefined();
  });

  test('other rules go on over the sound keys, under the stored key numbers, and wait with their remedies', () => {
    const track = spoilt(turned(CLEAN, [40], [0, 0, 20]), { 20: Number.NaN });
    const findings = surveyTrack(track);
    expect(findings.map(({ rule, keys }) => [rule, keys])).toEqual([
      ['file.not-finite', [5]],
      ['jump.lone-key', [40]],
    ]);
    expect(findings[1].remedy).toBeUndefined();
    expect(findings[1].message).toContain('key 40');
  });

  test('a track of nothing but NaN, and one without keys, are surveyed without an error', () => {
    const nothing = storedTrack({ ...CLEAN, values: CLEAN.values.map(() => Number.NaN) });
    expect(surveyTrack(nothing)).toMatchObject([{ rule: 'file.not-finite', count: 60 }]);
    expect(surveyTrack(storedTrack({ times: [], values: [] }))).toEqual([]);
    expect(surveyTrack(storedTrack({ times: [1], values: [0, 0, 0, 1] }))).toEqual([]);
  });

  test('tangents count as numbers of their key', () => {
    const cubic = keyed(MOTION, grid(20), 'CUBICSPLINE');
    const [finding] = surveyTrack(spoilt(cubic, { [12 * 9]: Number.NaN }));
    expect(finding).toMatchObject({ rule: 'file.not-finite', keys: [9], value: 1 });
  });
});
