import { buildPyramid, queryPyramid } from '@slewcurve/elements/plot';
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

  test('keeps greatest and least apart when both are given', () => {
    const pyramid = buildPyramid([5, 6, 7, 8, 9], [4, 3, 2, 1, 0]);
    expect(queryPyramid(pyramid, 1, 3)).toEqual({ greatest: 8, least: 1 });
  });

  test('reads what is not finite as 0, and an empty one as 0', () => {
    expect(queryPyramid(buildPyramid([Number.NaN, 2, Number.POSITIVE_INFINITY]), 0, 2).greatest).toBe(2);
    expect(queryPyramid(buildPyramid([]), 0, 5)).toEqual({ greatest: 0, least: 0 });
  });
});
