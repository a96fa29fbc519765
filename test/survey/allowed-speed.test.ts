import { rotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, allowedSpeed, type HouseRules } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';

const FILE = { name: 'rig.glb', nodes: [] };
const house: HouseRules = {
  ...NO_HOUSE_RULES,
  roles: { head: 'machine' },
  limits: { machine: { 'limit.speed': 30 } },
  exceptions: [{ where: { clip: 'slow' }, limits: { machine: { 'limit.speed': 20 } } }],
};
const trackOf = (id: string, clip: string): ReturnType<typeof rotationTrack> =>
  rotationTrack({ id, clip, times: [0, 1], values: [0, 0, 0, 1, 0, 0, 0, 1] });

describe('the speed that house rules allow', () => {
  test('is that of the role, and of an exception where one fits', () => {
    expect(allowedSpeed(house, trackOf('head', 'fast'), FILE)).toBe(30);
    expect(allowedSpeed(house, trackOf('head', 'slow'), FILE)).toBe(20);
  });

  test('is none where nothing is decreed', () => {
    expect(allowedSpeed(house, trackOf('knee', 'slow'), FILE)).toBeUndefined();
    expect(allowedSpeed(NO_HOUSE_RULES, trackOf('head', 'slow'), FILE)).toBeUndefined();
  });
});
