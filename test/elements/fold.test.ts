import { ROWS_AT_MOST, foldChoices, foldRows, rowAt } from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';

describe('the fold', () => {
  test('lays rows end to end from the start until the end is covered', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -100, max: 100, noNaN: true }),
        fc.double({ min: 0, max: 1000, noNaN: true }),
        fc.double({ min: 0.5, max: 60, noNaN: true }),
        (start, length, fold) => {
          const rows = foldRows(start, start + length, fold);
          // Minus zero counts as zero.
          expect(rows[0].from).toBe(start + 0);
          // 1e-6 of a row: a key that close after a fold ends the row before.
          expect(rows[rows.length - 1].to).toBeGreaterThanOrEqual(start + length - fold * 2e-6);
          expect(rows[rows.length - 1].from).toBeLessThanOrEqual(start + length);
        },
      ),
    );
  });

  test('gives a clip of exactly three loops three rows, not four', () => {
    expect(foldRows(0, 3.6, 1.2)).toHaveLength(3);
  });

  test('gives one still key one row', () => {
    expect(foldRows(5, 5, 10)).toEqual([{ index: 0, from: 5, to: 15 }]);
  });

  test('makes rows longer rather than more than a page can hold', () => {
    expect(foldRows(0, 86_400, 1).length).toBeLessThanOrEqual(ROWS_AT_MOST + 1);
    expect(foldRows(0, 10, Number.NaN)).toHaveLength(1);
    expect(foldRows(0, 10, -3)).toHaveLength(1);
  });

  test('finds the row of a time, held to the first and last', () => {
    const rows = foldRows(0, 45, 10);
    expect([-1, 0, 9.99, 10, 44, 99].map((time) => rowAt(rows, time))).toEqual([0, 0, 0, 1, 4, 4]);
  });

  test('offers one loop among the usual lengths', () => {
    expect(foldChoices(45, 1.2)).toEqual([1, 1.2, 2, 5, 10, 20, 30]);
  });
});
