import { describe, expect, test } from 'vitest';
import { PLAYBACKS, type PlaybackId, type RotationTrack } from '@slewcurve/core';
import { surveyTrack } from '@slewcurve/survey';
import { cubicTrack } from '../../../support/cubic-track.js';
import { turningTrack } from '../../../support/turning-track.js';

const collapse = (track: RotationTrack, playbacks: readonly PlaybackId[] = ['as-written']) =>
  surveyTrack(track, { playbacks }).find(({ rule }) => rule === 'pace.cubic-collapse');

/** The key and all after it on the other side; CUBICSPLINE, tangents along. */
function flippedFrom(track: RotationTrack, key: number): RotationTrack {
  const size = track.values.length / track.times.length;
  return { ...track, values: track.values.map((x, i) => (i < size * key ? x : -x)) };
}

describe('pace.cubic-collapse', () => {
  // NEEDS F2 measured min |p| 0.0436 for 0 → 10° with the second key negated, tangents of zero length.
  test('0 → 10°, the second key negated, shrinks to 0.0436: an error', () => {
    const track = flippedFrom(cubicTrack([0, 1], [0, 10], [0, 0]), 1);
    const finding = collapse(track)!;
    expect(finding).toMatchObject({ level: 'error', unit: 'length', keys: [1], limit: 0.5 });
    expect(finding.value).toBeCloseTo(0.0436, 4);
    expect(finding.time).toBeCloseTo(0.5, 6);
    expect(finding.remedy).toMatchObject({ verb: 'same side' });
    const { rate, time } = PLAYBACKS['as-written'].play(track).peak(0, 1);
    expect(rate * (180 / Math.PI)).toBeGreaterThan(7000);
    expect(time).toBeCloseTo(finding.time, 3);
  });

  test('q beside −q has no length at all in the middle', () => {
    const track = flippedFrom(cubicTrack([0, 1, 2], [20, 20, 20], [0, 0, 0]), 1);
    expect(collapse(track)!.value).toBeLessThan(1e-6);
  });

  // NEEDS F2 measured 0.737 for 0 → 170°.
  test('wide keys on one side are clean; half a turn and more is not', () => {
    expect(collapse(cubicTrack([0, 1], [0, 170], [0, 0]))).toBeUndefined();
    expect(collapse(cubicTrack([0, 1], [0, 260], [0, 0]))).toMatchObject({ level: 'warning' });
  });

  test('the player’s own cubics collapse alike, straight segments never', () => {
    const track = flippedFrom(
      turningTrack((key) => 10 * key, 4, 1),
      2,
    );
    expect(collapse(track)).toBeUndefined();
    expect(collapse(track, ['finite-cubic'])).toMatchObject({ level: 'error', keys: [2] });
  });
});
