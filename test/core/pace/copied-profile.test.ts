import { pace, playAs } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { oneAxisTrack } from '../../support/any-track.js';
import { codeOf } from '../../support/edit-acceptance.js';
import { arcs, keepsThePath, share, smooth, speedAt } from '../../support/keeps-the-path.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 5, endOnFailure: true };

describe('a copied pace', () => {
  it('is v₂(u) = v₁(u)·(S₂/T₂)/(S₁/T₁), over any span of the other curve and any time', () => {
    fc.assert(
      fc.property(
        fc.oneof(smooth, arcs),
        fc.oneof(smooth, arcs),
        share,
        fc.double({ min: 0.5, max: 4, noNaN: true }),
        (curve, of, cut, seconds) => {
          const ofSpan = [of.start, of.start + Math.max(0.3, cut) * (of.end - of.start)] as const;
          const paced = pace(curve, { kind: 'copy', of, ofSpan, seconds });
          keepsThePath(curve, paced);
          expect(paced.end - paced.start).toBeCloseTo(seconds, 12);
          const ratio =
            curve.length(curve.start, curve.end) / seconds / (of.length(...ofSpan) / (ofSpan[1] - ofSpan[0]));
          for (let i = 0; i < 20; i++) {
            const u = (i + 0.37) / 20;
            const t = ofSpan[0] + u * (ofSpan[1] - ofSpan[0]);
            const isFar = of.knots.every((knot) => Math.abs(knot - t) > 1e-6);
            const off = speedAt(paced, paced.start + u * seconds) - ratio * speedAt(of, t);
            expect(isFar ? Math.abs(off) : 0).toBeLessThan(1e-9);
          }
        },
      ),
      RUNS,
    );
  });

  it('of one steady speed is one steady speed, and a rest in it is a rest', () => {
    const [curve] = fc.sample(smooth, 1);
    const steady = pace(curve, { kind: 'copy', of: playAs(oneAxisTrack([0, 1], [0, 60]), 'as-written') });
    const mean = curve.length(curve.start, curve.end) / (curve.end - curve.start);
    expect(speedAt(steady, (curve.start + curve.end) / 2)).toBeCloseTo(mean, 9);
    const resting = playAs(oneAxisTrack([0, 1, 2, 3], [0, 60, 60, 120]), 'as-written');
    const paced = pace(curve, { kind: 'copy', of: resting, seconds: 3 });
    expect(speedAt(paced, paced.start + 1.5)).toBe(0);
    keepsThePath(curve, paced);
  });

  it('is refused where the other does not turn, or its span is none', () => {
    const [curve] = fc.sample(smooth, 1);
    const of = playAs(oneAxisTrack([0, 1, 2], [0, 60, 60]), 'as-written');
    expect(codeOf(() => pace(curve, { kind: 'copy', of, ofSpan: [1, 2] }))).toBe('pace.no-turn');
    expect(codeOf(() => pace(curve, { kind: 'copy', of, ofSpan: [1, 5] }))).toBe('pace.bad-span');
  });
});
