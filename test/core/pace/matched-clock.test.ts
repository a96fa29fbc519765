import { type Curve, pace, playAs } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { oneAxisTrack } from '../../support/any-track.js';
import { codeOf } from '../../support/edit-acceptance.js';
import { arcs, keepsThePath, share, smooth, speedAt } from '../../support/keeps-the-path.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 5, endOnFailure: true };
const RADIANS = Math.PI / 180;

/** Both sides of a time, shaped to one speed over a reach that fits. */
function meeting(curve: Curve, at: number, rate: number) {
  const reach = 0.9 * Math.min(at - curve.start, curve.end - at);
  return (['before', 'after'] as const).map((side) => ({ at, side, rate, reach }));
}

describe('matched speeds', () => {
  it('are the asked one at both sides; the times of the join and of all beyond the reach stay', () => {
    fc.assert(
      fc.property(
        fc.oneof(smooth, arcs),
        share,
        fc.double({ min: 0.2, max: 1.5, noNaN: true }),
        (curve, where, rate) => {
          const at = curve.start + where * (curve.end - curve.start);
          const sides = meeting(curve, at, rate);
          const { reach } = sides[0];
          const code = codeOf(() => pace(curve, { kind: 'match', sides }));
          expect([undefined, 'pace.too-little-to-borrow']).toContain(code);
          fc.pre(code === undefined);
          const paced = pace(curve, { kind: 'match', sides });
          keepsThePath(curve, paced);
          expect(paced.end).toBe(curve.end);
          expect(paced.retiming.newTime(at)).toBeCloseTo(at, 12);
          const apart = 1e-7 * (curve.end - curve.start);
          for (const t of [at - apart, at + apart]) expect(speedAt(paced, t)).toBeCloseTo(rate, 4);
          for (const t of [at - reach * 1.01, at + reach * 1.01])
            expect(paced.retiming.oldTime(t)).toBeCloseTo(t, 12);
        },
      ),
      RUNS,
    );
  });

  it('let time run where asked: slower at the join, the rest comes later by as much', () => {
    // 90 deg/s met at 45: v* = 90 − 45·e, e the minimum-jerk step over 0.5 s of old time on both sides.
    const curve = playAs(oneAxisTrack([0, 2], [0, 180]), 'as-written');
    const sides = [
      { at: 1, side: 'before' as const, rate: 45 * RADIANS, reach: 0.5 },
      { at: 1, side: 'after' as const, rate: 45 * RADIANS, reach: 0.5 },
    ];
    const paced = pace(curve, { kind: 'match', sides, ends: 'run' });
    // 2·∫₀^½ dt/(1 − m(2t)/2) by Simpson's rule, 200 pieces.
    let sum = 0;
    for (let i = 0; i <= 200; i++) {
      const u = i / 200;
      const slowed = 1 / (1 - 0.5 * u ** 3 * (10 - 15 * u + 6 * u * u));
      sum += (slowed * (i === 0 || i === 200 ? 1 : i % 2 === 1 ? 4 : 2)) / 600;
    }
    // Some 500 straight pieces on either side: 1e-6 of the time.
    expect(paced.end).toBeCloseTo(1 + sum, 5);
    expect(speedAt(paced, paced.retiming.newTime(1))).toBeCloseTo(45 * RADIANS, 6);
  });

  it('come down to rest and up from it: both ends stay', () => {
    const curve = playAs(oneAxisTrack([0, 2], [0, 180]), 'as-written');
    const paced = pace(curve, {
      kind: 'match',
      sides: [
        { at: 0, side: 'after', rate: 0, reach: 1 },
        { at: 2, side: 'before', rate: 0, reach: 1 },
      ],
    });
    expect(speedAt(paced, 0)).toBe(0);
    expect(speedAt(paced, 2 - 1e-6)).toBeLessThan(1e-5);
    expect(paced.end).toBe(2);
    expect(paced.length(0, 2) / RADIANS).toBeCloseTo(180, 9);
    keepsThePath(curve, paced);
  });

  it('are refused where nothing turns, where two sides overlap, or the time is outside', () => {
    const curve = playAs(oneAxisTrack([0, 1, 2], [0, 0, 90]), 'as-written');
    const one = { at: 1, side: 'before' as const, rate: 1, reach: 0.5 };
    const code = (...sides: readonly (typeof one | (Omit<typeof one, 'side'> & { side: 'after' }))[]) =>
      codeOf(() => pace(curve, { kind: 'match', sides }));
    expect(code(one)).toBe('pace.no-turn');
    expect(code({ ...one, at: 3 })).toBe('pace.bad-match');
    expect(code({ ...one, at: 2, reach: 0.8 }, { ...one, side: 'after', reach: 0.8 })).toBe('pace.bad-match');
  });
});
