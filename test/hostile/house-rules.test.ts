import { SlewcurveError } from '@slewcurve/core';
import { RULES, parseHouseRules, surveyTrack } from '@slewcurve/survey';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';
import { grid, keyed, turned } from '../support/smooth-track.js';

const TRACK = turned(
  keyed({ spin: [0, 20, 0], swing: [8, 0, 4], hertz: 0.4, phase: 1 }, grid(24), 'LINEAR'),
  [12],
  [0, 0, 9],
);
const NAMES = [
  'roles', 'limits', 'levels', 'exceptions', 'loops', 'declared', 'playback', 'leaveOut', 'where', 'file', 'clip', 'track',
  'cuts', 'holds', 'whips', 'spins', 'marks', 'joins', 'blends', 'from', 'to', 'clips', 'time', 'span', 'rpm', 'name', 'joint',
  'prop', 'machine', '*', 'off', 'note', 'warning', 'error', '__proto__', 'constructor', '', ...RULES.map(({ id }) => id),
]; // prettier-ignore
const ODD = fc.oneof(
  fc.constantFrom<unknown>(
    null,
    true,
    0,
    -0,
    1e308,
    -1e308,
    5e-324,
    'Wave',
    'Arm',
    '**',
    '[',
    'as-written',
    ...NAMES,
  ),
  fc.double(),
  fc.string({ maxLength: 4 }),
);
const { tree: anything } = fc.letrec<{ tree: unknown }>((tie) => ({
  tree: fc.oneof(
    { depthSize: 'small', withCrossShrink: true },
    ODD,
    fc.array(tie('tree'), { maxLength: 3 }),
    fc.dictionary(fc.constantFrom(...NAMES), tie('tree'), { maxKeys: 4 }),
  ),
}));

/** Objects of the right shape with wild numbers in them, so that most are taken and a survey goes by them. */
const number = fc.oneof(
  fc.constantFrom(0, -1, 1e-300, 1e300, -1e300),
  fc.double({ noNaN: true, noDefaultInfinity: true }),
);
const target = fc.record(
  { clip: fc.constantFrom('*', 'W*', ''), track: fc.constantFrom('*', 'Arm') },
  { requiredKeys: [] },
);
const span = fc.tuple(number, number).map(([a, b]) => [Math.min(a, b), Math.max(a, b)]);
const spans = fc.array(
  fc.tuple(target, span).map(([at, own]) => ({ ...at, span: own })),
  { maxLength: 3 },
);
const rule = fc.constantFrom(...RULES.map(({ id }) => id));
const limits = fc.dictionary(
  fc.constantFrom('*', 'joint', 'prop', 'machine', 'eye', 'camera-screen'),
  fc.dictionary(rule, fc.oneof(number.map(Math.abs), fc.constant('off')), { maxKeys: 12 }),
);
const levels = fc.dictionary(rule, fc.constantFrom('off', 'note', 'warning', 'error'), { maxKeys: 5 });
const likely = fc.record(
  {
    roles: fc.dictionary(
      fc.constantFrom('*', 'Arm'),
      fc.constantFrom('machine', 'eye', 'camera-screen', 'camera-headset'),
    ),
    limits,
    levels,
    exceptions: fc.array(fc.record({ where: target, limits, levels }, { requiredKeys: ['where'] }), {
      maxLength: 2,
    }),
    loops: fc.array(fc.constantFrom('*', 'Wave'), { maxLength: 2 }),
    declared: fc.record(
      {
        cuts: fc.array(
          fc.tuple(target, number).map(([at, time]) => ({ ...at, time })),
          { maxLength: 3 },
        ),
        holds: spans,
        whips: spans,
        spins: fc.array(
          fc.tuple(target, number).map(([at, rpm]) => ({ ...at, rpm })),
          { maxLength: 2 },
        ),
      },
      { requiredKeys: [] },
    ),
  },
  { requiredKeys: [] },
);

/** Whether the rules were taken; whatever a survey by them then finds is a report's. */
function surveysBy(json: unknown): boolean {
  try {
    const houseRules = parseHouseRules(JSON.parse(JSON.stringify(json)));
    for (const finding of surveyTrack(TRACK, { houseRules })) {
      expect(finding.message).not.toMatch(/NaN|Infinity/);
      expect(JSON.parse(JSON.stringify(finding))).toEqual(finding);
    }
    return true;
  } catch (error) {
    if (!(error instanceof SlewcurveError)) throw error;
    if (!error.code.startsWith('house-rules.')) throw error;
    return false;
  }
}

test('1,000 random house-rules files are refused with a code or lead to a report (seed 7)', () => {
  let taken = 0;
  fc.assert(
    fc.property(fc.oneof(anything, likely), (json) => {
      if (surveysBy(json)) taken++;
    }),
    { seed: 7, numRuns: 1000 },
  );
  // Of the half that have the right shape, most: else nothing would be tried.
  expect(taken).toBeGreaterThan(300);
});
