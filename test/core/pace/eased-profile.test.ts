import { EASES, measure, pace, playAs, rampEase } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { differenceFromSlopes } from '../../support/against-samples.js';
import { anyTrack } from '../../support/any-track.js';
import { keepsThePath, smooth, speedAt, timesOf } from '../../support/keeps-the-path.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 5, endOnFailure: true };
const RADIANS = Math.PI / 180;

describe('eased paces', () => {
  it('eases with exact rates and accelerations: they are the slopes of what it plays', () => {
    fc.assert(
      fc.property(
        smooth,
        fc.constantFrom(...Object.values(EASES), rampEase({ rise: 0.3 })),
        (curve, ease) => {
          const paced = pace(curve, { kind: 'ease', ease, seconds: 3 });
          keepsThePath(curve, paced);
          const total = curve.length(curve.start, curve.end);
          expect(paced.peak(0, paced.end).rate).toBeCloseTo((ease.peakSpeed * total) / 3, 5);
          // Five points 1e-4 s apart in curves that bend up to some 1000 rad/s⁴, near-stops left out by a wide berth.
          for (const t of timesOf(paced, 15)) {
            const moves = speedAt(curve, paced.retiming.oldTime(t)) > 0.3;
            expect(moves ? differenceFromSlopes(paced, t, 1e-4, 'own') : 0).toBeLessThan(1e-3);
          }
        },
      ),
      RUNS,
    );
  });

  it('turns a steady 90° in 1 s by minimum jerk with the peaks of the tables', () => {
    const steady = playAs(
      {
        ...fc.sample(anyTrack(1.5), 1)[0],
        times: Float64Array.of(0, 1),
        values: Float64Array.of(0, 0, 0, 1, 0, Math.SQRT1_2, 0, Math.SQRT1_2),
      },
      'short-way',
    );
    const { peakRate, peakAcceleration } = measure(
      pace(steady, { kind: 'ease', ease: EASES['minimum-jerk'] }),
    );
    expect(peakRate / RADIANS).toBeCloseTo(90 * 1.875, 9);
    expect(peakAcceleration / RADIANS).toBeCloseTo(90 * 5.773503, 4);
  });

  it('ramps at both ends from rest to rest and leaves the middle at its pace', () => {
    fc.assert(
      fc.property(smooth, (curve) => {
        const old = curve.end - curve.start;
        const paced = pace(curve, { kind: 'ramps', rise: 0.2 * old, fall: 0.3 * old });
        keepsThePath(curve, paced);
        expect(paced.end - paced.start).toBeCloseTo(1.5 * old, 9);
        expect(speedAt(paced, paced.start)).toBe(0);
        expect(speedAt(paced, paced.end)).toBeCloseTo(0, 9);
        const middle = curve.start + 0.45 * old;
        expect(speedAt(paced, paced.retiming.newTime(middle))).toBeCloseTo(speedAt(curve, middle), 9);
        for (const t of timesOf(paced, 15))
          expect(differenceFromSlopes(paced, t, 1e-4, 'own')).toBeLessThan(1e-3);
        const same = pace(curve, { kind: 'ramps', rise: 0.2 * old, fall: 0.3 * old, seconds: old });
        expect(same.end).toBeCloseTo(curve.end, 12);
        keepsThePath(curve, same);
      }),
      RUNS,
    );
  });
});
