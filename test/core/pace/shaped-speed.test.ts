import { type PaceLaw, pace } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../../support/edit-acceptance.js';
import { arcs, keepsThePath, share, smooth, speedAt } from '../../support/keeps-the-path.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 5, endOnFailure: true };

describe('shaped speeds', () => {
  it('presses the trace: with the same ends the area stays, and no speed falls below nothing', () => {
    const by = fc.double({ min: -2, max: 2, noNaN: true });
    let taken = 0;
    fc.assert(
      fc.property(fc.oneof(smooth, arcs), share, by, (curve, at, size) => {
        const old = curve.end - curve.start;
        const law: PaceLaw = {
          kind: 'press',
          at: curve.start + at * old,
          reach: old / 5,
          by: size,
          ends: 'same',
        };
        const code = codeOf(() => pace(curve, law));
        expect([undefined, 'pace.too-little-to-borrow']).toContain(code);
        if (code !== undefined) return;
        const paced = pace(curve, law);
        taken++;
        keepsThePath(curve, paced);
        expect(paced.end).toBeCloseTo(curve.end, 12);
        const was = speedAt(curve, law.kind === 'press' ? law.at : 0);
        // At the place itself the trace goes where it is pressed to; on smooth paths to the width of a place.
        expect(speedAt(paced, law.kind === 'press' ? law.at : 0)).toBeCloseTo(Math.max(0, was + size), 1);
      }),
      RUNS,
    );
    expect(taken).toBeGreaterThan(0);
  });

  it('presses the trace and lets time run: the path stays, the time is ∫dS/v*', () => {
    fc.assert(
      fc.property(smooth, share, fc.double({ min: 0.1, max: 2, noNaN: true }), (curve, at, by) => {
        const old = curve.end - curve.start;
        const paced = pace(curve, {
          kind: 'press',
          at: curve.start + at * old,
          reach: old / 5,
          by,
          ends: 'run',
        });
        keepsThePath(curve, paced);
        expect(paced.end).toBeLessThan(curve.end);
      }),
      RUNS,
    );
    expect(
      codeOf(() => {
        const [curve] = fc.sample(arcs, 1);
        pace(curve, { kind: 'press', at: curve.start + 0.01, reach: 1, by: -1e3, ends: 'run' });
      }),
    ).toBe('pace.stands-still');
  });

  it('follows a drawn speed, scaled to the angle that there is', () => {
    fc.assert(
      fc.property(
        smooth,
        fc.array(fc.double({ min: 0, max: 3, noNaN: true }), { minLength: 3, maxLength: 9 }),
        (curve, heights) => {
          fc.pre(heights.some((height) => height > 0.1));
          const old = curve.end - curve.start;
          const times = heights.map((_, i) => (i / (heights.length - 1)) * old);
          const paced = pace(curve, { kind: 'drawn', times, speeds: heights });
          keepsThePath(curve, paced);
          const total = curve.length(curve.start, curve.end);
          const drawn =
            heights.slice(1).reduce((sum, height, i) => sum + (height + heights[i]) / 2, 0) *
            (old / (heights.length - 1));
          expect(speedAt(paced, curve.start + times[1])).toBeCloseTo((heights[1] * total) / drawn, 6);
        },
      ),
      RUNS,
    );
  });
});
