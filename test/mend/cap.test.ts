import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { codeOf } from '../support/edit-acceptance.js';
import { offThePath, peakOf, repaced } from '../support/pace-acceptance.js';
import { played, sparse } from '../support/pace-tracks.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };

describe('cap', () => {
  it('brings the speed of any track down to the limit, and adds time', () => {
    fc.assert(
      fc.property(played, fc.double({ min: 0.3, max: 0.95, noNaN: true }), (track, share) => {
        fc.pre(peakOf(track) > 1);
        const rate = peakOf(track) * share;
        const result = repaced(track, { verb: 'cap', rate });
        expect(peakOf(result.track)).toBeLessThanOrEqual(rate * 1.005);
        expect(result.price.seconds).toBeGreaterThan(0);
        expect(offThePath(track, result)).toBeLessThan(0.001);
      }),
      RUNS,
    );
  });

  it('leaves a track that is legal as it is', () => {
    fc.assert(
      fc.property(sparse, (track) => {
        const result = repaced(track, { verb: 'cap', rate: 2 * peakOf(track) + 1 });
        expect(result.changed).toEqual([]);
        expect(result.track).toBe(track);
      }),
      RUNS,
    );
  });

  it('refuses a limit of acceleration where the path has corners', () => {
    const [track] = fc.sample(
      sparse.filter((candidate) => candidate.times.length > 3),
      { numRuns: 1, seed: 1 },
    );
    expect(codeOf(() => repaced(track, { verb: 'cap', rate: 5, acceleration: 5 }))).toBe('step.corners');
    expect(codeOf(() => repaced(track, { verb: 'cap' }))).toBe('step.needs-rate');
  });
});
