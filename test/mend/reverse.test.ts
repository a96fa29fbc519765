import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { repaced, travelled } from '../support/pace-acceptance.js';
import { dense, sparse } from '../support/pace-tracks.js';
import { smoothTracks } from '../support/smooth-track.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };

describe('reverse', () => {
  it('plays q(T − t), and twice gives the track back', () => {
    fc.assert(
      fc.property(
        fc.oneof(
          sparse,
          dense,
          smoothTracks.filter(({ interpolation }) => interpolation !== 'STEP'),
        ),
        (track) => {
          const result = repaced(track, { verb: 'reverse' });
          expect(result.price.degrees).toBeLessThan(1e-5);
          expect(travelled(result.track)).toBeCloseTo(travelled(track), 6);
          const back = repaced(result.track, { verb: 'reverse' });
          expect(back.track.values).toEqual(track.values);
          for (let key = 0; key < track.times.length; key++)
            expect(back.track.times[key]).toBeCloseTo(track.times[key], 12);
        },
      ),
      RUNS,
    );
  });
});
