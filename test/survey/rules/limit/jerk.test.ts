import { type RotationTrack, measureJerk, playAs } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { type HouseRules, NO_HOUSE_RULES, surveyTrack } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';
import { turningTrack } from '../../../support/turning-track.js';

const limited = (jerk: number): HouseRules => ({
  ...NO_HOUSE_RULES,
  roles: { '*': 'machine' },
  limits: { machine: { 'limit.jerk': jerk } },
});
const over = (track: RotationTrack, houseRules: HouseRules) =>
  surveyTrack(track, { houseRules }).find(({ rule }) => rule === 'limit.jerk');

describe('limit.jerk', () => {
  test('from step to step the acceleration goes from +20 to −20 deg/s² in a second: 40 deg/s³', () => {
    const track = turningTrack((key) => [0, 10, 40, 50][key] ?? 0, 4, 1);
    const finding = over(track, limited(5))!;
    expect(finding).toMatchObject({ level: 'warning', unit: 'deg/s³', limit: 5, keys: [1] });
    expect(finding.value).toBeCloseTo(40, 6);
    // Jerk falls with the third power of the time: 8 times less in twice the time.
    expect(finding.message).toContain('2.00 times as slow it would keep it');
    const slower = verbNamed('stretch').apply(track, finding.remedy!).track;
    expect(slower.times.at(-1)).toBeCloseTo(6, 2);
    expect(over(slower, limited(5))).toBeUndefined();
  });

  test('without a limit, and under it, nothing is said', () => {
    const track = turningTrack((key) => [0, 10, 40, 50][key] ?? 0, 4, 1);
    expect(over(track, NO_HOUSE_RULES)).toBeUndefined();
    expect(over(track, limited(40))).toBeUndefined();
    // One cubic segment has its own jerk, which is continuous inside it.
    const cubic = turningTrack((key) => 30 * key, 2, 1, { interpolation: 'CUBICSPLINE' });
    const { peakJerk } = measureJerk(playAs(cubic, 'as-written'), 'own');
    expect(peakJerk).toBeGreaterThan(0);
  });
});
