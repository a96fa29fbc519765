import { findSegment } from '@slewcurve/core';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';

test('finds the segment that a time lies in, the first before all, the last after', () => {
  const times = fc
    .uniqueArray(fc.integer({ min: -1000, max: 1000 }), { minLength: 2, maxLength: 50 })
    .map((all) => Float64Array.from(all.toSorted((a, b) => a - b)));
  fc.assert(
    fc.property(times, fc.integer({ min: -1100, max: 1100 }), (sorted, t) => {
      const due = Math.min(Math.max(sorted.filter((time) => time <= t).length - 1, 0), sorted.length - 2);
      expect(findSegment(sorted, t)).toBe(due);
    }),
  );
});

test('no times, one time and a time that is not a number give 0 (B21)', () => {
  expect(findSegment([], 3)).toBe(0);
  expect(findSegment([5], 7)).toBe(0);
  expect(findSegment([0, 1, 2], NaN)).toBe(0);
});
