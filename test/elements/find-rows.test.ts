import { PAGE_WORDS, findRows, foundNothing, isOfBody, type RosterRow } from '@slewcurve/elements/plot';
import { wordBook, wordsFor } from '@slewcurve/survey';
import { describe, expect, test } from 'vitest';

const BOOK = [...PAGE_WORDS, ...wordBook()];

const row = (track: string, rules: readonly string[] = []): RosterRow => ({
  id: track,
  file: 'knight.glb',
  clip: '1H_Melee_Attack_Chop',
  track: `Rig/root/${track}`,
  seconds: 1.2,
  ink: { density: Float32Array.of(0.3), darkest: 0.3 },
  counts: { error: 0, warning: rules.length, note: 0 },
  places: rules.length,
  rules,
  families: Object.fromEntries(rules.map((rule) => [rule.slice(0, rule.indexOf('.')), 1])),
  marks: [],
  peak: 2022.3,
  travel: 84.2,
});
const KNIGHT = [
  row('hips'),
  row('hips/upperleg.r', ['turn.sign-flip', 'jump.shelf']),
  row('hips/upperleg.r/lowerleg.r', ['jump.lone-key']),
  row('hips/upperleg.l/lowerleg.l'),
  row('hips/spine/chest/upperarm.r/lowerarm.r/hand.r'),
];
const found = (text: string, family = ''): string[] =>
  findRows(KNIGHT, text, family, BOOK).map(({ track }) => track.slice(track.lastIndexOf('/') + 1));

describe('finding a track', () => {
  test('by every word, in file, clip or track', () => {
    expect(found('chop LOWERLEG')).toEqual(['lowerleg.r', 'lowerleg.l']);
    expect(found('melee-attack hand')).toEqual(['hand.r']);
    // Joined by a hyphen or a line they are one word.
    expect(found('melee_chop')).toEqual([]);
    expect(found('')).toHaveLength(KNIGHT.length);
  });

  test('by the joint of the body that an animator means', () => {
    expect(found('knee')).toEqual(['lowerleg.r', 'lowerleg.l']);
    expect(found('left knee')).toEqual(['lowerleg.l']);
    expect(found('wrist')).toEqual(['hand.r']);
    expect(found('kne')).toEqual(['lowerleg.r', 'lowerleg.l']);
  });

  test.each([
    ['LeftLeg', 'knee', true],
    ['LeftUpLeg', 'knee', false],
    ['LeftUpLeg', 'hip', true],
    ['mixamorig:RightForeArm', 'elbow', true],
    ['r_arm', 'shoulder', true],
    ['tail_02', 'knee', false],
    ['lamp', 'left', false],
  ])('%s is the %s: %s', (joint, word, is) => {
    expect(isOfBody(joint, word)).toBe(is);
  });

  test('by what was found, and by what the trade calls it', () => {
    expect(found('jump')).toEqual(['upperleg.r', 'lowerleg.r']);
    expect(found('pop')).toEqual(['upperleg.r', 'lowerleg.r']);
    // A shelf is called a knee pop too, and yet this one is no knee.
    expect(wordsFor('knee pop', BOOK).map(({ name }) => name)).toContain('jump.shelf');
    expect(found('hemisphere')).toEqual(['upperleg.r']);
    expect(found('knee pop')).toEqual(['lowerleg.r']);
    expect(found('', 'turn')).toEqual(['upperleg.r']);
  });

  test('says what a word leads to where no track answers', () => {
    const leadsOf = (text: string): string[] => foundNothing(text, BOOK).leads.map(({ name }) => name);
    expect(leadsOf('easing')).toContain('ease in/out');
    expect(leadsOf('curve editor')).toEqual(['Chart']);
    expect(foundNothing('tail', BOOK)).toEqual({
      says: 'No track answers to “tail”, neither by name nor by what was found on it. Names are those of the file.',
      leads: [],
    });
    expect(foundNothing('', BOOK).says).toBe('No track has such a finding.');
  });
});

// The project's own table of findability: what people look for must land on something. Without cameras, mixing and layers, for which there is
// no rule or edit yet.
test.each(
  `curve editor, animation curve, keyframe, easing, cubic-bezier, slow in, slow out, retime, time remap, constant speed, speed ramp,
  pause, stepped, loop, cycle, walk cycle, seamless, pop, spike, glitch, outlier, jitter, noise, wobble, vibration, drift, flip, 180, sign,
  hemisphere, shortest path, long way, spinning, gimbal lock, Euler flip, wrap, 360,
  judder, stutter, dropped frames, freeze, duplicate frames, overshoot, stop-and-go, tangents, spline, C1, C2, smooth, filter, denoise, resample, bake, reduce keys, compress, blend,
  left/right, local, world, parent space, rotation order, up axis, degrees, radians, angular velocity, acceleration,
  jerk, total rotation, suppress, waive, ignore, threshold, config, motion path, in-betweens, 3-D view`
    .split(',')
    .map((word) => word.trim()),
)('“%s” leads somewhere', (word) => {
  expect(wordsFor(word, BOOK).map(({ name }) => name)).not.toEqual([]);
});
