import { angleBetween, measure, playAs, rotationSpline, toAxisAngle, type Curve } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { jumpsAtKnots, keyOf, oneAxisTrack } from '../../support/any-track.js';

const DEGREES = 180 / Math.PI;

/** Signed angle about z, degrees. */
function angleAt(curve: Curve, t: number): number {
  const axis = [0, 0, 0];
  return toAxisAngle(axis, curve.orientation<number[]>([], t)) * Math.sign(axis[2]) * DEGREES;
}

test('A4: a sine turn of nine keys steps by over 20 deg/s by great arcs and by less than 0.01 by splines, keys met within 1e-9°', () => {
  const times = Array.from({ length: 9 }, (_, n) => n / 4);
  const track = oneAxisTrack(
    times,
    times.map((t) => 45 * Math.sin(Math.PI * t)),
  );
  expect(measure(playAs(track, 'short-way')).worstRateJump * DEGREES).toBeGreaterThan(20);
  for (const options of [{ kind: 'squad' }, { kind: 'c2' }, { kind: 'tension-continuity-bias' }] as const) {
    const curve = rotationSpline(track, options);
    expect(measure(curve).worstRateJump * DEGREES).toBeLessThan(0.01);
    expect(jumpsAtKnots(curve).rate * DEGREES).toBeLessThan(0.01);
    times.forEach((t, key) =>
      expect(angleBetween(curve.orientation<number[]>([], t), keyOf(track, key)) * DEGREES).toBeLessThan(
        1e-9,
      ),
    );
  }
});

describe('A9: limited rates', () => {
  test('keep a hold: keys 0, 0, 90, 90 run over by 6.667° by secant and by nothing when limited', () => {
    const track = oneAxisTrack([0, 1, 2, 3], [0, 0, 90, 90]);
    const angles = (rates: 'secant' | 'limited'): number[] => {
      const curve = rotationSpline(track, { kind: 'squad', rates });
      return Array.from({ length: 3001 }, (_, n) => angleAt(curve, n / 1000));
    };
    // (4/27)·h·ω of the hold, ω = 45 deg/s, at a third of a second from the key.
    expect(Math.min(...angles('secant'))).toBeCloseTo(-20 / 3, 4);
    expect(Math.max(...angles('secant'))).toBeCloseTo(90 + 20 / 3, 4);
    expect(Math.min(...angles('limited'))).toBeGreaterThan(-1e-12);
    expect(Math.max(...angles('limited'))).toBeLessThan(90 + 1e-12);
    expect(rotationSpline(track, { kind: 'squad', rates: 'limited' }).length(0, 1)).toBeLessThan(1e-14);
  });

  test('never leave the range between two keys of one axis, at any gaps', () => {
    const step = fc.record({
      angle: fc.double({ min: -120, max: 120, noNaN: true }),
      gap: fc.double({ min: 0.05, max: 5, noNaN: true }),
    });
    fc.assert(
      fc.property(fc.array(step, { minLength: 2, maxLength: 5 }), (steps) => {
        const times = [0];
        const angles = [0];
        for (const { angle, gap } of steps) {
          times.push(times[times.length - 1] + gap);
          angles.push(angles[angles.length - 1] + angle);
        }
        const curve = rotationSpline(oneAxisTrack(times, angles), { kind: 'squad', rates: 'limited' });
        // Monotone between keys: the angle turned is the sum of the steps.
        const sum = steps.reduce((total, { angle }) => total + Math.abs(angle), 0);
        expect(curve.length(0, times[times.length - 1]) * DEGREES).toBeLessThan(sum + 1e-8);
      }),
      { seed: 16, numRuns: 40 },
    );
  });

  test('pass uneven keys 30° apart without a step: 30, 150, 30 deg/s by great arcs', () => {
    const track = oneAxisTrack([0, 1, 1.2, 2.2], [0, 30, 60, 90]);
    expect(measure(playAs(track, 'short-way')).worstRateJump * DEGREES).toBeCloseTo(120, 9);
    for (const rates of ['secant', 'three-point', 'limited'] as const) {
      const curve = rotationSpline(track, { kind: 'squad', rates });
      expect(curve.continuity).toBe(1);
      expect(jumpsAtKnots(curve).rate * DEGREES).toBeLessThan(1e-6);
    }
  });

  test('are three times the slower mean rate at the most', () => {
    // 1° in 1 s, then 100° in 1 s: secant 50.5 deg/s, limited 3.
    const curve = rotationSpline(oneAxisTrack([0, 1, 2], [0, 1, 101]), { kind: 'squad', rates: 'limited' });
    expect(curve.rate([0, 0, 0], 1, 'own')[2] * DEGREES).toBeCloseTo(3, 9);
  });
});

test('A19: splines pass keys at which the motion stood still, and keep a hold of two equal keys', () => {
  const steady = oneAxisTrack([0, 1, 2, 3, 4], [0, 10, 20, 30, 40]);
  const stalls = (curve: Curve): number =>
    [1, 2, 3].filter((t) => Math.hypot(...curve.rate([0, 0, 0], t, 'own')) * DEGREES < 2.5).length;
  // Zero tangents at every key: peak 15 deg/s for a mean of 10, standing at each.
  const stopping = rotationSpline(steady, { kind: 'tension-continuity-bias', tension: 1 });
  expect(stalls(stopping)).toBe(3);
  expect(stopping.peak(0, 4).rate * DEGREES).toBeCloseTo(15, 9);
  for (const kind of ['squad', 'c2', 'tension-continuity-bias', 'b-spline', 'log-chart'] as const) {
    const curve = rotationSpline(steady, { kind });
    expect(stalls(curve)).toBe(0);
    expect(curve.peak(0, 4).rate * DEGREES).toBeCloseTo(10, 9);
  }
  const held = rotationSpline(oneAxisTrack([0, 1, 2, 3], [0, 10, 10, 20]), {
    kind: 'squad',
    rates: 'limited',
  });
  expect(held.length(1, 2)).toBeLessThan(1e-14);
});
