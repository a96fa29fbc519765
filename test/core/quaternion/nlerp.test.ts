import { angleBetween, dot, nlerp, slerp } from '@slewcurve/core';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';
import { anyQuaternion } from '../../support/any-quaternion.js';

const fraction = fc.double({ min: 0, max: 1, noNaN: true });
const DEGREE = Math.PI / 180;

test('the result is unit across a sign change too: there is no plain lerp of quaternions (B4, B15)', () => {
  fc.assert(
    fc.property(anyQuaternion, anyQuaternion, fc.double({ min: -3, max: 4, noNaN: true }), (a, b, t) => {
      const q = nlerp<number[]>([], a, b, t);
      expect(Math.abs(Math.hypot(...q) - 1)).toBeLessThan(4 * Number.EPSILON);
    }),
  );
});

test('random signs leave the path unchanged, and the result lies on the side of the first (B2, B3)', () => {
  fc.assert(
    fc.property(anyQuaternion, anyQuaternion, fraction, (a, b, t) => {
      fc.pre(Math.abs(dot(a, b)) > 1e-12);
      const q = nlerp([], a, b, t);
      const minusB = b.map((part) => -part);
      expect(angleBetween(q, nlerp([], a, minusB, t))).toBe(0);
      expect(dot(q, a)).toBeGreaterThan(0);
    }),
  );
});

test('the ends are exact to the bit, the second on the side of the first (B11)', () => {
  fc.assert(
    fc.property(anyQuaternion, anyQuaternion, (a, b) => {
      const side = dot(a, b) < 0 ? -1 : 1;
      const [from, to] = [nlerp<number[]>([], a, b, 0), nlerp<number[]>([], a, b, 1)];
      for (let k = 0; k < 4; k++) {
        expect(from[k] + 0).toBe(a[k] + 0);
        expect(to[k] + 0).toBe(side * b[k] + 0);
      }
    }),
  );
});

test('it strays from the great arc by as much as the published closed form says: 0.267° at a span of 60°, 8.15° at 180°', () => {
  // Spans and deviations: closed form of the chord, evaluated in 50-digit arithmetic.
  for (const [span, due] of [
    [10, 0.00122],
    [60, 0.267],
    [90, 0.919],
    [180, 8.15],
  ]) {
    const b = [Math.sin((span * DEGREE) / 2), 0, 0, Math.cos((span * DEGREE) / 2)];
    let worst = 0;
    for (let t = 0; t <= 1; t += 0.001)
      worst = Math.max(
        worst,
        angleBetween(nlerp([], [0, 0, 0, 1], b, t), slerp([], [0, 0, 0, 1], b, t)) / DEGREE,
      );
    expect(worst / due).toBeCloseTo(1, 2);
  }
});

test('a quaternion of no length counts as identity; any length gives a unit result (B28, B29)', () => {
  expect(nlerp([], [0, 0, 0, 0], [0, 0, 0, 0], 0.5)).toEqual([0, 0, 0, 1]);
  for (const t of [-Number.MAX_VALUE, 1e200, Number.MAX_VALUE])
    expect(Math.hypot(...nlerp([], [2e200, 0, 0, 0], [0, 3e-200, 0, 0], t))).toBeCloseTo(1, 15);
});
