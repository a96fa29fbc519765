import { angleBetween, keyOrientation, playAs } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { repaced } from '../support/pace-acceptance.js';
import { played } from '../support/pace-tracks.js';

fc.configureGlobal({ ...fc.readConfigureGlobal(), seed: 5 });
const RUNS = { numRuns: 15, endOnFailure: true };
const DEGREES = 180 / Math.PI;

describe('hold', () => {
  it('stands still for as long as asked; what follows comes as much later', () => {
    fc.assert(
      fc.property(
        played,
        fc.double({ min: 0.1, max: 0.9, noNaN: true }),
        fc.constantFrom(0, 0.2),
        (track, share, shoulders) => {
          const { times } = track;
          const last = times.length - 1;
          const at = times[0] + share * (times[last] - times[0]);
          const result = repaced(track, {
            verb: 'hold',
            at,
            seconds: 0.5,
            ...(shoulders > 0 && { shoulders }),
          });
          const curve = playAs(result.track, 'as-written');
          const begins = result.repaced.retiming.newTime(at);
          expect(curve.length(begins, begins + 0.5) * DEGREES).toBeLessThan(1e-6);
          expect(
            angleBetween(curve.orientation([], begins), playAs(track, 'as-written').orientation([], at)) *
              DEGREES,
          ).toBeLessThan(1e-6);
          const later = Math.min(shoulders, at - times[0]) + Math.min(shoulders, times[last] - at);
          expect(result.price.seconds).toBeCloseTo(0.5 + later, 6);
          expect(
            angleBetween(
              keyOrientation([], result.track, result.track.times.length - 1),
              keyOrientation([], track, last),
            ),
          ).toBe(0);
        },
      ),
      RUNS,
    );
  });
});
