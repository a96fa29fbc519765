import { angleBetween, expMap, fromAxisAngle, logMap, toAxisAngle } from '@slewcurve/core';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';
import { anyDirection, anyQuaternion } from '../../support/any-quaternion.js';

test('axis and angle come back down to 1e-12 rad, to 4 roundings', () => {
  fc.assert(
    fc.property(
      anyDirection,
      fc.double({ min: -12, max: Math.log10(Math.PI - 1e-9), noNaN: true }),
      (axis, exponent) => {
        const angle = 10 ** exponent;
        const back = [0, 0, 0];
        const found = toAxisAngle(back, fromAxisAngle([], axis, angle));
        expect(Math.abs(found / angle - 1)).toBeLessThan(4 * Number.EPSILON);
        for (let n = 0; n < 3; n++) expect(Math.abs(back[n] - axis[n])).toBeLessThan(4 * Number.EPSILON);
      },
    ),
    { seed: 4 },
  );
});

test('q and -q have one axis and one angle, of 0 to 180°, and a longer q the same', () => {
  fc.assert(
    fc.property(anyQuaternion, (q) => {
      const [axis, other, longer] = [
        [0, 0, 0],
        [0, 0, 0],
        [0, 0, 0],
      ];
      const angle = toAxisAngle(axis, q);
      expect(angle).toBeGreaterThanOrEqual(0);
      expect(angle).toBeLessThanOrEqual(Math.PI);
      expect(
        toAxisAngle(
          longer,
          q.map((part) => 7 * part),
        ),
      ).toBeCloseTo(angle, 14);
      if (q[3] === 0) return;
      expect(
        toAxisAngle(
          other,
          q.map((part) => -part),
        ),
      ).toBe(angle);
      expect(other.map((part) => part + 0)).toEqual(axis.map((part) => part + 0));
    }),
    { seed: 5 },
  );
});

test('axis times angle is the rotation vector', () => {
  fc.assert(
    fc.property(anyQuaternion, (q) => {
      const axis = [0, 0, 0];
      const angle = toAxisAngle(axis, q);
      const vector = logMap([0, 0, 0], q);
      for (let n = 0; n < 3; n++) expect(Math.abs(vector[n] - axis[n] * angle)).toBeLessThan(2e-15);
      expect(angleBetween(expMap([], vector), fromAxisAngle([], axis, angle))).toBeLessThan(2e-15);
    }),
    { seed: 6 },
  );
});

test('no turn has the axis x, an axis of no length makes no turn, and the length of an axis is nothing', () => {
  const axis = [0, 0, 0];
  expect(toAxisAngle(axis, [0, 0, 0, 1])).toBe(0);
  expect(axis).toEqual([1, 0, 0]);
  expect(fromAxisAngle([], [0, 0, 0], 2)).toEqual([0, 0, 0, 1]);
  expect(angleBetween(fromAxisAngle([], [0, 30, 0], 1), fromAxisAngle([], [0, 1, 0], 1))).toBe(0);
  // cos 45° and sin 45° by the machine: one rounding apart.
  expect(angleBetween(fromAxisAngle([], [0, 0, 1], Math.PI / 2), [0, 0, 1, 1])).toBeLessThan(3e-16);
});
