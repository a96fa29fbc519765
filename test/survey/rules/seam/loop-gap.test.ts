import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

const LOOP = { houseRules: { ...NO_HOUSE_RULES, loops: ['*'] } };

function gap(track: RotationTrack, settings = LOOP) {
  return surveyTrack(track, settings).find((finding) => finding.rule === 'seam.loop-gap');
}

describe('seam.loop-gap', () => {
  // NEEDS A14: 0…350° as a loop stays 10° open.
  test('0 to 350° declared a loop is open by 10°, and nothing without the declaration', () => {
    const track = turningTrack((key) => 10 * key, 36);
    expect(gap(track)).toMatchObject({ level: 'warning', keys: [35], count: 1, limit: 0.25, unit: 'deg' });
    expect(gap(track)!.value).toBeCloseTo(10, 6);
    expect(gap(track)!.message).toBe('the loop ends 10.0° off its start: key 35 against key 0 (limit 0.25°)');
    expect(surveyTrack(track).filter(({ rule }) => rule.startsWith('seam.'))).toEqual([]);
  });

  test('a spin that comes round is closed', () => {
    expect(gap(turningTrack((key) => 10 * key, 109))).toBeUndefined();
  });

  test('the limit is the role’s, and never below twice the noise floor', () => {
    const track = turningTrack((key) => 20 * Math.sin((key * Math.PI) / 20) + 0.01 * key, 41);
    expect(gap(track)!.value).toBeCloseTo(0.4, 6);
    const joint = { houseRules: { ...LOOP.houseRules, roles: { '*': 'joint' } } } as const;
    expect(gap(track, joint)).toBeUndefined();
    const coarse = { ...track, storage: { component: 'int8', timeComponent: 'float32' } } as const;
    expect(gap(coarse)).toBeUndefined();
  });

  test('STEP tracks are spared', () => {
    expect(gap(turningTrack((key) => 10 * key, 30, 30, { interpolation: 'STEP' }))).toBeUndefined();
  });
});
