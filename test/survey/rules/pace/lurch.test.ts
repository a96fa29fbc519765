import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { surveyTrack } from '@slewcurve/survey';
import { cubicTrack, differences } from '../../../support/cubic-track.js';

const lurch = (track: RotationTrack) => surveyTrack(track).find(({ rule }) => rule === 'pace.lurch');

// RULES 29: a steady turn of 40 deg/s keyed at 0, 1, 1.1 and 2.1 s.
const TIMES = [0, 1, 1.1, 2.1];
const TURN = TIMES.map((time) => 40 * time);

describe('pace.lurch', () => {
  test('tangents as if keys were even lurch where the short gap is', () => {
    // Per step of one, written as if a step were the mean gap of 0.7 s.
    const finding = lurch(cubicTrack(TIMES, TURN, [40, 22 / 0.35, 22 / 0.35, 40]))!;
    expect(finding).toBeUndefined();
    const perStep = differences(TIMES, TURN, 0.1);
    expect(lurch(cubicTrack(TIMES, TURN, perStep))).toMatchObject({
      level: 'warning',
      unit: 'deg/s',
      limit: 120,
      count: 2,
    });
  });

  test('tangents weighted by time are clean, and so are even keys', () => {
    expect(lurch(cubicTrack(TIMES, TURN, differences(TIMES, TURN)))).toBeUndefined();
    const even = [0, 1, 2, 3];
    expect(lurch(cubicTrack(even, TURN, differences(even, TURN, 0.1)))).toBeUndefined();
  });

  test('easing to a stop at the key is meant', () => {
    expect(lurch(cubicTrack(TIMES, TURN, [0, 0, 0, 0]))).toBeUndefined();
  });
});
