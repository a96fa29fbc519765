import {
  angleBetween,
  keyOrientation,
  playAs,
  replaceTrack,
  rotateVector,
  rotationSpline,
  rotationTrack,
  storedTrack,
  type Curve,
  type RotationTrack,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { differenceFromSlopes } from '../../support/against-samples.js';
import { keyed, keyTimes, motions } from '../../support/smooth-track.js';

type Play = (track: RotationTrack) => Curve;

/** Everything that plays a track of quaternions, by name. CUBICSPLINE tracks serve all of them. */
const PLAYS: readonly (readonly [string, Play])[] = [
  ...(['as-written', 'short-way', 'chord', 'raw-chord', 'stored-cubic', 'finite-cubic', 'step'] as const).map(
    (id) => [id, (track: RotationTrack) => playAs(track, id)] as const,
  ),
  ...(['uniform', 'secant', 'three-point'] as const).map(
    (rates) =>
      [`squad ${rates}`, (track: RotationTrack) => rotationSpline(track, { kind: 'squad', rates })] as const,
  ),
];

const cubicTracks = fc
  .tuple(motions, keyTimes(4))
  .map(([motion, times]) => keyed(motion, times, 'CUBICSPLINE'));
const share = fc.double({ min: 0.05, max: 0.95, noNaN: true });

function timeIn(curve: Curve, segment: number, u: number): number {
  const i = segment % (curve.knots.length - 1);
  return curve.knots[i] + u * (curve.knots[i + 1] - curve.knots[i]);
}

function speed(curve: Curve, t: number): number {
  return Math.hypot(...curve.rate([0, 0, 0], t, 'own'));
}

describe.each(PLAYS)('played by %s', (name, play) => {
  test('rate and acceleration are the derivatives of the orientation, in own and in parent axes', () => {
    fc.assert(
      fc.property(
        cubicTracks,
        fc.nat(30),
        share,
        fc.constantFrom('own', 'parent'),
        (track, segment, u, frame) => {
          const curve = play(track);
          const t = timeIn(curve, segment, u);
          // Five-point differences over 2e-5 s: about 1e-11 of rounding by step, and step⁴ of truncation.
          expect(differenceFromSlopes(curve, t, 2e-5, frame)).toBeLessThan(2e-8);
        },
      ),
    );
  });

  test('the parent-axes rate is the own-axes rate turned by the orientation, at every time', () => {
    fc.assert(
      fc.property(cubicTracks, fc.nat(30), share, (track, segment, u) => {
        const curve = play(track);
        const t = timeIn(curve, segment, u);
        const turned = rotateVector([], curve.orientation([], t), curve.rate([], t, 'own'));
        expect(curve.rate([], t, 'parent')).toEqual(turned);
      }),
    );
  });

  test('every orientation is unit, and at a key it is the key, to the bit but for its sign', () => {
    fc.assert(
      fc.property(cubicTracks, fc.nat(30), share, (track, segment, u) => {
        const curve = play(track);
        const q = curve.orientation<number[]>([], timeIn(curve, segment, u));
        expect(Math.abs(Math.hypot(...q) - 1)).toBeLessThan(4 * Number.EPSILON);
        const key = segment % track.times.length;
        const at = curve.orientation<number[]>([], track.times[key]);
        const due = keyOrientation<number[]>([], track, key);
        const sign = at[3] === due[3] ? 1 : -1;
        expect(at.map((part) => part * sign)).toEqual(due);
      }),
    );
  });

  test('lengths add up, count no more than they should and no less than the shortest turn', () => {
    fc.assert(
      fc.property(cubicTracks, share, share, (track, a, b) => {
        const curve = play(track);
        const span = curve.end - curve.start;
        const [from, to] = [curve.start + Math.min(a, b) * span, curve.start + Math.max(a, b) * span];
        const middle = (from + to) / 2;
        const whole = curve.length(from, to);
        expect(Math.abs(curve.length(from, middle) + curve.length(middle, to) - whole)).toBeLessThan(
          1e-11 * whole + 1e-14,
        );
        expect(curve.length(to, from)).toBe(whole);
        expect(whole).toBeLessThanOrEqual(curve.peak(from, to).rate * (to - from) * (1 + 1e-9) + 1e-14);
        const shortest = angleBetween(curve.orientation([], from), curve.orientation([], to));
        expect(name === 'step' ? Infinity : whole).toBeGreaterThan(shortest - 1e-12);
      }),
      { numRuns: 12 },
    );
  });

  test('the peak is reached where it says, and no time of 400 is faster', () => {
    fc.assert(
      fc.property(cubicTracks, share, share, (track, a, b) => {
        const curve = play(track);
        const span = curve.end - curve.start;
        const [from, to] = [curve.start + Math.min(a, b) * span, curve.start + Math.max(a, b) * span];
        const peak = curve.peak(from, to);
        expect(peak.time).toBeGreaterThanOrEqual(from);
        expect(peak.time).toBeLessThanOrEqual(to);
        let fastest = 0;
        for (let i = 0; i < 400; i++)
          fastest = Math.max(fastest, speed(curve, from + ((to - from) * i) / 400));
        expect(peak.rate).toBeGreaterThanOrEqual(fastest * (1 - 1e-9) - 1e-100);
      }),
      { numRuns: 12 },
    );
  });

  test('holds its ends outside at rate 0, and takes a time that is no number for one before the start (A27)', () => {
    fc.assert(
      fc.property(cubicTracks, fc.double({ min: 1e-6, max: 1e9, noNaN: true }), (track, beyond) => {
        const curve = play(track);
        for (const t of [curve.start - beyond, curve.end + beyond, -Infinity, Infinity, NaN]) {
          const end = t > curve.end ? curve.end : curve.start;
          expect(curve.orientation([], t)).toEqual(curve.orientation([], end));
          expect(curve.rate([], t, 'parent')).toEqual([0, 0, 0]);
          expect(curve.acceleration([], t, 'own')).toEqual([0, 0, 0]);
        }
        expect(curve.length(curve.end, curve.end + beyond)).toBe(0);
        expect(curve.peak(curve.end + beyond, curve.end + 2 * beyond).rate).toBe(0);
      }),
      { numRuns: 20 },
    );
  });

  test('holds a key that a declared cut follows, until the next, and turns nothing there', () => {
    fc.assert(
      fc.property(cubicTracks, share, (track, u) => {
        const curve = play(replaceTrack(track, { breaks: [1] }));
        const t = timeIn(curve, 1, u);
        expect(curve.continuity).toBe(-1);
        expect(curve.orientation([], t)).toEqual(curve.orientation([], track.times[1]));
        expect(curve.rate([], t, 'own')).toEqual([0, 0, 0]);
        expect(curve.length(track.times[1], track.times[2])).toBe(0);
        expect(curve.peak(track.times[1], track.times[2]).rate).toBe(0);
      }),
      { numRuns: 20 },
    );
  });

  test('writes the same into every kind of array, and into no input (B20, B23)', () => {
    const track = keyed(
      { spin: [20, -30, 10], swing: [30, 10, 20], hertz: 0.4, phase: 1 },
      [0, 0.3, 0.7, 1],
      'CUBICSPLINE',
    );
    const values = Float64Array.from(track.values);
    const curve = play(track);
    for (const t of [-1, 0, 0.1, 0.3, 0.65, 1, 2]) {
      const plain = curve.orientation<number[]>([], t);
      expect([...curve.orientation(new Float64Array(4), t)]).toEqual(plain);
      expect([...curve.orientation(new Float32Array(4), t)]).toEqual(plain.map(Math.fround));
      for (const frame of ['own', 'parent'] as const) {
        const rate = curve.rate<number[]>([], t, frame);
        expect([...curve.rate(new Float32Array(3), t, frame)]).toEqual(rate.map(Math.fround));
        const bend = curve.acceleration<number[]>([], t, frame);
        expect([...curve.acceleration(new Float32Array(3), t, frame)]).toEqual(bend.map(Math.fround));
      }
    }
    curve.length(0, 1);
    curve.peak(0, 1);
    expect(track.values).toEqual(values);
  });
});

const IDS = ['as-written', 'short-way', 'chord', 'raw-chord', 'finite-cubic', 'step'] as const;
const oddNumber = fc.oneof(
  fc.double({ min: -1, max: 1 }),
  fc.constantFrom(0, NaN, Infinity, -Infinity, 1e-300, 1e300, 5e-324, -1),
);

describe.each(IDS)('faulty tracks played by %s', (id) => {
  test('give no number that is not finite, and the same every time (A15, B29)', () => {
    const faulty = fc.array(fc.tuple(oddNumber, oddNumber, oddNumber, oddNumber, oddNumber), {
      maxLength: 8,
    });
    fc.assert(
      fc.property(faulty, oddNumber, (keys, t) => {
        const track = storedTrack({
          times: keys.map(([time]) => time),
          values: keys.flatMap((key) => key.slice(1)),
        });
        const [curve, again] = [playAs(track, id), playAs(track, id)];
        for (const time of [t, ...curve.knots, (curve.start + curve.end) / 2]) {
          const numbers = [
            ...curve.orientation<number[]>([], time),
            ...curve.rate<number[]>([], time, 'parent'),
            ...curve.acceleration<number[]>([], time, 'own'),
          ];
          expect(numbers.filter((each) => Number.isNaN(each))).toEqual([]);
          expect(again.orientation([], time)).toEqual(curve.orientation([], time));
        }
        expect(curve.length(curve.start, curve.end)).not.toBeNaN();
        expect(curve.peak(curve.start, curve.end).rate).not.toBeNaN();
      }),
      { numRuns: 100 },
    );
  });

  test('a track of no key is identity for ever, one of one key is that key, two keys move (B21, B22)', () => {
    const none = playAs(rotationTrack({ times: [], values: [] }), id);
    expect(none.orientation([], 3)).toEqual([0, 0, 0, 1]);
    expect([none.start, none.end, none.length(0, 9), none.peak(0, 9).rate]).toEqual([0, 0, 0, 0]);
    const one = playAs(rotationTrack({ times: [2], values: [0, 1, 0, 0] }), id);
    for (const t of [0, 2, 5]) expect(one.orientation([], t)).toEqual([0, 1, 0, 0]);
    expect(one.rate([], 2, 'own')).toEqual([0, 0, 0]);
    expect([one.start, one.end, [...one.knots]]).toEqual([2, 2, [2]]);
    const two = playAs(rotationTrack({ times: [2, 3], values: [0, 0, 0, 1, 0, 0.6, 0, 0.8] }), id);
    expect(two.orientation([], 3)).toEqual([0, 0.6, 0, 0.8]);
    expect(two.length(2, 3)).toBeCloseTo(id === 'step' ? 0 : 2 * Math.atan2(0.6, 0.8), 12);
  });
});
