import { describe, expect, test } from 'vitest';
import { measure, playAs, rotationTrack, type RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack, type TrackSurveySettings } from '@slewcurve/survey';

const DEGREES = 180 / Math.PI;

function elbow(track: RotationTrack, settings: TrackSurveySettings = {}) {
  return surveyTrack(track, settings).find((finding) => finding.rule === 'pace.elbow');
}

/** Turns about y, degrees, at times so many seconds apart. */
function hinge(angles: readonly number[], gap: number): RotationTrack {
  const values = angles.flatMap((angle) => [
    0,
    Math.sin(angle / 2 / DEGREES),
    0,
    Math.cos(angle / 2 / DEGREES),
  ]);
  return rotationTrack({ times: angles.map((_, key) => key * gap), values });
}

const swing = hinge(
  Array.from({ length: 11 }, (_, key) => 30 * Math.sin(2 * Math.PI * 0.2 * key)),
  0.2,
);

describe('pace.elbow', () => {
  test('a swing of ±30° at 1 Hz keyed every 0.2 s steps by up to 197 deg/s', () => {
    // RULES 25 measured 197 deg/s. By hand: chords of 30·sin(72°·k) over 0.2 s, largest second difference
    // 30·(2 − 2cos 72°)·sin(72°)/0.2 = 197.1.
    const finding = elbow(swing)!;
    expect(finding.value).toBeCloseTo(
      (30 * (2 - 2 * Math.cos(0.4 * Math.PI)) * Math.sin(0.4 * Math.PI)) / 0.2,
      3,
    );
    expect(finding).toMatchObject({ level: 'warning', unit: 'deg/s', limit: 60, playback: 'as-written' });
    expect(finding.remedy).toMatchObject({ verb: 'ease through' });
  });

  test('the worst step is the one that `measure` reports of the same curve', () => {
    const { worstRateJump, worstRateJumpAt } = measure(playAs(swing, 'as-written'));
    expect(elbow(swing)!.value).toBeCloseTo(worstRateJump * DEGREES, 3);
    expect(elbow(swing)!.occurrences.map((place) => place.time)).toContain(worstRateJumpAt);
  });

  test('a change of axis at one speed is an elbow too', () => {
    const s = Math.sin(Math.PI / 12);
    const c = Math.cos(Math.PI / 12);
    // 30° about x, then 30° about own y.
    const track = rotationTrack({
      times: [0, 0.3, 0.6],
      values: [0, 0, 0, 1, s, 0, 0, c, s * c, c * s, s * s, c * c],
    });
    expect(elbow(track)!.value).toBeCloseTo(100 * Math.SQRT2, 3);
  });

  test('a steady turn, a step under the limit and one under its share are spared', () => {
    expect(elbow(hinge([0, 20, 40, 60, 80], 0.2))).toBeUndefined();
    // 100 to 150 deg/s: 50.
    expect(elbow(hinge([0, 20, 40, 70, 100], 0.2))).toBeUndefined();
    // 250 to 350 deg/s: 100, but 29 %.
    expect(elbow(hinge([0, 50, 100, 170, 240], 0.2))).toBeUndefined();
  });

  test('dense tracks, curves with a continuous rate, STEP and declared cuts are spared', () => {
    expect(elbow(hinge([0, 5, 10, 5, 0, 5], 1 / 30))).toBeUndefined();
    expect(elbow(rotationTrack({ ...swing, interpolation: 'STEP' }))).toBeUndefined();
    expect(elbow(swing, { playbacks: ['step'] })).toBeUndefined();
    expect(elbow(rotationTrack({ ...swing, breaks: [...swing.times.keys()].slice(0, -1) }))).toBeUndefined();
  });

  test('of several playbacks the worst counts, and is named', () => {
    const wide = hinge([0, 120, 0, 120], 1);
    const arc = elbow(wide, { playbacks: ['short-way'] })!.value;
    const chord = elbow(wide, { playbacks: ['chord'] })!.value;
    expect(chord).not.toBeCloseTo(arc, 0);
    const both = elbow(wide, { playbacks: ['short-way', 'chord'] })!;
    expect(both.value).toBe(Math.max(arc, chord));
    expect(both.playback).toBe(chord > arc ? 'chord' : 'short-way');
  });

  test('a camera is held to 5 deg/s and 20 %', () => {
    // 10 to 20 deg/s.
    const track = hinge([0, 2, 4, 8, 12], 0.2);
    expect(elbow(track)).toBeUndefined();
    expect(
      elbow(track, { houseRules: { ...NO_HOUSE_RULES, roles: { '*': 'camera-screen' } } }),
    ).toMatchObject({
      limit: 5,
      keys: [2],
    });
  });
});
