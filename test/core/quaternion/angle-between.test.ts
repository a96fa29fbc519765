import { angleBetween, expMap, multiply } from '@slewcurve/core';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';
import { anyDirection, anyQuaternion } from '../../support/any-quaternion.js';
import { randomQuaternion, seededRandom } from '../../support/seeded-random.js';

test('angles from 1e-12 rad to half a turn come back to 1e-15 rad, where arc cosines resolve 6e-8', () => {
  fc.assert(
    fc.property(
      anyQuaternion,
      anyDirection,
      fc.double({ min: -12, max: Math.log10(Math.PI), noNaN: true }),
      (a, axis, exponent) => {
        const size = Math.min(Math.PI, 10 ** exponent);
        const b = multiply(
          [],
          a,
          expMap(
            [],
            axis.map((part) => part * size),
          ),
        );
        expect(Math.abs(angleBetween(a, b) - size)).toBeLessThan(2e-15);
      },
    ),
    { numRuns: 1000 },
  );
});

test('200,000 pairs of equal and of opposite quaternions: exactly 0, never NaN (B5)', () => {
  const random = seededRandom(5);
  let wrong = 0;
  for (let i = 0; i < 100_000; i++) {
    const q = randomQuaternion(random);
    if (angleBetween(q, q) !== 0) wrong++;
    if (angleBetween(q, [-q[0], -q[1], -q[2], -q[3]]) !== 0) wrong++;
  }
  expect(wrong).toBe(0);
});

test('lengths do not matter, from 1e-200 to 1e200; no length counts as identity (B28, B29)', () => {
  fc.assert(
    fc.property(anyQuaternion, anyQuaternion, fc.constantFrom(1e-200, 0.5, 2, 1e200), (a, b, size) => {
      const scaled = angleBetween(
        a.map((part) => part * size),
        b,
      );
      expect(Math.abs(scaled - angleBetween(a, b))).toBeLessThan(2e-15);
    }),
  );
  expect(angleBetween([0, 0, 0, 0], [0, 0, 0, 0])).toBe(0);
  expect(angleBetween([0, 0, 0, 0], [1, 0, 0, 0])).toBeCloseTo(Math.PI, 15);
});
