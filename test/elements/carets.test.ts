import {
  caretPath,
  caretsOfRow,
  numberNotes,
  packMargin,
  spansOfRow,
  type MarginNote,
  type NoteLevel,
} from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';

const note = (id: string, level: NoteLevel, ...times: number[]): MarginNote => ({
  id,
  rule: 'jump.lone-key',
  level,
  message: id,
  time: times[0],
  places: times.map((time) => ({ time, span: [time, time], level })),
  count: times.length,
  status: 'open',
});
const row = { index: 0, from: 0, to: 10 };

describe('numbered notes', () => {
  test('are numbered as they are met when reading, the worse first at one time', () => {
    const notes = numberNotes([note('late', 'error', 9), note('mild', 'note', 2), note('bad', 'error', 2)]);
    expect(notes.map(({ number, note: { id } }) => `${number} ${id}`)).toEqual(['1 bad', '2 mild', '3 late']);
  });
});

describe('carets', () => {
  test('stand at their time, in their own row alone', () => {
    const notes = numberNotes([note('a', 'warning', 5, 12)]);
    expect(caretsOfRow(notes, row, 1000).map(({ x }) => x)).toEqual([500]);
    expect(caretsOfRow(notes, { index: 1, from: 10, to: 20 }, 1000).map(({ x }) => x)).toEqual([200]);
  });

  test('of one note that would cover one another are one, with the worst level and how many', () => {
    const [caret, ...others] = caretsOfRow(
      numberNotes([
        {
          ...note('a', 'note', 5, 5.05, 5.1),
          places: [
            { time: 5, span: [5, 5], level: 'note' },
            { time: 5.05, span: [5, 5], level: 'error' },
            { time: 5.1, span: [5, 5], level: 'note' },
          ],
        },
      ]),
      row,
      1000,
    );
    expect(others).toEqual([]);
    expect(caret).toMatchObject({ stands: 3, level: 'error' });
  });

  test('stand for every place of every note exactly once, whatever their number', () => {
    fc.assert(
      fc.property(
        fc.array(fc.array(fc.double({ min: 0, max: 9.999, noNaN: true }), { minLength: 1, maxLength: 40 }), {
          maxLength: 10,
        }),
        (all) => {
          const notes = numberNotes(all.map((times, i) => note(String(i), 'warning', ...times)));
          const stands = caretsOfRow(notes, row, 800).reduce((sum, caret) => sum + caret.stands, 0);
          expect(stands).toBe(all.flat().length);
        },
      ),
    );
  });

  test('of many notes on one spot are one, the worst, with how many others', () => {
    const notes = numberNotes([note('a', 'note', 5), note('b', 'error', 5.01), note('c', 'warning', 5.02)]);
    expect(caretsOfRow(notes, row, 1000)).toMatchObject([
      { note: 'b', level: 'error', others: 2, stands: 3 },
    ]);
  });

  test('have another shape at each level', () => {
    const shapes = (['error', 'warning', 'note'] as const).map((level) => caretPath(level, 0, 0, 9));
    expect(new Set(shapes).size).toBe(3);
    expect(shapes[0].endsWith('Z')).toBe(true);
    expect(shapes[1]).not.toContain('Z');
    expect(shapes[2].match(/M/g)).toHaveLength(5);
  });
});

describe('spans', () => {
  test('go on through every row that they touch', () => {
    const hum = {
      ...note('hum', 'warning', 12),
      places: [{ time: 12, span: [8, 22] as const, level: 'warning' as const }],
    };
    const notes = numberNotes([hum]);
    const rows = [0, 1, 2, 3].map((index) => ({ index, from: index * 10, to: index * 10 + 10 }));
    expect(rows.map((r) => spansOfRow(notes, r, 100).map(({ from, to }) => [from, to]))).toEqual([
      [[80, 100]],
      [[0, 100]],
      [[0, 20]],
      [],
    ]);
  });
});

describe('the margin', () => {
  test('pushes notes down until none covers the next, and leaves the others beside their row', () => {
    expect(
      packMargin(
        [
          { top: 0, height: 200 },
          { top: 100, height: 50 },
          { top: 200, height: 0 },
          { top: 300, height: 40 },
        ],
        6,
      ),
    ).toEqual({ pushes: [0, 106, 0, 0], bottom: 340 });
  });
});
