import { angleBetween, expMap, squad } from '@slewcurve/core';
import * as fc from 'fast-check';
import { expect, test } from 'vitest';
import { anyQuaternion } from '../../support/any-quaternion.js';

const DEGREE = Math.PI / 180;

function aboutX(degrees: number): number[] {
  return expMap<number[]>([], [degrees * DEGREE, 0, 0]);
}

test('the ends are the outer points to the bit, whatever the inner ones', () => {
  fc.assert(
    fc.property(anyQuaternion, anyQuaternion, anyQuaternion, anyQuaternion, (a, c, d, b) => {
      expect(squad([], a, c, d, b, 0)).toEqual([...a]);
      expect(angleBetween(squad([], a, c, d, b, 1), b)).toBe(0);
    }),
  );
});

test('about one axis it is the cubic of the angle by Bézier points: 2 outer weights and 2t(1−t) of the inner', () => {
  for (const t of [0.1, 0.25, 0.5, 0.8]) {
    const outer = 0 * (1 - t) + 80 * t;
    const inner = -20 * (1 - t) + 110 * t;
    const due = outer + 2 * t * (1 - t) * (inner - outer);
    const q = squad([], aboutX(0), aboutX(-20), aboutX(110), aboutX(80), t);
    expect(angleBetween(q, aboutX(due))).toBeLessThan(2e-15);
  }
});

test('inner points over half a turn apart are joined as stored: at 91° of to and fro nothing jumps', () => {
  const q = squad([], aboutX(0), aboutX(-91), aboutX(91), aboutX(0), 0.5);
  expect(angleBetween(q, aboutX(0))).toBeLessThan(2e-15);
  const before = squad([], aboutX(0), aboutX(-89), aboutX(89), aboutX(0), 0.3);
  const after = squad([], aboutX(0), aboutX(-91), aboutX(91), aboutX(0), 0.3);
  // 2° more at the inner points moves the curve by no more than 2·2t(1−t)(1−2t) degrees.
  expect(angleBetween(before, after) / DEGREE).toBeLessThan(2);
});
