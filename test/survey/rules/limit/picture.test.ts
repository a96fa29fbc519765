import type { Clip, RotationTrack, SceneNode } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { type HouseRules, NO_HOUSE_RULES, surveyTrack } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';
import { turningTrack } from '../../../support/turning-track.js';

/** A camera of 45° upright at 16 to 9: the middle of its picture crosses one width in 7 s at 12.05 deg/s (MATHS 8). */
const CAMERA: SceneNode = {
  path: 'camera',
  parent: -1,
  rotation: [0, 0, 0, 1],
  translation: [0, 0, 0],
  scale: [1, 1, 1],
  joint: false,
  camera: { verticalView: Math.PI / 4, aspect: 16 / 9 },
};
const LIMIT = ((2 * (16 / 9) * Math.tan(Math.PI / 8)) / 7) * (180 / Math.PI);

function sweeping(angle: (key: number) => number, count: number, seconds = 1): RotationTrack {
  const track = turningTrack(angle, count, 1 / seconds, { axis: [0, 1, 0] });
  return { ...track, source: { ...track.source, node: 0 } };
}

function found(
  track: RotationTrack,
  {
    frameRate,
    house = NO_HOUSE_RULES,
    node = CAMERA,
  }: { frameRate?: number; house?: HouseRules; node?: SceneNode } = {},
) {
  const clip: Clip = {
    name: track.clip,
    index: 0,
    tracks: [track],
    start: track.times[0] ?? 0,
    end: track.times.at(-1) ?? 0,
    ...(frameRate !== undefined && { frameRate }),
    loop: false,
    marks: [],
  };
  const findings = surveyTrack(track, { clip, nodes: [node], houseRules: house });
  return findings.find(({ rule }) => rule === 'limit.picture');
}

describe('limit.picture', () => {
  test('a pan of 15 deg/s for 2 s is faster than a width in 7 s, 12.05 deg/s; its remedy is not', () => {
    const pan = sweeping((key) => [0, 15, 30, 35][key] ?? 0, 4);
    const finding = found(pan)!;
    expect(finding).toMatchObject({ level: 'warning', unit: 'deg/s', keys: [1], span: [0, 2] });
    expect(finding.value).toBeCloseTo(15, 6);
    expect(finding.limit).toBeCloseTo(LIMIT, 3);
    expect(LIMIT).toBeCloseTo(12.05, 2);
    const step = finding.remedy!;
    expect(step).toMatchObject({ verb: 'cap', span: [0, 2] });
    const capped = verbNamed('cap').apply(pan, step).track;
    expect(found({ ...capped, source: pan.source })).toBeUndefined();
  });

  test('a second or less, slower pans, rolls and other nodes are none', () => {
    expect(found(sweeping((key) => [0, 15, 20][key] ?? 0, 3))).toBeUndefined();
    expect(found(sweeping((key) => 12 * key, 4))).toBeUndefined();
    const roll = turningTrack((key) => 40 * key, 4, 1, { axis: [0, 0, 1] });
    expect(found({ ...roll, source: { ...roll.source, node: 0 } })).toBeUndefined();
    const { camera: _, ...bare } = CAMERA;
    expect(
      found(
        sweeping((key) => 40 * key, 4),
        { node: bare },
      ),
    ).toBeUndefined();
  });

  test('a whip, faster than a width a second for less than 0.8 s, is meant, declared or not', () => {
    // 60° in half a second, between slow pans of half a second that alone would pass.
    const whip = sweeping((key) => [0, 7, 67, 74][key] ?? 0, 4, 0.5);
    expect(found(whip)).toBeUndefined();
    // The same swept for a second and a half is none.
    expect(found(sweeping((key) => [0, 7, 187, 194][key] ?? 0, 4, 1.5))?.value).toBeCloseTo(120, 5);
    const whips = [{ clip: '*', track: '*', span: [0, 3] as const }];
    const pan = sweeping((key) => 30 * key, 4);
    const house = { ...NO_HOUSE_RULES, declared: { ...NO_HOUSE_RULES.declared, whips } };
    expect(found(pan)).toBeDefined();
    expect(found(pan, { house })).toBeUndefined();
  });

  test('at 60 pictures a second two and a half times as fast is let pass', () => {
    const pan = sweeping((key) => 25 * key, 4);
    expect(found(pan, { frameRate: 30 })).toBeDefined();
    expect(found(pan, { frameRate: 60 })).toBeUndefined();
    expect(
      found(
        sweeping((key) => 32 * key, 4),
        { frameRate: 60 },
      )?.limit,
    ).toBeCloseTo(2.5 * LIMIT, 3);
  });
});
