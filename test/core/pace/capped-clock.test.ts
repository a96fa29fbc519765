import { EASES, measure, pace, rotationSpline } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anyTrack } from '../../support/any-track.js';
import { arcs, keepsThePath, share, smooth, speedAt, timesOf } from '../../support/keeps-the-path.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 5, endOnFailure: true };
const RADIANS = Math.PI / 180;

describe('caps', () => {
  it('caps the speed to the limit exactly, keeps the rest of the pace, and adds the least time there is', () => {
    fc.assert(
      fc.property(fc.oneof(smooth, arcs), share, (curve, at) => {
        const peak = curve.peak(curve.start, curve.end).rate;
        const rate = peak * at;
        const paced = pace(curve, { kind: 'cap', rate });
        keepsThePath(curve, paced);
        expect(paced.peak(paced.start, paced.end).rate).toBeLessThanOrEqual(rate * (1 + 1e-7));
        for (const t of timesOf(paced)) {
          const old = paced.retiming.oldTime(t);
          expect(speedAt(paced, t)).toBeCloseTo(Math.min(rate, speedAt(curve, old)), 6);
        }
        // ∫ max(0, |ω|/v − 1) dt over a fine grid.
        let least = 0;
        const count = 2000;
        const gap = (curve.end - curve.start) / count;
        for (let i = 0; i < count; i++)
          least += gap * Math.max(0, speedAt(curve, curve.start + (i + 0.5) * gap) / rate - 1);
        // The grid's own error: it cuts the curve's peaks.
        expect(Math.abs(paced.end - curve.end - least)).toBeLessThan(2e-3 * least + 1e-4);
      }),
      RUNS,
    );
  });

  it('caps speed and acceleration, bends included, to 0.5 % on C² paths', () => {
    fc.assert(
      fc.property(smooth, share, share, (curve, ofRate, ofAcceleration) => {
        const before = measure(curve);
        const rate = before.peakRate * ofRate;
        fc.pre(before.peakAcceleration > 0.1);
        const acceleration = before.peakAcceleration * ofAcceleration;
        const paced = pace(curve, { kind: 'cap', rate, acceleration });
        keepsThePath(curve, paced);
        expect(paced.peak(paced.start, paced.end).rate).toBeLessThanOrEqual(rate * 1.000001);
        let most = 0;
        for (let i = 1; i < 300; i++) {
          const t = paced.start + ((i + 0.21) / 301) * (paced.end - paced.start);
          most = Math.max(most, Math.hypot(...paced.acceleration([0, 0, 0], t, 'own')));
        }
        expect(most).toBeLessThanOrEqual(acceleration * 1.005);
        // Never faster than it was.
        for (const t of timesOf(paced))
          expect(speedAt(paced, t)).toBeLessThanOrEqual(
            speedAt(curve, paced.retiming.oldTime(t)) * 1.00001 + 1e-6,
          );
      }),
      RUNS,
    );
  });

  it('takes a straight move at the least time that its limits let: the trapezoid', () => {
    // 90° about one axis; 60 deg/s and 120 deg/s² take 2.0 s, 60 deg/s² 2.5 s (JOB B4).
    const move = rotationSpline(
      {
        ...fc.sample(anyTrack(1.5), 1)[0],
        times: Float64Array.of(0, 0.1),
        values: Float64Array.of(0, 0, 0, 1, 0, Math.SQRT1_2, 0, Math.SQRT1_2),
      },
      { kind: 'c2' },
    );
    const eased = pace(move, { kind: 'ease', ease: EASES['minimum-jerk'] });
    for (const [limit, seconds] of [
      [120, 2],
      [60, 2.5],
    ]) {
      const paced = pace(eased, { kind: 'cap', rate: 60 * RADIANS, acceleration: limit * RADIANS });
      expect(paced.end).toBeGreaterThan(seconds * 0.999);
      expect(paced.end).toBeLessThan(seconds * 1.01);
    }
  });
});
