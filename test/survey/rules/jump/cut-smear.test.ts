import { describe, expect, test } from 'vitest';
import { rotationTrack, type RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack, type HouseRules } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

const CAMERA: HouseRules = { ...NO_HOUSE_RULES, roles: { '*': 'camera-screen' } };

function jumps(track: RotationTrack, houseRules = CAMERA) {
  return surveyTrack(track, { houseRules }).filter((finding) => finding.rule.startsWith('jump.'));
}

/** A slow pan, a step of 60° within one frame of 30 a second at 1 s, a slow pan. */
const cut = turningTrack((key) => 0.2 * key + (key < 30 ? 0 : 60), 60);

describe('jump.cut-smear', () => {
  test('a camera that turns 60° within a frame between calm pans is a cut, and no shelf beside', () => {
    const [finding, ...rest] = jumps(cut);
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({ rule: 'jump.cut-smear', level: 'warning', keys: [30], limit: 20 });
    expect(finding.value).toBeCloseTo(60.2, 6);
  });

  test('two hand-set keys a frame apart are one too', () => {
    const turn = turningTrack((key) => [0, 2, 150, 152][key] ?? 0, 4);
    const track = rotationTrack({ ...turn, times: [0, 2, 2 + 1 / 30, 4] });
    expect(jumps(track)).toMatchObject([{ rule: 'jump.cut-smear', keys: [2] }]);
  });

  test('declared, as STEP, or on anything but a camera it is none; nor is a whip of four frames', () => {
    const cuts = [{ clip: '*', track: '*', time: 1 }];
    expect(jumps(cut, { ...CAMERA, declared: { ...CAMERA.declared, cuts } })).toEqual([]);
    const whips = [{ clip: '*', track: '*', span: [0.9, 1.1] as const }];
    expect(jumps(cut, { ...CAMERA, declared: { ...CAMERA.declared, whips } })).toEqual([]);
    expect(jumps({ ...cut, interpolation: 'STEP' })).toEqual([]);
    expect(jumps(cut, NO_HOUSE_RULES)).toMatchObject([{ rule: 'jump.shelf' }]);
    const whip = turningTrack((key) => 0.2 * key + 15 * Math.min(Math.max(key - 30, 0), 4), 60);
    expect(jumps(whip).filter(({ rule }) => rule === 'jump.cut-smear')).toEqual([]);
  });
});
