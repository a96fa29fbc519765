import {
  angleBetween,
  cumulativeBezier,
  cumulativeBSpline,
  cumulativeHermite,
  fromAxisAngle,
  multiply,
  nestedBezier,
  SlewcurveError,
  type Curve,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { differenceFromSlopes } from '../../support/against-samples.js';
import { anyQuaternion } from '../../support/any-quaternion.js';
import { anyTrack, keyOf } from '../../support/any-track.js';

/** Four controls or more, up to 1.2 rad apart, on one side of each other. */
const controls = anyTrack(1.2)
  .filter((track) => track.times.length >= 4)
  .map((track) => {
    const list = Array.from(track.times.keys(), (key) => keyOf(track, key));
    for (let n = 1; n < list.length; n++)
      if (list[n].reduce((sum, part, k) => sum + part * list[n - 1][k], 0) < 0)
        list[n] = list[n].map((part) => -part);
    return list;
  });

/** Largest angle between two curves over 20 times, `other` asked at `map(t)`. */
function apart(
  curve: Curve,
  other: Curve,
  map: (t: number) => number,
  left: readonly number[],
  right: readonly number[],
): number {
  return Math.max(
    ...Array.from({ length: 21 }, (_, n) => {
      const t = curve.start + (n / 20) * (curve.end - curve.start);
      const q = multiply<number[]>(
        [],
        left,
        multiply<number[]>([], other.orientation<number[]>([], map(t)), right),
      );
      return angleBetween(curve.orientation<number[]>([], t), q);
    }),
  );
}
const UNIT = [0, 0, 0, 1];
const same = (t: number): number => t;

describe.each([
  ['a Bezier curve by nested slerps', nestedBezier, true],
  ['a cumulative Bezier curve', cumulativeBezier, false],
  ['a cumulative B-spline', cumulativeBSpline, false],
] as const)('%s', (_, make, reverses) => {
  test('has the rates and accelerations of its own orientations, over any duration', () => {
    fc.assert(
      fc.property(controls, fc.double({ min: 0.1, max: 0.9, noNaN: true }), (list, u) => {
        const curve = make(list, 2.5, 7);
        const t = 7 + u * 2.5;
        for (const frame of ['own', 'parent'] as const)
          expect(differenceFromSlopes(curve, t, 2e-3, frame)).toBeLessThan(1e-6);
      }),
      { seed: 41, numRuns: 40 },
    );
  });

  test('moves along with all its controls, in parent and in own axes', () => {
    fc.assert(
      fc.property(controls, anyQuaternion, (list, q) => {
        const curve = make(list);
        const left = make(list.map((control) => multiply<number[]>([], q, control)));
        const right = make(list.map((control) => multiply<number[]>([], control, q)));
        expect(apart(left, curve, same, q, UNIT)).toBeLessThan(1e-12);
        expect(apart(right, curve, same, UNIT, q)).toBeLessThan(1e-12);
      }),
      { seed: 42, numRuns: 30 },
    );
  });

  test(`played backwards is ${reverses ? 'the same curve' : 'another curve'}`, () => {
    let worst = 0;
    fc.assert(
      fc.property(controls, (list) => {
        const curve = make(list);
        const back = make(list.map((_control, n) => list[list.length - 1 - n]));
        worst = Math.max(
          worst,
          apart(curve, back, (t) => curve.end - t, UNIT, UNIT),
        );
      }),
      { seed: 43, numRuns: 30 },
    );
    expect(worst < 1e-12).toBe(reverses);
  });

  test('refuses too few controls and what is no orientation, by name', () => {
    expect(() => make([UNIT])).toThrow(expect.objectContaining({ code: 'curve.too-few-controls' }));
    expect(() => make([UNIT, UNIT, [0, 0, 0, 0], UNIT])).toThrow(
      expect.objectContaining({ code: 'curve.bad-control' }),
    );
    expect(() => make([UNIT, UNIT, [0, NaN, 0, 1], UNIT])).toThrow(SlewcurveError);
  });
});

test.each([nestedBezier, cumulativeBezier])(
  'a Bezier curve meets its ends and leaves them along its legs, n legs a duration',
  (make) => {
    const list = [0, 0.3, 0.9, 1, 1.5].map((angle, n) => fromAxisAngle<number[]>([], [n, 1, 1], angle));
    const curve = make(list, 2);
    expect(angleBetween(curve.orientation<number[]>([], 0), list[0])).toBeLessThan(1e-15);
    expect(angleBetween(curve.orientation<number[]>([], 2), list[4])).toBeLessThan(1e-15);
    // Four legs in 2 s: twice the first leg's angle, twice the last one's.
    expect(curve.peak(0, 0).rate).toBeCloseTo(2 * angleBetween(list[0], list[1]), 12);
    expect(Math.hypot(...curve.rate([0, 0, 0], 2, 'own'))).toBeCloseTo(
      2 * angleBetween(list[3], list[4]),
      12,
    );
  },
);

test('curves of one piece say that acceleration is continuous: 2, the most that a curve claims', () => {
  const turns = [0, 0.4, 0.9, 1.1].map((angle) => fromAxisAngle<number[]>([], [1, 2, -2], angle));
  expect(cumulativeHermite(turns[0], turns[1], [1, 0, 0], [0, 1, 0], 2).continuity).toBe(2);
  for (const make of [cumulativeBezier, nestedBezier]) expect(make(turns, 2).continuity).toBe(2);
});
