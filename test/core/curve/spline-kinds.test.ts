import {
  angleBetween,
  fromAxisAngle,
  multiply,
  rotationSpline,
  rotationTrack,
  SlewcurveError,
  type Curve,
  type RotationSplineOptions,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { differenceFromSlopes } from '../../support/against-samples.js';
import { anyQuaternion } from '../../support/any-quaternion.js';
import {
  anyTrack,
  jumpsAtKnots,
  keyOf,
  multiplied,
  oneAxisTrack,
  reversed,
} from '../../support/any-track.js';

/** Whether a kind meets inner keys, is the same played backwards, and moves along with all of its keys. */
interface Promises {
  readonly meets: boolean;
  readonly reverses: boolean;
  readonly invariant: boolean;
}
const STRICT: Promises = { meets: true, reverses: true, invariant: true };
const CUMULATIVE: Promises = { ...STRICT, reverses: false };
const KINDS: readonly (readonly [string, RotationSplineOptions, Promises])[] = [
  ['squad by secant', { kind: 'squad', rates: 'secant' }, STRICT],
  ['squad by three points', { kind: 'squad', rates: 'three-point' }, STRICT],
  ['squad, limited', { kind: 'squad', rates: 'limited' }, STRICT],
  ['tension, continuity and bias of 0', { kind: 'tension-continuity-bias' }, CUMULATIVE],
  ['tension and bias', { kind: 'tension-continuity-bias', tension: 0.3, bias: -0.4 }, CUMULATIVE],
  ['c2', { kind: 'c2', tolerance: 1e-12 }, CUMULATIVE],
  ['b-spline', { kind: 'b-spline' }, { ...CUMULATIVE, meets: false }],
  ['log chart', { kind: 'log-chart', reference: [0, 0, 0, 1] }, { ...STRICT, invariant: false }],
];
const UNIT = [0, 0, 0, 1];

/** Largest angle between two curves over 20 times, `other` asked at `map(t)` and carried by `left` and `right`. */
function apart(
  curve: Curve,
  other: Curve,
  map = (t: number): number => t,
  left = UNIT,
  right = UNIT,
): number {
  let worst = 0;
  for (let n = 0; n <= 20; n++) {
    const t = curve.start + (n / 20) * (curve.end - curve.start);
    const q = multiply([], left, multiply<number[]>([], other.orientation<number[]>([], map(t)), right));
    worst = Math.max(worst, angleBetween(curve.orientation<number[]>([], t), q));
  }
  return worst;
}

describe.each(KINDS)('%s', (_, options, { meets, reverses, invariant }) => {
  test(`passes the ends${meets ? ' and every key between' : ''}, whatever the signs`, () => {
    fc.assert(
      fc.property(anyTrack(2), (track) => {
        const curve = rotationSpline(track, options);
        const all = Array.from(track.times.keys());
        for (const key of meets ? all : [0, all.length - 1])
          // A product of a few turns: some roundings of 1.
          expect(
            angleBetween(curve.orientation<number[]>([], track.times[key]), keyOf(track, key)),
          ).toBeLessThan(1e-14);
        const values = track.values.map((part, n) => (Math.floor(n / 4) % 2 === 1 ? -part : part));
        expect(
          apart(curve, rotationSpline(rotationTrack({ times: track.times, values }), options)),
        ).toBeLessThan(1e-12);
      }),
      { seed: 11, numRuns: 30 },
    );
  });

  test('has the rates and accelerations of its own orientations, in own and in parent axes', () => {
    fc.assert(
      fc.property(
        anyTrack(2),
        fc.double({ min: 0.05, max: 0.95, noNaN: true }),
        fc.nat(5),
        (track, u, segment) => {
          const curve = rotationSpline(track, options);
          const i = segment % (track.times.length - 1);
          const h = track.times[i + 1] - track.times[i];
          const t = track.times[i] + u * h;
          // Five-point differences with a step of h/1000: their own error is some 1e-8 of rates near 10 rad/s over 0.2 s.
          for (const frame of ['own', 'parent'] as const)
            expect(differenceFromSlopes(curve, t, h / 1000, frame)).toBeLessThan(1e-6);
        },
      ),
      { seed: 12, numRuns: 40 },
    );
  });

  test('keeps its promise of continuity at the keys', () => {
    fc.assert(
      fc.property(anyTrack(1.5), (track) => {
        const curve = rotationSpline(track, options);
        const { rate, acceleration } = jumpsAtKnots(curve);
        expect(curve.continuity).toBeGreaterThanOrEqual(1);
        // 1e-9 s before the key the rate is off by that times the acceleration, up to some 100 rad/s²; likewise the acceleration.
        expect(rate).toBeLessThan(1e-6);
        expect(curve.continuity === 2 ? acceleration : 0).toBeLessThan(1e-4);
      }),
      { seed: 13, numRuns: 30 },
    );
  });

  test(`${invariant ? 'moves' : 'does not move'} along with all its keys, in parent and in own axes`, () => {
    const found = { left: 0, right: 0 };
    fc.assert(
      fc.property(anyTrack(1.5), anyQuaternion, (track, q) => {
        const curve = rotationSpline(track, options);
        const [left, right] = [
          rotationSpline(multiplied(track, q, UNIT), options),
          rotationSpline(multiplied(track, UNIT, q), options),
        ];
        found.left = Math.max(found.left, apart(left, curve, undefined, [...q]));
        found.right = Math.max(found.right, apart(right, curve, undefined, UNIT, [...q]));
      }),
      { seed: 14, numRuns: 20 },
    );
    // The passes of c2 stop at 1e-12 rad/s.
    expect([found.left < 1e-11, found.right < 1e-11]).toEqual([invariant, invariant]);
  });

  test(`played backwards is ${reverses ? 'the same curve' : 'another curve with the same ends'}`, () => {
    let worst = 0;
    // Bias has a direction in time. A chart by the mean of near keys, so that no key lies past half a turn on either way.
    const shape: RotationSplineOptions =
      options.kind === 'tension-continuity-bias'
        ? { ...options, bias: 0 }
        : options.kind === 'log-chart'
          ? { kind: 'log-chart' }
          : options;
    fc.assert(
      fc.property(anyTrack(options.kind === 'log-chart' ? 0.4 : 1.5), (track) => {
        const sum = track.times[0] + track.times[track.times.length - 1];
        worst = Math.max(
          worst,
          apart(rotationSpline(track, shape), rotationSpline(reversed(track), shape), (t) => sum - t),
        );
      }),
      { seed: 15, numRuns: 20 },
    );
    expect(worst < 1e-11).toBe(reverses);
  });

  test('of no key, of one key and of equal keys is what there is, without NaN', () => {
    const none = rotationSpline(rotationTrack({ times: [], values: [] }), options);
    expect(none.orientation<number[]>([], 1)).toEqual(UNIT);
    const one = rotationSpline(rotationTrack({ times: [2], values: [0, 1, 0, 0] }), options);
    expect(one.orientation<number[]>([], -1)).toEqual([0, 1, 0, 0]);
    expect(one.rate<number[]>([], 2, 'own')).toEqual([0, 0, 0]);
    const still = rotationSpline(
      rotationTrack({ times: [0, 1, 2], values: [0, 0, 1, 0, 0, 0, 1, 0, 0, 0, -1, 0] }),
      options,
    );
    expect(still.length(0, 2)).toBeLessThan(1e-14);
    expect(angleBetween(still.orientation<number[]>([], 1.3), [0, 0, 1, 0])).toBeLessThan(1e-15);
  });

  test('holds after a break and starts anew behind it', () => {
    const values = [0, 0.3, 0.9, 1.6, 2.4].flatMap((angle) => fromAxisAngle<number[]>([], [1, 2, 2], angle));
    const track = rotationTrack({ times: [0, 1, 2, 3, 4], values, breaks: [1] });
    const curve = rotationSpline(track, options);
    const alone = rotationSpline(rotationTrack({ times: [2, 3, 4], values: values.slice(8) }), options);
    expect(curve.continuity).toBe(-1);
    expect(angleBetween(curve.orientation<number[]>([], 1.9), keyOf(track, 1))).toBeLessThan(1e-14);
    expect(curve.rate<number[]>([], 1.5, 'own')).toEqual([0, 0, 0]);
    for (const t of [2, 2.2, 2.9, 3.5, 4])
      expect(
        angleBetween(curve.orientation<number[]>([], t), alone.orientation<number[]>([], t)),
      ).toBeLessThan(1e-12);
  });
});

/** Difference of the two ends of a curve of 3 s. */
const seam = (curve: Curve, what: 'rate' | 'acceleration'): number => {
  const a = curve[what]([0, 0, 0], 3, 'own');
  const b = curve[what]([0, 0, 0], 0, 'own');
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
};

describe('a loop', () => {
  // Three axes, the last key the first again with its sign the other way: a closed way round may end on −q.
  const values = [
    UNIT,
    fromAxisAngle<number[]>([], [1, 0, 0], 1),
    fromAxisAngle<number[]>([], [1, 1, 0], 1.6),
    fromAxisAngle<number[]>([], [0, 1, 1], 0.8),
    [0, 0, 0, -1],
  ].flat();
  const loop = rotationTrack({ times: [0, 0.7, 1.5, 2.1, 3], values });
  const KINDS_OF_LOOP = ['squad', 'tension-continuity-bias', 'c2', 'b-spline', 'log-chart'] as const;

  test.each(KINDS_OF_LOOP)(
    'of kind %s has one orientation and one rate at both ends, and undeclared it has not',
    (kind) => {
      const curve = rotationSpline(loop, { kind, loop: true });
      // The passes of c2 stop at 1e-9 rad/s.
      expect(seam(curve, 'rate')).toBeLessThan(1e-8);
      expect(
        angleBetween(curve.orientation<number[]>([], 0), curve.orientation<number[]>([], 3)),
      ).toBeLessThan(1e-12);
      expect(seam(rotationSpline(loop, { kind }), 'rate')).toBeGreaterThan(0.1);
    },
  );

  test.each(['c2', 'b-spline'] as const)('of kind %s has one acceleration at both ends too', (kind) => {
    expect(seam(rotationSpline(loop, { kind, loop: true }), 'acceleration')).toBeLessThan(1e-7);
    const [x, y, z] = rotationSpline(loop, { kind, loop: true }).acceleration([0, 0, 0], 0, 'own');
    expect(Math.hypot(x, y, z)).toBeGreaterThan(0.1);
  });
});

test('a kind that there is not is refused by name', () => {
  const options: unknown = { kind: 'tau' };
  // oxlint-disable-next-line typescript/no-unsafe-type-assertion
  const asked = (): Curve => rotationSpline(oneAxisTrack([0, 1], [0, 10]), options as RotationSplineOptions);
  expect(asked).toThrow(SlewcurveError);
  expect(asked).toThrow(expect.objectContaining({ code: 'spline.unknown-kind' }));
});

test('a log chart keeps whole turns: three of them, keyed each 90°, are 1,080° long at one speed', () => {
  const angles = Array.from({ length: 13 }, (_, key) => 90 * key);
  const spin = oneAxisTrack([...angles.keys()], angles);
  const curve = rotationSpline(spin, { kind: 'log-chart' });
  expect((curve.length(0, 12) * 180) / Math.PI).toBeCloseTo(1080, 6);
  expect((curve.peak(0, 12).rate * 180) / Math.PI).toBeCloseTo(90, 6);
});
