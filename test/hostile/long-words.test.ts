// One letter or space 200,000 times over, wherever text is searched: each costs what its length does. Where a search takes its square, as
// careless patterns do, each of these takes minutes.
import { expect, test } from 'vitest';
import { readTime, SlewcurveError } from '@slewcurve/core';
import { bufferSource, openAnimation, type AnimationFile } from '@slewcurve/formats';
import { parseJobCard, parseSentence } from '@slewcurve/mend';
import { parseHouseRules } from '@slewcurve/survey';
import { BOOM } from '../support/bvh-text.js';

const MANY = 200_000;
const spaces = ' '.repeat(MANY);
const digits = '1'.repeat(MANY);
const letters = 'x'.repeat(MANY);

async function open(text: string, name: string): Promise<AnimationFile> {
  return openAnimation(bufferSource(new TextEncoder().encode(text)), { name });
}

const HEAD = 't,qx,qy,qz,qw\n0,0,0,0,1\n';
const CASES: readonly (readonly [string, () => unknown])[] = [
  ['spaces in a comment', () => open(`# timestamp${spaces}x\n0 1\n1 2\n`, 'x.txt')],
  ['spaces in a column name', () => open(`t,a${spaces}b,qx,qy,qz,qw\n0,1,0,0,0,1\n`, 'x.csv')],
  ['digits of a stamp', () => open(`${HEAD}${digits}x,0,0,0,1\n`, 'x.csv')],
  ['digits of a number', () => open(`${HEAD}0,${digits}x,0,0,1\n`, 'x.csv')],
  ['digits in the first row', () => open(`t,qx,qy,qz,qw\n0,0,0,0,${digits}x\n`, 'x.csv')],
  ['quotes', () => open(`${HEAD}0,0,0,0,${'"'.repeat(MANY)}1\n`, 'x.csv')],
  ['separators', () => open(`${HEAD}${','.repeat(MANY)}\n0,0,0,0,1\n`, 'x.csv')],
  [
    'spaces before a frame count',
    () => open(BOOM.replace('Frames: 3', `Frames:${spaces}3${spaces}x`), 'x.bvh'),
  ],
  ['digits of a Frame Time', () => open(BOOM.replace('0.04', `${digits}x`), 'x.bvh')],
  ['digits of an angle', () => open(BOOM.replace('12.000', `${digits}x`), 'x.bvh')],
  ['spaces in a joint name', () => open(BOOM.replace('Long Boom', `Long${spaces}Boom`), 'x.bvh')],
  ['digits of a time', () => readTime(`${digits}x`, 24)],
  ['spaces of a time', () => readTime(`frame ${spaces}x`, 24)],
  ['keys of a sentence', () => parseSentence(`Lift out keys ${'9, '.repeat(MANY / 4)}of Arm`)],
  ['spaces of a sentence', () => parseSentence(`Lift out key 9 of ${spaces}x in ${spaces}`)],
  ['a verb', () => parseJobCard({ schemaVersion: 1, steps: [{ verb: letters, clip: '*', track: '*' }] })],
  ['a key of the house rules', () => parseHouseRules({ [letters]: 1 })],
  ['a rule of the house rules', () => parseHouseRules({ levels: { [letters]: 'off' } })],
  ['a word for a role', () => parseHouseRules({ roles: { '*': letters } })],
];

test.each(CASES)('%s', async (_, run) => {
  const { user } = process.cpuUsage();
  try {
    await run();
  } catch (error) {
    if (!(error instanceof SlewcurveError)) throw error;
  }
  expect((process.cpuUsage().user - user) / 1e6).toBeLessThan(2);
});
