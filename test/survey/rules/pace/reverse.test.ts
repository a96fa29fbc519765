import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack, type HouseRules } from '@slewcurve/survey';
import { cubicTrack } from '../../../support/cubic-track.js';
import { turningTrack } from '../../../support/turning-track.js';

const CAMERA: HouseRules = { ...NO_HOUSE_RULES, roles: { '*': 'camera-screen' } };
const reverse = (track: RotationTrack, houseRules = CAMERA) =>
  surveyTrack(track, { houseRules }).find(({ rule }) => rule === 'pace.reverse');

/** A pan of 20 deg/s at 60 keys a second that runs back by a smooth bump within `frames` frames about second 2. */
function hitched(frames: number, degrees: number): RotationTrack {
  const clock = (key: number): number => {
    const share = Math.min(1, Math.max(0, (key - 120) / frames));
    return (
      key / 60 -
      ((degrees + (20 * frames) / 60) / 20) * (share - Math.sin(2 * Math.PI * share) / (2 * Math.PI))
    );
  };
  return turningTrack((key) => 20 * clock(key), 240, 60);
}

/** Back by 0.6° before it starts, past its end by 0.6° and back. */
function eased(key: number): number {
  if (key < 8) return -0.6 * Math.sin((Math.PI * key) / 8);
  return key < 100 ? (key - 8) / 2 : 46 + 0.6 * Math.sin((Math.PI * (key - 100)) / 8) * Number(key < 108);
}

describe('pace.reverse', () => {
  test('a pan that runs back by more than 0.3° within 0.15 s is named where it does', () => {
    const finding = reverse(hitched(9, 0.3))!;
    expect(finding).toMatchObject({ level: 'warning', unit: 'deg', limit: 0.3, count: 1 });
    expect(finding.span[0]).toBeGreaterThanOrEqual(2);
    expect(finding.span[1]).toBeLessThanOrEqual(2.15);
    expect(finding.value).toBeGreaterThan(0.3);
  });

  test('a pan that only slows down, a swing and a longer way back are clean', () => {
    expect(reverse(hitched(9, -1))).toBeUndefined();
    expect(reverse(turningTrack((key) => 20 * Math.sin(key / 20), 240, 60))).toBeUndefined();
    expect(reverse(hitched(30, 2))).toBeUndefined();
  });

  test('anticipation at the start and settling at the end are clean', () => {
    expect(reverse(turningTrack(eased, 150, 60))).toBeUndefined();
  });

  test('a handle that points too far runs back inside its segment; on a joint it is a note', () => {
    const track = cubicTrack([0, 0.4, 0.8, 1.2], [0, 20, 40, 60], [50, -40, 50, 50]);
    expect(reverse(track)).toMatchObject({ level: 'warning' });
    expect(reverse(track, { ...CAMERA, roles: { '*': 'joint' } })).toMatchObject({ level: 'note' });
  });
});
