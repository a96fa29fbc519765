import { describe, expect, test } from 'vitest';
import { rotationTrack, type RotationTrack } from '@slewcurve/core';
import { surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

function rounded(track: RotationTrack, levels: number): RotationTrack {
  return rotationTrack({
    ...track,
    values: track.values.map((value) => Math.round(value * levels) / levels),
  });
}

const slow = turningTrack((key) => 40 * Math.sin(key / 60), 300, 60);

describe('file.coarse', () => {
  test('a slow turn in 127 levels is named, with the share of steps that read zero, and nothing of it is called a jump', () => {
    const findings = surveyTrack(rounded(slow, 127));
    const finding = findings.find(({ rule }) => rule === 'file.coarse')!;
    expect(finding).toMatchObject({ level: 'warning', keys: [], unit: '%', limit: 5, count: 1 });
    const steps = [...rounded(slow, 127).values];
    const zero = Array.from({ length: 299 }, (_, k) =>
      [0, 1, 2, 3].every((i) => steps[4 * k + i] === steps[4 * k + 4 + i]),
    );
    // Counted over all steps; the rule counts those at over 2 deg/s, which are nearly all of this wave.
    expect(Math.abs(finding.value - (100 * zero.filter(Boolean).length) / 299)).toBeLessThan(4);
    expect(findings.filter(({ rule }) => /^(jump|shake|pace)/.test(rule))).toEqual([]);
  });

  test('the same in shorts, in floats, standing still or as STEP is not', () => {
    for (const track of [
      rounded(slow, 32767),
      slow,
      rounded(
        turningTrack(() => 12, 300, 60),
        127,
      ),
      { ...rounded(slow, 127), interpolation: 'STEP' as const },
    ])
      expect(surveyTrack(track).filter(({ rule }) => rule === 'file.coarse')).toEqual([]);
  });
});
