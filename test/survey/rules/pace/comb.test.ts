import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { applySteps } from '@slewcurve/mend';
import { surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

const comb = (track: RotationTrack) => surveyTrack(track).find(({ rule }) => rule === 'pace.comb');

function swing(time: number): number {
  return 30 * time + 20 * Math.sin(time);
}

/** A swing made at `made` frames a second, shown at `shown` by the nearest frame. */
function converted(made: number, shown: number): RotationTrack {
  return turningTrack((key) => swing(Math.round((key / shown) * made) / made), 4 * shown, shown);
}

describe('pace.comb', () => {
  // RULES 30: 24 → 30 repeats 20 %, period 5.
  test('24 frames a second shown at 30 repeat every fifth step', () => {
    const finding = comb(converted(24, 30))!;
    expect(finding).toMatchObject({ level: 'warning', unit: '%', count: 1 });
    // One step in five of some 119; the ends may hold one more or less.
    expect(Math.abs(finding.value - 20)).toBeLessThan(1);
    expect(finding.message).toContain('every 5th step repeats');
  });

  test('25 at 30 repeat every sixth; 30 at 60 is on twos, a note', () => {
    expect(comb(converted(25, 30))?.message).toContain('every 6th step');
    expect(comb(converted(30, 60))).toMatchObject({ level: 'note' });
  });

  test.each([
    [24, 30],
    [25, 30],
    [50, 60],
  ])(
    'of %d frames a second at %d a re-grid is proposed that takes the comb off and keeps the frames',
    (made, shown) => {
      const track = converted(made, shown);
      const { remedy } = comb(track)!;
      expect(remedy).toMatchObject({ verb: 're-grid', fps: shown, source: made });
      const [after] = applySteps([track], [remedy!]).tracks;
      expect(after.times).toEqual(track.times);
      expect(surveyTrack(after).filter(({ level }) => level !== 'note')).toEqual([]);
    },
  );

  test('on twos there is no remedy: it is meant', () => {
    expect(comb(converted(30, 60))?.remedy).toBeUndefined();
  });

  test('its own rate, a freeze and a hold are clean', () => {
    expect(comb(converted(30, 30))).toBeUndefined();
    expect(comb(turningTrack((key) => 2 * (key < 40 ? key : Math.max(40, key - 6)), 120))).toBeUndefined();
    expect(comb(turningTrack((key) => Math.min(key, 60), 120))).toBeUndefined();
  });
});
