import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

function jumps(track: RotationTrack) {
  return surveyTrack(track).filter((finding) => finding.rule.startsWith('jump.'));
}

const sway = (key: number): number => 8 * Math.sin(key / 10);

describe('jump.first-key', () => {
  test('a reference pose on the first frame is one finding of its own', () => {
    const [finding, ...rest] = jumps(turningTrack((key) => (key === 0 ? 70 : sway(key)), 90));
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({
      rule: 'jump.first-key',
      level: 'warning',
      keys: [0],
      time: 0,
      limit: 20,
    });
    expect(finding.value).toBeCloseTo(70 - sway(1), 3);
  });

  test('the first key of a motion, a fast start and a few hand-set keys are none', () => {
    expect(jumps(turningTrack(sway, 90))).toEqual([]);
    const start = turningTrack((key) => (key < 2 ? 21 * key : 38 + 0.3 * (key - 2)), 60);
    expect(jumps(start).filter(({ rule }) => rule === 'jump.first-key')).toEqual([]);
    expect(jumps(turningTrack((key) => (key === 0 ? 70 : key), 5, 2))).toEqual([]);
  });
});
