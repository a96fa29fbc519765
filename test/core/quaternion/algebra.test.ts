import { angleBetween, conjugate, dot, multiply, normalise, relative, rotateVector } from '@slewcurve/core';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';
import { anyQuaternion, anyVector } from '../../support/any-quaternion.js';

test('i·j = k: the Hamilton product, the second factor first', () => {
  expect(multiply([], [1, 0, 0, 0], [0, 1, 0, 0])).toEqual([0, 0, 1, 0]);
});

test('the relative turn is the conjugate times the other, its vector part exactly 0 from a thing to itself', () => {
  fc.assert(
    fc.property(anyQuaternion, anyQuaternion, (a, b) => {
      expect(angleBetween(relative([], a, b), multiply([], conjugate([], a), b))).toBeLessThan(1e-15);
      expect(relative<number[]>([], a, a).slice(0, 3)).toEqual([0, 0, 0]);
    }),
  );
});

test('turning a vector keeps its length and undoes with the conjugate', () => {
  fc.assert(
    fc.property(anyQuaternion, anyVector(10), (q, v) => {
      const turned = rotateVector<number[]>([], q, v);
      expect(Math.abs(Math.hypot(...turned) / Math.hypot(...v) - 1)).toBeLessThan(4e-15);
      const back = rotateVector<number[]>([], conjugate([], q), turned);
      for (let k = 0; k < 3; k++) expect(Math.abs(back[k] - v[k])).toBeLessThan(1e-14 * 10);
    }),
  );
});

test('normalise keeps unit numbers to the bit, keeps signs, and gives identity for no length (B28, B29)', () => {
  fc.assert(
    fc.property(anyQuaternion, (q) => {
      expect(normalise([], q)).toEqual([...q]);
    }),
  );
  expect(normalise([], [0, 0, 0, -2])).toEqual([0, 0, 0, -1]);
  expect(normalise([], [0, 0, 0, 0])).toEqual([0, 0, 0, 1]);
  for (const size of [1e-299, 1e-160, 1e160, 1.7e308])
    expect(Math.hypot(...normalise([], [size, -size, size, size]))).toBeCloseTo(1, 14);
});

test('the dot of unit quaternions is the cosine of half the angle between them', () => {
  fc.assert(
    fc.property(anyQuaternion, anyQuaternion, (a, b) => {
      expect(Math.abs(dot(a, b))).toBeCloseTo(Math.cos(angleBetween(a, b) / 2), 14);
    }),
  );
});
