import { describe, expect, test } from 'vitest';
import { PLAYBACKS, type PlaybackId, type RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack, type HouseRules } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

const MACHINE: HouseRules = { ...NO_HOUSE_RULES, roles: { '*': 'machine' } };
const bow = (track: RotationTrack, playback: PlaybackId = 'chord', houseRules = MACHINE) =>
  surveyTrack(track, { playbacks: [playback], houseRules }).find(({ rule }) => rule === 'pace.bow');

describe('pace.bow', () => {
  // RULES 27: measured max/min = 1/cos²(θ/4), to two decimals there.
  test.each([
    [60, 1.07],
    [90, 1.17],
    [120, 1.33],
    [150, 1.59],
  ])('keys %d° apart swell %f times under chords, which is what the curve does', (degrees, ratio) => {
    const track = turningTrack((key) => degrees * key, 3, 1);
    const finding = bow(track)!;
    expect(finding).toMatchObject({ unit: 'times', playback: 'chord', count: 2 });
    expect(Math.abs(finding.value - ratio)).toBeLessThan(0.005);
    const curve = PLAYBACKS.chord.play(track);
    const speed = (time: number): number => Math.hypot(...curve.rate([0, 0, 0], time, 'own'));
    // Six significant digits in reports.
    expect(speed(0.5) / speed(0)).toBeCloseTo(finding.value, 4);
  });

  test('arcs, close keys and wider limits are clean', () => {
    const wide = turningTrack((key) => 90 * key, 3, 1);
    expect(bow(wide, 'as-written')).toBeUndefined();
    expect(bow(turningTrack((key) => 30 * key, 3, 1))).toBeUndefined();
    expect(bow(wide, 'chord', { ...MACHINE, roles: { '*': 'joint' } })).toBeUndefined();
  });

  test('a change of sign under raw chords is left to turn.sign-flip', () => {
    const track = turningTrack((key) => 90 * key, 2, 1);
    const flipped = { ...track, values: track.values.map((x, i) => (i < 4 ? x : -x)) };
    expect(bow(track, 'raw-chord')?.count).toBe(1);
    expect(bow(flipped, 'raw-chord')).toBeUndefined();
  });
});
