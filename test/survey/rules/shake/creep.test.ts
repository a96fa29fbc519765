import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

function held(span: readonly [number, number]) {
  const holds = [{ clip: '*', track: '*', span }];
  return { ...NO_HOUSE_RULES, declared: { ...NO_HOUSE_RULES.declared, holds } };
}

const creep = (track: RotationTrack, houseRules = NO_HOUSE_RULES) =>
  surveyTrack(track, { houseRules }).find(({ rule }) => rule === 'shake.creep');

describe('shake.creep', () => {
  test('5° in 20 s is a warning in a declared hold and a note elsewhere', () => {
    const track = turningTrack((key) => (0.25 * key) / 60, 1201, 60);
    expect(creep(track, held([0, 20]))).toMatchObject({ level: 'warning', keys: [0, 1200], unit: 'deg' });
    expect(creep(track, held([0, 20]))!.value).toBeCloseTo(5, 3);
    expect(creep(track)).toMatchObject({ level: 'note' });
  });

  test('the stretch that creeps is told, and the move beside it is not', () => {
    const track = turningTrack((key) => (key < 300 ? (0.5 * key) / 60 : 2.5 + (key - 300) / 2), 400, 60);
    expect(creep(track)).toMatchObject({ keys: [0, 300], count: 1 });
  });

  test('standing still, breathing, a plain pan and a short slide are none', () => {
    expect(creep(turningTrack(() => 10, 600, 60))).toBeUndefined();
    expect(creep(turningTrack((key) => 0.4 * Math.sin(key / 60), 1200, 60))).toBeUndefined();
    expect(creep(turningTrack((key) => (5 * key) / 60, 600, 60))).toBeUndefined();
    expect(creep(turningTrack((key) => (0.4 * key) / 60, 90, 60))).toBeUndefined();
  });
});
