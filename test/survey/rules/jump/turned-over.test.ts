import { describe, expect, test } from 'vitest';
import { type RotationTrack } from '@slewcurve/core';
import { surveyTrack } from '@slewcurve/survey';
import { grid, keyed, turned } from '../../../support/smooth-track.js';

const MOTION = { spin: [0, 20, 0], swing: [8, 0, 4], hertz: 0.4, phase: 1 } as const;
const clean = keyed(MOTION, grid(120), 'LINEAR');
const inside = Array.from({ length: 20 }, (_, i) => 40 + i);

function jumps(track: RotationTrack) {
  return surveyTrack(track).filter((finding) => finding.rule.startsWith('jump.'));
}

describe('jump.turned-over', () => {
  test.each([
    [90, 'own'],
    [120, 'own'],
    [180, 'own'],
    [180, 'parent'],
  ] as const)('a stretch turned by %f° about an axis of its %s frame is one finding', (angle, side) => {
    const [finding, ...rest] = jumps(turned(clean, inside, [0, 0, angle], side));
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({
      rule: 'jump.turned-over',
      level: 'warning',
      keys: [40, 60],
      limit: angle,
    });
    // The motion around is taken off by the mean of both neighbours: half a degree is its change within two steps.
    expect(Math.abs(finding.value - angle)).toBeLessThan(0.5);
    expect(finding.span).toEqual([39 / 30, 2]);
  });

  test('two steps that don’t undo each other are two shelves', () => {
    const track = turned(
      turned(clean, inside, [0, 0, 90]),
      Array.from({ length: 60 }, (_, i) => 60 + i),
      [60, 0, 0],
    );
    expect(jumps(track).map(({ rule }) => rule)).not.toContain('jump.turned-over');
  });

  test('a flip that takes three frames each way is none', () => {
    const flip = [40, 41, 42].reduce(
      (track, key) =>
        turned(
          track,
          Array.from({ length: 60 - key }, (_, i) => key + i),
          [0, 0, 60],
        ),
      clean,
    );
    expect(jumps(flip).map(({ rule }) => rule)).not.toContain('jump.turned-over');
  });
});
