import { angleBetween, dot, expMap, multiply, normalise, slerp, slerpAsStored } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { anyDirection, anyQuaternion } from '../../support/any-quaternion.js';
import { randomQuaternion, seededRandom } from '../../support/seeded-random.js';

const DEGREE = Math.PI / 180;
const EPS = Number.EPSILON;
const HALF = Math.SQRT1_2;

const fraction = fc.double({ min: 0, max: 1, noNaN: true });
/** Angles from 1e-12 rad to just under half a turn, small ones as likely as large. */
const angle = fc
  .double({ min: -12, max: Math.log10(Math.PI * 0.999), noNaN: true })
  .map((power) => 10 ** power);

/** `a`, and `a` turned by `angle` about `axis`. */
function pair(a: readonly number[], axis: readonly number[], size: number): [number[], number[]] {
  const turn = expMap<number[]>(
    [],
    axis.map((part) => part * size),
  );
  return [[...a], normalise<number[]>([], multiply([], a, turn))];
}

const pairs = fc.tuple(anyQuaternion, anyDirection, angle).map(([a, axis, size]) => pair(a, axis, size));

function flipped(q: number[], flip: boolean): number[] {
  return flip ? q.map((part) => -part) : q;
}

function lengthOf(q: readonly number[]): number {
  return Math.hypot(...q);
}

describe('slerp, the ends', () => {
  test('t = 0 gives the first to the bit, t = 1 the second to the bit but for its sign, which is that of the side of the first (B11)', () => {
    fc.assert(
      fc.property(anyQuaternion, anyQuaternion, (a, b) => {
        const side = dot(a, b) < 0 ? -1 : 1;
        expect(slerp([], a, b, 0)).toEqual([...a]);
        const end = slerp<number[]>([], a, b, 1);
        for (let k = 0; k < 4; k++) expect(end[k]).toBe(side * b[k]);
      }),
    );
  });

  test('equal inputs return the input at every t (B6)', () => {
    fc.assert(
      fc.property(anyQuaternion, fc.double({ min: -5, max: 5, noNaN: true }), (q, t) => {
        expect(slerp([], q, q, t)).toEqual([...q]);
      }),
    );
  });
});

describe('slerp, signs', () => {
  test('a small-angle pair with a flipped sign has its midpoint between the two (B1)', () => {
    fc.assert(
      fc.property(
        anyQuaternion,
        anyDirection,
        fc.double({ min: 1e-9, max: 0.01, noNaN: true }),
        (a, axis, size) => {
          const [from, to] = pair(a, axis, size);
          const middle = slerp<number[]>(
            [],
            from,
            to.map((part) => -part),
            0.5,
          );
          // Rounding of two unit quaternions: 1e-15 rad.
          expect(Math.abs(angleBetween(from, middle) - size / 2)).toBeLessThan(1e-15);
          expect(Math.abs(angleBetween(middle, to) - size / 2)).toBeLessThan(1e-15);
        },
      ),
    );
  });

  test('the result lies on the side of the first input (B2)', () => {
    fc.assert(
      fc.property(pairs, fraction, ([a, b], t) => {
        expect(dot(slerp([], a, b, t), a)).toBeGreaterThan(0);
      }),
    );
  });

  test('random signs leave the path unchanged (B3)', () => {
    fc.assert(
      fc.property(pairs, fraction, fc.boolean(), fc.boolean(), ([a, b], t, flipA, flipB) => {
        expect(angleBetween(slerp([], a, b, t), slerp([], flipped(a, flipA), flipped(b, flipB), t))).toBe(0);
      }),
    );
  });

  test('slerpAsStored keeps the way that the signs tell: the long way where they are opposed (B18)', () => {
    fc.assert(
      fc.property(pairs, ([a, b]) => {
        const long = b.map((part) => -part);
        const short = angleBetween(a, b);
        const third = angleBetween(a, slerpAsStored([], a, long, 1 / 3));
        expect(Math.abs(third - (2 * Math.PI - short) / 3)).toBeLessThan(2e-15);
        expect(angleBetween(slerpAsStored([], a, b, 0.4), slerp([], a, b, 0.4))).toBeLessThan(1e-15);
      }),
    );
  });

  test('an exact sign change played as stored is a full turn about the own x axis', () => {
    fc.assert(
      fc.property(anyQuaternion, (a) => {
        const back = a.map((part) => -part);
        const quarter = slerpAsStored([], a, back, 0.25);
        const due = multiply([], a, [HALF, 0, 0, HALF]);
        expect(angleBetween(quarter, due)).toBeLessThan(1e-15);
        expect(slerpAsStored([], a, back, 1)).toEqual(back);
      }),
    );
  });
});

describe('slerp, the way between', () => {
  test('the angle turned is t times the whole, from 1e-12 rad to half a turn: no threshold shows (B8, B10)', () => {
    fc.assert(
      fc.property(pairs, fraction, ([a, b], t) => {
        const whole = angleBetween(a, b);
        // Two roundings of unit quaternions: an absolute error, whatever the span.
        expect(Math.abs(angleBetween(a, slerp([], a, b, t)) - t * whole)).toBeLessThan(2e-15);
      }),
    );
  });

  test('the angle is smooth across every span: its share at t = 0.3 stays 0.3 to rounding in a sweep of spans', () => {
    for (let power = -11; power < 0.49; power += 0.01) {
      const size = 10 ** power;
      const [a, b] = pair(
        [0.1, -0.7, 0.3, 0.64].map((part) => part / Math.hypot(0.1, 0.7, 0.3, 0.64)),
        [0, 0.6, 0.8],
        size,
      );
      const share = angleBetween(a, slerp([], a, b, 0.3)) / angleBetween(a, b);
      expect(Math.abs(share - 0.3)).toBeLessThan(1e-15 + 1e-15 / size);
    }
  });

  test('steps of 0.01° to 20° carried on to 90° arrive within 1e-9° (A27)', () => {
    for (const step of [0.01, 0.1, 0.5, 1, 3.6, 10, 20]) {
      const [a, b] = pair([0, 0, 0, 1], [0.6, 0, 0.8], step * DEGREE);
      const due = expMap([], [0.6 * 90 * DEGREE, 0, 0.8 * 90 * DEGREE]);
      expect(angleBetween(slerp([], a, b, 90 / step), due) / DEGREE).toBeLessThan(1e-9);
    }
  });

  test('any finite t gives a unit quaternion, to the ends of float64', () => {
    for (const t of [-Number.MAX_VALUE, -1e17, -3, 1e17, 1e300, Number.MAX_VALUE])
      expect(Math.abs(lengthOf(slerp([], [0.6, 0, 0, 0.8], [0, 0.6, 0, 0.8], t)) - 1)).toBeLessThan(4 * EPS);
  });

  test('played from the other end it is the same path', () => {
    fc.assert(
      fc.property(pairs, fraction, ([a, b], t) => {
        expect(angleBetween(slerp([], a, b, t), slerp([], b, a, 1 - t))).toBeLessThan(2e-15);
      }),
    );
  });
});

describe('slerp, half a turn apart', () => {
  test('the turn goes about the axis of a⁻¹b as stored, and reverses with the sign of either end (B12)', () => {
    const a = [0, 0, 0, 1];
    const b = [0, 0, 1, 0];
    expect(angleBetween(slerp([], a, b, 0.5), [0, 0, HALF, HALF])).toBeLessThan(1e-15);
    expect(angleBetween(slerp([], a, [0, 0, -1, 0], 0.5), [0, 0, -HALF, HALF])).toBeLessThan(1e-15);
    expect(slerp([], a, b, 1)).toEqual(b);
  });

  test('from just below half a turn the way is the short one, to 1.2e-15 rad', () => {
    for (const below of [1e-3, 1e-6, 1e-9, 1e-12]) {
      const [a, b] = pair([0.5, 0.5, -0.5, 0.5], [0, 1, 0], Math.PI - below);
      const due = multiply([], a, expMap([], [0, (Math.PI - below) / 4, 0]));
      expect(angleBetween(slerp([], a, b, 0.25), due)).toBeLessThan(1.2e-15);
    }
  });
});

describe('slerp, odd inputs', () => {
  test('inputs of any length give the unit result of their orientations (B28)', () => {
    fc.assert(
      fc.property(pairs, fraction, fc.constantFrom(1e-200, 1e-6, 0.5, 2, 1e6, 1e200), ([a, b], t, size) => {
        const scaled = slerp<number[]>(
          [],
          a.map((part) => part * size),
          b.map((part) => part * size),
          t,
        );
        expect(Math.abs(lengthOf(scaled) - 1)).toBeLessThan(4 * EPS);
        expect(angleBetween(scaled, slerp([], a, b, t))).toBeLessThan(4e-15);
      }),
    );
  });

  test('a quaternion of no length counts as identity, and never gives NaN (B29)', () => {
    const zero = [0, 0, 0, 0];
    expect(slerp([], zero, zero, 0.5)).toEqual([0, 0, 0, 1]);
    expect(slerp([], zero, [0, 0, 1, 0], 1)).toEqual([0, 0, 1, 0]);
    expect(angleBetween(slerp([], zero, [0, 0, 1, 0], 0.5), [0, 0, HALF, HALF])).toBeLessThan(1e-15);
  });
});

test.each([
  ['float64', 1, 4 * EPS],
  // A float32 answer is rounded once more: half of 2^-23 on each of four numbers.
  ['float32', 2, 2 ** -23],
] as const)(
  '60,000 in-betweens in %s from 1e-12 rad to half a turn: finite, unit, at rising angle (A12, B5, B9, B15, B23)',
  (store, seed, tolerance) => {
    const random = seededRandom(seed);
    const out = store === 'float64' ? new Float64Array(4) : new Float32Array(4);
    let worstLength = 0;
    let falls = 0;
    for (let i = 0; i < 20_000; i++) {
      const a = randomQuaternion(random);
      const size = 10 ** (-12 + random() * (12 + Math.log10(Math.PI)));
      const [from, to] = pair(a, [0.48, 0.6, 0.64], size);
      let before = -1e-15;
      for (const t of [random() / 3, 1 / 3 + random() / 3, 2 / 3 + random() / 3]) {
        slerp(out, from, to, t);
        worstLength = Math.max(worstLength, Math.abs(Math.hypot(...out) - 1));
        const turned = angleBetween(from, out);
        if (!(turned >= before - (store === 'float64' ? 2e-15 : 2.5e-7))) falls++;
        before = turned;
      }
    }
    expect(worstLength).toBeLessThanOrEqual(tolerance);
    expect(falls).toBe(0);
  },
);
