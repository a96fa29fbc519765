import { angleBetween, expMap, logMap, logMapLong } from '@slewcurve/core';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';
import { anyDirection, anyQuaternion } from '../../support/any-quaternion.js';

const power = fc.double({ min: -12, max: Math.log10(3.14), noNaN: true });

function apart(a: readonly number[], b: readonly number[]): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
}

test('log of exp is the vector itself, to 1e-15 of its length, from 1e-12 rad to half a turn (B14)', () => {
  fc.assert(
    fc.property(anyDirection, power, (axis, exponent) => {
      const r = axis.map((part) => part * 10 ** exponent);
      // Two sines, an arc tangent, two divisions: 4 eps.
      expect(apart(logMap<number[]>([], expMap([], r)), r)).toBeLessThan(1e-15 * 10 ** exponent);
    }),
    { numRuns: 1000 },
  );
});

test('exp of log is the orientation itself, to 2e-15 rad: twice what the length of a rounded unit quaternion may be off by', () => {
  fc.assert(
    fc.property(anyQuaternion, (q) => {
      expect(angleBetween(expMap([], logMap([], q)), q)).toBeLessThan(2e-15);
      expect(angleBetween(expMap([], logMapLong([], q)), q)).toBeLessThan(2e-15);
    }),
  );
});

test('logMap takes the short way whatever the sign; logMapLong takes the sign as the way', () => {
  fc.assert(
    fc.property(anyQuaternion, (q) => {
      fc.pre(Math.abs(q[3]) > 1e-9 && Math.abs(q[3]) < 1 - 1e-9);
      const minus = q.map((part) => -part);
      const short = logMap<number[]>([], q);
      expect(logMap([], minus)).toEqual(short);
      expect(Math.hypot(...short)).toBeLessThanOrEqual(Math.PI);
      const ways =
        Math.hypot(...logMapLong<number[]>([], q)) + Math.hypot(...logMapLong<number[]>([], minus));
      expect(Math.abs(ways - 2 * Math.PI)).toBeLessThan(4e-15);
    }),
  );
});

test.each([
  ['identity', [0, 0, 0, 1], [0, 0, 0], [0, 0, 0]],
  ['minus identity: nothing, or a full turn about x', [0, 0, 0, -1], [0, 0, 0], [2 * Math.PI, 0, 0]],
  ['no length', [0, 0, 0, 0], [0, 0, 0], [0, 0, 0]],
  ['half a turn, its sign as stored', [0, -1, 0, 0], [0, -Math.PI, 0], [0, -Math.PI, 0]],
  ['not unit', [0, 0, 3, 3], [0, 0, Math.PI / 2], [0, 0, Math.PI / 2]],
])('logs of %s', (_, q, short, long) => {
  for (let k = 0; k < 3; k++) {
    expect(logMap([], q)[k]).toBeCloseTo(short[k], 14);
    expect(logMapLong([], q)[k]).toBeCloseTo(long[k], 14);
  }
});

test('vectors too long to mean a direction give identity, never NaN', () => {
  expect(expMap([], [1e200, 0, 0])).toEqual([0, 0, 0, 1]);
  expect(expMap([], [0, 0, 0])).toEqual([0, 0, 0, 1]);
  expect(Math.hypot(...expMap([], [1e100, 1e100, 0]))).toBeCloseTo(1, 15);
});

test('a turn whose square leaves float64 keeps its vector', () => {
  expect(logMap([], [1e-200, 0, 0, 1])).toEqual([2e-200, 0, 0]);
  expect(expMap([], [2e-200, 0, 0])).toEqual([1e-200, 0, 0, 1]);
});
