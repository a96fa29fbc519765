import { describe, expect, test } from 'vitest';
import type { PlaybackId, RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack, type HouseRules } from '@slewcurve/survey';
import { cubicTrack, differences } from '../../../support/cubic-track.js';
import { turningTrack } from '../../../support/turning-track.js';

const overrun = (
  track: RotationTrack,
  houseRules: HouseRules = NO_HOUSE_RULES,
  playbacks: readonly PlaybackId[] = ['as-written'],
) => surveyTrack(track, { houseRules, playbacks }).find(({ rule }) => rule === 'pace.overrun');

const TIMES = [0, 1, 2, 3];
const HOLD = [0, 60, 60, 0];

describe('pace.overrun', () => {
  test('a hold at 60° between keys of finite differences swings out by 7.5°', () => {
    const finding = overrun(cubicTrack(TIMES, HOLD, differences(TIMES, HOLD)))!;
    expect(finding).toMatchObject({ level: 'warning', unit: 'deg', keys: [2], limit: 0.5 });
    expect(finding.time).toBeCloseTo(1.5, 3);
    // Hermite's blend of the two tangents at the middle: (30 + 30)/8. The chord of quaternions turns 1 % less far than the angles.
    expect(Math.abs(finding.value - 7.5)).toBeLessThan(0.1);
    expect(finding.message).toMatch(/keys 1 and 2 are the same, and between them it swings out by 7\.\d°/);
  });

  test('flat tangents at the hold keep it, and finite differences by the player do not', () => {
    expect(overrun(cubicTrack(TIMES, HOLD, [60, 0, 0, -60]))).toBeUndefined();
    const linear = turningTrack((key) => HOLD[key], 4, 1);
    expect(overrun(linear)).toBeUndefined();
    expect(overrun(linear, NO_HOUSE_RULES, ['finite-cubic'])?.playback).toBe('finite-cubic');
  });

  test('past the highest key of a swing it is a note: a wanted swing looks the same', () => {
    const angles = [0, 30, 28, 0];
    const finding = overrun(cubicTrack(TIMES, angles, differences(TIMES, angles)))!;
    expect(finding).toMatchObject({ level: 'note', keys: [2] });
    expect(overrun(cubicTrack(TIMES, [0, 10, 20, 30], [10, 10, 10, 10]))).toBeUndefined();
  });

  test('a marked swing is clean', () => {
    const angles = [0, 30, 28, 0];
    const track = cubicTrack(TIMES, angles, differences(TIMES, angles));
    const [{ time }] = overrun(track)!.occurrences;
    const marks = [{ clip: '*', time, name: 'accent' }];
    expect(
      overrun(track, { ...NO_HOUSE_RULES, declared: { ...NO_HOUSE_RULES.declared, marks } }),
    ).toBeUndefined();
  });
});
