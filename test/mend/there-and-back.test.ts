import { angleBetween, playAs } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { repaced, travelled } from '../support/pace-acceptance.js';
import { played } from '../support/pace-tracks.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };

describe('there and back', () => {
  it('plays to the end and the same way back; the old keys stay to the bit', () => {
    fc.assert(
      fc.property(played, (track) => {
        const result = repaced(track, { verb: 'there and back' });
        const { times } = track;
        const end = times[times.length - 1];
        expect(result.track.times).toHaveLength(2 * times.length - 1);
        expect(result.price.degrees).toBeLessThan(1e-5);
        expect(result.price.seconds).toBeCloseTo(end - times[0], 9);
        expect(travelled(result.track)).toBeCloseTo(2 * travelled(track), 6);
        const curve = playAs(result.track, 'as-written');
        for (const ago of [0.01, 0.3, 0.77].map((share) => share * (end - times[0])))
          expect(
            angleBetween(curve.orientation([], end - ago), curve.orientation([], end + ago)),
          ).toBeLessThan(1e-9);
      }),
      RUNS,
    );
  });
});
