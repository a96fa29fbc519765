import { describe, expect, test } from 'vitest';
import { SlewcurveError } from '@slewcurve/core';
import { NO_HOUSE_RULES, parseHouseRules, surveyTrack } from '@slewcurve/survey';
import { grid, keyed, turned } from '../support/smooth-track.js';

const popped = turned(
  keyed({ spin: [0, 20, 0], swing: [0, 0, 0], hertz: 0.4, phase: 1 }, grid(60), 'LINEAR'),
  [30],
  [0, 0, 1.5],
);
const levels = (json: unknown, file = 'walk.glb') =>
  surveyTrack(popped, { houseRules: parseHouseRules(json), file }).map(({ rule, level, limit }) => [
    rule,
    level,
    limit,
  ]);

function exception(where: object, level: string) {
  return { where, levels: { 'jump.lone-key': level } };
}

describe('house rules', () => {
  test('nothing decreed is the default', () => {
    expect(parseHouseRules({})).toEqual(NO_HOUSE_RULES);
    expect(levels({})).toEqual([['jump.lone-key', 'warning', 1]]);
  });

  test('levels silence or change a rule', () => {
    expect(levels({ levels: { 'jump.lone-key': 'off' } })).toEqual([]);
    expect(levels({ levels: { 'jump.lone-key': 'error' } })).toEqual([['jump.lone-key', 'error', 1]]);
  });

  test('limits go by role, as one number, by name, or off', () => {
    expect(levels({ limits: { prop: { 'jump.lone-key': 2 } } })).toEqual([]);
    expect(levels({ limits: { prop: { 'jump.lone-key': { size: 1.2 } } } })).toEqual([
      ['jump.lone-key', 'warning', 1.2],
    ]);
    expect(levels({ limits: { '*': { 'jump.lone-key': 'off' } } })).toEqual([]);
    expect(levels({ limits: { joint: { 'jump.lone-key': 2 } } })).toEqual([['jump.lone-key', 'warning', 1]]);
    expect(levels({ roles: { 'A*': 'joint' }, limits: { joint: { 'jump.lone-key': 2 } } })).toEqual([]);
  });

  test('exceptions hold where their patterns fit, the later one last', () => {
    expect(levels({ exceptions: [exception({ track: 'Arm' }, 'off')] })).toEqual([]);
    expect(levels({ exceptions: [exception({ file: 'run*' }, 'off')] })).toHaveLength(1);
    expect(levels({ exceptions: [exception({ clip: 'W*' }, 'off'), exception({}, 'note')] })).toEqual([
      ['jump.lone-key', 'note', 1],
    ]);
  });

  test.each([
    [[], 'house-rules.bad-shape', ''],
    [{ level: {} }, 'house-rules.unknown-key', '/level'],
    [{ levels: { 'jump.lone-kye': 'off' } }, 'house-rules.unknown-rule', '/levels/jump.lone-kye'],
    [{ levels: { 'jump.shelf': 'loud' } }, 'house-rules.unknown-level', '/levels/jump.shelf'],
    [{ roles: { '*': 'joints' } }, 'house-rules.unknown-role', '/roles/*'],
    [
      { limits: { prop: { 'jump.shelf': { sise: 2 } } } },
      'house-rules.unknown-limit',
      '/limits/prop/jump.shelf',
    ],
    [{ limits: { prop: { 'jump.shelf': '2' } } }, 'house-rules.bad-shape', '/limits/prop/jump.shelf'],
    [{ limits: { prop: { 'limit.accel': -1 } } }, 'house-rules.bad-shape', '/limits/prop/limit.accel'],
    [{ playback: ['as-writen'] }, 'house-rules.unknown-playback', '/playback/0'],
    [{ declared: { cuts: [{ time: null }] } }, 'house-rules.bad-shape', '/declared/cuts/0/time'],
    [{ declared: { holds: [{ span: [2, 1] }] } }, 'house-rules.bad-shape', '/declared/holds/0/span'],
    [{ declared: { joins: [{ from: 'Walk' }] } }, 'house-rules.bad-shape', '/declared/joins/0/to'],
    [{ declared: { blends: [{ clips: ['Walk'] }] } }, 'house-rules.bad-shape', '/declared/blends/0/clips'],
    [{ declared: { blends: [{ clip: [] }] } }, 'house-rules.unknown-key', '/declared/blends/0/clip'],
    [{ loops: 'Walk' }, 'house-rules.bad-shape', '/loops'],
  ])('%j is refused with %s at %j', (json, code, pointer) => {
    let thrown: unknown;
    try {
      parseHouseRules(json);
    } catch (error) {
      thrown = error;
    }
    expect(thrown).toBeInstanceOf(SlewcurveError);
    expect(thrown).toMatchObject({ code, place: { pointer } });
  });

  test('a misspelt word is answered with the nearest', () => {
    expect(() => parseHouseRules({ levels: { 'jump.lone-kye': 'off' } })).toThrow(
      'Did you mean jump.lone-key?',
    );
  });

  test('a whole file of them comes back typed', () => {
    const json = {
      roles: { '*/eye*': 'eye' },
      limits: { machine: { 'turn.half': { note: 100 } } },
      levels: { 'pace.elbow': 'note' },
      exceptions: [{ where: { clip: 'Walk' }, levels: { 'jump.shelf': 'off' } }],
      loops: ['Walk*'],
      declared: {
        cuts: [{ clip: 'Shots', track: 'Camera', time: 1.5 }],
        holds: [{ clip: 'Shots', track: 'Camera', span: [1, 2] }],
        whips: [],
        spins: [{ clip: '*', track: 'Wheel', rpm: 1200 }],
        marks: [{ clip: 'Shots', time: 4, name: 'door' }],
        joins: [{ from: 'Walk', to: 'Run', track: '*' }],
        blends: [{ clips: ['Walk', 'Run*'], track: 'Hip' }],
      },
      playback: ['as-written', 'raw-chord'],
      leaveOut: ['*.bak.glb'],
    };
    expect(parseHouseRules(json)).toEqual(json);
  });
});
