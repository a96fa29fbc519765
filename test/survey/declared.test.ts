import { describe, expect, test } from 'vitest';
import type { RotationTrack } from '@slewcurve/core';
import { NO_HOUSE_RULES, surveyTrack, type Declared, type HouseRules } from '@slewcurve/survey';
import { turningTrack } from '../support/turning-track.js';

const EVERYWHERE = { clip: '*', track: '*' };

function declaring(declared: Partial<Declared>, role: HouseRules['roles'][string] = 'joint'): HouseRules {
  return {
    ...NO_HOUSE_RULES,
    roles: { '*': role },
    declared: { ...NO_HOUSE_RULES.declared, ...declared },
  };
}

const rules = (track: RotationTrack, houseRules: HouseRules): string[] =>
  surveyTrack(track, { houseRules }).map(({ rule }) => rule);
const jumps = (track: RotationTrack, houseRules: HouseRules): string[] =>
  rules(track, houseRules).filter((rule) => rule.startsWith('jump.'));

/** A turn of 30 deg/s at 30 keys a second that goes 120° further within the frame into key 40. */
const whipped = turningTrack((key) => key + (key >= 40 ? 120 : 0), 80);
/** The same, and back within the frame into key 50. */
const whippedBack = turningTrack((key) => key + (key >= 40 && key < 50 ? 120 : 0), 80);
/** One frame alone, out and back. */
const flicked = turningTrack((key) => key + (key === 40 ? 120 : 0), 80);

describe('what is declared', () => {
  test.each([
    ['120° in one frame out of and back into motion', whipped],
    ['120° out and 120° back a third of a second later', whippedBack],
    ['120° out and back within two frames', flicked],
  ])('%s raises a jump; declared a whip, none, in any role', (_, track) => {
    for (const role of ['joint', 'prop', 'camera-screen', 'camera-headset', 'machine'] as const) {
      expect(jumps(track, declaring({}, role)).length, role).toBeGreaterThan(0);
      const whips = [{ ...EVERYWHERE, span: [39 / 30, 50 / 30] as const }];
      expect(jumps(track, declaring({ whips }, role)), role).toEqual([]);
    }
  });

  test('a whip declared elsewhere excuses nothing here', () => {
    const whips = [{ ...EVERYWHERE, span: [0, 1] as const }];
    expect(jumps(whipped, declaring({ whips }))).toEqual(['jump.shelf']);
    const others = [{ clip: 'Run', track: '*', span: [0, 3] as const }];
    expect(jumps(whipped, declaring({ whips: others }))).toEqual(['jump.shelf']);
  });

  test('declared a cut, neither jumps nor wide steps nor reversals are found at it', () => {
    const cuts = [40, 50].map((key) => ({ ...EVERYWHERE, time: key / 30 }));
    for (const role of ['joint', 'prop', 'camera-screen', 'camera-headset'] as const)
      expect(
        rules(whippedBack, declaring({ cuts }, role)).filter((rule) =>
          /^(?:jump|turn|pace\.(?!hard-stop))/.test(rule),
        ),
      ).toEqual([]);
  });

  test('a sparse corner is excused by a whip around it or a mark on it, where its rule says so', () => {
    const corner = turningTrack((key) => (key < 3 ? 100 * key : 300 - 20 * (key - 3)), 8, 1);
    const whips = [{ ...EVERYWHERE, span: [0, 7] as const }];
    const camera = (declared: Partial<Declared>): string[] =>
      rules(corner, declaring(declared, 'camera-screen')).filter((rule) => rule === 'pace.hard-stop');
    expect(camera({})).toEqual(['pace.hard-stop']);
    expect(camera({ whips })).toEqual([]);
    const marks = [0, 7].map((time) => ({ clip: '*', time, name: 'hit' }));
    expect(camera({ marks })).toEqual([]);
  });

  test('a declared spin is no creep, and its whole turns are no angle faults', () => {
    const slow = turningTrack((key) => key / 30, 180);
    expect(rules(slow, declaring({}, 'prop'))).toEqual(['shake.creep']);
    const spins = [{ ...EVERYWHERE, rpm: 1 / 6 }];
    expect(rules(slow, declaring({ spins }, 'prop'))).toEqual([]);
  });

  test('a slow drift in a declared hold is a warning, elsewhere a note', () => {
    const slow = turningTrack((key) => key / 30, 180);
    const level = (declared: Partial<Declared>): string | undefined =>
      surveyTrack(slow, { houseRules: declaring(declared, 'prop') }).find(
        ({ rule }) => rule === 'shake.creep',
      )?.level;
    expect(level({})).toBe('note');
    expect(level({ holds: [{ ...EVERYWHERE, span: [0, 6] }] })).toBe('warning');
  });
});
