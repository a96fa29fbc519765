import { angleBetween, keyOrientation, playAs } from '@slewcurve/core';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { repaced } from '../support/pace-acceptance.js';
import { played } from '../support/pace-tracks.js';
import { grid, keyed, motions } from '../support/smooth-track.js';

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

  it('stops dead on cubics: all keys keep their numbers, and the curve is the old one before and after', () => {
    const cubics = fc.tuple(
      motions,
      fc.constantFrom(0, 7),
      fc.constantFrom('float32' as const, 'float64' as const),
    );
    fc.assert(
      fc.property(
        cubics,
        fc.double({ min: 0.1, max: 0.9, noNaN: true }),
        ([motion, onKey, timeComponent], share) => {
          const plain = keyed(motion, grid(12, 6).map(Math.fround), 'CUBICSPLINE');
          const track = { ...plain, storage: { ...plain.storage, timeComponent } };
          const { times } = track;
          const at = onKey > 0 ? times[onKey] : share * times[11];
          const result = repaced(track, { verb: 'hold', at, seconds: 0.5 });
          const [old, now] = [playAs(track, 'as-written'), playAs(result.track, 'as-written')];
          for (const key of times.keys()) {
            if (times[key] === at) continue;
            const moved = result.track.times.findIndex(
              (t) => Math.abs(t - result.repaced.retiming.newTime(times[key])) < 1e-6,
            );
            expect(result.track.values.slice(12 * moved, 12 * moved + 12)).toEqual(
              track.values.slice(12 * key, 12 * key + 12),
            );
          }
          // Between keys of unit length the cubic is a little shorter than 1: a key there, made 1 again, bends it by what the price tells.
          const near = result.price.degrees + 0.001;
          for (const u of [0.05, 0.25, 0.45, 0.65, 0.85, 0.97]) {
            const time = u * times[11];
            const then = time < at ? time : time + 0.5;
            expect(angleBetween(now.orientation([], then), old.orientation([], time)) * DEGREES).toBeLessThan(
              near,
            );
          }
          expect(result.price.degrees).toBeLessThan(0.2);
          expect(now.length(at + 1e-5, at + 0.49999) * DEGREES).toBeLessThan(1e-3);
        },
      ),
      RUNS,
    );
  });
});
