import { describe, expect, test } from 'vitest';
import { rotationTrack, type RotationTrack } from '@slewcurve/core';
import { verbNamed } from '@slewcurve/mend';
import { NO_HOUSE_RULES, surveyTrack, type TrackSurveySettings } from '@slewcurve/survey';
import { grid, keyed, turned } from '../../../support/smooth-track.js';

const DEGREES = 180 / Math.PI;
const MOTION = { spin: [0, 20, 0], swing: [8, 0, 4], hertz: 0.4, phase: 1 } as const;

function jumps(track: RotationTrack, settings: TrackSurveySettings = {}) {
  return surveyTrack(track, settings).filter((finding) => finding.rule.startsWith('jump.'));
}

/** The track with everything from a key on turned, own axes, degrees. */
function stepped(
  track: RotationTrack,
  key: number,
  degrees: readonly [number, number, number],
): RotationTrack {
  return turned(track, [...track.times.keys()].slice(key), degrees);
}

function hinge(angle: (key: number) => number, count = 60): RotationTrack {
  const values = grid(count).flatMap((_, key) => [
    Math.sin(angle(key) / 2 / DEGREES),
    0,
    0,
    Math.cos(angle(key) / 2 / DEGREES),
  ]);
  return rotationTrack({ times: grid(count), values });
}

describe('jump.shelf', () => {
  test('a step that stays is named by its later key, with the offset as its size', () => {
    const [finding, ...rest] = jumps(stepped(keyed(MOTION, grid(60), 'LINEAR'), 30, [0, 0, 6]));
    expect(rest).toEqual([]);
    expect(finding).toMatchObject({ rule: 'jump.shelf', level: 'warning', keys: [30], limit: 2, count: 1 });
    expect(finding.value).toBeCloseTo(6, 1);
    expect(finding.span).toEqual([29 / 30, 1]);
    expect(finding.message).toMatch(
      /^from key 29 to key 30 it steps by 6\.0° in 0\.033 s and stays there \(limit 2\.0°\); a bridge over \d+ steps turns a key by up to [\d.]+°$/,
    );
  });

  test('the bridge proposed is the shortest of four steps or more that raises no jump, and ends the finding', () => {
    const track = stepped(keyed(MOTION, grid(60), 'LINEAR'), 30, [30, 0, 40]);
    const { remedy, price } = jumps(track)[0];
    expect(remedy!.verb).toBe('bridge');
    expect(remedy!.steps).toBeGreaterThanOrEqual(4);
    const bridged = (steps: number) => verbNamed('bridge').apply(track, { ...remedy!, steps });
    expect(jumps(bridged(remedy!.steps!).track)).toEqual([]);
    expect(price).toBeCloseTo(bridged(remedy!.steps!).largest, 3);
    for (let steps = 4; steps < remedy!.steps!; steps++) expect(jumps(bridged(steps).track)).not.toEqual([]);
  });

  // NEEDS A20.
  test('an unmarked change of 90° within one frame is one finding; as a declared cut it is none, as STEP none', () => {
    const track = stepped(keyed(MOTION, grid(60), 'LINEAR'), 30, [0, 90, 0]);
    expect(surveyTrack(track)).toHaveLength(1);
    const declared = { ...NO_HOUSE_RULES.declared, cuts: [{ clip: '*', track: '*', time: 1 }] };
    expect(surveyTrack(track, { houseRules: { ...NO_HOUSE_RULES, declared } })).toEqual([]);
    expect(surveyTrack(rotationTrack({ ...track, breaks: [29] }))).toEqual([]);
    expect(surveyTrack(rotationTrack({ ...track, interpolation: 'STEP' }))).toEqual([]);
  });

  test('one held pose after another is a note that says so; so is the start of a fast move', () => {
    const held = jumps(hinge((key) => (key < 30 ? 0 : 20)))[0];
    expect(held).toMatchObject({ rule: 'jump.shelf', level: 'note' });
    expect(held.message).toContain('standing still');
    // 20° at once and 8° a frame after: 240 deg/s against 600.
    const start = jumps(hinge((key) => (key < 30 ? 0 : 20 + 8 * (key - 30))));
    for (const finding of start) expect(finding.level).toBe('note');
  });

  test('a step out of standing still into a calm motion is a warning: no fast move starts there', () => {
    const [finding] = jumps(hinge((key) => (key < 30 ? 0 : 60 - 0.2 * (key - 30))));
    expect(finding).toMatchObject({ rule: 'jump.shelf', level: 'warning' });
    expect(finding.message).toContain('standing still');
  });

  test('a hit two frames wide is no shelf', () => {
    expect(jumps(hinge((key) => (key < 30 ? key : key === 30 ? 45 : 60 + (key - 31))))).toEqual([]);
  });

  test('in a declared loop whose seam it opens, seating the rest anew is proposed, the bridge offered beside it', () => {
    const closed = keyed({ spin: [0, 0, 0], swing: [20, 0, 0], hertz: 1, phase: 0 }, grid(61), 'LINEAR');
    const track = stepped(closed, 30, [0, 12, 0]);
    const house = { ...NO_HOUSE_RULES, loops: ['*'] };
    const places = jumps(track, { houseRules: house })[0].occurrences;
    const place = places.find(({ keys }) => keys[0] === 30)!;
    expect(place.remedy!.verb).toBe('re-seat');
    expect(verbNamed('re-seat').needsAllowing).toBe(true);
    expect(place.alternatives!.map((step) => step.verb)).toContain('bridge');
    // The open seam is no jump: it belongs to the seam.
    expect(places).toHaveLength(1);
    const seated = verbNamed('re-seat').apply(track, place.remedy!).track;
    expect(jumps(seated, { houseRules: house })).toEqual([]);
    // No loop: a bridge, whatever the seam.
    const walk = { ...track, times: track.times };
    const clip = { name: 'Wave', index: 0, tracks: [walk, walk], start: 0, end: 2, loop: false, marks: [] };
    expect(jumps(track, { clip })[0].remedy!.verb).toBe('bridge');
  });

  test('in a closed loop a step from the last key but one into the first again is named over the seam', () => {
    const closed = keyed({ spin: [0, 0, 0], swing: [20, 0, 0], hertz: 1, phase: 0 }, grid(61), 'LINEAR');
    const saw = grid(60).reduce((track, _, key) => turned(track, [key], [0, 0.2 * key, 0]), closed);
    const [finding] = jumps(saw, { houseRules: { ...NO_HOUSE_RULES, loops: ['*'] } });
    expect(finding).toMatchObject({ rule: 'jump.shelf', keys: [0], count: 1, span: [59 / 30, 2] });
    expect(finding.value).toBeCloseTo(12, 1);
    expect(finding.message).toContain('from key 59 to key 0, over the seam of the loop, it steps by 12.0°');
    expect(jumps(saw)).toEqual([]);
  });

  test('eyes are spared', () => {
    const track = stepped(keyed(MOTION, grid(60), 'LINEAR'), 30, [0, 0, 6]);
    expect(jumps(track, { houseRules: { ...NO_HOUSE_RULES, roles: { '*': 'eye' } } })).toEqual([]);
  });
});
