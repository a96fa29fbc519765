import {
  angleBetween,
  expMap,
  keyOrientation,
  rotationSpline,
  rotationTrack,
  type RotationTrack,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { keyed, keyTimes, motions } from '../../support/smooth-track.js';

const DEGREE = Math.PI / 180;
/** Uneven times, gaps up to eight times as long as others. */
const TIMES = [0, 1, 1.5, 3.5, 3.75, 4.75];

function steady(rate: number): RotationTrack {
  return rotationTrack({
    times: TIMES,
    values: TIMES.flatMap((t) => expMap<number[]>([], [0, rate * DEGREE * t, 0])),
  });
}

function speeds(track: RotationTrack, rates: 'secant' | 'three-point'): number[] {
  const curve = rotationSpline(track, { kind: 'squad', rates });
  return Array.from({ length: 476 }, (_, i) => Math.hypot(...curve.rate([0, 0, 0], i / 100, 'own')) / DEGREE);
}

describe('squad through keys at uneven times', () => {
  test.each(['secant', 'three-point'] as const)('by %s rates a steady turn stays steady (B17)', (rates) => {
    for (const speed of speeds(steady(36), rates)) expect(Math.abs(speed - 36)).toBeLessThan(1e-11);
  });

  test('by uniform rates the same turn surges: the speed at a key jumps by the ratio of its gaps, 20.25 to 162 deg/s', () => {
    const curve = rotationSpline(steady(36), { kind: 'squad', rates: 'uniform' });
    const speed = (t: number): number => Math.hypot(...curve.rate([0, 0, 0], t, 'own')) / DEGREE;
    // Either side of the key at 3.5 s: half of 72° + 9° over gaps of 2 and 0.25 s.
    expect(speed(3.5 - 1e-12)).toBeCloseTo(20.25, 8);
    expect(speed(3.5)).toBeCloseTo(162, 8);
    expect(curve.peak(0, 4.75).rate / DEGREE).toBeCloseTo(162, 8);
    // In the short segment it even turns back: (1.5·9 − (40.5 + 22.5)/4)/0.25 at its middle.
    expect(curve.rate([], 3.625, 'own')[1] / DEGREE).toBeCloseTo(-9, 8);
    expect(curve.continuity).toBe(0);
  });

  test.each(['secant', 'three-point'] as const)(
    'by %s rates the rate is continuous at keys, whatever the times',
    (rates) => {
      fc.assert(
        fc.property(motions, keyTimes(4), fc.nat(30), (motion, times, n) => {
          const curve = rotationSpline(keyed(motion, times, 'LINEAR'), { kind: 'squad', rates });
          expect(curve.continuity).toBe(1);
          const t = times[1 + (n % (times.length - 2))];
          const step = 1e-9;
          const [before, after] = [curve.rate([0, 0, 0], t - step, 'own'), curve.rate([0, 0, 0], t, 'own')];
          const bend = Math.hypot(...curve.acceleration([0, 0, 0], t - step, 'own'));
          const jump = Math.hypot(...after.map((part, k) => part - before[k]));
          expect(jump).toBeLessThan(2 * step * bend + 1e-9);
        }),
      );
    },
  );

  test('a gap ratio of 40 falls back to secant where the parabola would swing an inner point over half a turn', () => {
    const values = [0, 0, 0].flatMap((_, i) => expMap<number[]>([], [i === 0 ? 0 : 3, i / 4, 0]));
    const track = rotationTrack({ times: [0, 0.05, 2.05], values });
    const by = (rates: 'secant' | 'three-point'): number[] =>
      rotationSpline(track, { kind: 'squad', rates }).rate<number[]>([], 0.05, 'own');
    expect(by('three-point')).toEqual(by('secant'));
  });

  test('signs of keys do not matter, and keys are met exactly (B3)', () => {
    fc.assert(
      fc.property(motions, keyTimes(4), fc.nat(30), (motion, times, n) => {
        const track = keyed(motion, times, 'LINEAR');
        const values = track.values.map((part, i) => ((i >> 2) % 3 === n % 3 ? -part : part));
        const options = { kind: 'squad', rates: 'secant' } as const;
        const [plain, flipped] = [
          rotationSpline(track, options),
          rotationSpline(rotationTrack({ ...track, values }), options),
        ];
        const t = (times[0] + times.at(-1)!) / 2;
        expect(angleBetween(plain.orientation([], t), flipped.orientation([], t))).toBeLessThan(1e-14);
        const key = n % times.length;
        expect(angleBetween(plain.orientation([], times[key]), keyOrientation([], track, key))).toBe(0);
      }),
    );
  });

  test('no, one and two keys, and keys around a cut, play (B21)', () => {
    const options = { kind: 'squad', rates: 'secant' } as const;
    for (const count of [0, 1, 2]) {
      const times = TIMES.slice(0, count);
      const values = times.flatMap((t) => expMap<number[]>([], [t, 0, 0]));
      const curve = rotationSpline(rotationTrack({ times, values }), options);
      expect(Math.hypot(...curve.orientation([], 0.5))).toBeCloseTo(1, 15);
      expect(curve.rate([], 0.5, 'own')[0]).toBeCloseTo(count === 2 ? 1 : 0, 12);
    }
    const cut = rotationSpline(rotationTrack({ ...steady(36), breaks: [2] }), options);
    expect(cut.rate([], 1.25, 'own')[1] / DEGREE).toBeCloseTo(36, 10);
    expect(cut.rate([], 2, 'own')).toEqual([0, 0, 0]);
  });
});
