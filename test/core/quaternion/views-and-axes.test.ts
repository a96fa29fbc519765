import {
  angleBetween,
  axisChange,
  canonical,
  changeAxes,
  changeAxesOfRate,
  changeBasis,
  conjugate,
  dot,
  fromAxisAngle,
  lookAlong,
  lookAlongPath,
  lookAt,
  lookLeastTwist,
  matrixOrientation,
  mean,
  mirror,
  multiply,
  rotateVector,
  slerpTurns,
  splitMatrix,
  swing,
  toMat3,
  turnAboutOwn,
  turnAboutParent,
  turnAboutWorld,
  turnBetween,
  twist,
  twistAngle,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { anyDirection, anyQuaternion } from '../../support/any-quaternion.js';

const DEGREES = 180 / Math.PI;
const far = (a: readonly number[], b: readonly number[]): number =>
  Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
const turnOf = (q: readonly number[], v: readonly number[]): number[] => rotateVector([0, 0, 0], q, v);

describe('views', () => {
  test('look along −Z with +Y as near up as can be', () => {
    fc.assert(
      fc.property(anyDirection, anyDirection, (view, up) => {
        fc.pre(Math.abs(view[0] * up[0] + view[1] * up[1] + view[2] * up[2]) < 0.999);
        const q = lookAlong<number[]>([], view, up);
        expect(far(turnOf(q, [0, 0, -1]), view)).toBeLessThan(1e-14);
        const right = turnOf(q, [1, 0, 0]);
        expect(Math.abs(right[0] * up[0] + right[1] * up[1] + right[2] * up[2])).toBeLessThan(1e-14);
        const top = turnOf(q, [0, 1, 0]);
        expect(top[0] * up[0] + top[1] * up[1] + top[2] * up[2]).toBeGreaterThan(0);
        const eye = [3, -2, 7];
        const target = eye.map((part, n) => part + 4 * view[n]);
        expect(angleBetween(lookAt<number[]>([], eye, target, up), q)).toBeLessThan(1e-12);
      }),
      { seed: 21 },
    );
  });

  test('straight up, or without an up, take the smallest turn from −Z, and nothing to look at is the identity', () => {
    const up = lookAlong<number[]>([], [0, 5, 0], [0, 1, 0]);
    expect(angleBetween(up, fromAxisAngle<number[]>([], [1, 0, 0], Math.PI / 2))).toBeLessThan(1e-15);
    expect(
      angleBetween(
        lookAlong<number[]>([], [1, 0, 0], [0, 0, 0]),
        fromAxisAngle<number[]>([], [0, -1, 0], Math.PI / 2),
      ),
    ).toBeLessThan(1e-15);
    expect(angleBetween(lookAlong<number[]>([], [0, 0, 0], [0, 1, 0]), [0, 0, 0, 1])).toBe(0);
  });

  test('A17: over the top of a vertical loop, frames carried along roll by less than 1° a frame; an up vector flips by 180°', () => {
    // 240 frames of a loop that leans 0.01° out of the vertical plane, as real paths do.
    const count = 240;
    const views = Array.from({ length: count }, (_, n) => {
      const angle = (2 * Math.PI * (n + 0.5)) / count;
      return [2e-4 * Math.sin(angle / 2), Math.sin(angle), -Math.cos(angle)];
    });
    const carried = lookAlongPath<number[]>([], views.flat(), [0, 0, 0, 1]);
    const byUp = views.map((view) => lookAlong<number[]>([], view, [0, 1, 0]));
    const rolls = { carried: 0, byUp: 0 };
    for (let n = 1; n < count; n++) {
      const roll = (a: number[], b: number[]): number =>
        Math.abs(twistAngle(multiply<number[]>([], conjugate<number[]>([], a), b), [0, 0, 1])) * DEGREES;
      const frame = carried.slice(4 * n, 4 * n + 4);
      expect(far(turnOf(frame, [0, 0, -1]), views[n])).toBeLessThan(1e-7);
      rolls.carried = Math.max(rolls.carried, roll(carried.slice(4 * n - 4, 4 * n), frame));
      rolls.byUp = Math.max(rolls.byUp, roll(byUp[n - 1], byUp[n]));
    }
    expect(rolls.carried).toBeLessThan(1);
    expect(rolls.byUp).toBeGreaterThan(170);
  });

  test('carried along a path begin at the frame they are given', () => {
    fc.assert(
      fc.property(anyQuaternion, anyDirection, anyDirection, (first, view, next) => {
        const carried = lookAlongPath<number[]>([], [...view, ...next], first);
        const begun = lookLeastTwist<number[]>([], first, view);
        expect(carried.slice(0, 4)).toEqual(begun);
        expect(carried.slice(4)).toEqual(lookLeastTwist<number[]>([], begun, next));
      }),
      { seed: 23 },
    );
  });

  test('of least twist turn the frame before by the angle between the views and no more', () => {
    fc.assert(
      fc.property(anyQuaternion, anyDirection, (previous, view) => {
        const q = lookLeastTwist<number[]>([], previous, view);
        const before = turnOf([...previous], [0, 0, -1]);
        const between =
          2 * Math.atan2(far(before, view), Math.hypot(...view.map((part, n) => part + before[n])));
        expect(far(turnOf(q, [0, 0, -1]), view)).toBeLessThan(2e-15 * 4);
        expect(angleBetween(q, previous)).toBeCloseTo(between, 12);
      }),
      { seed: 22 },
    );
  });
});

test('the turn between two directions takes one to the other by their angle, opposite ones half round', () => {
  fc.assert(
    fc.property(anyDirection, anyDirection, (a, b) => {
      const q = turnBetween<number[]>([], a, b);
      expect(far(turnOf(q, a), b)).toBeLessThan(1e-14);
      expect(Math.hypot(...q)).toBeCloseTo(1, 14);
      const back = turnBetween<number[]>(
        [],
        a,
        a.map((part) => -part),
      );
      expect(
        far(
          turnOf(back, a),
          a.map((part) => -part),
        ),
      ).toBeLessThan(1e-14);
      expect(turnBetween<number[]>([], a, a).map((part) => part + 0)).toEqual([0, 0, 0, 1]);
    }),
    { seed: 23 },
  );
  expect(turnBetween<number[]>([], [0, 0, 0], [1, 0, 0]).map((part) => part + 0)).toEqual([0, 0, 0, 1]);
  const near = turnBetween<number[]>([], [1, 0, 0], [1, 1e-9, 0]);
  expect(near[2] / 5e-10).toBeCloseTo(1, 14);
});

test('swing · twist is the turn; the twist is about the axis, the swing square to it', () => {
  fc.assert(
    fc.property(anyQuaternion, anyDirection, (q, axis) => {
      fc.pre(Math.hypot(q[0] * axis[0] + q[1] * axis[1] + q[2] * axis[2], q[3]) > 1e-3);
      const about = twist<number[]>([], q, axis);
      const over = swing<number[]>([], q, axis);
      expect(angleBetween(multiply<number[]>([], over, about), q)).toBeLessThan(1e-14);
      expect(far(turnOf(about, axis), axis)).toBeLessThan(1e-14);
      expect(Math.abs(over[0] * axis[0] + over[1] * axis[1] + over[2] * axis[2])).toBeLessThan(1e-15 * 4);
      expect(
        Math.cos(
          twistAngle(q, axis) -
            twistAngle(
              q.map((part) => -part),
              axis,
            ),
        ),
      ).toBeCloseTo(1, 12);
    }),
    { seed: 24 },
  );
  expect(twistAngle(fromAxisAngle<number[]>([], [0, 1, 0], -2), [0, 1, 0])).toBeCloseTo(-2, 14);
  expect(twistAngle([1, 0, 0, 0], [0, 1, 0])).toBe(0);
});

describe('changes of axes', () => {
  test('turn vectors as the matrix turned does, also where the hand changes', () => {
    for (const words of ['x z -y', '-x y z', 'y x z', 'z x y', '-z -x -y'])
      fc.assert(
        fc.property(anyQuaternion, anyDirection, (q, v) => {
          const change = axisChange(words);
          const map = (u: readonly number[]): number[] =>
            [0, 1, 2].map((row) => change[row] * u[0] + change[3 + row] * u[1] + change[6 + row] * u[2]);
          const there = turnOf(changeAxes<number[]>([], q, change), map(v));
          expect(far(there, map(turnOf([...q], v)))).toBeLessThan(1e-14);
        }),
        { seed: 25, numRuns: 20 },
      );
    // A rate is an axial vector: mirrored axes reverse it.
    expect(changeAxesOfRate<number[]>([], [1, 2, 3], axisChange('x y -z'))).toEqual([-1, -2, 3]);
    for (const words of ['x y', 'x y y', 'x y w', ''])
      expect(() => axisChange(words)).toThrow(expect.objectContaining({ code: 'axes.unknown' }));
  });

  test("a mirror is its own undoing and reverses turns in its plane's axes", () => {
    fc.assert(
      fc.property(anyQuaternion, anyDirection, anyDirection, (q, normal, v) => {
        const flip = (u: readonly number[]): number[] => {
          const twice = 2 * (u[0] * normal[0] + u[1] * normal[1] + u[2] * normal[2]);
          return u.map((part, n) => part - twice * normal[n]);
        };
        const seen = mirror<number[]>([], q, normal);
        expect(far(turnOf(seen, flip(v)), flip(turnOf([...q], v)))).toBeLessThan(1e-14);
        expect(angleBetween(mirror<number[]>([], seen, normal), q)).toBeLessThan(1e-14);
      }),
      { seed: 26 },
    );
  });

  test('a change of basis writes the same turn in other axes', () => {
    fc.assert(
      fc.property(anyQuaternion, anyQuaternion, anyDirection, (q, basis, v) => {
        const there = changeBasis<number[]>([], q, basis);
        // Own vector of the basis: out, turned, back.
        const expected = turnOf(conjugate<number[]>([], basis), turnOf([...q], turnOf([...basis], v)));
        expect(far(turnOf(there, v), expected)).toBeLessThan(1e-14);
      }),
      { seed: 27 },
    );
  });
});

test('turning about own, parent and world axes moves what each says', () => {
  fc.assert(
    fc.property(anyQuaternion, anyQuaternion, anyDirection, anyDirection, (q, parent, axis, v) => {
      const turn = fromAxisAngle<number[]>([], axis, 0.7);
      const inParent = turnOf([...q], v);
      expect(
        far(turnOf(turnAboutParent<number[]>([], q, axis, 0.7), v), turnOf(turn, inParent)),
      ).toBeLessThan(1e-14);
      expect(
        far(turnOf(turnAboutOwn<number[]>([], q, axis, 0.7), v), turnOf([...q], turnOf(turn, v))),
      ).toBeLessThan(1e-14);
      const world = turnOf([...parent], turnOf(turnAboutWorld<number[]>([], q, parent, axis, 0.7), v));
      expect(far(world, turnOf(turn, turnOf([...parent], inParent)))).toBeLessThan(1e-14);
    }),
    { seed: 28 },
  );
});

const scaled = (q: readonly number[], scale: readonly number[]): number[] =>
  toMat3<number[]>([], q).map((part, n) => part * scale[Math.floor(n / 3)]);

describe('taking a matrix apart', () => {
  test('gives back turn and scale, and names a reflection', () => {
    fc.assert(
      fc.property(anyQuaternion, (q) => {
        const plain = splitMatrix(scaled(q, [2, 3, 0.5]));
        expect(plain.reflected).toBe(false);
        expect(plain.shear).toBeLessThan(1e-14);
        expect(angleBetween(plain.orientation, q)).toBeLessThan(1e-14);
        plain.scale.forEach((part, n) => expect(part).toBeCloseTo([2, 3, 0.5][n], 13));
        const flipped = splitMatrix(scaled(q, [-2, 3, 0.5]));
        expect(flipped.reflected).toBe(true);
        expect(angleBetween(flipped.orientation, q)).toBeLessThan(1e-14);
        expect(flipped.scale[0]).toBeCloseTo(-2, 13);
      }),
      { seed: 29 },
    );
  });

  test('reads a 4×4 with its translation', () => {
    const found = splitMatrix([2, 0, 0, 0, 0, 2, 0, 0, 0, 0, 2, 0, 5, 6, 7, 1]);
    expect(found).toEqual({
      translation: [5, 6, 7],
      orientation: [0, 0, 0, 1],
      scale: [2, 2, 2],
      reflected: false,
      shear: 0,
    });
  });

  test.each([
    ['matrix.reflected', [1, 0, 0, 0, 1, 0, 0, 0, -1]],
    ['matrix.sheared', [1, 0, 0, 0.1, 1, 0, 0, 0, 1]],
    ['matrix.flat', [1, 0, 0, 1, 0, 0, 0, 0, 1]],
    ['matrix.flat', [1, 0, 0, 0, 0, 0, 0, 0, 1]],
    ['matrix.not-finite', [1, 0, 0, 0, NaN, 0, 0, 0, 1]],
    ['matrix.bad-length', [1, 0, 0, 1]],
  ])('names %s', (code, matrix) => {
    expect(() => matrixOrientation(matrix)).toThrow(expect.objectContaining({ code }));
  });

  test('reads a shear as the cosine between columns, and the nearest turn', () => {
    const found = splitMatrix([1, 0, 0, Math.sin(0.2), Math.cos(0.2), 0, 0, 0, 1]);
    expect(found.shear).toBeCloseTo(Math.sin(0.2), 14);
    // Both leaning columns share the lean.
    expect(angleBetween(found.orientation, fromAxisAngle<number[]>([], [0, 0, 1], -0.1))).toBeLessThan(1e-14);
  });
});

test('the chordal mean lies on the side of the first orientation', () => {
  fc.assert(
    fc.property(anyQuaternion, (q) => {
      // A little to each side of q: the mean is q itself, up to its sign.
      const either = [-0.1, 0.1].flatMap((angle) =>
        multiply<number[]>([], q, fromAxisAngle<number[]>([], [1, 2, -2], angle)),
      );
      const found = mean<number[]>([], either);
      expect(dot(found, either)).toBeGreaterThan(0);
      expect(angleBetween(found, q)).toBeLessThan(1e-14);
    }),
    { seed: 24 },
  );
});

test('the chordal mean of two is not slerp: a quarter of the weight on 120° gives 19.1°, and signs and order do not matter', () => {
  const b = fromAxisAngle<number[]>([], [0, 0, 1], (120 * Math.PI) / 180);
  // tan 2ψ = w₂ sin θ/(w₁ + w₂ cos θ), derived.
  const found = mean<number[]>([], [0, 0, 0, 1, ...b], [0.75, 0.25]);
  expect((angleBetween(found, [0, 0, 0, 1]) * DEGREES).toFixed(1)).toBe('19.1');
  const other = mean<number[]>([], [...b.map((part) => -part), 0, 0, 0, 1], [0.25, 0.75]);
  expect(angleBetween(found, other)).toBeLessThan(1e-14);
  expect(mean<number[]>([], [])).toEqual([0, 0, 0, 1]);
});

test('canonical picks w > 0, then the first part that is not 0', () => {
  expect(canonical<number[]>([], [0.5, 0.5, 0.5, -0.5])).toEqual([-0.5, -0.5, -0.5, 0.5]);
  expect(canonical<number[]>([], [0, -1, 0, 0]).map((part) => part + 0)).toEqual([0, 1, 0, 0]);
  expect(canonical<number[]>([], [0.6, 0, 0, 0.8])).toEqual([0.6, 0, 0, 0.8]);
});

test('slerpTurns is a at 0 and b at 1 to the bit up to sign, without a jump of sign between, and stays where ends are equal', () => {
  fc.assert(
    fc.property(anyQuaternion, anyQuaternion, fc.integer({ min: -3, max: 3 }), (a, b, turns) => {
      expect(slerpTurns<number[]>([], a, b, 0, turns)).toEqual([...a]);
      const end = slerpTurns<number[]>([], a, b, 1, turns);
      expect(angleBetween(end, b)).toBe(0);
      const before = slerpTurns<number[]>([], a, b, 1 - 1e-9, turns);
      expect(Math.hypot(...end.map((part, n) => part - before[n]))).toBeLessThan(1e-7);
      expect(angleBetween(slerpTurns<number[]>([], a, a, 0.3, turns), a)).toBe(0);
    }),
    { seed: 30 },
  );
});
