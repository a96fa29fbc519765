import {
  foldRows,
  rateNames,
  rowSentence,
  sayReading,
  tableLines,
  textTwin,
  trackName,
} from '@slewcurve/elements/plot';
import { describe, expect, test } from 'vitest';
import { chartOf, popped } from '../support/tracks-for-elements.js';

const data = chartOf(popped(), {
  limit: { speed: 120, name: 'house rule' },
  notes: [
    {
      id: 'a',
      rule: 'jump.lone-key',
      level: 'warning',
      message: 'Key 12 stands 5.0° off its neighbours.',
      time: 1.2,
      places: [{ time: 1.2, span: [1.1, 1.3], level: 'warning' }],
      count: 1,
      status: 'open',
    },
  ],
});

describe('the text twin', () => {
  test('says what the picture shows, with units', () => {
    // 150 deg/s from key 11 at 1.1 s to key 12; said to the column of 1/512 of the whole in which it begins.
    expect(textTwin(data)).toEqual([
      'hand in Wave lasts 3 s and has 31 keys. Played as written, it turns 300° in all; its greatest speed is 150 deg/s near 1.10 s. Below 0.01 deg/s nothing is claimed.',
      'The house rule is 120 deg/s; the motion passes it.',
      'There is 1 warning in the margin.',
    ]);
  });

  test('says so where nothing is left', () => {
    expect(textTwin({ ...data, notes: [] }).at(-1)).toBe('Nothing is left to mend here.');
  });

  test('has a sentence a row, with its findings by number', () => {
    const [first, second] = foldRows(0, 3, 1);
    expect(rowSentence(data, first)).toBe(
      '0.0 s to 1.0 s: up to 100 deg/s, turns 100°, odometer 100°, 10 keys, no findings.',
    );
    expect(rowSentence(data, second)).toContain('finding 1.');
  });

  test('has a table whose turns add up to the odometer and whose keys are all there, once', () => {
    const lines = tableLines(data, 1);
    expect(lines.reduce((sum, line) => sum + line.turned, 0)).toBeCloseTo(lines[2].odometer, 9);
    expect(lines.reduce((sum, line) => sum + line.keys, 0)).toBe(31);
  });

  test('reads the cursor', () => {
    expect(sayReading(data.motion.read(0.55), rateNames('camera-screen'))).toBe(
      '0.550 s, 100 deg/s, tilt 0 deg/s, pan 100 deg/s, roll 0 deg/s, odometer 55°',
    );
  });

  test('calls a track by the last part of its path', () => {
    expect([trackName('Hips/Spine/lowerleg.r'), trackName('a~1b'), trackName('')]).toEqual([
      'lowerleg.r',
      'a/b',
      'nameless track',
    ]);
  });
});
