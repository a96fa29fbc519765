import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { surveyTrack } from '@slewcurve/survey';
import { cubicTrack, differences } from '../../../support/cubic-track.js';

const lurch = (track: RotationTrack) => surveyTrack(track).find(({ rule }) => rule === 'pace.lurch');

// RULES 29: a steady turn of 40 deg/s keyed at 0, 1, 1.1 and 2.1 s.
const TIMES = [0, 1, 1.1, 2.1];
const TURN = TIMES.map((time) => 40 * time);

// Slopes as if all keys stood a tenth of a second apart.
const LURCHING = cubicTrack(TIMES, TURN, [40, 220, 220, 40]);

describe('pace.lurch', () => {
  test('tangents as if keys were even lurch where the short gap is', () => {
    expect(lurch(LURCHING)).toMatchObject({
      level: 'warning',
      unit: 'deg/s',
      limit: 120,
      count: 2,
    });
  });

  test('setting the tangents of both keys anew mends it', () => {
    const steps = lurch(LURCHING)!.occurrences.map(({ remedy }) => remedy!);
    expect(
      lurch(steps.reduce((now, step) => verbNamed(step.verb).apply(now, step).track, LURCHING)),
    ).toBeUndefined();
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
