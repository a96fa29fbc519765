import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

const LOOP = { houseRules: { ...NO_HOUSE_RULES, loops: ['*'] } };

function kink(track: RotationTrack, settings: Parameters<typeof surveyTrack>[1] = LOOP) {
  return surveyTrack(track, settings).find((finding) => finding.rule === 'seam.loop-kink');
}

describe('seam.loop-kink', () => {
  test('an arch that starts up and ends down comes back at another rate: the step of both is named', () => {
    // 20°·sin(πk/60), 30 keys a second: its first and last step turn at ±20·sin(π/60)·30 deg/s.
    const arch = turningTrack((key) => 20 * Math.sin((key * Math.PI) / 60), 61);
    const step = 2 * 20 * Math.sin(Math.PI / 60) * 30;
    expect(kink(arch)).toMatchObject({ level: 'warning', keys: [60], unit: 'deg/s', count: 1 });
    expect(Math.abs(kink(arch)!.value - step)).toBeLessThan(1e-6 * step);
    expect(kink(arch, {})).toBeUndefined();
  });

  test('a whole wave runs on over its seam, and so does a spin', () => {
    expect(kink(turningTrack((key) => 20 * Math.sin((key * Math.PI) / 30), 61))).toBeUndefined();
    expect(kink(turningTrack((key) => 6 * key, 61))).toBeUndefined();
  });

  test('an open loop is a gap and no kink', () => {
    expect(kink(turningTrack((key) => 20 * Math.sin((key * Math.PI) / 60) + 0.1 * key, 61))).toBeUndefined();
  });

  test('what a lively motion does everywhere is no kink', () => {
    const lively = turningTrack((key) => (key % 2 === 0 ? 0 : 5), 61);
    expect(kink(lively)).toBeUndefined();
  });

  test('sparse keys are judged at the join itself', () => {
    expect(kink(turningTrack((key) => [0, 30, 0][key] ?? 0, 3, 1))).toMatchObject({ keys: [2], value: 60 });
    const stopping = turningTrack((key) => [0, 30, 0][key] ?? 0, 3, 1, { interpolation: 'CUBICSPLINE' });
    expect(kink(stopping)).toBeUndefined();
  });
});
