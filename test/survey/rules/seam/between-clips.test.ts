import { rotationTrack, type Clip, type Interpolation, type RotationTrack } from '@slewcurve/core';
import { parseHouseRules, surveyTrack, type Finding, type HouseRules } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';
import { turningTrack } from '../../../support/turning-track.js';

type Angle = (key: number) => number;

function clipOf(
  name: string,
  angle: Angle,
  axis: readonly [number, number, number] = [0, 1, 0],
  interpolation: Interpolation = 'LINEAR',
): Clip {
  const track = rotationTrack({ ...turningTrack(angle, 31, 30, { axis, interpolation }), clip: name });
  return { name, index: 0, tracks: [track], start: 0, end: 1, frameRate: 30, loop: false, marks: [] };
}

/** What rules of family seam find on the track of the first clip. */
function found(clips: readonly Clip[], houseRules: HouseRules): Finding[] {
  const track = clips[0].tracks[0];
  return surveyTrack(track, { clip: clips[0], clips, houseRules }).filter(({ rule }) =>
    rule.startsWith('seam.'),
  );
}

function negated(clip: Clip): Clip {
  const [track] = clip.tracks;
  return { ...clip, tracks: [rotationTrack({ ...track, values: track.values.map((value) => -value) })] };
}

const JOIN = parseHouseRules({ declared: { joins: [{ from: 'Walk', to: 'Run' }] } });
const walk = clipOf('Walk', (key) => key);

/** What is found where a walk of 30 deg/s runs on at another speed. */
function at(speed: number): Finding[] {
  return found([walk, clipOf('Run', (key) => 30 + (key * speed) / 30)], JOIN);
}

function steps(name: string, angle: Angle): Clip {
  return clipOf(name, angle, [0, 1, 0], 'STEP');
}

describe('seam.join', () => {
  test('a pose 3° off where the next clip begins is twelve times a prop’s limit of 0.25°', () => {
    const run = clipOf('Run', (key) => 33 + key);
    const [finding, ...rest] = found([walk, run], JOIN);
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({
      rule: 'seam.join',
      level: 'warning',
      keys: [30],
      time: 1,
      unit: 'times',
      limit: 1,
    });
    // 3° over 0.25°.
    expect(finding.value).toBeCloseTo(12, 4);
    expect(finding.message).toBe(
      'it runs on into Run 3.0° off, from 30.0 deg/s to 30.0 deg/s, axes 0.0° apart: 12.0 times what passes',
    );
    expect(found([walk, run], parseHouseRules({}))).toEqual([]);
  });

  test('the pose fits: clips that go on are clean, a speed of 60 deg/s after 30 is named, 31 is not', () => {
    expect(at(30)).toEqual([]);
    expect(at(31)).toEqual([]);
    // 30 deg/s over the larger of 10 deg/s and a tenth of 60.
    expect(at(60)[0].value).toBeCloseTo(3, 3);
  });

  test('another axis at the same speed is named: about x after y is 90°, nine times the limit', () => {
    const still = clipOf('Walk', (key) => key - 30);
    expect(found([still, clipOf('Run', (key) => key, [1, 0, 0])], JOIN)[0].value).toBeCloseTo(9, 3);
  });

  test('one step of the clip itself is as usual as the last: an elbow in a shaking capture is no fault of the join', () => {
    const shaking = clipOf('Walk', (key) => (key === 30 ? 30 : key + 0.5 * (-1) ** key));
    expect(found([shaking, clipOf('Run', (key) => 30 + 1.3 * key)], JOIN)).toEqual([]);
  });

  test('STEP clips have a pose alone', () => {
    expect(found([steps('Walk', (key) => key), steps('Run', (key) => 30 + 9 * key)], JOIN)).toEqual([]);
    expect(found([steps('Walk', (key) => key), steps('Run', (key) => 33 + 9 * key)], JOIN)).toHaveLength(1);
  });
});

describe('seam.blend-side', () => {
  const MIX = parseHouseRules({ declared: { blends: [{ clips: ['Walk', 'Run'] }] } });
  const run = clipOf('Run', (key) => 5 + key);

  test('5° apart on opposite sides leave a length of 0.022, told once and on the earlier clip', () => {
    const [finding, ...rest] = found([walk, negated(run)], MIX);
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({ rule: 'seam.blend-side', level: 'warning', unit: 'length', limit: 0.7 });
    // sin(5° / 4): half of the sum of two unit quaternions 2.5° short of opposite.
    expect(finding.value).toBeCloseTo(Math.sin((5 * Math.PI) / 720), 6);
    const [clip] = [negated(run)];
    const later: RotationTrack = clip.tracks[0];
    expect(surveyTrack(later, { clip, clips: [walk, clip], houseRules: MIX })).toEqual([]);
  });

  test('on one side, or not declared, nothing is said', () => {
    expect(found([walk, run], MIX)).toEqual([]);
    expect(found([negated(walk), negated(run)], MIX)).toEqual([]);
    expect(found([walk, negated(run)], parseHouseRules({}))).toEqual([]);
  });
});
