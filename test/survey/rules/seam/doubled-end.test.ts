import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

const LOOP = { houseRules: { ...NO_HOUSE_RULES, loops: ['*'] } };

function doubled(track: RotationTrack, settings: Parameters<typeof surveyTrack>[1] = LOOP) {
  return surveyTrack(track, settings).find((finding) => finding.rule === 'seam.doubled-end');
}

describe('seam.doubled-end', () => {
  test('a last key that repeats the one before it in a steady turn is named', () => {
    const track = turningTrack((key) => 6 * Math.min(key, 60), 62);
    expect(doubled(track)).toMatchObject({ level: 'warning', keys: [61], value: 0, unit: 'deg' });
    expect(doubled(track)!.limit).toBeCloseTo(0.6, 6);
    expect(doubled(track, {})).toBeUndefined();
  });

  test('a loop without it is clean, and so is one that rests at its seam', () => {
    expect(doubled(turningTrack((key) => 6 * key, 61))).toBeUndefined();
    expect(doubled(turningTrack((key) => 20 - 20 * Math.cos((key * Math.PI) / 60), 121))).toBeUndefined();
    expect(doubled(turningTrack(() => 0, 61))).toBeUndefined();
  });
});
