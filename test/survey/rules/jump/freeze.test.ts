import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { NO_HOUSE_RULES, surveyTrack } from '@slewcurve/survey';
import { turningTrack } from '../../../support/turning-track.js';

function jumps(track: RotationTrack, houseRules = NO_HOUSE_RULES) {
  return surveyTrack(track, { houseRules }).filter((finding) => finding.rule.startsWith('jump.'));
}

const sway = (key: number): number => 40 * Math.sin(key / 30);
const eased = (u: number): number => u * u * u * (10 - 15 * u + 6 * u * u);
const pause = (key: number): number =>
  key < 40 ? 20 * eased(key / 40) : key < 50 ? 20 : 20 + 20 * eased((key - 50) / 40);
const frozen = turningTrack((key) => sway(key > 60 && key <= 65 ? 60 : key), 150, 60);

describe('jump.freeze', () => {
  test('five repeats in a motion and the leap after them are one finding, and no shelf', () => {
    const [finding, ...rest] = jumps(frozen);
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({ rule: 'jump.freeze', level: 'warning', keys: [61, 62, 63, 64, 65] });
    expect(finding.value).toBeCloseTo(Math.abs(sway(66) - sway(60)) * 60, 2);
  });

  test('its bridge lays those keys anew, all others stay, and nothing is left to find', () => {
    const [{ remedy }] = jumps(frozen);
    const result = verbNamed('bridge').apply(frozen, remedy!);
    expect(result.changed).toEqual([61, 62, 63, 64, 65]);
    expect(jumps(result.track)).toEqual([]);
  });

  test('a hold that is eased into and out of is none, nor one that a fast move starts from', () => {
    expect(jumps(turningTrack((key) => pause(Math.min(key, 90)), 100, 60))).toEqual([]);
    const start = turningTrack((key) => (key < 40 ? key : key < 45 ? 40 : 40 + 5 * (key - 44)), 90, 60);
    expect(jumps(start).filter(({ rule }) => rule === 'jump.freeze')).toEqual([]);
  });

  test('STEP tracks and declared whips are spared', () => {
    expect(jumps({ ...frozen, interpolation: 'STEP' })).toEqual([]);
    const whips = [{ clip: '*', track: '*', span: [0.9, 1.2] as const }];
    expect(jumps(frozen, { ...NO_HOUSE_RULES, declared: { ...NO_HOUSE_RULES.declared, whips } })).toEqual([]);
  });
});
