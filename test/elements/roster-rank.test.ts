import {
  countWords,
  familiesOf,
  rankRows,
  rowWindow,
  rowWords,
  scrollToRow,
  type RosterRow,
} from '@slewcurve/elements/plot';
import { describe, expect, test } from 'vitest';

const row = (id: string, counts: Partial<RosterRow['counts']>, more: Partial<RosterRow> = {}): RosterRow => ({
  id,
  file: 'knight.glb',
  clip: '1H_Melee_Attack_Chop',
  track: `rig/${id}`,
  seconds: 1.2,
  ink: { density: Float32Array.of(0.3), darkest: 0.3 },
  counts: { error: 0, warning: 0, note: 0, ...counts },
  places: 0,
  rules: [],
  families: {},
  marks: [],
  peak: 2022.3,
  travel: 84.2,
  ...more,
});

describe('the roster', () => {
  test('ranks one error before any number of warnings, and those before notes', () => {
    const rows = [
      row('n', { note: 50 }),
      row('w', { warning: 40 }),
      row('e', { error: 1 }),
      row('c', {}),
      row('e2', { error: 2 }),
    ];
    expect(rankRows(rows, 'wrong').map(({ id }) => id)).toEqual(['e2', 'e', 'w', 'n', 'c']);
    expect(rows[0].id).toBe('n');
  });

  test('ranks clean tracks by their darkest ink, and keeps the order of those that tie', () => {
    const rows = [
      row('a', {}),
      row('b', {}, { ink: { density: Float32Array.of(0.1, 1), darkest: 1 } }),
      row('c', {}),
    ];
    expect(rankRows(rows, 'wrong').map(({ id }) => id)).toEqual(['b', 'a', 'c']);
    expect(rankRows(rows, 'file').map(({ id }) => id)).toEqual(['a', 'b', 'c']);
  });

  test('tells the families that have findings, most first', () => {
    const rows = [row('a', {}, { families: { jump: 1 } }), row('b', {}, { families: { turn: 2, jump: 3 } })];
    expect(familiesOf(rows)).toEqual([
      { family: 'jump', rows: 2 },
      { family: 'turn', rows: 1 },
    ]);
  });

  test('says a row in one sentence', () => {
    expect(rowWords(row('lowerleg.r', { warning: 1 }))).toBe(
      'lowerleg.r in 1H_Melee_Attack_Chop: 1 warning, peak 2,022 deg/s, turns 84.2°',
    );
    expect(rowWords(row('hand', {}))).toContain('nothing found');
    expect(countWords(row('x', { error: 1, note: 2 }, { places: 3 }))).toBe('1 error, 2 notes');
    expect(countWords(row('x', { error: 1, note: 2 }, { places: 14 }))).toBe('1 error, 2 notes at 14 places');
  });

  test('builds the rows on screen alone', () => {
    expect(rowWindow(2000, 15, 15_000, 600, 6)).toEqual({ first: 994, last: 1046 });
    expect(rowWindow(3, 15, 0, 600, 6)).toEqual({ first: 0, last: 3 });
    expect(rowWindow(0, 15, 0, 600)).toEqual({ first: 0, last: 0 });
  });

  test('scrolls as little as needed', () => {
    expect([scrollToRow(0, 10, 50, 100), scrollToRow(20, 10, 50, 100), scrollToRow(7, 10, 50, 100)]).toEqual([
      0, 110, 50,
    ]);
  });
});
