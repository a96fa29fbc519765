import {
  type Curve,
  EASES,
  angleBetween,
  conjugate,
  expMap,
  letAngleGo,
  multiply,
  playAs,
  rotationSpline,
  rotationTrack,
} from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { differenceFromSlopes } from '../../support/against-samples.js';
import { anyTrack, oneAxisTrack } from '../../support/any-track.js';
import { codeOf } from '../../support/edit-acceptance.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 10, endOnFailure: true };
const DEGREES = 180 / Math.PI;

const tracks = anyTrack(1.5);
const curves = fc.oneof(
  tracks.map((track) => rotationSpline(track, { kind: 'c2' })),
  tracks.map((track) => playAs(track, 'short-way')),
);
const share = fc.double({ min: 0.05, max: 0.95, noNaN: true });
const change = fc.double({ min: -2, max: 2, noNaN: true });

function speedAt(curve: Curve, t: number): number {
  return Math.hypot(...curve.rate([0, 0, 0], t, 'own'));
}

/** The press as MATHS 5 has it: by, faded out by the minimum-jerk step. */
function added(press: { at: number; reach: number; by: number }, t: number): number {
  const off = Math.min(1, Math.abs(t - press.at) / press.reach);
  return press.by * (1 - EASES['minimum-jerk'].position(off));
}

describe('letAngleGo', () => {
  it('turns by (v + b)₊ about the axis of each moment, and leaves what is before and after its press as it was', () => {
    fc.assert(
      fc.property(curves, share, share, change, (curve, where, wide, by) => {
        const length = curve.end - curve.start;
        const press = { at: curve.start + where * length, reach: (wide * length) / 2, by };
        const freed = letAngleGo(curve, press);
        const [from, to] = freed.pressed;
        const whole = freed.turnAt([0, 0, 0, 0], freed.end);
        for (let i = 0; i < 40; i++) {
          const t = curve.start + ((i + 0.37) / 40) * length;
          const [was, is] = [curve.orientation([], t), freed.orientation([], t)];
          const before = t <= from ? angleBetween(is, was) : 0;
          expect(before).toBe(0);
          // One turn about parent axes: every later pose by the same.
          const after = t >= to ? angleBetween(is, multiply([], whole, was)) : 0;
          expect(after).toBeLessThan(1e-14);
          const isInside = t > from && t < to;
          const wanted = Math.max(0, speedAt(curve, t) + (isInside ? added(press, t) : 0));
          expect(Math.abs(speedAt(freed, t) - wanted)).toBeLessThan(1e-12);
          const [slow, fast] = [curve.rate([0, 0, 0], t, 'own'), freed.rate([0, 0, 0], t, 'own')];
          const square = Math.hypot(
            slow[1] * fast[2] - slow[2] * fast[1],
            slow[2] * fast[0] - slow[0] * fast[2],
            slow[0] * fast[1] - slow[1] * fast[0],
          );
          expect(square).toBeLessThan(1e-12);
        }
      }),
      RUNS,
    );
  });

  it('plays rates and accelerations that are the slopes of its poses', () => {
    fc.assert(
      fc.property(curves, share, change, (curve, where, by) => {
        const length = curve.end - curve.start;
        const press = { at: curve.start + where * length, reach: length / 3, by };
        const freed = letAngleGo(curve, press);
        for (let i = 0; i < 15; i++) {
          const t = curve.start + ((i + 0.37) / 15) * length;
          const isFar = freed.knots.every((knot) => Math.abs(knot - t) > 2e-3);
          // Five points 1e-4 s apart; near-stops, where the axis turns over in no time, left out by a wide berth.
          if (!isFar || speedAt(curve, t) < 0.3) continue;
          for (const frame of ['own', 'parent'] as const)
            expect(differenceFromSlopes(freed, t, 1e-4, frame)).toBeLessThan(1e-4);
        }
      }),
      RUNS,
    );
  });

  it('turns further about one axis by the area of the press: its height times its reach', () => {
    // The minimum-jerk step has the mean ½, so that a press of 30 deg/s reaching 0.5 s to either side adds 15°.
    const curve = playAs(oneAxisTrack([0, 1, 3], [0, 40, 90]), 'as-written');
    const freed = letAngleGo(curve, { at: 1.2, reach: 0.5, by: 30 / DEGREES });
    const by = angleBetween(freed.orientation([], 3), curve.orientation([], 3)) * DEGREES;
    expect(by).toBeCloseTo(15, 9);
    expect(freed.length(0, 3) * DEGREES).toBeCloseTo(105, 9);
    expect(freed.peak(0, 3).rate * DEGREES).toBeGreaterThan(40);
    // Pressed to nothing and no further: 25 deg/s are there, so that −1000 deg/s leaves none at its place.
    const stopped = letAngleGo(curve, { at: 2, reach: 0.5, by: -1000 / DEGREES });
    expect(speedAt(stopped, 2)).toBe(0);
    expect(stopped.continuity).toBe(0);
    expect(stopped.length(0, 3)).toBeLessThan(curve.length(0, 3));
  });

  it('goes far beyond half a turn without changing sides', () => {
    const curve = playAs(oneAxisTrack([0, 2], [0, 90]), 'as-written');
    const freed = letAngleGo(curve, { at: 1, reach: 1, by: 900 / DEGREES });
    // 900 deg/s over 1 s of mean height: 900°, five half turns; the quaternion goes round with it, (0, 0, sin 450°, cos 450°).
    const turn = freed.turnAt([0, 0, 0, 0], 2);
    [0, 0, 1, 0].forEach((part, i) => expect(turn[i]).toBeCloseTo(part, 9));
    expect(freed.length(0, 2) * DEGREES).toBeCloseTo(990, 6);
  });

  it('sums its turn to 1e-6° of one that is summed two hundred times as finely', () => {
    const [track] = fc.sample(tracks, { numRuns: 1, seed: 7 });
    const curve = rotationSpline(track, { kind: 'c2' });
    const press = { at: (curve.start + curve.end) / 2, reach: (curve.end - curve.start) / 2, by: 0.7 };
    const freed = letAngleGo(curve, press);
    const q = curve.orientation([0, 0, 0, 0], curve.start);
    const parts = 80_000;
    const h = (curve.end - curve.start) / parts;
    // The midpoint rule with exact rates: an error of h² alone, 1e-9 here.
    for (let i = 0; i < parts; i++) {
      const rate = freed.rate([0, 0, 0], curve.start + (i + 0.5) * h, 'own');
      multiply(
        q,
        q,
        expMap<number[]>(
          [],
          rate.map((part) => part * h),
        ),
      );
    }
    expect(angleBetween(q, freed.orientation([], curve.end)) * DEGREES).toBeLessThan(1e-6);
  });

  it('goes on about the last axis where nothing turns, across a cut by the same turn, and refuses where there is none', () => {
    const still = rotationTrack({
      times: [0, 1, 2, 3],
      values: [0, 0, 0, 1, 0, 0, Math.SQRT1_2, Math.SQRT1_2, 0, 0, Math.SQRT1_2, Math.SQRT1_2, 1, 0, 0, 0],
      breaks: [2],
    });
    const curve = playAs(still, 'as-written');
    const freed = letAngleGo(curve, { at: 1.5, reach: 0.8, by: 20 / DEGREES });
    const rate = freed.rate([0, 0, 0], 1.5, 'own');
    expect(rate[2] * DEGREES).toBeCloseTo(20, 9);
    expect(Math.hypot(rate[0], rate[1])).toBe(0);
    // The cut at 3 s jumps as it did, after 16° about z.
    const turn = multiply([], freed.orientation([], 3), conjugate([], curve.orientation([], 3)));
    expect(2 * Math.atan2(turn[2], turn[3]) * DEGREES).toBeCloseTo(16, 7);
    const dead = rotationTrack({ times: [0, 1], values: [0, 0, 0, 1, 0, 0, 0, 1] });
    expect(codeOf(() => letAngleGo(playAs(dead, 'as-written'), { at: 0.5, reach: 0.2, by: 1 }))).toBe(
      'pace.no-turn',
    );
    expect(codeOf(() => letAngleGo(curve, { at: 9, reach: 0.2, by: 1 }))).toBe('pace.bad-press');
    expect(codeOf(() => letAngleGo(curve, { at: 1, reach: 0, by: 1 }))).toBe('pace.bad-press');
  });
});
