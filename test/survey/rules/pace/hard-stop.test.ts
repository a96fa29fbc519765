import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { NO_HOUSE_RULES, surveyTrack, type HouseRules } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

const CAMERA: HouseRules = { ...NO_HOUSE_RULES, roles: { '*': 'camera-screen' } };
const stop = (track: RotationTrack, houseRules = CAMERA) =>
  surveyTrack(track, { houseRules }).find(({ rule }) => rule === 'pace.hard-stop');

describe('pace.hard-stop', () => {
  test('a camera’s pan of 20 deg/s starts and stops hard', () => {
    const finding = stop(turningTrack((key) => 20 * key, 4, 1))!;
    expect(finding).toMatchObject({ level: 'warning', count: 2, limit: 5, unit: 'deg/s' });
    expect(finding.value).toBeCloseTo(20, 6);
    expect(finding.occurrences.map(({ keys }) => keys[0])).toEqual([0, 3]);
  });

  test('either end is eased over 0.3 s by its own step, and together they leave none', () => {
    const pan = turningTrack((key) => 20 * key, 4, 1);
    const steps = stop(pan)!.occurrences.map(({ remedy }) => remedy!);
    expect(steps.map(({ which, shoulders }) => [which, shoulders])).toEqual([
      ['in', 0.3],
      ['out', 0.3],
    ]);
    const eased = steps.reduce((track, step) => verbNamed(step.verb).apply(track, step).track, pan);
    expect(stop(eased)).toBeUndefined();
    // Exact at both ends: the ramps take time from the middle.
    expect(eased.times.at(-1)).toBe(3);
    // Shorter than twice that, there is no room.
    expect(stop(turningTrack((key) => 5 * key, 3, 4))!.remedy).toBeUndefined();
  });

  test('eased ends, slow ends, loops, joints and marked ends are none', () => {
    expect(stop(turningTrack((key) => 20 * key, 4, 1, { interpolation: 'CUBICSPLINE' }))).toBeUndefined();
    expect(stop(turningTrack((key) => 4 * key, 4, 1))).toBeUndefined();
    expect(
      stop(
        turningTrack((key) => 20 * key, 4, 1),
        { ...CAMERA, loops: ['*'] },
      ),
    ).toBeUndefined();
    expect(
      stop(
        turningTrack((key) => 20 * key, 4, 1),
        NO_HOUSE_RULES,
      ),
    ).toBeUndefined();
    const marks = [0, 3].map((time) => ({ clip: '*', time, name: 'hit' }));
    const marked = { ...CAMERA, declared: { ...CAMERA.declared, marks } };
    expect(
      stop(
        turningTrack((key) => 20 * key, 4, 1),
        marked,
      ),
    ).toBeUndefined();
  });
});
