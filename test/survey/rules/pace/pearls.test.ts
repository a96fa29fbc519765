import { describe, expect, test } from 'vitest';
import { verbNamed } from '@slewcurve/mend';
import { NO_HOUSE_RULES, surveyTrack, type HouseRules } from '@slewcurve/survey';
import { cubicTrack, differences } from '../../../support/cubic-track.js';
import type { RotationTrack } from '@slewcurve/core';
import { keyed } from '../../../support/smooth-track.js';

const pearls = (track: RotationTrack, houseRules: HouseRules = NO_HOUSE_RULES) =>
  surveyTrack(track, { houseRules }).find(({ rule }) => rule === 'pace.pearls');

const TIMES = [0, 1, 2, 3, 4, 5, 6];
const SPIN = TIMES.map((time) => 10 * time);
const STOPPED = cubicTrack(TIMES, SPIN, SPIN.map(() => 0)); // prettier-ignore

describe('pace.pearls', () => {
  // NEEDS A19: a staircase of eased keys. Five inner keys, each of which stops.
  test('a spin of 10 deg/s with a stop at every key is named once, with its five keys', () => {
    const finding = pearls(STOPPED)!;
    expect(finding).toMatchObject({ level: 'warning', unit: '%', value: 100, limit: 60, count: 1 });
    expect(finding.keys).toEqual([1, 2, 3, 4, 5]);
    expect(finding.message).toContain('at 5 of the 5 keys');
    expect(pearls(verbNamed('set tangents').apply(STOPPED, finding.remedy!).track)).toBeUndefined();
    // Tangents of zero length are this finding, not one of their scale as well.
    expect(surveyTrack(STOPPED).map(({ rule }) => rule)).not.toContain('pace.tangent-scale');
  });

  test('the same keys with their own tangents are clean', () => {
    expect(pearls(cubicTrack(TIMES, SPIN, differences(TIMES, SPIN)))).toBeUndefined();
  });

  test('fewer than four inner keys, or stops at fewer than 60 % of them, are clean', () => {
    expect(pearls(cubicTrack(TIMES.slice(0, 5), SPIN.slice(0, 5), [0, 0, 0, 0, 0]))).toBeUndefined();
    expect(pearls(cubicTrack(TIMES, SPIN, [0, 0, 10, 0, 10, 10, 0]))).toBeUndefined();
  });

  test('poses that are held between are meant', () => {
    const times = [0, 0.5, 1, 1.5, 2, 2.5, 3, 3.5, 4, 4.5];
    const posed = [0, 20, 20, 40, 40, 60, 60, 80, 80, 100];
    expect(pearls(cubicTrack(times, posed, posed.map(() => 0)))).toBeUndefined(); // prettier-ignore
  });

  test('straight segments, dense keys and a declared whip are clean', () => {
    const motion = { spin: [0, 10, 0], swing: [0, 0, 0], hertz: 0.4, phase: 1 } as const;
    expect(pearls(keyed(motion, TIMES, 'LINEAR'))).toBeUndefined();
    const dense = TIMES.map((time) => time / 30);
    expect(pearls(cubicTrack(dense, SPIN, SPIN.map(() => 0)))).toBeUndefined(); // prettier-ignore
    const whips = [{ clip: '*', track: '*', span: [0, 6] as const }];
    expect(
      pearls(STOPPED, { ...NO_HOUSE_RULES, declared: { ...NO_HOUSE_RULES.declared, whips } }),
    ).toBeUndefined();
  });
});
