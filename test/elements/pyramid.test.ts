import { buildPyramid, columnMaxima, queryPyramid } from '@slewcurve/elements/plot';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';

const speeds = fc.array(fc.float({ min: 0, max: 1e6, noNaN: true }), { minLength: 1, maxLength: 700 });

describe('the min/max pyramid', () => {
  test('answers any stretch as a plain scan does, exactly', () => {
    fc.assert(
      fc.property(speeds, fc.nat(), fc.nat(), (values, a, b) => {
        const low = Math.min(a, b) % values.length;
        const high = Math.max(low, Math.max(a, b) % values.length);
        const scanned = values.slice(low, high + 1);
        expect(queryPyramid(buildPyramid(values), low, high)).toEqual({
          greatest: Math.max(...scanned),
          least: Math.min(...scanned),
        });
      }),
    );
  });

  test('loses no one-sample spike, at any width and any window that holds it', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 5000 }),
        fc.nat(),
        fc.integer({ min: 1, max: 400 }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (length, where, width, before, after) => {
          const spike = where % length;
          const values = new Float32Array(length).fill(1);
          values[spike] = 1000;
          const from = before * spike;
          const to = spike + 1 + after * (length - spike - 1);
          const columns = columnMaxima(buildPyramid(values), from, to, new Float32Array(width));
          expect(Math.max(...columns)).toBe(1000);
        },
      ),
    );
  });

  test('draws the spike in the column where it stands', () => {
    const values = new Float32Array(1000);
    values[250] = 7;
    const columns = columnMaxima(buildPyramid(values), 0, 1000, new Float32Array(100));
    expect(columns[25]).toBe(7);
    // The border of columns 24 and 25 lies in its bin, so both have it and the line stays joined.
    expect([...columns].filter((value) => value > 0)).toHaveLength(2);
  });

  test('keeps greatest and least apart when both are given', () => {
    const pyramid = buildPyramid([5, 6, 7, 8, 9], [4, 3, 2, 1, 0]);
    expect(queryPyramid(pyramid, 1, 3)).toEqual({ greatest: 8, least: 1 });
  });

  test('reads what is not finite as 0, and an empty one as 0', () => {
    expect(queryPyramid(buildPyramid([Number.NaN, 2, Number.POSITIVE_INFINITY]), 0, 2).greatest).toBe(2);
    expect(queryPyramid(buildPyramid([]), 0, 5)).toEqual({ greatest: 0, least: 0 });
  });
});
