import { describe, expect, test } from 'vitest';
import { rotationTrack, type Clip, type SceneNode } from '@slewcurve/core';
import { NO_HOUSE_RULES, ROLES, RULES, roleOf, surveyClip, surveyTrack } from '@slewcurve/survey';
import { grid, keyed, turned } from '../support/smooth-track.js';

const MOTION = { spin: [0, 20, 0], swing: [8, 0, 4], hertz: 0.4, phase: 1 } as const;
const CLEAN = keyed(MOTION, grid(60), 'LINEAR');
const NODE: SceneNode = {
  path: 'Arm',
  parent: -1,
  rotation: [0, 0, 0, 1],
  translation: [],
  scale: [],
  joint: false,
};

function clipOf(tracks: Clip['tracks']): Clip {
  return { name: 'Wave', index: 0, tracks, start: 0, end: 59 / 30, frameRate: 30, loop: false, marks: [] };
}

describe('survey', () => {
  test('clean tracks of every interpolation give nothing under every playback that minds no signs', () => {
    for (const interpolation of ['LINEAR', 'CUBICSPLINE', 'STEP'] as const)
      expect(
        surveyTrack(keyed(MOTION, grid(60), interpolation), {
          playbacks: ['as-written', 'short-way', 'chord', 'finite-cubic', 'step'],
          // This motion’s tangents go on beyond both ends.
          houseRules: { ...NO_HOUSE_RULES, levels: { 'pace.end-tangent': 'off' } },
        }),
      ).toEqual([]);
  });

  test('a playback that a track can’t be played by is left out, not an error', () => {
    expect(surveyTrack(CLEAN, { playbacks: ['stored-cubic'] })).toEqual([]);
    const popped = turned(CLEAN, [30], [0, 0, 9]);
    expect(surveyTrack(popped, { playbacks: ['stored-cubic', 'short-way'] })).toMatchObject([
      { rule: 'jump.lone-key', playback: 'short-way' },
    ]);
  });

  test('one finding a track and rule, its numbers those of the worst place, all places listed and counted', () => {
    const track = turned(turned(turned(CLEAN, [15], [0, 0, 5]), [30], [0, 0, 9]), [45], [7, 0, 0]);
    const [finding, ...rest] = surveyTrack(track);
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({ rule: 'jump.lone-key', keys: [30], count: 3 });
    expect(finding.occurrences.map(({ keys }) => keys[0])).toEqual([30, 45, 15]);
    expect(finding.occurrences[0]).toMatchObject({
      time: finding.time,
      value: finding.value,
      message: finding.message,
    });
  });

  test('the list ends at 100 places, the count does not', () => {
    const flipped = rotationTrack({
      ...keyed(MOTION, grid(400), 'LINEAR'),
      values: keyed(MOTION, grid(400), 'LINEAR').values.map((value, i) =>
        Math.floor(i / 4) % 2 === 0 ? value : -value,
      ),
    });
    const [finding] = surveyTrack(flipped);
    expect(finding).toMatchObject({ rule: 'turn.sign-flip', count: 399 });
    expect(finding.occurrences).toHaveLength(100);
  });

  test('a clip is surveyed track by track, with frame numbers where it has a grid', () => {
    const other = rotationTrack({ ...turned(CLEAN, [20], [0, 9, 0]), id: 'Leg' });
    const findings = surveyClip(clipOf([CLEAN, other, turned(CLEAN, [30], [9, 0, 0])]), [NODE]);
    expect(findings.map(({ track, keys, frame }) => [track, keys, frame])).toEqual([
      ['Leg', [20], 20],
      ['Arm', [30], 30],
    ]);
  });

  test('measured numbers have six significant digits, times are as stored', () => {
    const times = Float64Array.from(grid(60), Math.fround);
    const [finding] = surveyTrack(rotationTrack({ ...turned(CLEAN, [20], [0, 9, 0]), times }));
    expect(String(finding.value).replace('.', '').length).toBeLessThanOrEqual(6);
    expect(finding.time).toBe(times[20]);
  });

  test('the same track gives the same findings, and is not written to', () => {
    const track = turned(CLEAN, [20], [0, 9, 0]);
    const before = [...track.values];
    expect(surveyTrack(track)).toEqual(surveyTrack(track));
    expect([...track.values]).toEqual(before);
  });
});

describe('roles', () => {
  const track = rotationTrack({ ...CLEAN, source: { ...CLEAN.source, node: 0 } });

  test('a node with a camera is a camera on a screen, a joint of a skin a joint, anything else a prop', () => {
    expect(roleOf(track, [{ ...NODE, camera: { verticalView: 1 }, joint: true }])).toBe('camera-screen');
    expect(roleOf(track, [{ ...NODE, joint: true }])).toBe('joint');
    expect(roleOf(track, [{ ...NODE, path: 'Camera' }])).toBe('prop');
    expect(roleOf(CLEAN, [])).toBe('prop');
  });

  test('every rule has thresholds for every role, or spares it', () => {
    for (const rule of RULES) expect(Object.keys(rule.limits).toSorted()).toEqual([...ROLES].toSorted());
  });
});
