import { describe, expect, test } from 'vitest';
import { rotationTrack } from '@slewcurve/core';
import { surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

const idle = (track: Parameters<typeof surveyTrack>[0]) =>
  surveyTrack(track).find(({ rule }) => rule === 'file.idle');

describe('file.idle', () => {
  // NEEDS A21.
  test('thirty equal keys are a note', () => {
    expect(idle(turningTrack(() => 25, 30))).toMatchObject({ level: 'note', value: 0, count: 1, keys: [] });
    expect(idle(turningTrack(() => 25, 30))!.message).toContain('its 30 keys turn by 0.0° in all');
  });

  test('two keys, a small motion, and tangents that move something are not', () => {
    expect(idle(turningTrack(() => 25, 2))).toBeUndefined();
    expect(idle(turningTrack((key) => 0.001 * key, 30))).toBeUndefined();
    const still = turningTrack(() => 25, 3, 30, { interpolation: 'CUBICSPLINE' });
    expect(idle(still)).toBeDefined();
    const values = still.values.map((value, i) => (i === 20 ? 0.3 : value));
    expect(idle(rotationTrack({ ...still, values }))).toBeUndefined();
  });
});
