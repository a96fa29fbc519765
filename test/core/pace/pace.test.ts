import { type PaceLaw, angleBetween, measure, pace, playAs } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anyTrack } from '../../support/any-track.js';
import { codeOf } from '../../support/edit-acceptance.js';
import { arcs, keepsThePath, share, smooth, speedAt, timesOf } from '../../support/keeps-the-path.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 5, endOnFailure: true };
const RADIANS = Math.PI / 180;

describe('pace', () => {
  it('keeps one speed along any path', () => {
    fc.assert(
      fc.property(smooth, (curve) => {
        const paced = pace(curve, { kind: 'constant' });
        keepsThePath(curve, paced);
        const mean = curve.length(curve.start, curve.end) / (curve.end - curve.start);
        for (const t of timesOf(paced)) expect(speedAt(paced, t)).toBeCloseTo(mean, 9);
      }),
      RUNS,
    );
  });

  it('keeps the jump at a corner: v·|Δn| (two 60°/s arcs about square axes: 84.9 deg/s, MATHS 5)', () => {
    const h = Math.sin(Math.PI / 6);
    const corner = playAs(
      {
        ...fc.sample(anyTrack(1.5), 1)[0],
        times: Float64Array.of(0, 1, 2),
        // 60° about x, then 60° about own y.
        values: Float64Array.of(
          0,
          0,
          0,
          1,
          h,
          0,
          0,
          Math.cos(Math.PI / 6),
          h * Math.cos(Math.PI / 6),
          h * Math.cos(Math.PI / 6),
          h * h,
          Math.cos(Math.PI / 6) ** 2,
        ),
      },
      'short-way',
    );
    const paced = pace(corner, { kind: 'constant' });
    expect(measure(paced).worstRateJump / RADIANS).toBeCloseTo(60 * Math.SQRT2, 6);
  });

  it('holds: no speed for as long as asked, later times shifted, the pace at both sides as it was', () => {
    fc.assert(
      fc.property(fc.oneof(smooth, arcs), share, fc.constantFrom(0, 0.1), (curve, at, shoulders) => {
        const old = curve.end - curve.start;
        const time = curve.start + at * old;
        const paced = pace(curve, { kind: 'hold', at: time, seconds: 0.75, shoulders: shoulders * old });
        keepsThePath(curve, paced);
        const begins = paced.retiming.newTime(time);
        for (const since of [0.01, 0.3, 0.74]) expect(speedAt(paced, begins + since)).toBe(0);
        const side =
          Math.min(shoulders * old, time - curve.start) + Math.min(shoulders * old, curve.end - time);
        expect(paced.end - curve.end).toBeCloseTo(0.75 + side, 9);
      }),
      RUNS,
    );
  });

  it('puts marks where they are asked, without a jump of the speed and never back', () => {
    fc.assert(
      fc.property(smooth, share, share, share, share, (curve, a, b, c, d) => {
        fc.pre(Math.abs(a - b) > 0.02 && Math.abs(c - d) > 0.02);
        const old = curve.end - curve.start;
        const place = (u: number): number => curve.start + u * old;
        const marks = [
          { old: place(Math.min(a, b)), time: place(Math.min(c, d)) },
          { old: place(Math.max(a, b)), time: place(Math.max(c, d)) },
        ];
        const paced = pace(curve, { kind: 'marks', marks });
        keepsThePath(curve, paced);
        for (const mark of marks)
          expect(
            angleBetween(paced.orientation([], mark.time), curve.orientation([], mark.old)),
          ).toBeLessThan(1e-9);
        const turned = (from: number, to: number): number => paced.length(from, to);
        for (const mark of marks) {
          const [before, after] = [turned(mark.time - 1e-6, mark.time), turned(mark.time, mark.time + 1e-6)];
          expect(Math.abs(before - after)).toBeLessThan(1e-9);
        }
      }),
      RUNS,
    );
  });

  it('changes a span alone: before it nothing, after it the same shifted', () => {
    fc.assert(
      fc.property(fc.oneof(smooth, arcs), share, (curve, at) => {
        const old = curve.end - curve.start;
        const span = [curve.start + 0.3 * at * old, curve.start + (0.3 * at + 0.5) * old] as const;
        const paced = pace(curve, { kind: 'stretch', seconds: 1.7 * (span[1] - span[0]), span });
        keepsThePath(curve, paced);
        const { retiming } = paced;
        for (const t of timesOf(curve)) {
          const wanted =
            t < span[0] ? t : t > span[1] ? t + 0.7 * (span[1] - span[0]) : span[0] + 1.7 * (t - span[0]);
          expect(retiming.newTime(t)).toBeCloseTo(wanted, 12);
          expect(speedAt(paced, wanted)).toBeCloseTo(
            speedAt(curve, t) / (t > span[0] && t < span[1] ? 1.7 : 1),
            6,
          );
        }
      }),
      RUNS,
    );
  });

  it.each<[string, PaceLaw]>([
    ['pace.bad-span', { kind: 'constant', span: [-1, 1] }],
    ['pace.bad-span', { kind: 'constant', span: [1, 1] }],
    ['pace.bad-number', { kind: 'constant', seconds: 0 }],
    ['pace.bad-number', { kind: 'cap', rate: -1 }],
    ['pace.bad-number', { kind: 'cap', rate: 1, acceleration: NaN }],
    ['pace.bad-number', { kind: 'ramps', rise: 50 }],
    ['pace.bad-number', { kind: 'hold', at: 1e6, seconds: 1 }],
    ['pace.bad-press', { kind: 'press', at: 1, reach: 0, by: 1, ends: 'same' }],
    ['pace.bad-marks', { kind: 'marks', marks: [{ old: 1e3, time: 1 }] }],
  ])('refuses with %s what cannot be', (code, law) => {
    const [track] = fc.sample(anyTrack(1.5), 1);
    expect(codeOf(() => pace(playAs(track, 'short-way'), law))).toBe(code);
  });
});
