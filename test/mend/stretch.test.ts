import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../support/edit-acceptance.js';
import { offThePath, peakOf, repaced } from '../support/pace-acceptance.js';
import { played, sparse } from '../support/pace-tracks.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };

describe('stretch and shrink', () => {
  it('scale every speed by one factor and keep every value but cubic tangents to the bit', () => {
    fc.assert(
      fc.property(played, fc.double({ min: 0.3, max: 3, noNaN: true }), (track, factor) => {
        fc.pre(Math.abs(factor - 1) > 0.01);
        const { times } = track;
        const length = times[times.length - 1] - times[0];
        const verb = factor > 1 ? 'stretch' : 'shrink';
        const result = repaced(track, { verb, seconds: factor * length });
        expect(peakOf(result.track) * factor).toBeCloseTo(peakOf(track), 5);
        expect(result.price.degrees).toBeLessThan(1e-6);
        expect(offThePath(track, result)).toBeLessThan(1e-6);
      }),
      RUNS,
    );
    const [track] = fc.sample(sparse, { numRuns: 1, seed: 1 });
    expect(codeOf(() => repaced(track, { verb: 'stretch', seconds: 0.01 }))).toBe('step.bad-length');
  });
});
